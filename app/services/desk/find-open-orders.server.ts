import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { StandingLine } from "~/services/orders/find-most-cases.server"

export type OpenState = "placed" | "confirmed" | "packed"

export type OpenLine = StandingLine & {
	code: string
	productName: string
	caseCents: number
	/** Set where the line is priced by weight: `caseCents` is an estimate until `weighedGrams` is there. */
	poundCents: number | null
	weighedGrams: number | null
	pieceNetGrams: number
}

/** An order that has not left yet, with its lines by code. */
export type OpenOrder = {
	id: string
	number: number
	state: OpenState
	deliveryOn: Day
	storeName: string
	deliveryCents: number
	lines: OpenLine[]
}

type Row = Omit<OpenOrder, "lines"> & Omit<OpenLine, "id"> & { lineId: string }

/**
 * The orders of a producer that have not left yet, of all days or of `on` alone: by delivery day, the one placed first
 * before the later. One statement.
 */
export async function findOpenOrders(
	tx: Tx,
	query: { producerId: string; states: readonly OpenState[]; on?: Day },
): Promise<OpenOrder[]> {
	const ofDay = query.on ? sql`and o.delivery_on = ${query.on}` : sql``
	const { rows } = await tx.execute<Row>(sql`
		select o.id, o.number, o.state, o.delivery_on::text as "deliveryOn", s.name as "storeName",
			o.delivery_cents as "deliveryCents", l.id as "lineId", l.product_id as "productId",
			l.asked_cases as "askedCases", l.given_cases as "givenCases", l.is_to_share as "isToShare",
			l.promised_cases as "promisedCases",
			l.pieces_per_case as "piecesPerCase", l.case_cents as "caseCents",
			l.pound_cents as "poundCents", l.weighed_grams as "weighedGrams", p.piece_net_grams as "pieceNetGrams", p.code, p.name as "productName"
		from orders o
		join stores s on s.producer_id = o.producer_id and s.id = o.store_id
		join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
		join products p on p.producer_id = l.producer_id and p.id = l.product_id
		where o.producer_id = ${query.producerId} and o.state = any(${sql.param([...query.states])}::text[]) ${ofDay}
		order by o.delivery_on, o.placed_at, o.number, length(p.code), p.code`)
	const orders = new Map<string, OpenOrder>()
	for (const { id, number, state, deliveryOn, storeName, deliveryCents, lineId, ...line } of rows) {
		const order = orders.get(id) ?? { id, number, state, deliveryOn, storeName, deliveryCents, lines: [] }
		order.lines.push({ ...line, id: lineId })
		orders.set(id, order)
	}
	return [...orders.values()]
}
