import { Link } from "react-router"
import { type Day, fullDay } from "~/domain/calendar"
import { formatMoney, plainMoney } from "~/domain/money"
import {
	type PaymentState,
	paymentWords,
	type ReturnKind,
	type ReturnState,
	returnWords,
} from "~/domain/payments/payment-words"
import { Totals, TotalsRow } from "~/ui/layout/sheet"

type Facts = {
	state: PaymentState
	amountCents: number
	settledCents: number
	returnedCents: number
	feeCents: number | null
	payoutOn: Day | null
	enteredBy: string | null
	isAutomatic: boolean
	stripePaymentIntentId: string | null
	settled: readonly { number: string; kind: "payment" | "discount"; cents: number; on: Day }[]
	returns: readonly {
		id: string
		kind: ReturnKind
		state: ReturnState
		amountCents: number
		on: Day
		note: string
		by: string | null
		isLost: boolean
	}[]
}

/** What became of a payment: what it settled and what went back, Stripe's fee, and the payout that brought the rest. */
export function PaymentFacts({ payment, base }: { payment: Facts; base: string }) {
	const { amountCents, settledCents, returnedCents, feeCents, payoutOn, enteredBy, isAutomatic } = payment
	const onAccount = payment.state === "settled" ? amountCents - settledCents - returnedCents : 0
	return (
		<div className="payment-facts">
			<p>
				<b className={payment.state === "returned" ? "short" : undefined}>{capital(paymentWords(payment))}</b>
				{isAutomatic ? ", taken by itself as the store agreed." : enteredBy ? `, by ${enteredBy}.` : "."}
			</p>
			<Totals>
				<TotalsRow label="Settles invoices" value={plainMoney(settledCents)} />
				{returnedCents > 0 && <TotalsRow label="Went back" value={plainMoney(returnedCents)} />}
				{onAccount > 0 && <TotalsRow label="On the store’s account" value={plainMoney(onAccount)} />}
				{feeCents !== null && (
					<TotalsRow
						label="Stripe kept"
						note={payoutOn ? `paid out on ${fullDay(payoutOn)}` : "not paid out yet"}
						value={plainMoney(feeCents)}
					/>
				)}
			</Totals>
			<Settled rows={payment.settled} base={base} />
			{payment.returns.length > 0 && (
				<section aria-labelledby="returns-head">
					<h2 className="head-italic" id="returns-head">
						What went back
					</h2>
					<ul>
						{payment.returns.map((one) => (
							<li key={one.id} className="py-1">
								<b className={one.state === "done" ? "short" : undefined}>
									{returnWords(one.kind, one.state, one.isLost)}
								</b>
								: {formatMoney(one.amountCents)}, {fullDay(one.on)}
								{one.by && `, by ${one.by}`}
								{one.note && <span className="note block">{one.note}</span>}
							</li>
						))}
					</ul>
				</section>
			)}
		</div>
	)
}

function Settled({ rows, base }: { rows: Facts["settled"]; base: string }) {
	if (rows.length === 0) return null
	return (
		<table className="sheet-table">
			<caption className="head-italic text-left">What it settled</caption>
			<thead>
				<tr>
					<th scope="col">Invoice</th>
					<th scope="col">On</th>
					<th scope="col">As</th>
					<th scope="col" className="num">
						Amount
					</th>
				</tr>
			</thead>
			<tbody>
				{rows.map((row, index) => (
					// biome-ignore lint/suspicious/noArrayIndexKey: rows of a ledger stay where they are
					<tr key={index}>
						<td>
							<Link className="fig inline-block py-1" to={`${base}/invoices/${row.number}`}>
								{row.number}
							</Link>
						</td>
						<td>{fullDay(row.on)}</td>
						<td>{rowWords(row)}</td>
						<td className="money">{plainMoney(row.cents)}</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

function rowWords({ kind, cents }: Facts["settled"][number]): string {
	if (cents < 0) return kind === "discount" ? "discount taken back" : "taken back"
	return kind === "discount" ? "discount for paying early" : "paid"
}

function capital(words: string): string {
	return words.charAt(0).toUpperCase() + words.slice(1)
}
