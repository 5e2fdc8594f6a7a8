import { type SQL, sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { CULLS } from "~/domain/lots/count-harvest"
import type { Outlook, PromisedQuantity, Supply, SupplyKind } from "~/domain/promise/free-to-promise"

/** Supplies, promises and reserve of one product, in pieces. */
export type ProductOutlook = Outlook & { piecesPerCase: number }

type Row = {
	productId: string
	piecesPerCase: number
	reserve: number
	/** Null, with all that follows, for a product of which nothing is known. */
	kind: SupplyKind | "promised" | null
	on: Day
	until: Day | null
	pieces: number
}

/**
 * What is known of each product as of `today`, in pieces: released stock now, held lots from their expected release, both
 * until their best-before, and not culls; what the hives are expected to give, at the figure the producer chose, keeping as
 * long as its lots do; and what open orders have been promised (an overdue promise still holds, as of today). Withdrawn
 * lots give nothing; of lines still to be shared out only what is sure already. One statement for all products, or for
 * `productIds` alone; products without any supply are there too, with empty lists.
 */
export async function findOutlooks(
	tx: Tx,
	query: { producerId: string; today: Day; productIds?: readonly string[] },
): Promise<Map<string, ProductOutlook>> {
	const { producerId, today } = query
	const among = (id: SQL) => (query.productIds ? sql`and ${id} = any(${sql.param(query.productIds)}::uuid[])` : sql``)
	const { rows } = await tx.execute<Row>(sql`
		with p as (
			select p.id, p.code, p.pieces_per_case, p.reserve_pieces from products p where p.producer_id = ${producerId} ${among(sql`p.id`)}
		), entries as (
			select l.product_id, case l.state when 'released' then 'free' else 'held' end as kind,
				case l.state when 'released' then ${today}::date else greatest(l.expected_release_on, ${today}::date) end as on_day,
				l.best_before_on as until, sum(b.pieces)::int as pieces
			from lots l
			join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
			where l.producer_id = ${producerId} ${among(sql`l.product_id`)} and l.state in ('released', 'held')
				and l.best_before_on >= ${today} and l.grade <> ${CULLS}
				and b.place in ('cold-room', 'ready') and b.place_ref = '00000000-0000-0000-0000-000000000000' and b.pieces > 0
			group by 1, 2, 3, 4
			union all
			select e.product_id, 'expected', e.expected_on, e.expected_on + coalesce(s.best_before_days, 300)::int,
				case s.crop_figure when 'likely' then e.likely_pieces else e.low_pieces end
			from expected_supplies e
			left join producer_settings s on s.producer_id = e.producer_id
			where e.producer_id = ${producerId} ${among(sql`e.product_id`)} and e.expected_on >= ${today}
				and case s.crop_figure when 'likely' then e.likely_pieces else e.low_pieces end > 0
			union all
			select ol.product_id, 'promised', greatest(o.delivery_on, ${today}::date), null,
				sum(coalesce(ol.given_cases, case when ol.is_to_share then ol.promised_cases else ol.asked_cases end) * ol.pieces_per_case)::int
			from orders o
			join order_lines ol on ol.producer_id = o.producer_id and ol.order_id = o.id
			where o.producer_id = ${producerId} ${among(sql`ol.product_id`)} and o.state in ('placed', 'confirmed')
			group by 1, 3
		)
		select p.id as "productId", p.pieces_per_case as "piecesPerCase", p.reserve_pieces as reserve,
			e.kind, e.on_day::text as on, e.until::text as until, e.pieces
		from p left join entries e on e.product_id = p.id
		order by p.code, e.on_day, e.until`)
	const outlooks = new Map<string, ProductOutlook & { supplies: Supply[]; promises: PromisedQuantity[] }>()
	for (const { productId, piecesPerCase, reserve, kind, on, until, pieces } of rows) {
		const outlook = outlooks.get(productId) ?? { supplies: [], promises: [], reserve, piecesPerCase }
		outlooks.set(productId, outlook)
		if (kind === "promised") outlook.promises.push({ on, quantity: pieces })
		else if (kind) outlook.supplies.push({ on, until: until ?? undefined, quantity: pieces, kind })
	}
	return outlooks
}
