import { sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { type Tx, withProducer } from "~/db/transaction.server"
import { sendingRefusalWords } from "~/domain/invoicing/refusal-words"
import { log } from "~/platform/log.server"
import { sendOrderIn } from "~/services/orders/send-order.server"
import { findInvoicingProducer } from "./find-invoicing-producer.server"

type Run = { producerId: string; runId: string }
type Waiting = { orderId: string; number: number; startedBy: string }

/**
 * Sends and invoices the orders of a run, each in a transaction of its own that also marks it done or refused, so that it
 * is done once however often this runs, by however many workers, and goes on where it stopped. One that fails leaves the
 * others: it stays waiting, and the first failure is thrown at the end, so that the job is tried again.
 */
export async function sendInvoiceRun({ producerId, runId }: Run): Promise<void> {
	const producer = await findInvoicingProducer(producerId)
	const failures = new Map<string, unknown>()
	for (;;) {
		const next = await withProducer(producerId, (tx) => findNext(tx, { producerId, runId, but: [...failures.keys()] }))
		if (!next) break
		try {
			await withProducer(producerId, async (tx) => {
				if (!(await lockWaiting(tx, { producerId, runId, orderId: next.orderId }))) return
				const sent = await sendOrderIn(tx, { producer, number: next.number, personId: next.startedBy })
				const problem = sent.ok ? "" : sendingRefusalWords(next.number, sent)
				await mark(tx, { producerId, runId, orderId: next.orderId, problem })
			})
		} catch (error) {
			failures.set(next.orderId, error)
			if (breaksConstraint(error, "books_closed")) continue
			log.error({ err: error, runId, orderNumber: next.number }, "an order of a run was not sent")
		}
	}
	await withProducer(producerId, (tx) =>
		tx.execute(sql`
			update invoice_runs r set finished_at = now()
			where r.producer_id = ${producerId} and r.id = ${runId} and r.finished_at is null
				and not exists (select from invoice_run_orders w
					where w.producer_id = r.producer_id and w.run_id = r.id and w.state = 'waiting')`),
	)
	if (failures.size > 0) throw [...failures.values()][0]
}

async function findNext(tx: Tx, query: Run & { but: readonly string[] }): Promise<Waiting | null> {
	const { producerId, runId, but } = query
	const { rows } = await tx.execute<Waiting>(sql`
		select w.order_id as "orderId", o.number, r.started_by as "startedBy"
		from invoice_run_orders w
		join invoice_runs r on r.producer_id = w.producer_id and r.id = w.run_id
		join orders o on o.producer_id = w.producer_id and o.id = w.order_id
		where w.producer_id = ${producerId} and w.run_id = ${runId} and w.state = 'waiting'
			and w.order_id <> all(${sql.param([...but])}::uuid[])
		order by o.number limit 1`)
	return rows[0] ?? null
}

/** Takes one order of the run in hand; false when another worker did it meanwhile. */
async function lockWaiting(tx: Tx, query: Run & { orderId: string }): Promise<boolean> {
	const { producerId, runId, orderId } = query
	const { rows } = await tx.execute<{ state: string }>(sql`
		select state from invoice_run_orders
		where producer_id = ${producerId} and run_id = ${runId} and order_id = ${orderId} for update`)
	return rows[0]?.state === "waiting"
}

async function mark(tx: Tx, query: Run & { orderId: string; problem: string }): Promise<void> {
	const { producerId, runId, orderId, problem } = query
	await tx.execute(sql`
		update invoice_run_orders set state = ${problem === "" ? "done" : "refused"}, problem = ${problem}
		where producer_id = ${producerId} and run_id = ${runId} and order_id = ${orderId}`)
}
