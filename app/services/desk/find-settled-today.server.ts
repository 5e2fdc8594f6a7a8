import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { dayInZone, instantAt } from "~/domain/calendar"

/** A confirmation whose letters have not gone: it can still be taken back. */
export type OpenConfirmation = { number: number; storeName: string; at: Date }

/** What was settled since the day began, by anyone. */
export type SettledToday = {
	undoable: OpenConfirmation[]
	/** How often each step was taken today. */
	confirmed: number
	packed: number
	sent: number
	paid: number
}

type Counts = { confirmed: number; packed: number; sent: number; paid: number }

/** What was settled today: confirmations that can be taken back first, the rest as counts. Two statements. */
export async function findSettledToday(
	tx: Tx,
	query: { producerId: string; now: Date; zone: string },
): Promise<SettledToday> {
	const { producerId, now, zone } = query
	const since = instantAt(dayInZone(now, zone), "00:00", zone).toISOString()
	const { rows: undoable } = await tx.execute<{ number: number; storeName: string; at: Date | string }>(sql`
		select o.number, s.name as "storeName", max(m.created_at) as at
		from outbox_mails m
		join orders o on o.producer_id = m.producer_id and m.once_key = 'order-confirmed:' || o.id
		join stores s on s.producer_id = o.producer_id and s.id = o.store_id
		where m.producer_id = ${producerId} and m.sent_at is null and o.state = 'confirmed'
			and not exists (
				select from outbox_mails g
				where g.producer_id = m.producer_id and g.once_key = m.once_key and g.sent_at is not null)
		group by o.number, s.name
		order by at desc, o.number`)
	const {
		rows: [counts],
	} = await tx.execute<Counts>(sql`
		select count(distinct order_id) filter (where kind = 'confirmed')::int as confirmed,
			count(distinct order_id) filter (where kind = 'packed')::int as packed,
			count(distinct order_id) filter (where kind = 'sent')::int as sent,
			count(*) filter (where kind = 'paid')::int as paid
		from order_events
		where producer_id = ${producerId} and at >= ${since}`)
	const { confirmed = 0, packed = 0, sent = 0, paid = 0 } = counts ?? {}
	return { undoable: undoable.map((row) => ({ ...row, at: new Date(row.at) })), confirmed, packed, sent, paid }
}
