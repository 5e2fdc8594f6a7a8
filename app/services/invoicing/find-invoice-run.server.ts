import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"

/** How far the sending of many orders is. */
export type InvoiceRun = {
	startedAt: Date
	finishedAt: Date | null
	/** The delivery day of its orders. */
	day: Day | null
	waiting: number
	done: number
	refused: { orderNumber: number; storeName: string; problem: string }[]
	/** What was sent, the latest first, 50 at most; without a number where the store gets one invoice a month. */
	sent: { orderNumber: number; storeName: string; invoiceNumber: string | null; totalCents: number | null }[]
}

type Count = { waiting: number; done: number; startedAt: string; finishedAt: string | null; day: Day | null }
type SentRow = {
	orderNumber: number
	storeName: string
	year: number | null
	sequence: number | null
	totalCents: number | null
}

/** One run for its page; null when there is none. */
export function findInvoiceRun(query: { producerId: string; runId: string }): Promise<InvoiceRun | null> {
	const { producerId, runId } = query
	return readProducer(producerId, async (tx) => {
		const counts = await tx.execute<Count>(sql`
			select count(w.*) filter (where w.state = 'waiting')::int as waiting,
				count(w.*) filter (where w.state = 'done')::int as done, r.started_at as "startedAt",
				r.finished_at as "finishedAt", min(o.delivery_on)::text as day
			from invoice_runs r
			left join invoice_run_orders w on w.producer_id = r.producer_id and w.run_id = r.id
			left join orders o on o.producer_id = w.producer_id and o.id = w.order_id
			where r.producer_id = ${producerId} and r.id = ${runId}
			group by r.started_at, r.finished_at`)
		const count = counts.rows[0]
		if (!count) return null
		const refused = await tx.execute<InvoiceRun["refused"][number]>(sql`
			select o.number as "orderNumber", s.name as "storeName", w.problem
			from invoice_run_orders w
			join orders o on o.producer_id = w.producer_id and o.id = w.order_id
			join stores s on s.producer_id = o.producer_id and s.id = o.store_id
			where w.producer_id = ${producerId} and w.run_id = ${runId} and w.state = 'refused'
			order by o.number`)
		const sent = await tx.execute<SentRow>(sql`
			select o.number as "orderNumber", s.name as "storeName", i.year, i.sequence, i.total_cents as "totalCents"
			from invoice_run_orders w
			join orders o on o.producer_id = w.producer_id and o.id = w.order_id
			join stores s on s.producer_id = o.producer_id and s.id = o.store_id
			left join invoice_orders x on x.producer_id = o.producer_id and x.order_id = o.id
			left join invoices i on i.producer_id = x.producer_id and i.id = x.invoice_id
			where w.producer_id = ${producerId} and w.run_id = ${runId} and w.state = 'done'
			order by i.year desc nulls last, i.sequence desc nulls last, o.number desc limit 50`)
		return {
			waiting: count.waiting,
			done: count.done,
			day: count.day,
			startedAt: new Date(count.startedAt),
			finishedAt: count.finishedAt === null ? null : new Date(count.finishedAt),
			refused: refused.rows,
			sent: sent.rows.map(({ year, sequence, ...row }) => ({
				...row,
				invoiceNumber: year === null || sequence === null ? null : invoiceNumber(year, sequence),
			})),
		}
	})
}
