import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Place } from "~/domain/stock/places"

export type LotMove = {
	id: string
	at: Date
	from: Place | null
	to: Place
	pieces: number
	reason: string
	who: string | null
}

const PAGE = 50

/** The moves of a lot's pieces, the latest first, 50 at a time. `after` is the `next` of an earlier page. */
export function listLotMoves(query: {
	producerId: string
	code: string
	after: string | null
}): Promise<{ moves: LotMove[]; next: string | null }> {
	const { producerId, code } = query
	const after = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/.test(query.after ?? "") ? query.after : null
	// The row itself says when it was, to the microsecond; a date that went through the page would not.
	const beyond = after
		? sql`and (v.moved_at, v.id) < (select a.moved_at, a.id from stock_moves a
			where a.producer_id = ${producerId} and a.id = ${after})`
		: sql``
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Omit<LotMove, "at"> & { at: Date | string }>(sql`
			select v.id, v.moved_at as at, v.from_place as from, v.to_place as to, v.pieces, v.reason, u.name as who
			from stock_moves v left join users u on u.id = v.moved_by
			where v.producer_id = ${producerId} ${beyond}
				and v.lot_id = (select l.id from lots l where l.producer_id = ${producerId} and l.code = ${code})
			order by v.moved_at desc, v.id desc
			limit ${PAGE + 1}`)
		const moves = rows.slice(0, PAGE).map((move) => ({ ...move, at: new Date(move.at) }))
		return { moves, next: rows.length > PAGE ? (moves.at(-1)?.id ?? null) : null }
	})
}
