import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Outlook, SupplyKind } from "~/domain/promise/free-to-promise"

/** Supplies, promises and reserve of one product, in pieces. */
export type ProductOutlook = Outlook & { piecesPerCase: number }

type Row = { product_id: string; kind: SupplyKind | "promised"; on: Day; pieces: number }

/**
 * What is known of each product as of `today`, in pieces: released stock now, held lots from their expected release,
 * the low figure from the hives, and what open orders have been promised (an overdue promise still holds, as of today).
 * Lines still to be shared out are promised nothing yet. One query for all products, or for `productIds` alone;
 * products without any supply are there too, with empty lists.
 */
export async function findOutlooks(
	tx: Tx,
	query: { producerId: string; today: Day; productIds?: readonly string[] },
): Promise<Map<string, ProductOutlook>> {
	const { producerId, today } = query
	const only = query.productIds ? sql`and p.id = any(${sql.param(query.productIds)}::uuid[])` : sql``
	const [products, entries] = [
		await tx.execute<{ id: string; pieces_per_case: number; reserve_pieces: number }>(
			sql`select p.id, p.pieces_per_case, p.reserve_pieces from products p where p.producer_id = ${producerId} ${only}`,
		),
		await tx.execute<Row>(sql`
			select l.product_id, case l.state when 'released' then 'free' else 'held' end as kind,
				case l.state when 'released' then ${today}::date else greatest(l.expected_release_on, ${today}::date) end::text as on,
				sum(b.pieces)::int as pieces
			from lots l
			join products p on p.producer_id = l.producer_id and p.id = l.product_id ${only}
			join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
			where l.producer_id = ${producerId} and l.state in ('released', 'held') and l.best_before_on >= ${today}
				and b.place in ('cold-room', 'ready') and b.pieces > 0
			group by 1, 2, 3
			union all
			select e.product_id, 'expected', e.expected_on::text, e.low_pieces
			from expected_supplies e
			join products p on p.producer_id = e.producer_id and p.id = e.product_id ${only}
			where e.producer_id = ${producerId} and e.expected_on >= ${today} and e.low_pieces > 0
			union all
			select ol.product_id, 'promised', greatest(o.delivery_on, ${today}::date)::text,
				sum(coalesce(ol.given_cases, case when ol.is_to_share then 0 else ol.asked_cases end) * ol.pieces_per_case)::int
			from orders o
			join order_lines ol on ol.producer_id = o.producer_id and ol.order_id = o.id
			join products p on p.producer_id = ol.producer_id and p.id = ol.product_id ${only}
			where o.producer_id = ${producerId} and o.state in ('placed', 'confirmed')
			group by 1, 3`),
	]
	const outlooks = new Map(
		products.rows.map((product) => [
			product.id,
			{
				supplies: [] as { on: Day; quantity: number; kind: SupplyKind }[],
				promises: [] as { on: Day; quantity: number }[],
				reserve: product.reserve_pieces,
				piecesPerCase: product.pieces_per_case,
			},
		]),
	)
	for (const { product_id, kind, on, pieces } of entries.rows) {
		const outlook = outlooks.get(product_id)
		if (kind === "promised") outlook?.promises.push({ on, quantity: pieces })
		else outlook?.supplies.push({ on, quantity: pieces, kind })
	}
	return outlooks
}
