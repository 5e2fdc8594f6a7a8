import { sql } from "drizzle-orm"
import { auditEntries, settlements } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { allocatePayment } from "~/domain/invoicing/payments"
import { afterParts, type LaidPart, layOldestFirst } from "~/domain/payments/lay-payment"
import { lockStoreAccount, withAccount } from "~/services/credits/lock-store-account.server"
import { type OpenAccountInvoice, readPayable } from "./read-payable.server"
import { type Laid, writeSettlements } from "./write-settlements.server"

/**
 * Lays what is on a store's account, credits first and then payments, the older first, against its open invoices, the one
 * due first before the later. Answers how much was laid. `books-closed` where `on` lies in closed books.
 */
export async function layOnAccount(query: {
	producerId: string
	storeId: string
	on: Day
	personId: string
}): Promise<{ ok: true; laidCents: number } | { ok: false; reason: "books-closed" }> {
	const { producerId, storeId, on, personId } = query
	const done = await withAccount(producerId, async (tx) => {
		await lockStoreAccount(tx, { producerId, storeId })
		const open = await readPayable(tx, { producerId, storeId })
		const creditedCents = await layCredits(tx, query, open)
		const left = creditedCents > 0 ? await readPayable(tx, { producerId, storeId }) : open
		const laidCents = creditedCents + (await layPayments(tx, query, left))
		if (laidCents > 0) {
			await tx.insert(auditEntries).values({
				producerId,
				userId: personId,
				action: "lay account against invoices",
				subjectType: "store",
				subjectId: storeId,
				detail: { laidCents, on },
			})
		}
		return laidCents
	})
	return done === "books-closed" ? { ok: false, reason: "books-closed" } : { ok: true, laidCents: done }
}

type Query = Parameters<typeof layOnAccount>[0]
type Left = { id: string; leftCents: number }

async function layCredits(
	tx: Tx,
	{ producerId, storeId, on, personId }: Query,
	invoices: OpenAccountInvoice[],
): Promise<number> {
	const { rows } = await tx.execute<Left>(sql`
		select id, total_cents - settled_cents as "leftCents" from credits
		where producer_id = ${producerId} and store_id = ${storeId} and settled_cents < total_cents
		order by issued_on, id`)
	let open = invoices
	const entries: (typeof settlements.$inferInsert)[] = []
	for (const { id, leftCents } of rows) {
		const { parts } = allocatePayment(leftCents, open)
		const about = { producerId, kind: "credit" as const, creditId: id, settledOn: on, enteredBy: personId }
		entries.push(...parts.map(({ invoiceId, cents }) => ({ ...about, invoiceId, amountCents: cents })))
		open = afterParts(open, parts.map(withoutDiscount))
	}
	if (entries.length > 0) await tx.insert(settlements).values(entries)
	return entries.reduce((sum, { amountCents }) => sum + amountCents, 0)
}

const withoutDiscount = (part: { invoiceId: string; cents: number }): LaidPart => ({ ...part, discountCents: 0 })

async function layPayments(
	tx: Tx,
	{ producerId, storeId, on, personId }: Query,
	invoices: OpenAccountInvoice[],
): Promise<number> {
	const { rows } = await tx.execute<Left>(sql`
		select id, amount_cents - settled_cents - returned_cents as "leftCents" from payments
		where producer_id = ${producerId} and store_id = ${storeId} and state = 'settled'
			and settled_cents + returned_cents < amount_cents
		order by received_on, id`)
	let open = invoices
	let laidCents = 0
	const laid: Laid[] = []
	for (const { id, leftCents } of rows) {
		const { parts, onAccountCents } = layOldestFirst(leftCents, open, on)
		laid.push({ paymentId: id, parts })
		laidCents += leftCents - onAccountCents
		open = afterParts(open, parts)
	}
	await writeSettlements(tx, { producerId, settledOn: on, personId }, laid)
	return laidCents
}
