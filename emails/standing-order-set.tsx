import { z } from "zod"
import { dayWords } from "~/domain/calendar"
import { casesWords } from "~/domain/quantity"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { PlainTable } from "./parts/plain-table"
import { Lead, Small, Title } from "./parts/text"
import { cases, day, mailAddress, sampleYard, webAddress, words, yard } from "./props"
import { mistakeWords } from "./words"

/**
 * The acknowledgement of a standing order. `cadence` is the rule in words ("every other Tuesday"), `changeUntil` each
 * date's cut-off in words, in the producer's time zone. A line with `leastCases` is left out of a delivery that cannot
 * give that much.
 */
export const schema = z.object({
	yard,
	sentTo: mailAddress,
	storeName: words,
	cadence: words,
	lines: z
		.array(z.object({ productName: words, productNote: words.nullish(), cases, leastCases: cases.nullish() }))
		.min(1)
		.max(1000),
	nextDates: z
		.array(z.object({ deliveryOn: day, changeUntil: words }))
		.min(1)
		.max(12),
	standingOrderUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	yard: sampleYard,
	sentTo: "rosa@pantryandplume.example.test",
	storeName: "Pantry & Plume",
	cadence: "every other Tuesday",
	lines: [
		{ productName: "Round section, clover", productNote: "Fancy, 8 oz, case of 12", cases: 3, leastCases: 1 },
		{ productName: "Cut comb, clover", productNote: "12 oz, case of 8", cases: 2 },
	],
	nextDates: [
		{ deliveryOn: "2026-08-18", changeUntil: "noon on Friday, August 14" },
		{ deliveryOn: "2026-09-01", changeUntil: "noon on Friday, August 28" },
		{ deliveryOn: "2026-09-15", changeUntil: "noon on Friday, September 11" },
	],
	standingOrderUrl: "https://waxbill.example.test/buy/larkmoor/standing-order",
} satisfies Props

export function subject({ cadence, yard }: Props): string {
	return `Your standing order with ${yard.name}: ${cadence}`
}

export default function StandingOrderSet(props: Props) {
	const { yard, sentTo, storeName, cadence, lines, nextDates, standingOrderUrl } = props
	const first = nextDates[0]
	return (
		<Frame
			title={subject(props)}
			preview={first ? `First on ${dayWords(first.deliveryOn)}.` : cadence}
			yard={yard}
			about={["Standing order"]}
			sentTo={sentTo}
		>
			<Title>We have your standing order, {cadence}.</Title>
			<Lead>
				For {storeName}. At each cut-off it becomes an order; until then you can change it, skip a date or change one
				date only.
			</Lead>
			<Button href={standingOrderUrl} words="Open the standing order" />
			<PlainTable
				heads={["Product", "Each time"]}
				rows={lines.map((line) => ({
					key: line.productName,
					name: line.productName,
					note: line.productNote,
					figure: casesWords(line.cases),
					figureNote: line.leastCases ? `at least ${line.leastCases}, or none` : null,
				}))}
			/>
			<PlainTable
				heads={["Next deliveries", "Change until"]}
				rows={nextDates.map((date) => ({
					key: date.deliveryOn,
					name: dayWords(date.deliveryOn),
					figure: date.changeUntil,
				}))}
			/>
			<Small lines={["If a product is short, it is shared out and a letter says so.", mistakeWords(yard)]} />
		</Frame>
	)
}
