import { Link } from "react-router"

/** Where an invoice leads: the file for a bookkeeper's program, and the orders that it is about. */
export function InvoiceLinks({
	base,
	number,
	orderNumbers,
}: {
	base: string
	number: string
	orderNumbers: readonly number[]
}) {
	return (
		<>
			{/* A file, not a page: the router leaves it to the browser. */}
			<Link className="py-1" to={`${base}/invoices/${number}.xml`} reloadDocument>
				For a program (UBL)
			</Link>
			{orderNumbers.slice(0, 5).map((orderNumber) => (
				<Link key={orderNumber} className="py-1" to={`${base}/orders/${orderNumber}`}>
					Order {orderNumber}
				</Link>
			))}
		</>
	)
}
