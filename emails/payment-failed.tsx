import { z } from "zod"
import { dayWords, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { SumTable } from "./parts/sum-table"
import { Lead, Note, Small, Title } from "./parts/text"
import { cents, day, mailAddress, sampleYard, webAddress, words, yard } from "./props"
import { mistakeWords } from "./words"

/**
 * Tells whoever paid that it did not hold: the bank has returned a debit, or what should be taken by itself was refused.
 * `openCents` is what each invoice asks now.
 */
export const schema = z.object({
	yard,
	sentTo: mailAddress,
	storeName: words,
	why: z.enum(["debit-returned", "automatic-refused"]),
	amountCents: cents.positive(),
	/** The bank's own words; empty where it gave none. */
	reason: z.string().max(500),
	on: day,
	invoices: z.array(z.object({ invoiceNumber: words, openCents: cents.nonnegative() })),
	invoicesUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	yard: sampleYard,
	sentTo: "rosa@pantryandplume.example.test",
	storeName: "Pantry & Plume",
	why: "debit-returned",
	amountCents: 112990,
	reason: "The customer's account has insufficient funds to cover this payment.",
	on: "2026-08-31",
	invoices: [
		{ invoiceNumber: "2026-0203", openCents: 92990 },
		{ invoiceNumber: "2026-0211", openCents: 20000 },
	],
	invoicesUrl: "https://waxbill.example.test/buy/larkmoor/pantry-and-plume/invoices",
} satisfies Props

export function subject({ yard, why, amountCents }: Props): string {
	return why === "debit-returned"
		? `${yard.name}: your bank returned the payment of ${formatMoney(amountCents)}`
		: `${yard.name}: the payment of ${formatMoney(amountCents)} was refused`
}

export default function PaymentFailed(props: Props) {
	const { yard, sentTo, storeName, why, amountCents, reason, on, invoices, invoicesUrl } = props
	const isReturned = why === "debit-returned"
	const open = invoices.filter(({ openCents }) => openCents > 0)
	return (
		<Frame
			title={subject(props)}
			preview={isReturned ? "Nothing was paid; please pay in another way." : "Nothing was taken; please pay by hand."}
			yard={yard}
			about={[isReturned ? "Payment returned" : "Payment refused", fullDay(on)]}
			sentTo={sentTo}
		>
			<Title>{isReturned ? "Your bank has returned the payment." : "Your payment was refused."}</Title>
			<Lead>
				For {storeName}: {formatMoney(amountCents)}, {isReturned ? "returned" : "refused"} on {dayWords(on)}.{" "}
				{isReturned
					? "The invoices that it was for are open again."
					: "Nothing was taken, and it is not tried again by itself: please pay these invoices yourself."}
			</Lead>
			{reason !== "" && <Note>The bank says: {reason}</Note>}
			<Button href={invoicesUrl} words="Open your invoices" />
			{open.length > 0 && (
				<SumTable
					head="Open now"
					parts={open.map(({ invoiceNumber, openCents }) => ({ label: `Invoice ${invoiceNumber}`, cents: openCents }))}
					total={{ label: "To pay", cents: open.reduce((sum, { openCents }) => sum + openCents, 0) }}
				/>
			)}
			<Small lines={[mistakeWords(yard)]} />
		</Frame>
	)
}
