import { z } from "zod"
import { dayWords } from "~/domain/calendar"
import { casesWords } from "~/domain/quantity"
import { orderFacts, sampleOrder, sumsUp } from "./order-props"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { LineTable } from "./parts/line-table"
import { Lead, Note, Small, Title } from "./parts/text"
import { cases, cents, charge, words } from "./props"
import { mistakeWords, NOT_FOR_INFANTS } from "./words"

/**
 * The acknowledgement of an order. A line with `toBeShared` is in short supply: its cases are the most the store can get
 * and its `amountCents` is 0, since it stays out of the sure total. `changeUntil` is the cut-off in words, in the
 * producer's time zone ("noon on Friday, August 14"). Refused when the parts do not sum to `totalCents`.
 */
export const schema = orderFacts
	.extend({
		changeUntil: words.nullish(),
		/** It was there before, and its lines have been changed by the store. */
		isChanged: z.boolean().optional(),
		lines: z
			.array(
				z.object({
					productName: words,
					productNote: words.nullish(),
					cases,
					priceCents: cents,
					amountCents: cents,
					toBeShared: z.boolean(),
				}),
			)
			.min(1)
			.max(1000),
		charges: z.array(charge).max(20),
		totalCents: cents,
	})
	.refine(({ lines }) => lines.every((line) => !line.toBeShared || line.amountCents === 0), {
		path: ["lines"],
		message: "that are to be shared out have no amount yet",
	})
	.refine(sumsUp, { path: ["totalCents"], message: "is not the sum of the lines and charges" })
type Props = z.infer<typeof schema>

export const sample = {
	...sampleOrder,
	changeUntil: "noon on Friday, August 14",
	lines: [
		{
			productName: "Round section, clover",
			productNote: "Fancy, 8 oz, case of 12",
			cases: 3,
			priceCents: 10830,
			amountCents: 32490,
			toBeShared: false,
		},
		{
			productName: "Basswood section, clover",
			productNote: "Fancy, 13 oz, case of 12",
			cases: 4,
			priceCents: 14250,
			amountCents: 0,
			toBeShared: true,
		},
		{
			productName: "Cut comb, clover",
			productNote: "12 oz, case of 8",
			cases: 2,
			priceCents: 9400,
			amountCents: 18800,
			toBeShared: false,
		},
	],
	charges: [{ label: "Delivery", cents: 1500 }],
	totalCents: 52790,
} satisfies Props

export function subject({ deliveryOn, orderNumber, isChanged }: Props): string {
	if (isChanged) return `Your order ${orderNumber} for ${dayWords(deliveryOn)} is changed`
	return `We have your order ${orderNumber} for ${dayWords(deliveryOn)}`
}

export default function OrderReceived(props: Props) {
	const { yard, sentTo, storeName, orderNumber, deliveryOn, changeUntil, lines, charges, totalCents, orderUrl } = props
	const shared = lines.filter((line) => line.toBeShared).map((line) => line.productName)
	const day = dayWords(deliveryOn)
	return (
		<Frame
			title={subject(props)}
			preview={`${yard.name} has it and will confirm it.`}
			yard={yard}
			about={[`Order ${orderNumber}`, day]}
			sentTo={sentTo}
		>
			<Title>{props.isChanged ? `We have your changed order for ${day}.` : `We have your order for ${day}.`}</Title>
			<Lead>
				For {storeName}. {yard.name} confirms it with another letter.
				{changeUntil && ` You can change it until ${changeUntil}.`}
			</Lead>
			<Button href={orderUrl} words="Open the order" />
			<LineTable
				casesHead="Cases asked"
				lines={lines.map((line) => ({
					name: line.productName,
					note: line.productNote,
					cases: line.toBeShared ? `up to ${line.cases}` : `${line.cases}`,
					priceCents: line.priceCents,
					amount: line.toBeShared ? "to be shared out" : line.amountCents,
				}))}
				charges={charges}
				total={{ label: shared.length > 0 ? "Sure total" : "Total", cents: totalCents }}
			/>
			{shared.length > 0 && (
				<Note>
					{sharedSentence(lines)} You keep the price break of what you asked for, and pay only for what you get.
				</Note>
			)}
			<Small lines={[NOT_FOR_INFANTS, mistakeWords(yard)]} />
		</Frame>
	)
}

function sharedSentence(lines: Props["lines"]): string {
	const asked = lines
		.filter((line) => line.toBeShared)
		.map((line) => `${line.productName} (up to ${casesWords(line.cases)})`)
	return `More was asked than there is, so this is to be shared out: ${asked.join("; ")}.`
}
