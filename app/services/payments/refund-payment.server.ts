import { and, eq, sql } from "drizzle-orm"
import { auditEntries, paymentReturns, payments } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { refundableCents } from "~/domain/payments/lay-payment"
import { log } from "~/platform/log.server"
import { isRefusal, refund } from "~/platform/stripe-kept.server"
import { lockStoreAccount } from "~/services/credits/lock-store-account.server"
import { bringIntent } from "./bring-from-stripe.server"
import { openDay } from "./open-day.server"

export type RefundAnswer =
	| { ok: true; state: "answered" | "no-answer" | "refused" }
	| { ok: false; reason: "no-such-payment" | "not-by-stripe" }
	| { ok: false; reason: "too-much"; leftCents: number }

/**
 * Gives back part of a payment through Stripe, or all: never more than was paid less what went back. It is asked for here
 * first, under an id made with the form, so that a second send of the form, or a line that breaks, gives back once. Where
 * Stripe does not answer it stays asked for, and the nightly look asks again; `refused` is Stripe's own no. What it settled is taken back when Stripe says that it is done.
 */
export async function refundPayment(query: {
	producerId: string
	paymentId: string
	returnId: string
	amountCents: number
	reason: string
	personId: string
	today: Day
}): Promise<RefundAnswer> {
	const asked = await askRefund(query)
	if (!asked.ok) return asked
	return { ok: true, state: await pushRefund({ ...query, intentId: asked.intentId }) }
}

type Asked = Exclude<RefundAnswer, { ok: true }> | { ok: true; intentId: string }

function askRefund(query: Parameters<typeof refundPayment>[0]): Promise<Asked> {
	const { producerId, paymentId, returnId, amountCents } = query
	return withProducer(producerId, async (tx) => {
		const isPayment = and(eq(payments.producerId, producerId), eq(payments.id, paymentId))
		const [found] = await tx.select({ storeId: payments.storeId }).from(payments).where(isPayment)
		if (!found) return { ok: false, reason: "no-such-payment" }
		await lockStoreAccount(tx, { producerId, storeId: found.storeId })
		const [payment] = await tx.select().from(payments).where(isPayment)
		const intentId = payment?.stripePaymentIntentId
		if (payment?.state !== "settled" || !intentId) return { ok: false, reason: "not-by-stripe" }
		const returns = await tx
			.select()
			.from(paymentReturns)
			.where(and(eq(paymentReturns.producerId, producerId), eq(paymentReturns.paymentId, paymentId)))
		if (returns.some(({ id }) => id === returnId)) return { ok: true, intentId }
		const leftCents = refundableCents({ amountCents: payment.amountCents, returns })
		if (amountCents > leftCents) return { ok: false, reason: "too-much", leftCents }
		await tx.insert(paymentReturns).values({
			...{ producerId, id: returnId, paymentId, kind: "refund", state: "asked", amountCents },
			returnedOn: await openDay(tx, { producerId, day: query.today }),
			note: query.reason,
			enteredBy: query.personId,
		})
		await tx.insert(auditEntries).values({
			producerId,
			userId: query.personId,
			action: "refund payment",
			subjectType: "payment",
			subjectId: paymentId,
			detail: { amountCents, reason: query.reason },
		})
		return { ok: true, intentId }
	})
}

/** Sends a refund that was asked for to Stripe, and brings the payment to what came of it. */
export async function pushRefund(query: {
	producerId: string
	returnId: string
	intentId: string
	amountCents: number
}): Promise<"answered" | "no-answer" | "refused"> {
	const { producerId, returnId, intentId, amountCents } = query
	try {
		await refund({ returnId, intentId, amountCents })
		await bringIntent(intentId)
		return "answered"
	} catch (error) {
		log.warn({ err: error, returnId }, "a refund was not answered, or refused")
		if (!isRefusal(error)) return "no-answer"
		await withProducer(producerId, (tx) =>
			tx
				.update(paymentReturns)
				.set({ state: "failed" })
				.where(and(eq(paymentReturns.producerId, producerId), eq(paymentReturns.id, returnId), sql`state = 'asked'`)),
		)
		return "refused"
	}
}
