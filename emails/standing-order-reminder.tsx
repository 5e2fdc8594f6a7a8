import { z } from "zod"
import { dayWords } from "~/domain/calendar"
import { casesWords } from "~/domain/quantity"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { PlainTable } from "./parts/plain-table"
import { Lead, Small, Title } from "./parts/text"
import { cases, day, mailAddress, sampleYard, webAddress, words, yard } from "./props"
import { mistakeWords } from "./words"

/** Tells a day before last orders what a standing order is about to ask; `dateUrl` opens that one date. */
export const schema = z.object({
	yard,
	sentTo: mailAddress,
	storeName: words,
	deliveryOn: day,
	changeUntil: words,
	lines: z
		.array(z.object({ productName: words, productNote: words.nullish(), cases }))
		.min(1)
		.max(1000),
	dateUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	yard: sampleYard,
	sentTo: "rosa@pantryandplume.example.test",
	storeName: "Pantry & Plume",
	deliveryOn: "2026-08-18",
	changeUntil: "noon on Friday, August 14",
	lines: [
		{ productName: "Round section, clover", productNote: "Fancy, 8 oz, case of 12", cases: 2 },
		{ productName: "Cut comb, clover", productNote: "12 oz, case of 8", cases: 2 },
	],
	dateUrl: "https://waxbill.example.test/buy/larkmoor/pantry-and-plume/standing?date=2026-08-18",
} satisfies Props

export function subject({ deliveryOn, yard }: Props): string {
	return `Your delivery from ${yard.name} on ${dayWords(deliveryOn)}: still right?`
}

export default function StandingOrderReminder(props: Props) {
	const { yard, sentTo, storeName, deliveryOn, changeUntil, lines, dateUrl } = props
	return (
		<Frame
			title={subject(props)}
			preview={`You can change it until ${changeUntil}.`}
			yard={yard}
			about={["Standing order"]}
			sentTo={sentTo}
		>
			<Title>This comes on {dayWords(deliveryOn)}.</Title>
			<Lead>
				Your standing order for {storeName} becomes an order at {changeUntil}. Until then you can change or skip this
				date. If it is right, there is nothing to do.
			</Lead>
			<Button href={dateUrl} words="Change this date" />
			<PlainTable
				heads={["Product", "Asked"]}
				rows={lines.map((line) => ({
					key: line.productName,
					name: line.productName,
					note: line.productNote,
					figure: casesWords(line.cases),
				}))}
			/>
			<Small lines={["If a product is short, it is shared out and a letter says so.", mistakeWords(yard)]} />
		</Frame>
	)
}
