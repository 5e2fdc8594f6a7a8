import { z } from "zod"
import { dayWords } from "~/domain/calendar"
import { givenLines, orderFacts, sampleOrder, sumsUp } from "./order-props"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { LineTable } from "./parts/line-table"
import { stripCaption } from "./parts/strip-cells"
import { Lead, Small, Title } from "./parts/text"
import { sentence, words } from "./props"
import { mistakeWords, NOT_FOR_INFANTS } from "./words"

/**
 * What a store gets of a product that did not reach for all who asked: its own figures and the rule, in one sentence for
 * each of its orders of the day. Lines beyond the product itself stand in for it.
 */
export const schema = orderFacts
	.extend(givenLines)
	.extend({ productName: words, sentences: z.array(sentence).min(1).max(50) })
	.refine(sumsUp, { path: ["totalCents"], message: "is not the sum of the lines and charges" })
type Props = z.infer<typeof schema>

export const sample = {
	...sampleOrder,
	productName: "Basswood section, clover",
	sentences: ["You asked 4 and get 2. We gave one case each until the 18 were gone."],
	lines: [
		{
			productName: "Basswood section, clover",
			productNote: "Fancy, 13 oz",
			casesAsked: 4,
			casesGiven: 2,
			priceCents: 14250,
			amountCents: 28500,
		},
	],
	charges: [],
	totalCents: 28500,
} satisfies Props

const isShort = ({ lines }: Props) => lines.some((line) => line.casesGiven < line.casesAsked)

export function subject(props: Props): string {
	const end = `${props.productName} for ${dayWords(props.deliveryOn)}`
	return isShort(props) ? `Less than you asked: ${end}` : `All that you asked: ${end}`
}

export default function OrderShared(props: Props) {
	const { yard, sentTo, storeName, orderNumber, deliveryOn, productName, sentences, lines, orderUrl } = props
	const day = dayWords(deliveryOn)
	return (
		<Frame
			title={subject(props)}
			preview={sentences[0] ?? ""}
			yard={yard}
			about={[`Order ${orderNumber}`, day]}
			sentTo={sentTo}
		>
			<Title>
				{productName} for {day} was short and is shared out.
			</Title>
			<Lead>For {storeName}.</Lead>
			{sentences.map((words) => (
				<Lead key={words}>{words}</Lead>
			))}
			<Button href={orderUrl} words="Open the order" />
			<LineTable
				casesHead="Cases given"
				lines={lines.map((line) => ({
					name: line.productName,
					note: line.productNote ?? "",
					cases: stripCaption(line.casesGiven, line.casesAsked),
					strip: { given: line.casesGiven, asked: line.casesAsked },
					priceCents: line.priceCents,
					amount: line.amountCents,
				}))}
				charges={[]}
				total={{ label: "Together", cents: props.totalCents }}
			/>
			<Small lines={["The rest of your order stays as it is.", NOT_FOR_INFANTS, mistakeWords(yard)]} />
		</Frame>
	)
}
