import { data, Form, Link, redirect, useNavigation } from "react-router"
import { dayInZone, dayWords } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { mayPay } from "~/domain/people/roles"
import { now as askClock } from "~/platform/clock.server"
import { findStoreDetails } from "~/services/delivery/find-store-details.server"
import { findInvoice } from "~/services/invoicing/find-invoice.server"
import { findInvoicePayments } from "~/services/payments/find-invoice-payments.server"
import { findPayPage } from "~/services/payments/find-pay-page.server"
import { findVisit } from "~/services/payments/find-visit.server"
import { startPayment } from "~/services/payments/start-payment.server"
import { Button } from "~/ui/forms/button"
import { InvoiceDocument } from "~/ui/invoicing/invoice-document"
import { InvoiceLinks } from "~/ui/invoicing/invoice-links"
import { PaymentOnItsWay } from "~/ui/invoicing/payment-on-its-way"
import { MessageLine } from "~/ui/layout/sheet"
import { InvoicePayments } from "~/ui/payments/invoice-payments"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/invoice"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"
import { payRefusal } from "./pay-form"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Invoice ${params.invoice} · Waxbill` }]

export const loader = guard(admits.store("buyer", "payer"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const { producer, store, storeRoles } = scope
	const ofStore = { producerId: producer.id, storeId: store.id }
	// The visit first: where it says paid, what is read after it says so too.
	const visit = await findVisit({ ...ofStore, visitId: url.searchParams.get("paid") })
	const page = await findInvoice({ producerId: producer.id, storeId: store.id, number: params.invoice })
	if (!page) throw data(null, { status: 404 })
	const now = askClock()
	const canPay = storeRoles.some(mayPay)
	const found = await findInvoicePayments({ ...ofStore, number: params.invoice })
	return {
		frame: await findBuyFrame(scope, { part: "invoices", now }),
		invoice: page.document,
		care: page.care,
		orderNumbers: page.orderNumbers,
		openCents: page.openCents,
		payable: canPay ? await findPayable(ofStore, params.invoice, dayInZone(now, producer.timeZone)) : NOTHING,
		payments: found?.payments ?? [],
		onItsWayCents: found?.onItsWayCents ?? 0,
		declineMessage: page.declineMessage,
		canPay,
		payers: canPay || page.openCents === 0 ? [] : await payersOf({ producer, store, now }),
		// The person has come back from the page and the event has not come yet.
		isOnItsWay: visit?.state === "open" || (visit?.state === "declined" && visit.method === "card"),
		isDebitStarted: visit?.state === "on-its-way",
		isJustPaid: visit?.state === "paid",
	}
})

const NOTHING = { leftCents: 0, discountCents: 0 }

/** What is to be paid of it today, less a discount and debits on their way. */
async function findPayable(ofStore: { producerId: string; storeId: string }, number: string, today: string) {
	const { invoices } = await findPayPage({ ...ofStore, today })
	const { leftCents, discountCents } = invoices.find((invoice) => invoice.number === number) ?? NOTHING
	return { leftCents, discountCents }
}

async function payersOf(query: {
	producer: { id: string; timeZone: string }
	store: { id: string }
	now: Date
}): Promise<string[]> {
	const { producer, store, now } = query
	const details = await findStoreDetails({ producerId: producer.id, storeId: store.id, now, zone: producer.timeZone })
	return details.people.filter((person) => person.roles.some(mayPay)).map((person) => person.name)
}

export const action = guard(admits.store("payer"), async ({ request, params }: Route.ActionArgs, scope) => {
	const { producer, store, person } = scope
	if ((await request.formData()).get("intent") !== "pay") throw data(null, { status: 400 })
	const today = dayInZone(askClock(), producer.timeZone)
	const { leftCents } = await findPayable({ producerId: producer.id, storeId: store.id }, params.invoice, today)
	const wishes = [{ number: params.invoice, cents: Math.max(1, leftCents) }]
	const started = await startPayment({ producer, store, person, wishes, method: "card" })
	if (started.ok) throw redirect(started.url)
	if (started.reason === "no-such-invoice") throw data(null, { status: 404 })
	const { status, problem, errors } = payRefusal(started)
	return data({ problem: problem ?? errors.map(({ message }) => message).join(" ") }, { status })
})

export default function Invoice({ loaderData, actionData, params }: Route.ComponentProps) {
	const { invoice, care, openCents, declineMessage, isOnItsWay, isJustPaid, onItsWayCents } = loaderData
	const base = `/buy/${params.producer}/${params.store}`
	return (
		<BuyBook frame={loaderData.frame}>
			{actionData && (
				<MessageLine tone="problem" title="It was not paid.">
					{actionData.problem}
				</MessageLine>
			)}
			{isOnItsWay && <PaymentOnItsWay />}
			{loaderData.isDebitStarted && (
				<MessageLine tone="saved" title={`Your bank debit of ${formatMoney(onItsWayCents)} is on its way.`}>
					It takes some days to clear; a receipt follows then. You need do nothing more.
				</MessageLine>
			)}
			{isJustPaid && (
				<MessageLine tone="saved" title="Paid, thank you.">
					A receipt goes to whoever paid.
				</MessageLine>
			)}
			{!isOnItsWay && declineMessage !== "" && (
				<MessageLine tone="problem" title="The last payment was refused, and nothing was taken.">
					{declineMessage} The invoice is still open.
				</MessageLine>
			)}
			<div className="invoice-bar no-print">
				{openCents > 0 ? (
					<p>
						<b>{formatMoney(openCents)}</b> to pay by {dayWords(invoice.due.on)}
						{onItsWayCents > 0 && `; ${formatMoney(onItsWayCents)} of it is on its way`}.
					</p>
				) : (
					<p>
						<b>Paid.</b> There is nothing to pay.
					</p>
				)}
				<Pay loaderData={loaderData} payHref={`${base}/pay?invoice=${invoice.number}`} />
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
			<InvoicePayments payments={loaderData.payments} />
			<InvoiceDocument invoice={invoice} care={care} />
		</BuyBook>
	)
}

function Pay({ loaderData, payHref }: Pick<Route.ComponentProps, "loaderData"> & { payHref: string }) {
	const { openCents, canPay, payers, isOnItsWay } = loaderData
	const { leftCents, discountCents } = loaderData.payable
	const isLeaving = useNavigation().formMethod === "POST"
	if (openCents === 0 || isOnItsWay) return null
	if (!canPay) {
		const who =
			payers.length > 0 ? `${payers.join(" and ")} can pay it by card` : "Nobody of your store pays by card yet"
		return <p className="text-ink-soft">{who}; a check, cash or a transfer is as good.</p>
	}
	if (leftCents === 0) return null
	return (
		<>
			<Form method="post">
				<Button
					variant="primary"
					size="big"
					name="intent"
					value="pay"
					busy={isLeaving}
					busyLabel="Opening the card page"
				>
					Pay {formatMoney(leftCents)} by card
				</Button>
				{discountCents > 0 && <span className="note block">{formatMoney(discountCents)} off for paying early</span>}
			</Form>
			<Link className="py-1" to={payHref}>
				Pay a part, or by bank debit
			</Link>
		</>
	)
}
