import { z } from "zod"
import { piecesWords } from "~/domain/quantity"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { PlainTable } from "./parts/plain-table"
import { Lead, Note, Small, Title } from "./parts/text"
import { mailAddress, sampleYard, sentence, webAddress, words, yard } from "./props"

/** Lots are called back: which the store had, why, what to do, and where to answer. */
export const schema = z.object({
	yard,
	sentTo: mailAddress,
	storeName: words,
	number: z.int().positive(),
	reason: sentence,
	instructions: sentence,
	lots: z.array(z.object({ code: words, productName: words, pieces: z.int().positive() })).min(1),
	noticeUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	yard: sampleYard,
	sentTo: "rosa@pantryandplume.example.test",
	storeName: "Pantry & Plume",
	number: 3,
	reason: "Some boxes of this lot were closed with a cracked lid, and ants may have come in.",
	instructions: "Take the pieces off the shelf, keep them apart, and do not throw them away until we have called.",
	lots: [
		{ code: "C26-014", productName: "Clear-box section, sainfoin", pieces: 36 },
		{ code: "C26-015", productName: "Clear-box section, sainfoin", pieces: 12 },
	],
	noticeUrl: "https://waxbill.example.test/shop/larkmoor/notices/sample",
} satisfies Props

const lotWords = ({ lots }: Props) =>
	lots.length === 1 ? `lot ${lots[0]?.code}` : `lots ${lots.map(({ code }) => code).join(", ")}`

export function subject(props: Props): string {
	return `Please stop selling ${lotWords(props)} from ${props.yard.name}`
}

export default function Withdrawal(props: Props) {
	const { yard, sentTo, storeName, number, reason, instructions, lots, noticeUrl } = props
	const call = yard.phone ? ` or call ${yard.phone}` : ""
	return (
		<Frame
			title={subject(props)}
			preview="What to do, and how many pieces you had."
			yard={yard}
			about={[`Withdrawal ${number}`]}
			sentTo={sentTo}
		>
			<Title>Please stop selling {lotWords(props)}.</Title>
			<Lead>
				For {storeName}. {reason}
			</Lead>
			<Lead>
				<b>What to do.</b> {instructions}
			</Lead>
			<Button href={noticeUrl} words="Say how many you still hold" />
			<PlainTable
				heads={["Lot", "You had"]}
				rows={lots.map((lot) => ({
					key: lot.code,
					name: lot.code,
					note: lot.productName,
					figure: piecesWords(lot.pieces),
				}))}
			/>
			<Note>The lot is printed on every label. What carries another lot is not meant.</Note>
			<Small
				lines={[
					`The link needs no sign-in. Pass it only to whoever answers for ${storeName}. Questions: write back${call}.`,
				]}
			/>
		</Frame>
	)
}
