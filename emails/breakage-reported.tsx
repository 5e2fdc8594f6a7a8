import { z } from "zod"
import { piecesWords } from "~/domain/quantity"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { PlainTable } from "./parts/plain-table"
import { Lead, Note, Small, Title } from "./parts/text"
import { mailAddress, sampleYard, sentence, webAddress, words, yard } from "./props"

/** Tells the desk that a store has reported broken comb. The photos stay on the page. */
export const schema = z.object({
	yard,
	sentTo: mailAddress,
	storeName: words,
	invoiceNumber: words,
	personName: words,
	note: sentence.nullish(),
	lines: z
		.array(
			z.object({
				productName: words,
				productNote: words.nullish(),
				pieces: z.int().positive(),
				photos: z.int().nonnegative(),
			}),
		)
		.min(1)
		.max(1000),
	reportUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	yard: sampleYard,
	sentTo: "ida@larkmoor.example.test",
	storeName: "Pantry & Plume",
	invoiceNumber: "2026-0412",
	personName: "Rosa Quill",
	note: "The lowest case was wet when we opened it.",
	lines: [
		{ productName: "Round section, clover", productNote: "Fancy, 8 oz, case of 12", pieces: 5, photos: 2 },
		{ productName: "Basswood section, clover", productNote: "Fancy, 13 oz, case of 12", pieces: 1, photos: 0 },
	],
	reportUrl: "https://waxbill.example.test/desk/larkmoor/breakage/6f0c5a52-3a2c-4f0e-9f6b-2f4f5f1d9a11",
} satisfies Props

const countOf = (lines: Props["lines"]) => lines.reduce((sum, { pieces }) => sum + pieces, 0)

export function subject({ storeName, invoiceNumber, lines }: Props): string {
	return `${storeName}: ${piecesWords(countOf(lines))} broken, of invoice ${invoiceNumber}`
}

export default function BreakageReported(props: Props) {
	const { yard, sentTo, storeName, invoiceNumber, personName, note, lines, reportUrl } = props
	return (
		<Frame
			title={subject(props)}
			preview={`${personName} has reported it and waits for your answer.`}
			yard={yard}
			about={[`Invoice ${invoiceNumber}`]}
			sentTo={sentTo}
		>
			<Title>{storeName} reports broken comb.</Title>
			<Lead>
				{personName} wrote down {piecesWords(countOf(lines))} of invoice {invoiceNumber} and waits for your answer.
			</Lead>
			{note && <Note>{note}</Note>}
			<Button href={reportUrl} words="Look at it and answer" />
			<PlainTable
				heads={["Product", "Broken"]}
				rows={lines.map(({ productName, productNote, pieces, photos }, index) => ({
					key: `${index}`,
					name: productName,
					note: productNote,
					figure: piecesWords(pieces),
					figureNote: photos === 0 ? "no photo" : photos === 1 ? "1 photo" : `${photos} photos`,
				}))}
			/>
			<Small lines={["Nothing is credited before you answer."]} />
		</Frame>
	)
}
