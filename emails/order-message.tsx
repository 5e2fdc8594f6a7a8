import { z } from "zod"
import { dayWords } from "~/domain/calendar"
import { orderFacts, sampleOrder } from "./order-props"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { Lead, Small, Title } from "./parts/text"
import { words } from "./props"

/** What one side has written to the other about an order; `writer` is a person, `from` the store or the producer. */
export const schema = orderFacts.extend({ writer: words, from: words, body: z.string().trim().min(1).max(4000) })
type Props = z.infer<typeof schema>

export const sample = {
	...sampleOrder,
	writer: "Ida",
	from: "Larkmoor Bee Yard",
	body: "The van comes at seven on Tuesday, an hour early.\nWill somebody be at the back door?",
} satisfies Props

export function subject({ writer, from, orderNumber }: Props): string {
	return `${writer} of ${from} writes about order ${orderNumber}`
}

/** The lines of a message, each once with the place it stands in. */
function paragraphs(body: string): { key: string; text: string }[] {
	return body
		.split(/\n+/)
		.map((text) => text.trim())
		.filter((text) => text !== "")
		.map((text, index) => ({ key: `${index} ${text}`, text }))
}

export default function OrderMessage(props: Props) {
	const { yard, sentTo, orderNumber, deliveryOn, orderUrl, writer, from, body } = props
	return (
		<Frame
			title={subject(props)}
			preview={`About the order for ${dayWords(deliveryOn)}.`}
			yard={yard}
			about={[`Order ${orderNumber}`, dayWords(deliveryOn)]}
			sentTo={sentTo}
		>
			<Title>
				{writer} of {from} writes:
			</Title>
			{paragraphs(body).map(({ key, text }) => (
				<Lead key={key}>{text}</Lead>
			))}
			<Button href={orderUrl} words="Answer on the order" />
			<Small lines={["Answer there, so that both sides find it beside the order."]} />
		</Frame>
	)
}
