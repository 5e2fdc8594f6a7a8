import { sql } from "drizzle-orm"
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
		const taken: { order: Waiting | null } = { order: null }
		try {
			await withProducer(producerId, async (tx) => {
				taken.order = await lockNext(tx, { producerId, runId, but: [...failures.keys()] })
				if (!taken.order) return
				const { orderId, number, startedBy } = taken.order
				const sent = await sendOrderIn(tx, { producer, number, personId: startedBy })
				const problem = sent.ok ? "" : sendingRefusalWords(number, sent)
				await mark(tx, { producerId, runId, orderId, problem })
			})
			if (!taken.order) break
		} catch (error) {
			if (!taken.order) throw error
			failures.set(taken.order.orderId, error)
			log.error({ err: error, runId, orderNumber: taken.order.number }, "an order of a run was not sent")
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

/** Takes the next waiting order of the run in hand, past those that other workers have; null when none is left. */
async function lockNext(tx: Tx, query: Run & { but: readonly string[] }): Promise<Waiting | null> {
	const { producerId, runId, but } = query
	const { rows } = await tx.execute<Waiting>(sql`
		select w.order_id as "orderId", o.number, r.started_by as "startedBy"
		from invoice_run_orders w
		join invoice_runs r on r.producer_id = w.producer_id and r.id = w.run_id
		join orders o on o.producer_id = w.producer_id and o.id = w.order_id
		where w.producer_id = ${producerId} and w.run_id = ${runId} and w.state = 'waiting'
			and w.order_id <> all(${sql.param([...but])}::uuid[])
		order by o.number limit 1 for update of w skip locked`)
	return rows[0] ?? null
}

async function mark(tx: Tx, query: Run & { orderId: string; problem: string }): Promise<void> {
	const { producerId, runId, orderId, problem } = query
	await tx.execute(sql`
		update invoice_run_orders set state = ${problem === "" ? "done" : "refused"}, problem = ${problem}
		where producer_id = ${producerId} and run_id = ${runId} and order_id = ${orderId}`)
}
