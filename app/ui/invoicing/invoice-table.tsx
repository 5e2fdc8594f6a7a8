import { Link } from "react-router"
import { type Day, fullDay } from "~/domain/calendar"
import { invoiceStanding, standingWords } from "~/domain/invoicing/payments"
import { formatMoney } from "~/domain/money"
import { listDay } from "~/ui/orders/state-words"

type Row = {
	number: string
	storeName: string
	/** "318", "318, 325"; empty on a charge that is about no order. */
	orderNumbers: string
	issuedOn: Day
	dueOn: Day
	totalCents: number
	openCents: number
}

/** Invoices with how each stands, in words. `showStore` where they are of several stores. */
export function InvoiceTable({
	invoices,
	today,
	base,
	showStore = false,
}: {
	invoices: readonly Row[]
	today: Day
	base: string
	showStore?: boolean
}) {
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col">Invoice</th>
					{showStore && <th scope="col">Store</th>}
					<th scope="col" className="max-desk:hidden">
						Order
					</th>
					<th scope="col" className="max-desk:hidden">
						Issued
					</th>
					<th scope="col">Due</th>
					<th scope="col" className="max-desk:hidden">
						How it stands
					</th>
					<th scope="col" className="num max-desk:hidden">
						Total
					</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						Still to pay
					</th>
				</tr>
			</thead>
			<tbody>
				{invoices.map((invoice) => (
					<InvoiceRow key={invoice.number} invoice={invoice} today={today} base={base} showStore={showStore} />
				))}
			</tbody>
		</table>
	)
}

function InvoiceRow({
	invoice,
	today,
	base,
	showStore,
}: {
	invoice: Row
	today: Day
	base: string
	showStore: boolean
}) {
	const standing = invoiceStanding(invoice, today)
	const words = <span className={standing.daysLate > 0 ? "short" : undefined}>{standingWords(standing)}</span>
	return (
		<tr className={standing.state === "paid" ? "text-ink-soft" : undefined}>
			<td>
				<Link className="inline-block py-1 fig whitespace-nowrap" to={`${base}/invoices/${invoice.number}`}>
					{invoice.number}
				</Link>
			</td>
			{showStore && <td>{invoice.storeName}</td>}
			<td className="max-desk:hidden">
				<OrderLinks numbers={invoice.orderNumbers.split(", ").filter((number) => number !== "")} base={base} />
			</td>
			<td className="max-desk:hidden">{listDay(invoice.issuedOn, today)}</td>
			<td>
				<span title={fullDay(invoice.dueOn)}>{listDay(invoice.dueOn, today)}</span>
				<span className="note block desk:hidden">{words}</span>
			</td>
			<td className="max-desk:hidden">{words}</td>
			<td className="money max-desk:hidden">{formatMoney(invoice.totalCents)}</td>
			<td className="money pr-4! desk:pr-8!">{standing.openCents > 0 ? formatMoney(standing.openCents) : ""}</td>
		</tr>
	)
}

/** More would make the row of a month's invoice taller than the page. */
const MOST_ORDERS = 4

function OrderLinks({ numbers, base }: { numbers: readonly string[]; base: string }) {
	const more = numbers.length - MOST_ORDERS
	return (
		<>
			{numbers.slice(0, MOST_ORDERS).map((number) => (
				<Link key={number} className="mr-2 inline-block py-1 fig" to={`${base}/orders/${number}`}>
					{number}
				</Link>
			))}
			{more > 0 && <span className="note">and {more} more</span>}
		</>
	)
}
