import type { z } from "zod"
import { dayWords } from "~/domain/calendar"
import { givenLines, orderFacts, sampleGivenLines, sampleOrder, sumsUp } from "./order-props"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { GivenTable } from "./parts/given-table"
import { Lead, Small, Title } from "./parts/text"
import { casesInSentence, KEEP_COMB, mistakeWords, NOT_FOR_INFANTS } from "./words"

/** What has left the yard; lines as packed. */
export const schema = orderFacts
	.extend(givenLines)
	.refine(sumsUp, { path: ["totalCents"], message: "is not the sum of the lines and charges" })
type Props = z.infer<typeof schema>

export const sample = { ...sampleOrder, ...sampleGivenLines } satisfies Props

export function subject({ deliveryOn, orderNumber }: Props): string {
	return `On its way: order ${orderNumber} for ${dayWords(deliveryOn)}`
}

export default function OrderSent(props: Props) {
	const { yard, sentTo, storeName, orderNumber, deliveryOn, lines, charges, totalCents, orderUrl } = props
	const day = dayWords(deliveryOn)
	const sent = lines.reduce((sum, line) => sum + line.casesGiven, 0)
	return (
		<Frame
			title={subject(props)}
			preview={`${casesInSentence(sent)} for ${day}.`}
			yard={yard}
			about={[`Order ${orderNumber}`, day]}
			sentTo={sentTo}
		>
			<Title>Your order for {day} is on its way.</Title>
			<Lead>
				For {storeName}: {casesInSentence(sent)}. Please open each case when it comes, and tell us what is broken.
			</Lead>
			<Button href={orderUrl} words="Open the order" />
			<GivenTable
				casesHead="Cases sent"
				lines={lines}
				charges={charges}
				total={{ label: "Total", cents: totalCents }}
			/>
			<Small lines={[`${KEEP_COMB} ${NOT_FOR_INFANTS}`, mistakeWords(yard)]} />
		</Frame>
	)
}
