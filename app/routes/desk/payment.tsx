import { randomUUID } from "node:crypto"
import { data, Link, redirect } from "react-router"
import { dayInZone, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { methodWords } from "~/domain/payments/payment-words"
import { now as askClock } from "~/platform/clock.server"
import { findPayment } from "~/services/payments/find-payment.server"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { BounceForm, RefundForm } from "~/ui/payments/give-back"
import { PaymentFacts } from "~/ui/payments/payment-facts"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/payment"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { takePaymentStep } from "./payment-step.server"

export const meta: Route.MetaFunction = () => [{ title: "Payment · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const payment = await findPayment({ producerId: scope.producer.id, paymentId: params.payment })
	if (!payment) throw data(null, { status: 404 })
	return {
		frame: await findDeskFrame(scope, { part: "invoices" }),
		payment,
		returnId: randomUUID(),
		today: dayInZone(askClock(), scope.producer.timeZone),
		done: url.searchParams.get("done"),
	}
})

export const action = guard(admits.desk("owner", "desk"), async ({ request, params, url }: Route.ActionArgs, scope) => {
	const step = await takePaymentStep(await request.formData(), params.payment, scope)
	if (step.ok) throw redirect(`${url.pathname}?done=${step.done}`)
	return data(step.refused, { status: 422 })
})

const DONE: Record<string, string> = {
	refunded: "The refund is made.",
	"refund-asked": "The refund is asked for; Stripe has not answered yet. It is asked again by itself, once.",
	bounced: "It is noted. What it had settled is open again.",
}

export default function Payment({ loaderData, actionData, params }: Route.ComponentProps) {
	const { payment, done, today } = loaderData
	const base = `/desk/${params.producer}`
	const byStripe = payment.stripePaymentIntentId !== null
	const errors = actionData?.errors ?? []
	const method = methodWords(payment.method)
	return (
		<DeskBook frame={loaderData.frame}>
			{done && DONE[done] && !actionData && <MessageLine tone="saved" title={DONE[done]} />}
			<SheetHead
				title={`${formatMoney(payment.amountCents)} by ${method}`}
				lead={
					<>
						<Link to={`${base}/stores/${payment.storeSlug}`}>{payment.storeName}</Link>
						{payment.state === "on-its-way" ? ", started on " : ", "}
						{fullDay(payment.receivedOn)}
						{payment.reference && `, ${payment.reference}`}.
					</>
				}
				action={<Link to={`${base}/payments`}>All payments</Link>}
			/>
			<ErrorSummary title="Nothing was changed" errors={errors} />
			<PaymentFacts payment={payment} base={base} />
			{byStripe && payment.state === "settled" && payment.refundableCents > 0 && (
				<RefundForm
					returnId={loaderData.returnId}
					refundableCents={payment.refundableCents}
					method={method}
					values={actionData?.intent === "refund" ? actionData.values : undefined}
					errors={errors}
				/>
			)}
			{!byStripe && payment.returnedCents === 0 && (
				<BounceForm
					isCheck={payment.method === "cheque"}
					today={today}
					values={actionData?.intent === "bounce" ? actionData.values : undefined}
					errors={errors}
				/>
			)}
		</DeskBook>
	)
}
