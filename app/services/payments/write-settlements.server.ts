import { sql } from "drizzle-orm"
import { orderEvents, settlements } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { type LaidPart, takeBack } from "~/domain/payments/lay-payment"

type Entry = { producerId: string; settledOn: Day; personId: string | null }

/** What one payment settles. */
export type Laid = { paymentId: string; parts: readonly LaidPart[] }

/** Enters what payments settle, with the discount that goes with it, and notes it on the orders of those invoices. */
export async function writeSettlements(tx: Tx, entry: Entry, laid: readonly Laid[]): Promise<void> {
	const { producerId, personId } = entry
	const parts = laid.flatMap((one) => one.parts)
	if (parts.length === 0) return
	await writeRows(tx, entry, laid)
	const { rows } = await tx.execute<{ orderId: string; invoiceId: string }>(sql`
		select order_id as "orderId", invoice_id as "invoiceId" from invoice_orders
		where producer_id = ${producerId}
			and invoice_id = any(${sql.param(parts.map(({ invoiceId }) => invoiceId))}::uuid[])`)
	if (rows.length === 0) return
	await tx.insert(orderEvents).values(
		rows.map(({ orderId, invoiceId }) => ({
			producerId,
			orderId,
			kind: "paid" as const,
			userId: personId,
			detail: {
				invoiceId,
				amountCents: parts.reduce((sum, part) => sum + (part.invoiceId === invoiceId ? part.cents : 0), 0),
			},
		})),
	)
}

/** Takes so many cents back from what the payment has settled; answers the invoices that are open again by it. */
export async function takeBackSettlements(
	tx: Tx,
	entry: Entry & { paymentId: string; cents: number },
): Promise<string[]> {
	const { paymentId } = entry
	if (entry.cents === 0) return []
	const taken = takeBack(entry.cents, await readLaid(tx, entry))
	const parts = taken.map(({ invoiceId, cents, discountCents }) => ({
		invoiceId,
		cents: -cents,
		discountCents: -discountCents,
	}))
	await writeRows(tx, entry, [{ paymentId, parts }])
	return taken.map(({ invoiceId }) => invoiceId)
}

async function writeRows(tx: Tx, entry: Entry, laid: readonly Laid[]): Promise<void> {
	const { producerId, settledOn, personId } = entry
	const row = (paymentId: string, invoiceId: string, kind: "payment" | "discount", amountCents: number) =>
		amountCents === 0 ? [] : [{ producerId, paymentId, invoiceId, kind, amountCents, settledOn, enteredBy: personId }]
	await tx
		.insert(settlements)
		.values(
			laid.flatMap(({ paymentId, parts }) =>
				parts.flatMap(({ invoiceId, cents, discountCents }) => [
					...row(paymentId, invoiceId, "payment", cents),
					...row(paymentId, invoiceId, "discount", discountCents),
				]),
			),
		)
}

/** What a payment has settled, in the order in which it was laid; nothing that was taken back. */
async function readLaid(tx: Tx, query: { producerId: string; paymentId: string }): Promise<LaidPart[]> {
	const { rows } = await tx.execute<LaidPart>(sql`
		select t.invoice_id as "invoiceId", coalesce(sum(t.amount_cents) filter (where t.kind = 'payment'), 0)::int as cents,
			coalesce(sum(t.amount_cents) filter (where t.kind = 'discount'), 0)::int as "discountCents"
		from settlements t
		join invoices i on i.producer_id = t.producer_id and i.id = t.invoice_id
		where t.producer_id = ${query.producerId} and t.payment_id = ${query.paymentId}
		group by t.invoice_id, i.due_on, i.year, i.sequence
		having sum(t.amount_cents) > 0
		order by min(t.settled_at), i.due_on, i.year, i.sequence`)
	return rows
}
