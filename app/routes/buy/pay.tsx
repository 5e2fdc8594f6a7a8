import { data, Link, redirect, useNavigation } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { now as askClock } from "~/platform/clock.server"
import { findPayPage } from "~/services/payments/find-pay-page.server"
import { startPayment } from "~/services/payments/start-payment.server"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { PayForm } from "~/ui/payments/pay-form"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/pay"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"
import { payRefusal, readPayForm } from "./pay-form"

export const meta: Route.MetaFunction = () => [{ title: "Pay invoices · Waxbill" }]

/** More than this is more than anybody ticks off; what is due later comes when these are paid. */
const SHOWN = 100

export const loader = guard(admits.store("payer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, store } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const { invoices, way } = await findPayPage({ producerId: producer.id, storeId: store.id, today })
	const named = url.searchParams.getAll("invoice")
	const first = invoices.filter(({ number }) => named.includes(number))
	const others = invoices.filter(({ number }) => !named.includes(number))
	const due = invoices.filter(({ dueOn, leftCents }) => dueOn <= today && leftCents > 0)
	return {
		frame: await findBuyFrame(scope, { part: "invoices", now }),
		lines: [...first, ...others].slice(0, SHOWN),
		hidden: Math.max(0, invoices.length - SHOWN),
		ticked: named.length > 0 ? named : due.map(({ number }) => number),
		openCents: invoices.reduce((sum, { openCents }) => sum + openCents, 0),
		way,
	}
})

export const action = guard(admits.store("payer"), async ({ request }: Route.ActionArgs, scope) => {
	const { producer, store, person } = scope
	const read = readPayForm(await request.formData())
	const { ticked, values } = read
	if (!read.ok) return data({ problem: null, errors: read.errors, ticked, values }, { status: 422 })
	const started = await startPayment({ producer, store, person, wishes: read.wishes, method: read.method })
	if (started.ok) throw redirect(started.url)
	const { status, ...refusal } = payRefusal(started)
	return data({ ...refusal, ticked, values }, { status })
})

export default function Pay({ loaderData, actionData, params }: Route.ComponentProps) {
	const { lines, hidden, openCents, way } = loaderData
	const base = `/buy/${params.producer}/${params.store}`
	const isLeaving = useNavigation().formMethod === "POST"
	return (
		<BuyBook frame={loaderData.frame}>
			{actionData?.problem && (
				<MessageLine tone="problem" title="Nothing was paid.">
					{actionData.problem}
				</MessageLine>
			)}
			<SheetHead
				title="Pay invoices"
				lead={
					openCents > 0
						? `${formatMoney(openCents)} is open. Tick what you pay now; a part of an invoice will do.`
						: "There is nothing to pay."
				}
				action={<Link to={`${base}/payment-method`}>{way.keptWords === "" ? "Keep a way to pay" : way.keptWords}</Link>}
			/>
			<ErrorSummary title="Nothing was paid" errors={actionData?.errors ?? []} />
			{lines.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/invoices`}>All invoices</Link>}>Every invoice is paid.</EmptyLine>
			) : (
				<PayForm
					lines={lines}
					ticked={actionData?.ticked ?? loaderData.ticked}
					values={actionData?.values}
					errors={actionData?.errors ?? []}
					keptWords={way.keptWords}
					isLeaving={isLeaving}
				/>
			)}
			{hidden > 0 && <p className="note px-4 pb-4 desk:px-8">{hidden} more are open; they come when these are paid.</p>}
		</BuyBook>
	)
}
