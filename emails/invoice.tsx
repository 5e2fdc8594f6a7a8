import { z } from "zod"
import { dayWords, fullDay, monthDay } from "~/domain/calendar"
import { discountWords, missedDiscountWords } from "~/domain/invoicing/discount-words"
import { openCents, settledParts } from "~/domain/invoicing/invoice-facts"
import { formatMoney } from "~/domain/money"
import { type InvoiceProps, invoiceProps, sampleInvoice, sentLines } from "./documents/invoice-props"
import { Button } from "./parts/button"
import { Frame } from "./parts/frame"
import { GivenTable } from "./parts/given-table"
import { Lead, Small, Title } from "./parts/text"
import { type DrawElsewhere, mailAddress, webAddress } from "./props"
import { casesInSentence, joinKnown, KEEP_COMB, mistakeWords, NOT_FOR_INFANTS } from "./words"

/** An invoice with the places to pay it and to print it; the PDF goes with the letter. */
export const schema = z.object({
	invoice: invoiceProps,
	sentTo: mailAddress,
	payUrl: webAddress,
	pdfUrl: webAddress,
})
type Props = z.infer<typeof schema>

export const sample = {
	invoice: sampleInvoice,
	sentTo: "rosa@pantryandplume.example.test",
	payUrl: "https://waxbill.example.test/buy/larkmoor/invoices/1203",
	pdfUrl: "https://waxbill.example.test/buy/larkmoor/invoices/1203.pdf",
} satisfies Props

export function subject({ invoice }: Props): string {
	const { yard, number, due } = invoice
	const open = openCents(invoice)
	if (open === 0) return `${yard.name}: invoice ${number}, nothing to pay`
	return `${yard.name}: invoice ${number}, ${formatMoney(open)} by ${dayWords(due.on)}`
}

/** The PDF that goes with the letter. Loaded only here, since the drawing of PDFs takes a second to load. */
export async function attachments({ invoice }: Props, draw?: DrawElsewhere) {
	const name = `invoice-${invoice.number.replace(/[^\w-]+/g, "-")}.pdf`
	const drawn = await draw?.("draw-invoices", invoice)
	const content = drawn ? Buffer.from(drawn) : await (await import("./documents/invoice")).renderInvoicePdf(invoice)
	return [{ filename: name, content, contentType: "application/pdf" }]
}

export default function Invoice(props: Props) {
	const { invoice, sentTo, payUrl, pdfUrl } = props
	const { yard, number, issuedOn, due, discount, charges, notes, delivered } = invoice
	const open = openCents(invoice)
	return (
		<Frame
			title={subject(props)}
			preview={`${delivered ? `For ${dayWords(delivered.on)}; the` : "The"} printed page comes with this letter.`}
			yard={yard}
			about={[`Invoice ${number}`, fullDay(issuedOn)]}
			sentTo={sentTo}
		>
			<Title>
				{open > 0 ? (
					<>
						Please pay <b style={{ fontWeight: 600 }}>{formatMoney(open)}</b> by {dayWords(due.on)}.
					</>
				) : (
					"There is nothing to pay."
				)}
			</Title>
			<Lead>{deliverySentence(invoice)}</Lead>
			{discount && open > 0 && <Lead>{discountSentences({ issuedOn, dueOn: due.on, discount })}</Lead>}
			<Button
				href={payUrl}
				words={open > 0 ? "Pay by card" : "Open the invoice"}
				beside={{ href: pdfUrl, words: "Printed page (PDF)" }}
			/>
			<GivenTable
				casesHead="Cases sent"
				lines={sentLines(invoice)}
				charges={[...charges, ...settledParts(invoice)]}
				total={{ label: "To pay", cents: open }}
			/>
			<Small lines={[`${KEEP_COMB} ${NOT_FOR_INFANTS}`, ...notes, mistakeWords(yard)]} />
		</Frame>
	)
}

/** What may be taken off until when, and what it costs to let that go. */
function discountSentences(invoice: Parameters<typeof missedDiscountWords>[0]): string {
	return joinKnown([`${discountWords(invoice.discount)}.`, missedDiscountWords(invoice)], " ")
}

/** "For Pantry & Plume: eight cases on Tuesday, August 18, 8:40 am, back door, signed for by Rosa Quill." */
function deliverySentence({ store, delivered, lines, orders = [] }: InvoiceProps): string {
	if (!delivered) return `For ${store.name}: ${lines.map(({ productName }) => productName).join(", ")}.`
	const count = lines.reduce((sum, line) => sum + line.casesSent, 0)
	if (delivered.from && delivered.from !== delivered.on) {
		const span = `${monthDay(delivered.from)} to ${monthDay(delivered.on)}`
		return `For ${store.name}: ${casesInSentence(count)} of ${orders.length} orders, ${span}.`
	}
	const signed = delivered.signedBy && `signed for by ${delivered.signedBy}`
	const known = joinKnown([dayWords(delivered.on), delivered.at, delivered.place, signed])
	return `For ${store.name}: ${casesInSentence(count)} on ${known}.`
}
