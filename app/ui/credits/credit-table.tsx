import { Link } from "react-router"
import { type Day, fullDay } from "~/domain/calendar"
import { type CreditKind, creditKindWords } from "~/domain/credits/credit-words"
import { formatMoney } from "~/domain/money"
import { listDay } from "~/ui/orders/state-words"

type Row = {
	number: string
	storeName: string
	issuedOn: Day
	kind: CreditKind
	invoiceNumber: string | null
	totalCents: number
	onAccountCents: number
}

/** Credits with what they are for and what of them has settled nothing yet. `showStore` where they are of several stores. */
export function CreditTable(table: { credits: readonly Row[]; today: Day; base: string; showStore?: boolean }) {
	const { credits, today, base, showStore = false } = table
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col">Credit</th>
					{showStore && <th scope="col">Store</th>}
					<th scope="col">Issued</th>
					<th scope="col" className="max-desk:hidden">
						For
					</th>
					<th scope="col" className="max-desk:hidden">
						Takes off invoice
					</th>
					<th scope="col" className="num">
						Credited
					</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						On account
					</th>
				</tr>
			</thead>
			<tbody>
				{credits.map((credit) => (
					<tr key={credit.number}>
						<td>
							<Link className="inline-block py-1 fig whitespace-nowrap" to={`${base}/credits/${credit.number}`}>
								{credit.number}
							</Link>
							<span className="note block desk:hidden">{creditKindWords(credit.kind)}</span>
						</td>
						{showStore && <td>{credit.storeName}</td>}
						<td>
							<span title={fullDay(credit.issuedOn)}>{listDay(credit.issuedOn, today)}</span>
						</td>
						<td className="max-desk:hidden">{creditKindWords(credit.kind)}</td>
						<td className="max-desk:hidden">
							{credit.invoiceNumber && (
								<Link className="inline-block py-1 fig" to={`${base}/invoices/${credit.invoiceNumber}`}>
									{credit.invoiceNumber}
								</Link>
							)}
						</td>
						<td className="money">{formatMoney(credit.totalCents)}</td>
						<td className="money pr-4! desk:pr-8!">
							{credit.onAccountCents > 0 ? formatMoney(credit.onAccountCents) : ""}
						</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}
