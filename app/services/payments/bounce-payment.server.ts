import { and, eq } from "drizzle-orm"
import { auditEntries, paymentReturns, payments } from "~/db/schema"
import type { Day } from "~/domain/calendar"
import { lockStoreAccount, withAccount } from "~/services/credits/lock-store-account.server"
import { takeBackSettlements } from "./write-settlements.server"

export type BounceAnswer =
	| { ok: true }
	| { ok: false; reason: "no-such-payment" | "by-stripe" | "gone-already" | "before-it-came" | "books-closed" }

/**
 * Marks a payment that was noted by hand as one that did not hold: a check that bounced, or one whose amount was wrong.
 * All that it settled is open again. Done twice, it is done once.
 */
export async function bouncePayment(query: {
	producerId: string
	paymentId: string
	bouncedOn: Day
	note: string
	personId: string
}): Promise<BounceAnswer> {
	const { producerId, paymentId, bouncedOn, note, personId } = query
	const done = await withAccount<BounceAnswer>(producerId, async (tx) => {
		const isPayment = and(eq(payments.producerId, producerId), eq(payments.id, paymentId))
		const [found] = await tx.select({ storeId: payments.storeId }).from(payments).where(isPayment)
		if (!found) return { ok: false, reason: "no-such-payment" }
		await lockStoreAccount(tx, { producerId, storeId: found.storeId })
		const [payment] = await tx.select().from(payments).where(isPayment)
		if (!payment || payment.stripePaymentIntentId) return { ok: false, reason: "by-stripe" }
		if (payment.returnedCents > 0) return { ok: false, reason: "gone-already" }
		if (bouncedOn < payment.receivedOn) return { ok: false, reason: "before-it-came" }
		const entry = { producerId, paymentId, settledOn: bouncedOn, personId }
		await takeBackSettlements(tx, { ...entry, cents: payment.settledCents })
		await tx.insert(paymentReturns).values({
			...{ producerId, paymentId, kind: "bounced", state: "done", amountCents: payment.amountCents },
			returnedOn: bouncedOn,
			note,
			enteredBy: personId,
		})
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: "bounce payment",
			subjectType: "payment",
			subjectId: paymentId,
			detail: { amountCents: payment.amountCents, note },
		})
		return { ok: true }
	})
	return done === "books-closed" ? { ok: false, reason: "books-closed" } : done
}
