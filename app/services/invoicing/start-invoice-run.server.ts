import { sql } from "drizzle-orm"
import { auditEntries, invoiceRuns } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

export type StartedRun = { ok: true; runId: string } | { ok: false; reason: "nothing-packed" }

/**
 * Begins the sending of every packed order of a day: what is packed now goes on the list, a job sends and invoices one
 * after the other. `runId` is made with the form: sent again it finds the run. An order that another run has in hand is
 * left to that one; where that leaves none, the answer is that run.
 */
export function startInvoiceRun(query: {
	producerId: string
	day: Day
	personId: string
	runId: string
}): Promise<StartedRun> {
	const { producerId, day, personId, runId } = query
	return withProducer(producerId, async (tx) => {
		const run = await tx
			.insert(invoiceRuns)
			.values({ producerId, id: runId, startedBy: personId })
			.onConflictDoNothing()
			.returning({ id: invoiceRuns.id })
		if (run.length === 0) return { ok: true, runId }
		const { rowCount } = await tx.execute(sql`
			insert into invoice_run_orders (producer_id, run_id, order_id)
			select o.producer_id, ${runId}, o.id from orders o
			where o.producer_id = ${producerId} and o.delivery_on = ${day} and o.state = 'packed'
				and not exists (select from invoice_run_orders w
					where w.producer_id = o.producer_id and w.order_id = o.id and w.state = 'waiting')`)
		if (!rowCount) {
			await tx.execute(sql`delete from invoice_runs where producer_id = ${producerId} and id = ${runId}`)
			const { rows } = await tx.execute<{ runId: string }>(sql`
				select w.run_id as "runId" from invoice_run_orders w
				join orders o on o.producer_id = w.producer_id and o.id = w.order_id
				where w.producer_id = ${producerId} and w.state = 'waiting' and o.delivery_on = ${day} limit 1`)
			return rows[0] ? { ok: true, runId: rows[0].runId } : { ok: false, reason: "nothing-packed" }
		}
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: "packed orders sent together",
			subjectType: "invoice-run",
			subjectId: runId,
			detail: { day, orders: rowCount },
		})
		const payload = JSON.stringify({ producerId, runId })
		await tx.execute(sql`
			select jobs.enqueue('send-invoice-run', ${payload}::json, null, ${`invoice-run:${runId}`})`)
		return { ok: true, runId }
	})
}
