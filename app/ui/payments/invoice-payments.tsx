import { Link } from "react-router"
import { type Day, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { methodWords, type PaymentMethod, type PaymentState, paymentWords } from "~/domain/payments/payment-words"

type Payment = {
	id: string
	method: PaymentMethod
	state: PaymentState
	receivedOn: Day
	amountCents: number
	settledCents: number
	returnedCents: number
	cents: number
	isDisputed: boolean
}

/** The payments of an invoice, one to a line. `href` is where the desk finds a payment; stores have no page for it. */
export function InvoicePayments({ payments, href }: { payments: readonly Payment[]; href?: string }) {
	if (payments.length === 0) return null
	return (
		<section className="invoice-payments no-print" aria-labelledby="payments-head">
			<h2 className="head-italic" id="payments-head">
				Payments
			</h2>
			<ul>
				{payments.map((payment) => (
					<li key={payment.id}>
						{href ? (
							<Link className="inline-block py-1" to={`${href}/${payment.id}`}>
								{lineWords(payment)}
							</Link>
						) : (
							<span className="inline-block py-1">{lineWords(payment)}</span>
						)}
						{payment.isDisputed && <span className="short"> Disputed at the bank</span>}
					</li>
				))}
			</ul>
		</section>
	)
}

/** "Bank debit of August 14, 2026: $500.00, on its way". */
function lineWords(payment: Payment): string {
	const method = methodWords(payment.method)
	const cents = payment.state === "returned" || payment.cents === 0 ? payment.amountCents : payment.cents
	const of = cents === payment.amountCents ? "" : ` of ${formatMoney(payment.amountCents)}`
	const how = paymentWords(payment)
	const words = `${method.charAt(0).toUpperCase()}${method.slice(1)} of ${fullDay(payment.receivedOn)}: ${formatMoney(cents)}${of}`
	return how === "settled" ? words : `${words}, ${how}`
}
