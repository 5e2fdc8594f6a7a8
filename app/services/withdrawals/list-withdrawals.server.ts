import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"

/** A withdrawal in the list, and how far it has come. Held pieces are by the stores' own answers. */
export type ListedWithdrawal = {
	number: number
	reason: string
	startedAt: Date
	lots: string[]
	stores: number
	opened: number
	answered: number
	heldPieces: number
}

const PAGE = 30

/** The producer's withdrawals, the latest first, 30 at a time. `after` is the `next` of an earlier page. */
export function listWithdrawals(query: {
	producerId: string
	after: string | null
}): Promise<{ withdrawals: ListedWithdrawal[]; next: string | null }> {
	const { producerId, after } = query
	const beyond = after && /^[1-9]\d{0,8}$/.test(after) ? sql`and w.number < ${Number(after)}::int` : sql``
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Omit<ListedWithdrawal, "startedAt"> & { startedAt: Date | string }>(sql`
			select w.number, w.reason, w.started_at as "startedAt",
				(select coalesce(json_agg(l.code order by l.code), '[]'::json) from withdrawal_lots x
					join lots l on l.producer_id = x.producer_id and l.id = x.lot_id
					where x.producer_id = w.producer_id and x.withdrawal_id = w.id) as lots,
				n.stores, n.opened, n.answered, n."heldPieces"
			from withdrawals w
			join lateral (
				select count(*)::int as stores, count(opened_at)::int as opened, count(answered_at)::int as answered,
					coalesce(sum(held_pieces), 0)::int as "heldPieces"
				from withdrawal_notices n where n.producer_id = w.producer_id and n.withdrawal_id = w.id
			) n on true
			where w.producer_id = ${producerId} ${beyond}
			order by w.number desc limit ${PAGE + 1}`)
		const withdrawals = rows.slice(0, PAGE).map((row) => ({ ...row, startedAt: new Date(row.startedAt) }))
		const last = withdrawals.at(-1)
		return { withdrawals, next: rows.length > PAGE && last ? String(last.number) : null }
	})
}
