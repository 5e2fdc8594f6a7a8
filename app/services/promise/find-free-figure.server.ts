import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { CULLS } from "~/domain/lots/count-harvest"
import { type Explanation, explainFree } from "~/domain/promise/explain-free"
import type { SupplyKind } from "~/domain/promise/free-to-promise"

/** Pieces of one lot, or of the crop, that can serve from `on` to `until`. `lotCode` is null for the crop. */
export type SupplyLine = { kind: SupplyKind; lotCode: string | null; on: Day; until: Day; quantity: number }

/** Pieces promised by one order. `on` is the day it counts for: today, where its delivery is overdue. */
export type PromiseLine = { orderNumber: number; storeName: string; deliveryOn: Day; on: Day; quantity: number }

export type FreeFigure = Explanation<SupplyLine, PromiseLine> & {
	productName: string
	detail: string
	piecesPerCase: number
	/** Which figure of the crop counts. */
	cropFigure: "low" | "likely"
}

/**
 * Takes the figure of free to promise apart for one product and day, in pieces, down to its lots and orders: the same
 * facts that `findOutlooks` sums. Null when the producer sells no product of that code. One statement for each list.
 */
export function findFreeFigure(query: {
	producerId: string
	productCode: string
	day: Day
	today: Day
}): Promise<FreeFigure | null> {
	const { producerId, productCode, day, today } = query
	return readProducer(producerId, async (tx) => {
		const {
			rows: [product],
		} = await tx.execute<
			Omit<FreeFigure, keyof Explanation<SupplyLine, PromiseLine>> & { id: string; reserve: number }
		>(sql`
			select p.id, p.name as "productName", p.detail, p.pieces_per_case as "piecesPerCase", p.reserve_pieces as reserve,
				coalesce(s.crop_figure, 'low') as "cropFigure"
			from products p left join producer_settings s on s.producer_id = p.producer_id
			where p.producer_id = ${producerId} and p.code = ${productCode}`)
		if (!product) return null
		const { id, reserve, ...facts } = product
		const { rows: supplies } = await tx.execute<SupplyLine>(sql`
			select case l.state when 'released' then 'free' else 'held' end as kind, l.code as "lotCode",
				case l.state when 'released' then ${today}::date else greatest(l.expected_release_on, ${today}::date) end::text as on,
				l.best_before_on::text as until, sum(b.pieces)::int as quantity
			from lots l
			join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
			where l.producer_id = ${producerId} and l.product_id = ${id} and l.state in ('released', 'held')
				and l.best_before_on >= ${today} and l.grade <> ${CULLS}
				and b.place in ('cold-room', 'ready') and b.place_ref = '00000000-0000-0000-0000-000000000000' and b.pieces > 0
			group by l.id, l.state, l.code, l.expected_release_on, l.best_before_on
			union all
			select 'expected', null, e.expected_on::text, (e.expected_on + coalesce(s.best_before_days, 300)::int)::text,
				case s.crop_figure when 'likely' then e.likely_pieces else e.low_pieces end
			from expected_supplies e
			left join producer_settings s on s.producer_id = e.producer_id
			where e.producer_id = ${producerId} and e.product_id = ${id} and e.expected_on >= ${today}
				and case s.crop_figure when 'likely' then e.likely_pieces else e.low_pieces end > 0
			order by 3, 4, 2`)
		const { rows: promises } = await tx.execute<PromiseLine>(sql`
			select o.number as "orderNumber", s.name as "storeName", o.delivery_on::text as "deliveryOn",
				greatest(o.delivery_on, ${today}::date)::text as on,
				sum(coalesce(l.given_cases, case when l.is_to_share then l.promised_cases else l.asked_cases end) * l.pieces_per_case)::int as quantity
			from orders o
			join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
			join stores s on s.producer_id = o.producer_id and s.id = o.store_id
			where o.producer_id = ${producerId} and l.product_id = ${id} and o.state in ('placed', 'confirmed')
			group by o.delivery_on, o.number, s.name
			having sum(coalesce(l.given_cases, case when l.is_to_share then l.promised_cases else l.asked_cases end)) > 0
			order by o.delivery_on, o.number`)
		return { ...facts, ...explainFree({ supplies, promises, reserve, day }) }
	})
}
