import { Fragment } from "react"
import { type Day, fullDay } from "~/domain/calendar"
import {
	type InvoiceFacts,
	invoiceParties,
	invoiceSlip,
	linesByOrder,
	openCents,
	settledParts,
} from "~/domain/invoicing/invoice-facts"
import { poundPriceWords } from "~/domain/invoicing/weighed-words"
import { formatMoney, plainMoney } from "~/domain/money"
import { InvoicePaper } from "~/ui/layout/invoice-paper"
import { FillStrip } from "~/ui/stock/fill-strip"

type Line = {
	sheetNumber?: string | null | undefined
	productName: string
	productNote?: string | null | undefined
	lots: readonly string[]
	netWeight?: string | null | undefined
	casesAsked: number
	casesSent: number
	priceCents: number
	poundCents?: number | null | undefined
	amountCents: number
	reason?: string | null | undefined
	orderNumber?: string | null | undefined
}

/** All that an invoice says; the letter and the PDF are drawn from the same. */
export type Invoice = Omit<InvoiceFacts, "lines"> & {
	yard: { name: string; address: string; email: string; phone?: string | null | undefined }
	issuedOn: Day
	lines: readonly Line[]
	charges: readonly { label: string; cents: number }[]
	notes: readonly string[]
}

/** An invoice on its paper, as it prints. `care` says how to keep the comb. */
export function InvoiceDocument({ invoice, care }: { invoice: Invoice; care: string }) {
	const { yard, number, lines, notes } = invoice
	const reasons = [...new Set(lines.flatMap((line) => (line.casesSent < line.casesAsked && line.reason) || []))]
	const hasCases = lines.some((line) => line.casesAsked > 0)
	return (
		<InvoicePaper
			yard={{ name: yard.name, contact: [yard.address, yard.email, yard.phone].filter(Boolean).join(". ") }}
			title={`Invoice ${number}`}
			date={fullDay(invoice.issuedOn)}
			blocks={invoiceParties(invoice).map(({ group, name, facts }) => ({ title: group, name, lines: facts }))}
			note={
				reasons.length > 0 &&
				reasons.map((reason) => (
					<p key={reason} className="mb-2 last:mb-0">
						{reason}
					</p>
				))
			}
			care={(hasCases ? [care, ...notes] : notes).join(" ")}
			slip={invoiceSlip(invoice)?.map(({ head, value }) => ({ label: head, value }))}
			fine={hasCases ? "One solid cell is one case sent; a bare line is one asked for and not sent." : ""}
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
					{linesByOrder(lines, invoice.orders).map((group, groupIndex) => (
						// biome-ignore lint/suspicious/noArrayIndexKey: the lines of an issued invoice are never reordered
						<Fragment key={groupIndex}>
							{group.head && (
								<tr className="order-head">
									<th scope="rowgroup" colSpan={7}>
										{group.head}
									</th>
								</tr>
							)}
							{group.lines.map((line, index) => (
								// biome-ignore lint/suspicious/noArrayIndexKey: the lines of an issued invoice are never reordered
								<LineRow key={index} line={line} />
							))}
						</Fragment>
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
				{line.poundCents && (
					<span className="note block desk:hidden print:hidden">
						{line.netWeight} at {poundPriceWords(line.poundCents)}
					</span>
				)}
			</td>
			<td className="fig wide-only">{line.lots.join(", ")}</td>
			<td className="fig wide-only">{line.netWeight}</td>
			<td>
				{casesAsked > 0 && (
					<FillStrip
						countsThrough
						runs={[
							{ state: "free", count: casesSent },
							{ state: "short", count: Math.max(0, casesAsked - casesSent) },
						]}
						label={`${casesSent} sent of ${casesAsked} asked`}
						caption={casesSent < casesAsked ? `${casesSent} sent of ${casesAsked} asked` : `${casesSent} sent`}
					/>
				)}
			</td>
			<td className="money wide-only">{priceWords(line)}</td>
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

function priceWords({ casesAsked, priceCents, poundCents }: Line): string {
	if (casesAsked === 0) return ""
	return poundCents ? poundPriceWords(poundCents) : plainMoney(priceCents)
}

function Sums({ invoice }: { invoice: Invoice }) {
	return (
		<tfoot>
			{[...invoice.charges, ...settledParts(invoice)].map((charge) => (
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
				<td className="money">{formatMoney(openCents(invoice))}</td>
			</tr>
		</tfoot>
	)
}
