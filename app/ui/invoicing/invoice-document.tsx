import { type Day, dayWords, fullDay, monthDay } from "~/domain/calendar"
import { formatMoney, plainMoney } from "~/domain/money"
import { casesWords } from "~/domain/quantity"
import { InvoicePaper } from "~/ui/layout/invoice-paper"
import { FillStrip } from "~/ui/stock/fill-strip"

type Line = {
	sheetNumber?: string | null
	productName: string
	productNote?: string | null
	lots: readonly string[]
	netWeight?: string | null
	casesAsked: number
	casesSent: number
	priceCents: number
	amountCents: number
	reason?: string | null
}

/** All that an invoice says; the letter and the PDF are drawn from the same. */
export type Invoice = {
	yard: { name: string; address: string; email: string; phone?: string | null }
	number: string
	issuedOn: Day
	store: { name: string; contactName?: string | null; address?: string | null }
	order: { number: string; placedOn: Day }
	delivered: { on: Day; netWeight?: string | null }
	due: { on: Day; termsWords: string }
	waysToPay: string
	lines: readonly Line[]
	charges: readonly { label: string; cents: number }[]
	totalCents: number
	paidCents: number
	notes: readonly string[]
}

/** An invoice on its paper, as it prints. `care` says how to keep the comb. */
export function InvoiceDocument({ invoice, care }: { invoice: Invoice; care: string }) {
	const { yard, number, store, order, delivered, due, lines } = invoice
	const openCents = invoice.totalCents - invoice.paidCents
	const isPaid = openCents <= 0
	const cases = lines.reduce((sum, line) => sum + line.casesSent, 0)
	const reasons = [...new Set(lines.flatMap((line) => (line.casesSent < line.casesAsked && line.reason) || []))]
	return (
		<InvoicePaper
			yard={{ name: yard.name, contact: [yard.address, yard.email, yard.phone].filter(Boolean).join(". ") }}
			title={`Invoice ${number}`}
			date={fullDay(invoice.issuedOn)}
			blocks={[
				{
					title: "To",
					name: store.name,
					lines: [store.contactName, store.address, `Your order of ${monthDay(order.placedOn)}`].filter(Boolean),
				},
				{
					title: "Delivered",
					name: dayWords(delivered.on),
					lines: [casesWords(cases), delivered.netWeight && `${delivered.netWeight} of comb, net`].filter(Boolean),
				},
				isPaid
					? { title: "To pay", name: "Nothing", lines: ["This invoice is paid."] }
					: {
							title: "Please pay by",
							name: dayWords(due.on),
							lines: [due.termsWords, invoice.waysToPay, `Quote ${number}`],
						},
			]}
			note={
				reasons.length > 0 &&
				reasons.map((reason) => (
					<p key={reason} className="mb-2 last:mb-0">
						{reason}
					</p>
				))
			}
			care={[care, ...invoice.notes].join(" ")}
			slip={
				isPaid
					? undefined
					: [
							{ label: "Invoice", value: number },
							{ label: "Store", value: store.name },
							{ label: `By ${monthDay(due.on)}`, value: formatMoney(openCents) },
						]
			}
			fine="One solid cell is one case sent; a bare line is one asked for and not sent."
		>
			<table className="paper-table">
				<thead>
					<tr>
						<th scope="col" className="wide-only">
							No.
						</th>
						<th scope="col">Product</th>
						<th scope="col" className="wide-only">
							Lot
						</th>
						<th scope="col" className="wide-only">
							Net weight
						</th>
						<th scope="col">Cases</th>
						<th scope="col" className="money wide-only">
							A case
						</th>
						<th scope="col" className="money">
							Amount
						</th>
					</tr>
				</thead>
				<tbody>
					{lines.map((line, index) => (
						// biome-ignore lint/suspicious/noArrayIndexKey: the lines of an issued invoice are never reordered
						<LineRow key={index} line={line} />
					))}
				</tbody>
				<Sums invoice={invoice} />
			</table>
		</InvoicePaper>
	)
}

function LineRow({ line }: { line: Line }) {
	const { casesAsked, casesSent } = line
	return (
		<tr>
			<td className="fig wide-only">{line.sheetNumber}</td>
			<td>
				<span className="name">{line.productName}</span>
				{line.productNote && <span className="note">{line.productNote}</span>}
			</td>
			<td className="fig wide-only">{line.lots.join(", ")}</td>
			<td className="fig wide-only">{line.netWeight}</td>
			<td>
				<FillStrip
					countsThrough
					runs={[
						{ state: "free", count: casesSent },
						{ state: "short", count: Math.max(0, casesAsked - casesSent) },
					]}
					label={`${casesSent} sent of ${casesAsked} asked`}
					caption={casesSent < casesAsked ? `${casesSent} sent of ${casesAsked} asked` : `${casesSent} sent`}
				/>
			</td>
			<td className="money wide-only">{plainMoney(line.priceCents)}</td>
			<td className="money">{plainMoney(line.amountCents)}</td>
		</tr>
	)
}

/** The columns between the words and the amount: fewer on a phone. */
function Between() {
	return (
		<>
			<td className="wide-only" />
			<td className="wide-only" />
			<td />
			<td className="wide-only" />
		</>
	)
}

function Sums({ invoice: { charges, totalCents, paidCents } }: { invoice: Invoice }) {
	const paid = paidCents > 0 ? [{ label: "Paid, thank you", cents: -paidCents }] : []
	return (
		<tfoot>
			{[...charges, ...paid].map((charge) => (
				<tr key={charge.label}>
					<td className="wide-only" />
					<td>{charge.label}</td>
					<Between />
					<td className="money">{plainMoney(charge.cents)}</td>
				</tr>
			))}
			<tr className="to-pay">
				<td className="wide-only" />
				<td>To pay</td>
				<Between />
				<td className="money">{formatMoney(totalCents - paidCents)}</td>
			</tr>
		</tfoot>
	)
}
