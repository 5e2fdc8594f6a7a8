import { sql } from "drizzle-orm"
import { auditEntries } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { refreshExpected } from "./refresh-expected.server"

/** The bee escape goes in under a super, or comes out again because it was put in too early or marked by mistake. */
export type SuperMark = "escape-in" | "escape-out"

export type MarkRefusal =
	| { ok: false; reason: "none-chosen" | "gone" | "in-the-future" }
	/** The day lies before a chosen super was set on. */
	| { ok: false; reason: "before-set-on"; setOn: Day }

/**
 * Marks many supers at once, all or none. Those that are marked so already stay as they are, with the day they were
 * marked. Refuses a day after today or before one of them was set on, and supers that are not there or have come off.
 * Their row locks come before those of products, as wherever supers change.
 */
export async function markSupers(given: {
	producerId: string
	personId: string
	today: Day
	superIds: readonly string[]
	mark: SuperMark
	on: Day
}): Promise<Result<{ marked: number }, MarkRefusal>> {
	const { producerId, personId, today, mark, on } = given
	const superIds = [...new Set(given.superIds)]
	if (superIds.length === 0) return { ok: false, reason: "none-chosen" }
	if (on > today) return { ok: false, reason: "in-the-future" }
	return withProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<{ id: string; productId: string; setOn: Day; state: string }>(sql`
			select id, product_id as "productId", set_on::text as "setOn", state from supers
			where producer_id = ${producerId} and id = any(${sql.param(superIds)}::uuid[]) and state <> 'off'
			order by id for update`)
		if (rows.length < superIds.length) return { ok: false, reason: "gone" }
		const latest =
			rows
				.map(({ setOn }) => setOn)
				.toSorted()
				.at(-1) ?? on
		if (mark === "escape-in" && on < latest) return { ok: false, reason: "before-set-on", setOn: latest }
		const state = mark === "escape-in" ? "clearing" : "on"
		const changing = rows.filter((one) => one.state !== state)
		if (changing.length === 0) return { ok: true, marked: 0 }
		const ids = changing.map(({ id }) => id)
		await tx.execute(sql`
			update supers set state = ${state}, clearing_on = ${mark === "escape-in" ? on : null}::date
			where producer_id = ${producerId} and id = any(${sql.param(ids)}::uuid[])`)
		await tx.insert(auditEntries).values(
			ids.map((subjectId) => ({
				producerId,
				userId: personId,
				action: mark === "escape-in" ? "bee escape put in" : "bee escape taken out",
				subjectType: "super",
				subjectId,
				detail: { on },
			})),
		)
		const productIds = [...new Set(changing.map(({ productId }) => productId))]
		await refreshExpected(tx, { producerId, today, productIds })
		return { ok: true, marked: changing.length }
	})
}
