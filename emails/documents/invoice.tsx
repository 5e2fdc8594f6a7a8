import { fullDay } from "~/domain/calendar"
import { invoiceParties, invoiceSlip, openCents, settledParts } from "~/domain/invoicing/invoice-facts"
import { KEEP_COMB, NOT_FOR_INFANTS, shortSentences } from "../words"
import { InvoiceLines } from "./invoice-lines"
import { type InvoiceProps, sentLines } from "./invoice-props"
import { Notes, Paper, Parties, renderPaper, Slip, Sums } from "./paper-parts"

/**
 * Draws the printed page of an invoice: Letter, a tear-off slip at the foot of the last page while something is to be
 * paid, column heads on every page. The date of the file is the day of issue, so the same invoice gives the same page.
 * Throws when the fonts of the packages cannot be read.
 */
export function renderInvoicePdf(invoice: InvoiceProps): Promise<Buffer> {
	return renderPaper(invoice, (legible) => <InvoiceDocument invoice={legible} />)
}

function InvoiceDocument({ invoice }: { invoice: InvoiceProps }) {
	const { yard, number, issuedOn, store, lines, orders, charges } = invoice
	const slip = invoiceSlip(invoice)
	const hasCases = lines.some((line) => line.casesAsked > 0)
	return (
		<Paper
			title={`Invoice ${number}`}
			yard={yard}
			subject={`Invoice ${number} to ${store.name}, ${fullDay(issuedOn)}`}
			day={issuedOn}
			fine={hasCases ? "One solid cell is one case sent; a bare line is one asked for and not sent." : ""}
		>
			<Parties parties={invoiceParties(invoice)} />
			<InvoiceLines lines={lines} orders={orders} />
			<Sums charges={[...charges, ...settledParts(invoice)]} total={{ label: "To pay", cents: openCents(invoice) }} />
			<Notes
				reasons={shortSentences(sentLines(invoice))}
				plain={[...(hasCases ? [`${KEEP_COMB} ${NOT_FOR_INFANTS}`] : []), ...invoice.notes]}
			/>
			{slip && <Slip facts={slip} words="Tear here and send with a check." />}
		</Paper>
	)
}
