import { z } from "zod"
import { dayWords, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { Lead, Small, Title } from "./parts/text"
import { cents, day, mailAddress, sampleYard, webAddress, words, yard } from "./props"
import { mistakeWords } from "./words"

/** Tells whoever paid that part of a payment goes back to them, or all: `paidCents` is what they had paid. */
export const schema = z.object({
	yard,
	sentTo: mailAddress,
	storeName: words,
	amountCents: cents.positive(),
	paidCents: cents.positive(),
	refundedOn: day,
	way: z.enum(["card", "bank"]),
	invoicesUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	yard: sampleYard,
	sentTo: "rosa@pantryandplume.example.test",
	storeName: "Pantry & Plume",
	amountCents: 20000,
	paidCents: 112990,
	refundedOn: "2026-08-31",
	way: "card",
	invoicesUrl: "https://waxbill.example.test/buy/larkmoor/pantry-and-plume/invoices",
} satisfies Props

export function subject({ yard, amountCents }: Props): string {
	return `${yard.name} has refunded ${formatMoney(amountCents)}`
}

export default function PaymentRefunded(props: Props) {
	const { yard, sentTo, storeName, amountCents, paidCents, refundedOn, way, invoicesUrl } = props
	const where = way === "card" ? "the card that paid" : "the account that paid"
	return (
		<Frame
			title={subject(props)}
			preview={`It goes back to ${where}.`}
			yard={yard}
			about={["Refund", fullDay(refundedOn)]}
			sentTo={sentTo}
		>
			<Title>
				<b style={{ fontWeight: 600 }}>{formatMoney(amountCents)}</b> is on its way back to you.
			</Title>
			<Lead>
				For {storeName}: {amountCents === paidCents ? "all" : "part"} of the payment of {formatMoney(paidCents)},
				refunded on {dayWords(refundedOn)}. It goes to {where}; the bank takes some days to show it.
			</Lead>
			<Button href={invoicesUrl} words="Open your invoices" />
			<Small lines={[mistakeWords(yard)]} />
		</Frame>
	)
}
