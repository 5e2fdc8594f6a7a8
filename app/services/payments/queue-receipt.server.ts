import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { queueMail } from "~/services/mail/queue-mail.server"
import { findPayer, type Try } from "./find-payer.server"

type Applied = { year: number; sequence: number; cents: number; discountCents: number; openCents: number }

/** Queues the receipt of a payment through Stripe to the person who paid, or who agreed to it: once for each payment. */
export async function queueReceipt(
	tx: Tx,
	{ producerId, paymentId, visit }: { producerId: string; paymentId: string; visit: Try },
): Promise<void> {
	const payer = await findPayer(tx, visit)
	if (!payer) return
	const [payment] = (
		await tx.execute<{ amountCents: number; receivedOn: Day; method: string }>(sql`
			select amount_cents as "amountCents", received_on::text as "receivedOn", method from payments
			where producer_id = ${producerId} and id = ${paymentId}`)
	).rows
	if (!payment) throw new Error("a receipt is of a payment that is there")
	const { rows } = await tx.execute<Applied>(sql`
		select i.year, i.sequence, sum(t.amount_cents) filter (where t.kind = 'payment')::int as cents,
			coalesce(sum(t.amount_cents) filter (where t.kind = 'discount'), 0)::int as "discountCents", i.open_cents as "openCents"
		from settlements t join invoices i on i.producer_id = t.producer_id and i.id = t.invoice_id
		where t.producer_id = ${producerId} and t.payment_id = ${paymentId}
		group by i.year, i.sequence, i.open_cents, i.due_on
		order by i.due_on, i.year, i.sequence`)
	const applied = rows.map(({ year, sequence, ...part }) => ({ invoiceNumber: invoiceNumber(year, sequence), ...part }))
	await queueMail(tx, {
		producerId,
		to: payer.email,
		onceKey: `payment-received:${paymentId}`,
		template: "payment-received",
		props: {
			...payer.head,
			amountCents: payment.amountCents,
			paidOn: payment.receivedOn,
			way: payment.method === "bank-debit" ? "bank" : "card",
			isAutomatic: visit.kind === "automatic",
			applied,
			onAccountCents: payment.amountCents - applied.reduce((sum, { cents }) => sum + cents, 0),
		},
	})
}
