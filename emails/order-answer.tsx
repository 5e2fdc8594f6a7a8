import { z } from "zod"
import { dayWords } from "~/domain/calendar"
import { lateChange, orderFacts, sampleLateChange, sampleOrder } from "./order-props"
import { Button } from "./parts/button"
import { ChangeTable } from "./parts/change-table"
import { Frame } from "./parts/frame"
import { Lead, Title } from "./parts/text"
import { words } from "./props"

/** To the producer's desk: what a store has answered to a change it was asked about. */
export const schema = orderFacts.extend({
	...lateChange,
	answer: z.enum(["accepted", "declined"]),
	answeredBy: words,
})
type Props = z.infer<typeof schema>

export const sample = {
	...sampleOrder,
	...sampleLateChange,
	sentTo: "ida@larkmoor.example.test",
	answer: "accepted",
	answeredBy: "Rosa Quill",
} satisfies Props

export function subject({ storeName, answer, orderNumber }: Props): string {
	return `${storeName} has ${answer} the change to order ${orderNumber}`
}

export default function OrderAnswer(props: Props) {
	const { yard, sentTo, storeName, orderNumber, deliveryOn, orderUrl, answer, answeredBy } = props
	return (
		<Frame
			title={subject(props)}
			preview={answer === "accepted" ? "The order is changed." : "The order stands as it was confirmed."}
			yard={yard}
			about={[`Order ${orderNumber}`, dayWords(deliveryOn)]}
			sentTo={sentTo}
		>
			<Title>
				{storeName} has {answer} the change.
			</Title>
			<Lead>
				{answeredBy} answered.{" "}
				{answer === "accepted"
					? "The order is changed as below."
					: "The order stands as it was confirmed, without this:"}
			</Lead>
			<ChangeTable {...props} />
			<Button href={orderUrl} words="Open the order" />
		</Frame>
	)
}
