import { and, eq } from "drizzle-orm"
import { auditEntries, stores } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { now } from "~/platform/clock.server"
import { log } from "~/platform/log.server"
import { forgetMethod } from "~/platform/stripe-kept.server"
import { lockStoreAccount } from "~/services/credits/lock-store-account.server"

type Query = { producerId: string; storeId: string; personId: string }

/**
 * Forgets the store's kept way to pay, and with it that the store pays by itself. It is forgotten here at once, and at
 * Stripe as soon as that answers: what is not known here is never charged.
 */
export async function removeMethod(query: Query): Promise<void> {
	const methodId = await withProducer(query.producerId, async (tx) => {
		const store = await lockStore(tx, query)
		if (!store?.stripePaymentMethodId) return null
		await tx
			.update(stores)
			.set({ ...NOT_AUTOMATIC, stripePaymentMethodId: null, paysWithWords: "" })
			.where(isStore(query))
		await record(tx, query, { action: "remove way to pay", words: store.paysWithWords })
		return store.stripePaymentMethodId
	})
	if (!methodId) return
	await forgetMethod(methodId).catch((error: unknown) => {
		log.warn({ err: error, storeId: query.storeId }, "a way to pay that was removed is still kept at Stripe")
	})
}

/** Whether what falls due is taken by itself; who agreed and when is kept. `nothing-kept` where there is nothing to take from. */
export function setAutomatic(
	query: Query & { isOn: boolean },
): Promise<{ ok: true } | { ok: false; reason: "nothing-kept" }> {
	return withProducer(query.producerId, async (tx) => {
		const store = await lockStore(tx, query)
		if (query.isOn && !store?.stripePaymentMethodId) return { ok: false, reason: "nothing-kept" }
		if (!store || store.paysAutomatically === query.isOn) return { ok: true }
		await tx
			.update(stores)
			.set(
				query.isOn
					? { paysAutomatically: true, autopayAgreedBy: query.personId, autopayAgreedAt: now() }
					: NOT_AUTOMATIC,
			)
			.where(isStore(query))
		const action = query.isOn ? "agree to automatic payments" : "end automatic payments"
		await record(tx, query, { action, words: store.paysWithWords })
		return { ok: true }
	})
}

const NOT_AUTOMATIC = { paysAutomatically: false, autopayAgreedBy: null, autopayAgreedAt: null }

const isStore = ({ producerId, storeId }: Query) => and(eq(stores.producerId, producerId), eq(stores.id, storeId))

async function lockStore(tx: Tx, query: Query) {
	await lockStoreAccount(tx, query)
	const [store] = await tx.select().from(stores).where(isStore(query))
	return store
}

async function record(tx: Tx, query: Query, { action, words }: { action: string; words: string }): Promise<void> {
	await tx.insert(auditEntries).values({
		producerId: query.producerId,
		userId: query.personId,
		action,
		subjectType: "store",
		subjectId: query.storeId,
		detail: { words },
	})
}
