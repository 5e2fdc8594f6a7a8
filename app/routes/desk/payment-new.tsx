import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { now as askClock } from "~/platform/clock.server"
import { findStoreAccount } from "~/services/payments/find-store-account.server"
import { layOnAccount } from "~/services/payments/lay-on-account.server"
import { recordPayment } from "~/services/payments/record-payment.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { NotePayment } from "~/ui/payments/note-payment"
import { settledWords } from "~/ui/payments/settled-words"
import { ToldParts } from "~/ui/payments/told-parts"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/payment-new"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { BOOKS_CLOSED, readPayment } from "./payment-form"
import { readTold, toldProblem } from "./told-form"

export const meta: Route.MetaFunction = () => [{ title: "Note a payment · Waxbill" }]

async function accountOf({ producer }: DeskScope, slug: string) {
	const account = await findStoreAccount({ producerId: producer.id, slug })
	if (!account) throw data(null, { status: 404 })
	return account
}

export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const { name, onAccountCents, invoices } = await accountOf(scope, params.store)
	return {
		frame: await findDeskFrame(scope, { part: "stores" }),
		name,
		onAccountCents,
		invoices: invoices.map(({ number, dueOn, openCents, onItsWayCents }) => ({
			number,
			dueOn,
			openCents,
			onItsWayCents,
		})),
		today: dayInZone(askClock(), scope.producer.timeZone),
		paymentId: randomUUID(),
		noted: url.searchParams.get("noted"),
	}
})

export const action = guard(admits.desk("owner", "desk"), async ({ request, params, url }: Route.ActionArgs, scope) => {
	const { producer, person } = scope
	const { storeId } = await accountOf(scope, params.store)
	const today = dayInZone(askClock(), producer.timeZone)
	const form = await request.formData()
	if (form.get("intent") === "lay") {
		const laid = await layOnAccount({ producerId: producer.id, storeId, on: today, personId: person.id })
		if (!laid.ok) return data({ errors: [{ message: BOOKS_CLOSED }], values: {} }, { status: 409 })
		throw redirect(
			`${url.pathname}?${new URLSearchParams({ noted: `${formatMoney(laid.laidCents)} is laid against open invoices.` })}`,
		)
	}
	const read = readPayment(form, today)
	const told = readTold(form)
	const values = { ...(read.ok ? read.values : read.refused.values), ...told.values }
	const errors = [...(read.ok ? [] : read.refused.errors), ...told.errors]
	if (!read.ok || errors.length > 0) return data({ errors, values }, { status: 422 })
	const { amount, ...payment } = read.payment
	const noted = await recordPayment({
		producerId: producer.id,
		aim: told.isTold ? { storeId, told: told.parts } : { storeId },
		amountCents: amount,
		personId: person.id,
		...payment,
	})
	if (noted.ok) throw redirect(`${url.pathname}?${new URLSearchParams({ noted: settledWords(noted) })}`)
	return data({ errors: [toldProblem(noted)], values }, { status: 422 })
})

export default function NewPayment({ loaderData, actionData, params }: Route.ComponentProps) {
	const { name, onAccountCents, invoices, today, paymentId, noted } = loaderData
	const base = `/desk/${params.producer}`
	const openCents = invoices.reduce((sum, one) => sum + one.openCents, 0)
	const errors: { field?: string; message: string }[] = actionData?.errors ?? []
	return (
		<DeskBook frame={loaderData.frame}>
			{noted && !actionData && (
				<MessageLine tone="saved" title="It is noted.">
					{noted}
				</MessageLine>
			)}
			<SheetHead
				title={`Payment of ${name}`}
				lead={
					openCents > 0
						? `${formatMoney(openCents)} is open on ${invoices.length === 1 ? "one invoice" : `${invoices.length} invoices`}.`
						: "Nothing is open: what comes in stays on the store’s account."
				}
				action={<Link to={`${base}/payments`}>All payments</Link>}
			/>
			<ErrorSummary title="The payment was not noted" errors={errors} />
			{onAccountCents > 0 && (
				<Form method="post" className="on-account">
					<p>
						<b>{formatMoney(onAccountCents)}</b> is on the store’s account, from payments and credits.
					</p>
					{openCents > 0 && (
						<Button name="intent" value="lay">
							Lay it against the open invoices, the oldest first
						</Button>
					)}
				</Form>
			)}
			<NotePayment
				paymentId={paymentId}
				today={today}
				amount=""
				amountHint="What is over stays on the store’s account."
				values={actionData?.values}
				errors={errors}
			>
				{invoices.length > 0 && <ToldParts invoices={invoices} values={actionData?.values} errors={errors} />}
			</NotePayment>
		</DeskBook>
	)
}
