import { Link } from "react-router"
import { type Day, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { methodWords, type PaymentMethod, type PaymentState, paymentWords } from "~/domain/payments/payment-words"
import { listDay } from "~/ui/orders/state-words"

type Row = {
	id: string
	storeName: string
	method: PaymentMethod
	state: PaymentState
	receivedOn: Day
	reference: string
	amountCents: number
	settledCents: number
	returnedCents: number
	isDisputed: boolean
}

/** Payments, the latest first, with how each stands. */
export function PaymentsTable({ payments, today, base }: { payments: readonly Row[]; today: Day; base: string }) {
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col">Came on</th>
					<th scope="col">Store</th>
					<th scope="col" className="max-desk:hidden">
						As
					</th>
					<th scope="col" className="max-desk:hidden">
						How it stands
					</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						Amount
					</th>
				</tr>
			</thead>
			<tbody>
				{payments.map((payment) => (
					<tr key={payment.id}>
						<td>
							<Link className="inline-block py-1 whitespace-nowrap" to={`${base}/payments/${payment.id}`}>
								<span title={fullDay(payment.receivedOn)}>{listDay(payment.receivedOn, today)}</span>
							</Link>
						</td>
						<td>
							{payment.storeName}
							<span className="note block desk:hidden">
								{methodWords(payment.method)}, <Standing payment={payment} />
							</span>
						</td>
						<td className="max-desk:hidden">
							{methodWords(payment.method)}
							{payment.reference && <span className="note block">{payment.reference}</span>}
						</td>
						<td className="max-desk:hidden">
							<Standing payment={payment} />
						</td>
						<td className="money pr-4! desk:pr-8!">{formatMoney(payment.amountCents)}</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

function Standing({ payment }: { payment: Row }) {
	const isBad = payment.isDisputed || payment.state === "returned" || payment.returnedCents === payment.amountCents
	return (
		<span className={isBad ? "short" : undefined}>
			{paymentWords(payment)}
			{payment.isDisputed && ", disputed"}
		</span>
	)
}
