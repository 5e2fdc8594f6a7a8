import { sql } from "drizzle-orm"
import type { payments } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import { afterParts, layAsTold, type ToldPart } from "~/domain/payments/lay-payment"
import { readPayable } from "./read-payable.server"
import { type Laid, writeSettlements } from "./write-settlements.server"

type Payment = Pick<
	typeof payments.$inferSelect,
	"producerId" | "id" | "storeId" | "amountCents" | "settledCents" | "returnedCents" | "receivedOn" | "enteredBy"
>

/**
 * Lays what is left of a payment against the invoices that it was made for, as far as they are open; what is over stays on
 * account. `madeOn` is the day that decides on the discount. In a transaction that holds the store's account.
 */
export async function layMeant(
	tx: Tx,
	{ payment, onlinePaymentId, madeOn }: { payment: Payment; onlinePaymentId: string; madeOn: Day },
): Promise<void> {
	const { producerId, storeId } = payment
	const { rows: told } = await tx.execute<ToldPart>(sql`
		select p.invoice_id as "invoiceId", p.amount_cents as cents from online_payment_parts p
		join invoices i on i.producer_id = p.producer_id and i.id = p.invoice_id
		where p.producer_id = ${producerId} and p.online_payment_id = ${onlinePaymentId}
		order by i.due_on, i.year, i.sequence`)
	const invoiceIds = told.map(({ invoiceId }) => invoiceId)
	const open = await readPayable(tx, { producerId, storeId, invoiceIds })
	const left = payment.amountCents - payment.settledCents - payment.returnedCents
	const { parts } = layAsTold(left, told, open, madeOn)
	const entry = { producerId, settledOn: payment.receivedOn, personId: payment.enteredBy }
	await writeSettlements(tx, entry, [{ paymentId: payment.id, parts }])
}

/**
 * Lays money on the store's account that came through Stripe against invoices that a return has opened again: the earlier
 * payment first. So it does not matter which of two payments of one invoice was known first. In a transaction that holds
 * the store's account.
 */
export async function layAgain(
	tx: Tx,
	query: { producerId: string; storeId: string; invoiceIds: readonly string[]; settledOn: Day; zone: string },
): Promise<void> {
	const { producerId, storeId, invoiceIds, settledOn, zone } = query
	if (invoiceIds.length === 0) return
	const { rows } = await tx.execute<{ id: string; leftCents: number; receivedAt: string }>(sql`
		select id, amount_cents - settled_cents - returned_cents as "leftCents", received_at::text as "receivedAt"
		from payments
		where producer_id = ${producerId} and store_id = ${storeId} and state = 'settled'
			and settled_cents + returned_cents < amount_cents and stripe_payment_intent_id is not null
		order by received_at, stripe_payment_intent_id`)
	let open = rows.length > 0 ? await readPayable(tx, { producerId, storeId, invoiceIds }) : []
	const laid: Laid[] = []
	for (const { id, leftCents, receivedAt } of rows) {
		const told = open.map((invoice) => ({ invoiceId: invoice.id, cents: invoice.openCents }))
		const { parts } = layAsTold(leftCents, told, open, dayInZone(new Date(receivedAt), zone))
		laid.push({ paymentId: id, parts })
		open = afterParts(open, parts)
	}
	await writeSettlements(tx, { producerId, settledOn, personId: null }, laid)
}
