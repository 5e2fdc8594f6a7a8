import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { dayInZone, dayWords } from "~/domain/calendar"
import { formatMoney, plainMoney } from "~/domain/money"
import { now as askClock } from "~/platform/clock.server"
import { findInvoice } from "~/services/invoicing/find-invoice.server"
import { recordPayment } from "~/services/payments/record-payment.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { SelectField, TextField } from "~/ui/forms/fields"
import { InvoiceDocument } from "~/ui/invoicing/invoice-document"
import { InvoiceLinks } from "~/ui/invoicing/invoice-links"
import { MessageLine } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/invoice"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { paymentForm } from "./payment-form"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Invoice ${params.invoice} · Waxbill` }]

export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const page = await findInvoice({ producerId: scope.producer.id, number: params.invoice })
	if (!page) throw data(null, { status: 404 })
	return {
		frame: await findDeskFrame(scope, { part: "invoices" }),
		invoice: page.document,
		care: page.care,
		orderNumbers: page.orderNumbers,
		openCents: page.openCents,
		paymentId: randomUUID(),
		noted: url.searchParams.get("noted"),
	}
})

export const action = guard(admits.desk("owner", "desk"), async ({ request, params, url }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const values = Object.fromEntries(
		["method", "amount", "paymentId"].map((name) => [name, String(form.get(name) ?? "").slice(0, 100)]),
	)
	const parsed = paymentForm.safeParse(values)
	if (!parsed.success) {
		const errors = parsed.error.issues.map(({ path, message }) => ({ field: String(path[0]), message }))
		if (errors.some(({ field }) => field === "paymentId")) throw data(null, { status: 400 })
		return data({ errors, values }, { status: 422 })
	}
	const { method, amount, paymentId } = parsed.data
	const noted = await recordPayment({
		producerId: scope.producer.id,
		invoiceNumber: params.invoice,
		method,
		amountCents: amount,
		personId: scope.person.id,
		paymentId,
		receivedOn: dayInZone(askClock(), scope.producer.timeZone),
	})
	if (!noted.ok) throw data(null, { status: 404 })
	throw redirect(`${url.pathname}?${new URLSearchParams({ noted: settledWords(noted) })}`)
})

/** "It settles $929.90 of invoice 2026-0012; $20.00 stays on account." */
function settledWords(noted: { settledInvoices: { number: string; cents: number }[]; onAccountCents: number }): string {
	const parts = noted.settledInvoices.map(({ number, cents }) => `${formatMoney(cents)} of invoice ${number}`)
	const settles = parts.length > 0 ? [`It settles ${parts.join(", ")}`] : []
	const over = noted.onAccountCents > 0 ? [`${formatMoney(noted.onAccountCents)} stays on the store’s account`] : []
	return `${[...settles, ...over].join("; ")}.`
}

export default function Invoice({ loaderData, actionData, params }: Route.ComponentProps) {
	const { invoice, care, openCents, noted } = loaderData
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
							<b>{formatMoney(openCents)}</b> to be paid by {dayWords(invoice.due.on)}.
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
						<Link className="py-1" to={`${base}/invoices/${invoice.number}/credit`}>
							Credit it
						</Link>
					</span>
				</div>
				{openCents > 0 && <NotePayment loaderData={loaderData} actionData={actionData} />}
			</div>
			<InvoiceDocument invoice={invoice} care={care} />
		</DeskBook>
	)
}

function NotePayment({ loaderData, actionData }: Pick<Route.ComponentProps, "loaderData" | "actionData">) {
	const { openCents, invoice, paymentId } = loaderData
	const errorOf = (field: string) => actionData?.errors.find((error) => error.field === field)?.message
	return (
		<Form method="post" className="payment-form" noValidate aria-label="Note a payment">
			<input type="hidden" name="paymentId" value={actionData?.values.paymentId ?? paymentId} />
			<SelectField
				name="method"
				label="Money came as"
				options={[
					{ value: "cheque", label: "a check" },
					{ value: "cash", label: "cash" },
					{ value: "transfer", label: "a bank transfer" },
				]}
				defaultValue={actionData?.values.method ?? "cheque"}
				error={errorOf("method")}
			/>
			<TextField
				name="amount"
				label="How much"
				inputMode="decimal"
				autoComplete="off"
				hint={`What is over goes to ${invoice.store.name}’s other open invoices, the oldest first.`}
				defaultValue={actionData?.values.amount ?? plainMoney(openCents)}
				error={errorOf("amount")}
			/>
			<div className="payment-button">
				<Button variant="primary" name="intent" value="note">
					Note the payment
				</Button>
			</div>
		</Form>
	)
}
