import { type Day, fullDay } from "~/domain/calendar"
import { type CreditKind, creditKindWords } from "~/domain/credits/credit-words"
import { formatMoney, plainMoney } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import { InvoicePaper } from "~/ui/layout/invoice-paper"

/** All that a credit says; the letter and the PDF are drawn from the same. */
export type Credit = {
	yard: { name: string; address: string; email: string; phone?: string | null }
	number: string
	issuedOn: Day
	kind: CreditKind
	reason: string
	store: { name: string; address?: string | null }
	invoice: { number: string; issuedOn: Day } | null
	lines: readonly {
		sheetNumber?: string | null
		productName: string
		productNote?: string | null
		pieces: number
		amountCents: number
	}[]
	taxCents: number
	totalCents: number
	settled: readonly { invoiceNumber: string; cents: number }[]
	onAccountCents: number
}

/** A credit on its paper, as it prints. */
export function CreditDocument({ credit }: { credit: Credit }) {
	const { yard, number, store, invoice, totalCents, onAccountCents } = credit
	return (
		<InvoicePaper
			yard={{ name: yard.name, contact: [yard.address, yard.email, yard.phone].filter(Boolean).join(". ") }}
			title={`Credit ${number}`}
			date={fullDay(credit.issuedOn)}
			blocks={[
				{ title: "To", name: store.name, lines: [store.address].filter(Boolean) },
				{
					title: "Takes off",
					name: invoice ? `Invoice ${invoice.number}` : "No invoice in particular",
					lines: [invoice && `of ${fullDay(invoice.issuedOn)}`, `For ${creditKindWords(credit.kind)}`].filter(Boolean),
				},
				{
					title: "Credited",
					name: formatMoney(totalCents),
					lines: [onAccountCents > 0 ? `${formatMoney(onAccountCents)} of it on your account` : "All of it taken off"],
				},
			]}
			note={<p>{credit.reason}</p>}
			fine="A credit takes off what was invoiced; nothing is to be paid on it."
		>
			<table className="paper-table">
				<thead>
					<tr>
						<th scope="col" className="wide-only">
							No.
						</th>
						<th scope="col">Product</th>
						<th scope="col">Pieces</th>
						<th scope="col" className="money">
							Amount
						</th>
					</tr>
				</thead>
				<tbody>
					{credit.lines.map((line, index) => (
						// biome-ignore lint/suspicious/noArrayIndexKey: the lines of an issued credit are never reordered
						<tr key={index}>
							<td className="fig wide-only">{line.sheetNumber}</td>
							<td>
								<span className="name">{line.productName}</span>
								{line.productNote && <span className="note">{line.productNote}</span>}
							</td>
							<td className="fig">{line.pieces > 0 ? piecesWords(line.pieces) : "amount"}</td>
							<td className="money">{plainMoney(line.amountCents)}</td>
						</tr>
					))}
				</tbody>
				<Sums credit={credit} />
			</table>
		</InvoicePaper>
	)
}

function Sums({ credit: { taxCents, totalCents, settled, onAccountCents } }: { credit: Credit }) {
	return (
		<tfoot>
			{taxCents > 0 && <Sum label="Sales tax" money={plainMoney(taxCents)} />}
			<Sum label="Credited" money={formatMoney(totalCents)} isTotal />
			{settled.map(({ invoiceNumber, cents }) => (
				<Sum key={invoiceNumber} label={`Taken off invoice ${invoiceNumber}`} money={plainMoney(cents)} />
			))}
			{onAccountCents > 0 && <Sum label="On your account" money={plainMoney(onAccountCents)} />}
		</tfoot>
	)
}

function Sum({ label, money, isTotal = false }: { label: string; money: string; isTotal?: boolean }) {
	return (
		<tr className={isTotal ? "to-pay" : undefined}>
			<td className="wide-only" />
			<td>{label}</td>
			<td />
			<td className="money">{money}</td>
		</tr>
	)
}
