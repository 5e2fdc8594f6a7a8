import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import { weighedWords } from "~/domain/invoicing/weighed-words"
import type { PackingSlip } from "~/domain/orders/packing-slip"
import { weightWords } from "~/domain/weight"
import { findYard } from "~/services/producers/find-yard.server"
import { KEEP_COMB, NOT_FOR_INFANTS } from "~emails/words"

type OrderRow = {
	id: string
	placedAt: string
	poNumber: string
	note: string
	deliveryOn: Day
	storeName: string
	storeAddress: string
	receivingNote: string
	orderedBy: string | null
	zone: string
}
type LineRow = {
	code: string
	name: string
	detail: string
	cases: number
	pieces: number
	grams: number
	isWeighed: boolean
	lots: { code: string; pieces: number; bestBeforeOn: Day }[] | null
}

/** What the slip of a packed order says. Null when the producer has no such order, or it is not packed. */
export function findPackingSlip(query: { producerId: string; number: number }): Promise<PackingSlip | null> {
	const { producerId, number } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<OrderRow>(sql`
			select o.id, o.placed_at as "placedAt", o.po_number as "poNumber", o.note, o.delivery_on::text as "deliveryOn",
				s.name as "storeName", s.address as "storeAddress", s.receiving_note as "receivingNote",
				u.name as "orderedBy", y.time_zone as zone
			from orders o
			join stores s on s.producer_id = o.producer_id and s.id = o.store_id
			join producers y on y.id = o.producer_id
			left join users u on u.id = o.placed_by
			where o.producer_id = ${producerId} and o.number = ${number} and o.state in ('packed', 'sent', 'received')`)
		const order = rows[0]
		if (!order) return null
		const { rows: lines } = await tx.execute<LineRow>(sql`
			select p.code, p.name, p.detail, l.given_cases as cases, l.given_cases * l.pieces_per_case as pieces,
				coalesce(l.weighed_grams, l.given_cases * l.pieces_per_case * p.piece_net_grams) as grams,
				l.weighed_grams is not null as "isWeighed",
				(select json_agg(json_build_object('code', t.code, 'pieces', f.pieces, 'bestBeforeOn', t.best_before_on::text)
					order by t.best_before_on, t.code)
				from order_line_lots f join lots t on t.producer_id = f.producer_id and t.id = f.lot_id
				where f.producer_id = l.producer_id and f.order_line_id = l.id) as lots
			from order_lines l join products p on p.producer_id = l.producer_id and p.id = l.product_id
			where l.producer_id = ${producerId} and l.order_id = ${order.id} and l.given_cases > 0
			order by p.code`)
		const { name, address, email, phone } = await findYard(tx, producerId)
		return {
			yard: { name, address, email, phone },
			orderNumber: number,
			placedOn: dayInZone(new Date(order.placedAt), order.zone),
			poNumber: order.poNumber || null,
			deliveryOn: order.deliveryOn,
			store: {
				name: order.storeName,
				address: order.storeAddress || null,
				contactName: order.orderedBy,
				receivingNote: order.receivingNote || null,
			},
			lines: lines.map(({ grams, isWeighed, lots, detail, ...line }) => ({
				...line,
				detail: detail || null,
				lots: lots ?? [],
				netWeight: isWeighed ? weighedWords(grams) : weightWords(grams),
			})),
			netWeight: weightWords(lines.reduce((sum, { grams }) => sum + grams, 0)),
			note: order.note || null,
			care: `${KEEP_COMB} ${NOT_FOR_INFANTS}`,
		}
	})
}
