import { and, eq } from "drizzle-orm"
import { auditEntries, onlinePayments, stores } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { KeptMethod } from "~/platform/stripe-payment.server"
import { lockStoreAccount } from "~/services/credits/lock-store-account.server"

/**
 * Brings a visit without a payment to what Stripe says of its page: it has expired, or a way to pay was kept for the
 * store, which it pays with from now on. Once done it stays done, also when the store has forgotten that way since.
 */
export async function bringVisit(
	tx: Tx,
	query: {
		producerId: string
		onlinePaymentId: string
		sessionId: string
		isExpired: boolean
		kept: KeptMethod | null
	},
): Promise<void> {
	const { producerId, onlinePaymentId, sessionId, isExpired, kept } = query
	const isVisit = and(eq(onlinePayments.producerId, producerId), eq(onlinePayments.id, onlinePaymentId))
	const [found] = await tx.select({ storeId: onlinePayments.storeId }).from(onlinePayments).where(isVisit)
	if (!found) return
	await lockStoreAccount(tx, { producerId, storeId: found.storeId })
	const [visit] = await tx.select().from(onlinePayments).where(isVisit)
	if (!visit || visit.state === "paid" || visit.state === "on-its-way") return
	if (kept) {
		await tx.update(onlinePayments).set({ state: "paid", stripeSessionId: sessionId }).where(isVisit)
		await tx
			.update(stores)
			.set({
				stripeCustomerId: kept.customerId,
				stripePaymentMethodId: kept.methodId,
				paysWithWords: kept.words,
			})
			.where(and(eq(stores.producerId, producerId), eq(stores.id, visit.storeId)))
		await tx.insert(auditEntries).values({
			producerId,
			userId: visit.startedBy,
			action: "keep way to pay",
			subjectType: "store",
			subjectId: visit.storeId,
			detail: { words: kept.words },
		})
		return
	}
	if (isExpired) await tx.update(onlinePayments).set({ state: "expired" }).where(isVisit)
}
