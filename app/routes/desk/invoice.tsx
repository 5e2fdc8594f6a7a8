import { randomUUID } from "node:crypto"
import { data, Link, redirect } from "react-router"
import { dayInZone, dayWords } from "~/domain/calendar"
import { formatMoney, plainMoney } from "~/domain/money"
import { now as askClock } from "~/platform/clock.server"
import { findInvoice } from "~/services/invoicing/find-invoice.server"
import { findInvoicePayments } from "~/services/payments/find-invoice-payments.server"
import { recordPayment } from "~/services/payments/record-payment.server"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { InvoiceDocument } from "~/ui/invoicing/invoice-document"
import { InvoiceLinks } from "~/ui/invoicing/invoice-links"
import { MessageLine } from "~/ui/layout/sheet"
import { InvoicePayments } from "~/ui/payments/invoice-payments"
import { NotePayment } from "~/ui/payments/note-payment"
import { settledWords } from "~/ui/payments/settled-words"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/invoice"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { BOOKS_CLOSED, readPayment } from "./payment-form"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Invoice ${params.invoice} · Waxbill` }]

export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const query = { producerId: scope.producer.id, number: params.invoice }
	const page = await findInvoice(query)
	const found = await findInvoicePayments(query)
	if (!page || !found) throw data(null, { status: 404 })
	return {
		frame: await findDeskFrame(scope, { part: "invoices" }),
		invoice: page.document,
		care: page.care,
		orderNumbers: page.orderNumbers,
		openCents: page.openCents,
		...found,
		today: dayInZone(askClock(), scope.producer.timeZone),
		paymentId: randomUUID(),
		noted: url.searchParams.get("noted"),
	}
})

export const action = guard(admits.desk("owner", "desk"), async ({ request, params, url }: Route.ActionArgs, scope) => {
	const { producer, person } = scope
	const today = dayInZone(askClock(), producer.timeZone)
	const read = readPayment(await request.formData(), today)
	if (!read.ok) return data(read.refused, { status: 422 })
	const { amount, ...payment } = read.payment
	const noted = await recordPayment({
		producerId: producer.id,
		aim: { invoiceNumber: params.invoice },
		amountCents: amount,
		personId: person.id,
		...payment,
	})
	if (noted.ok) throw redirect(`${url.pathname}?${new URLSearchParams({ noted: settledWords(noted) })}`)
	if (noted.reason !== "books-closed") throw data(null, { status: 404 })
	return data({ errors: [{ field: "receivedOn", message: BOOKS_CLOSED }], values: read.values }, { status: 422 })
})

export default function Invoice({ loaderData, actionData, params }: Route.ComponentProps) {
	const { invoice, care, openCents, noted, today, storeSlug, payments, onItsWayCents } = loaderData
	const base = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame}>
			{noted && !actionData && (
				<MessageLine tone="saved" title="The payment is noted.">
					{noted}
				</MessageLine>
			)}
			<div className="no-print">
				<ErrorSummary title="The payment was not noted" errors={actionData?.errors ?? []} />
				<div className="invoice-bar">
					{openCents > 0 ? (
						<p>
							<b>{formatMoney(openCents)}</b> to be paid by {dayWords(invoice.due.on)}
							{onItsWayCents > 0 && `; ${formatMoney(onItsWayCents)} of it is on its way`}.
						</p>
					) : (
						<p>
							<b>Paid.</b> Nothing is open.
						</p>
					)}
					<span className="flex flex-wrap gap-x-5">
						{/* A file, not a page: the router leaves it to the browser. */}
						<Link className="py-1" to={`${base}/invoices/${invoice.number}.pdf`} reloadDocument>
							Printed page (PDF)
						</Link>
						<InvoiceLinks base={base} number={invoice.number} orderNumbers={loaderData.orderNumbers} />
						<Link className="py-1" to={`${base}/stores/${storeSlug}/payment`}>
							Payment for several
						</Link>
						<Link className="py-1" to={`${base}/invoices/${invoice.number}/credit`}>
							Credit it
						</Link>
					</span>
				</div>
				<InvoicePayments payments={payments} href={`${base}/payments`} />
				{openCents > 0 && (
					<NotePayment
						paymentId={loaderData.paymentId}
						today={today}
						amount={plainMoney(openCents)}
						amountHint={`What is over goes to ${invoice.store.name}’s other open invoices, the oldest first.`}
						values={actionData?.values}
						errors={actionData?.errors ?? []}
					/>
				)}
			</div>
			<InvoiceDocument invoice={invoice} care={care} />
		</DeskBook>
	)
}
