import type { z } from "zod"
import { dayWords } from "~/domain/calendar"
import { lateChange, orderFacts, sampleLateChange, sampleOrder } from "./order-props"
import { Button } from "./parts/button"
import { ChangeTable } from "./parts/change-table"
import { Frame } from "./parts/frame"
import { Lead, Note, Small, Title } from "./parts/text"
import { mistakeWords } from "./words"

/** The producer asks to change a confirmed order; it stands as confirmed until the store accepts. */
export const schema = orderFacts.extend(lateChange)
type Props = z.infer<typeof schema>

export const sample = { ...sampleOrder, ...sampleLateChange } satisfies Props

export function subject({ yard, deliveryOn }: Props): string {
	return `${yard.name} asks to change your order for ${dayWords(deliveryOn)}`
}

export default function OrderProposal(props: Props) {
	const { yard, sentTo, storeName, orderNumber, deliveryOn, orderUrl, reason } = props
	return (
		<Frame
			title={subject(props)}
			preview="Please accept or decline; until then your order stands as confirmed."
			yard={yard}
			about={[`Order ${orderNumber}`, dayWords(deliveryOn)]}
			sentTo={sentTo}
		>
			<Title>A change to your order for {dayWords(deliveryOn)} needs your answer.</Title>
			<Lead>
				For {storeName}. Nothing changes unless you accept. If you decline, the order stands as it was confirmed and{" "}
				{yard.name} is told.
			</Lead>
			<Note>{reason}</Note>
			<ChangeTable {...props} />
			<Button href={orderUrl} words="Accept or decline" />
			<Small lines={[mistakeWords(yard)]} />
		</Frame>
	)
}
