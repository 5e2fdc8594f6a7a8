import { and, eq } from "drizzle-orm"
import { auditEntries, stores } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Result } from "~/domain/result"
import { columnsOf, hasTier, markOf, type StoreTerms, termsOfRow } from "./store-terms.server"

export type SaveRefusal =
	| { ok: false; reason: "no-such-store" }
	| { ok: false; reason: "no-such-tier" }
	| { ok: false; reason: "changed-meanwhile"; now: StoreTerms; mark: string }

/**
 * Sets what the producer sets of a store, from its next order and invoice on. `mark` is that of the terms the form was made
 * from: when somebody has changed them since, nothing is written and what holds now is answered. What changed is recorded.
 */
export function saveStore(query: {
	producerId: string
	storeId: string
	personId: string
	mark: string
	terms: StoreTerms
}): Promise<Result<object, SaveRefusal>> {
	const { producerId, storeId, personId, mark, terms } = query
	return withProducer(producerId, async (tx) => {
		const isStore = and(eq(stores.producerId, producerId), eq(stores.id, storeId))
		const [row] = await tx.select().from(stores).where(isStore).for("no key update")
		if (!row) return { ok: false, reason: "no-such-store" }
		const before = termsOfRow(row)
		if (markOf(before) !== mark) return { ok: false, reason: "changed-meanwhile", now: before, mark: markOf(before) }
		if (!(await hasTier(tx, { producerId, tierId: terms.tierId }))) return { ok: false, reason: "no-such-tier" }
		const changed = changesOf(before, terms)
		if (Object.keys(changed).length === 0) return { ok: true }
		await tx.update(stores).set(columnsOf(terms)).where(isStore)
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: "store changed",
			subjectType: "store",
			subjectId: storeId,
			detail: changed,
		})
		return { ok: true }
	})
}

function changesOf(before: StoreTerms, after: StoreTerms): Record<string, { before: unknown; after: unknown }> {
	const names = Object.keys(after) as (keyof StoreTerms)[]
	return Object.fromEntries(
		names
			.filter((name) => JSON.stringify(before[name]) !== JSON.stringify(after[name]))
			.map((name) => [name, { before: before[name], after: after[name] }]),
	)
}
