import { z } from "zod"
import { dayWords } from "~/domain/calendar"
import { lateChange, orderFacts, sampleLateChange, sampleOrder } from "./order-props"
import { Button } from "./parts/button"
import { ChangeTable } from "./parts/change-table"
import { Frame } from "./parts/frame"
import { Lead, Note, Small, Title } from "./parts/text"
import { mistakeWords } from "./words"

/** A confirmed order gives more or costs less now; or a change that was asked for is asked for no more. */
export const schema = orderFacts.extend({ ...lateChange, what: z.enum(["applied", "taken-back"]) })
type Props = z.infer<typeof schema>

export const sample = {
	...sampleOrder,
	...sampleLateChange,
	reason: "More came off the hives than we counted on.",
	lines: [
		{
			productName: "Basswood section, clover",
			productNote: "Fancy, 13 oz, case of 12",
			change: "4 cases instead of 2",
		},
	],
	beforeCents: 28500,
	afterCents: 57000,
	what: "applied",
} satisfies Props

export function subject({ deliveryOn, what }: Props): string {
	const day = dayWords(deliveryOn)
	return what === "applied"
		? `Changed in your favour: your order for ${day}`
		: `No change after all: your order for ${day}`
}

export default function OrderChanged(props: Props) {
	const { yard, sentTo, storeName, orderNumber, deliveryOn, orderUrl, reason, what } = props
	const isApplied = what === "applied"
	return (
		<Frame
			title={subject(props)}
			preview={isApplied ? "It gives more or costs less." : "Your order stands as it was confirmed."}
			yard={yard}
			about={[`Order ${orderNumber}`, dayWords(deliveryOn)]}
			sentTo={sentTo}
		>
			<Title>
				{isApplied
					? `Your order for ${dayWords(deliveryOn)} gives more or costs less.`
					: `Your order for ${dayWords(deliveryOn)} stands as it was confirmed.`}
			</Title>
			<Lead>
				For {storeName}.{" "}
				{isApplied
					? "There is nothing you need to do."
					: "The change below, which you were asked about, is taken back. There is nothing to answer any more."}
			</Lead>
			<Note>{reason}</Note>
			<ChangeTable {...props} />
			<Button href={orderUrl} words="Open the order" />
			<Small lines={[mistakeWords(yard)]} />
		</Frame>
	)
}
