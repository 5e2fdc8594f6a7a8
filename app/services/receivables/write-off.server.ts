import { sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { auditEntries, settlements } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"

export type WriteOffRefusal = { ok: false; reason: "no-such-invoice" | "more-than-open" | "books-closed" }

/**
 * Gives up what a store owes on an invoice, in whole or in part, as a bad debt of `today`. `writeOffId` is made with the form:
 * sent twice it is given up once. Refused when more is given up than is open, or the books of that day are closed. The
 * reason is recorded with it.
 */
export async function writeOff(query: {
	producerId: string
	storeId: string
	invoiceId: string
	amountCents: number
	reason: string
	writeOffId: string
	personId: string
	today: Day
}): Promise<Result<object, WriteOffRefusal>> {
	const { producerId, storeId, invoiceId, amountCents, reason, writeOffId, personId, today } = query
	try {
		return await withProducer<Result<object, WriteOffRefusal>>(producerId, async (tx) => {
			// Whoever settles something of the store waits here.
			await tx.execute(sql`
				select 1 from stores where producer_id = ${producerId} and id = ${storeId} for no key update`)
			const { rows } = await tx.execute<{ openCents: number; isDone: boolean }>(sql`
				select i.open_cents as "openCents",
					exists (select from settlements t where t.producer_id = i.producer_id and t.id = ${writeOffId}) as "isDone"
				from invoices i
				where i.producer_id = ${producerId} and i.store_id = ${storeId} and i.id = ${invoiceId}`)
			const invoice = rows[0]
			if (!invoice) return { ok: false, reason: "no-such-invoice" }
			if (invoice.isDone) return { ok: true }
			if (amountCents > invoice.openCents) return { ok: false, reason: "more-than-open" }
			await tx.insert(settlements).values({
				producerId,
				id: writeOffId,
				invoiceId,
				kind: "write-off",
				amountCents,
				settledOn: today,
				enteredBy: personId,
			})
			await tx.insert(auditEntries).values({
				producerId,
				userId: personId,
				action: "bad debt given up",
				subjectType: "invoice",
				subjectId: invoiceId,
				detail: { amountCents, reason, storeId },
			})
			return { ok: true }
		})
	} catch (error) {
		if (breaksConstraint(error, "books_closed")) return { ok: false, reason: "books-closed" }
		if (breaksConstraint(error, "invoices_settled_within_total")) return { ok: false, reason: "more-than-open" }
		throw error
	}
}
