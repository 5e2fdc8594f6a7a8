import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { hashToken } from "~/platform/session-cookie.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"

/** What a store reads behind its secret link. */
export type StoreNotice = {
	yard: { name: string; address: string; email: string; phone: string | null }
	storeName: string
	number: number
	startedAt: Date
	reason: string
	instructions: string
	/** Pieces that the store was sent, all lots together. */
	pieces: number
	lots: { code: string; productName: string; detail: string; pieces: number }[]
	heldPieces: number | null
	answerNote: string
	answeredAt: Date | null
}

/** The notice behind a secret link, or null when no such link was ever sent by this producer. Marks nothing. */
export function findNotice(query: { producerId: string; token: string }): Promise<StoreNotice | null> {
	const { producerId } = query
	return readProducer(producerId, async (tx) => {
		type Row = Omit<StoreNotice, "yard" | "startedAt" | "answeredAt"> & { startedAt: string; answeredAt: string | null }
		const { rows } = await tx.execute<Row>(sql`
			select s.name as "storeName", w.number, w.started_at as "startedAt", w.reason, w.instructions, n.pieces,
				n.held_pieces as "heldPieces", n.answer_note as "answerNote", n.answered_at as "answeredAt",
				(select coalesce(json_agg(json_build_object('code', h.code, 'productName', h.name, 'detail', h.detail,
					'pieces', h.pieces) order by h.code), '[]'::json)
					from (select l.code, p.name, p.detail, sum(x.pieces)::int as pieces
						from withdrawal_lots wl
						join lots l on l.producer_id = wl.producer_id and l.id = wl.lot_id
						join products p on p.producer_id = l.producer_id and p.id = l.product_id
						join order_line_lots x on x.producer_id = l.producer_id and x.lot_id = l.id
						join order_lines e on e.producer_id = x.producer_id and e.id = x.order_line_id
						join orders o on o.producer_id = e.producer_id and o.id = e.order_id
							and o.store_id = n.store_id and o.state in ('sent', 'received')
						where wl.producer_id = w.producer_id and wl.withdrawal_id = w.id
						group by 1, 2, 3) h) as lots
			from withdrawal_notices n
			join withdrawals w on w.producer_id = n.producer_id and w.id = n.withdrawal_id
			join stores s on s.producer_id = n.producer_id and s.id = n.store_id
			where n.producer_id = ${producerId} and n.token_hash = ${hashToken(query.token)}`)
		const [notice] = rows
		if (!notice) return null
		const { name, address, email, phone } = letterHead(await findYard(tx, producerId))
		return {
			...notice,
			yard: { name, address, email, phone },
			startedAt: new Date(notice.startedAt),
			answeredAt: notice.answeredAt === null ? null : new Date(notice.answeredAt),
		}
	})
}
