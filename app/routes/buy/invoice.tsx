import { data, Form, Link, redirect, useNavigation } from "react-router"
import { dayWords } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { mayPay } from "~/domain/people/roles"
import { now as askClock } from "~/platform/clock.server"
import { findStoreDetails } from "~/services/delivery/find-store-details.server"
import { findInvoice } from "~/services/invoicing/find-invoice.server"
import { startPayment } from "~/services/payments/start-payment.server"
import { Button } from "~/ui/forms/button"
import { InvoiceDocument } from "~/ui/invoicing/invoice-document"
import { InvoiceLinks } from "~/ui/invoicing/invoice-links"
import { PaymentOnItsWay } from "~/ui/invoicing/payment-on-its-way"
import { MessageLine } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/invoice"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Invoice ${params.invoice} · Waxbill` }]

export const loader = guard(admits.store("buyer", "payer"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const { producer, store, storeRoles } = scope
	const page = await findInvoice({ producerId: producer.id, storeId: store.id, number: params.invoice })
	if (!page) throw data(null, { status: 404 })
	const now = askClock()
	const canPay = storeRoles.some(mayPay)
	const paid = url.searchParams.get("paid")
	return {
		frame: await findBuyFrame(scope, { part: "invoices", now }),
		invoice: page.document,
		care: page.care,
		orderNumbers: page.orderNumbers,
		openCents: page.openCents,
		declineMessage: page.declineMessage,
		canPay,
		payers: canPay || page.openCents === 0 ? [] : await payersOf({ producer, store, now }),
		// The person has come back from the card page and the event has not come yet.
		isOnItsWay: page.openCents > 0 && paid !== null && page.unpaidVisits.includes(paid),
		isJustPaid: page.openCents === 0 && paid !== null,
	}
})

async function payersOf(query: {
	producer: { id: string; timeZone: string }
	store: { id: string }
	now: Date
}): Promise<string[]> {
	const { producer, store, now } = query
	const details = await findStoreDetails({ producerId: producer.id, storeId: store.id, now, zone: producer.timeZone })
	return details.people.filter((person) => person.roles.some(mayPay)).map((person) => person.name)
}

const PROBLEMS = {
	"nothing-open": "There is nothing to pay on it any more.",
	"under-way": "A payment of this invoice has been made already and is on its way to us. Look again in a minute.",
	"no-answer":
		"The payment service does not answer. No money was taken, and the invoice stays as it is. Try again in a few minutes.",
} as const

export const action = guard(admits.store("payer"), async ({ request, params }: Route.ActionArgs, scope) => {
	const { producer, store, person } = scope
	if ((await request.formData()).get("intent") !== "pay") throw data(null, { status: 400 })
	const page = await findInvoice({ producerId: producer.id, storeId: store.id, number: params.invoice })
	if (!page) throw data(null, { status: 404 })
	const wishes = [{ number: params.invoice, cents: page.openCents }]
	const started = await startPayment({ producer, store, person, wishes, method: "card" })
	if (started.ok) throw redirect(started.url)
	if (started.reason === "no-such-invoice") throw data(null, { status: 404 })
	if (!(started.reason in PROBLEMS)) throw data(null, { status: 400 })
	return data(
		{ problem: PROBLEMS[started.reason as keyof typeof PROBLEMS] },
		{ status: started.reason === "no-answer" ? 503 : 409 },
	)
})

export default function Invoice({ loaderData, actionData, params }: Route.ComponentProps) {
	const { invoice, care, openCents, declineMessage, isOnItsWay, isJustPaid } = loaderData
	const base = `/buy/${params.producer}/${params.store}`
	return (
		<BuyBook frame={loaderData.frame}>
			{actionData && (
				<MessageLine tone="problem" title="It was not paid.">
					{actionData.problem}
				</MessageLine>
			)}
			{isOnItsWay && <PaymentOnItsWay />}
			{isJustPaid && (
				<MessageLine tone="saved" title="Paid, thank you.">
					A receipt goes to whoever paid.
				</MessageLine>
			)}
			{!isOnItsWay && declineMessage !== "" && (
				<MessageLine tone="problem" title="The card was refused, and nothing was taken.">
					{declineMessage} The invoice is still open.
				</MessageLine>
			)}
			<div className="invoice-bar no-print">
				{openCents > 0 ? (
					<p>
						<b>{formatMoney(openCents)}</b> to pay by {dayWords(invoice.due.on)}.
					</p>
				) : (
					<p>
						<b>Paid.</b> There is nothing to pay.
					</p>
				)}
				<Pay loaderData={loaderData} />
				<span className="flex flex-wrap gap-x-5">
					{/* A file, not a page: the router leaves it to the browser. */}
					<Link className="py-1" to={`${base}/invoices/${invoice.number}.pdf`} reloadDocument>
						Printed page (PDF)
					</Link>
					<InvoiceLinks base={base} number={invoice.number} orderNumbers={loaderData.orderNumbers} />
					<Link className="py-1" to={`${base}/invoices/${invoice.number}/breakage`}>
						Something arrived broken
					</Link>
				</span>
			</div>
			<InvoiceDocument invoice={invoice} care={care} />
		</BuyBook>
	)
}

function Pay({ loaderData }: Pick<Route.ComponentProps, "loaderData">) {
	const { openCents, canPay, payers, isOnItsWay } = loaderData
	const isLeaving = useNavigation().formMethod === "POST"
	if (openCents === 0 || isOnItsWay) return null
	if (!canPay) {
		const who =
			payers.length > 0 ? `${payers.join(" and ")} can pay it by card` : "Nobody of your store pays by card yet"
		return <p className="text-ink-soft">{who}; a check, cash or a transfer is as good.</p>
	}
	return (
		<Form method="post">
			<Button variant="primary" size="big" name="intent" value="pay" busy={isLeaving} busyLabel="Opening the card page">
				Pay {formatMoney(openCents)} by card
			</Button>
		</Form>
	)
}
