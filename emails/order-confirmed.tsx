import type { z } from "zod"
import { dayWords } from "~/domain/calendar"
import { givenLines, orderFacts, sampleGivenLines, sampleOrder, sumsUp } from "./order-props"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { GivenTable } from "./parts/given-table"
import { Lead, Small, Title } from "./parts/text"
import { mistakeWords, NOT_FOR_INFANTS } from "./words"

/** What a store will get of what it asked, with one sentence for each line that is short. */
export const schema = orderFacts
	.extend(givenLines)
	.refine(sumsUp, { path: ["totalCents"], message: "is not the sum of the lines and charges" })
type Props = z.infer<typeof schema>

export const sample = { ...sampleOrder, ...sampleGivenLines } satisfies Props

const isShort = ({ lines }: Props) => lines.some((line) => line.casesGiven < line.casesAsked)

export function subject(props: Props): string {
	const day = dayWords(props.deliveryOn)
	return isShort(props) ? `Confirmed, but short: your order for ${day}` : `Confirmed: your order for ${day}`
}

export default function OrderConfirmed(props: Props) {
	const { yard, sentTo, storeName, orderNumber, deliveryOn, lines, charges, totalCents, orderUrl } = props
	const day = dayWords(deliveryOn)
	return (
		<Frame
			title={subject(props)}
			preview={isShort(props) ? "One or more lines are short; the letter says why." : "You get all that you asked for."}
			yard={yard}
			about={[`Order ${orderNumber}`, day]}
			sentTo={sentTo}
		>
			<Title>Your order for {day} is confirmed.</Title>
			<Lead>
				For {storeName}. {isShort(props) ? "Not all of it could be given; " : "All of it will be given; "}
				the invoice comes when it is sent.
			</Lead>
			<Button href={orderUrl} words="Open the order" />
			<GivenTable
				casesHead="Cases given"
				lines={lines}
				charges={charges}
				total={{ label: "Total", cents: totalCents }}
			/>
			<Small lines={[NOT_FOR_INFANTS, mistakeWords(yard)]} />
		</Frame>
	)
}
