import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { WeightUnit } from "~/domain/scale/weight-units"

/** The lot that is weighed, and what its label is likely to say. */
export type WeighedLot = {
	code: string
	state: "held" | "released" | "withdrawn"
	productName: string
	detail: string
	pieceNetGrams: number
	piecesHarvested: number
	/** Still in the cold room or ready. */
	leftPieces: number
}

export type EarlierCheck = {
	id: string
	checkedOn: Day
	lotPackages: number
	sample: number
	average: string
	unit: WeightUnit
	tooShort: number
	hasPassed: boolean
	who: string | null
}

const PAGE = 20
const uuid = /^[0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12}$/

/** One lot by its code, as the pages of the scale need it; null when the producer has none of that code. */
export async function readWeighedLot(
	tx: Tx,
	{ producerId, code }: { producerId: string; code: string },
): Promise<(WeighedLot & { id: string }) | null> {
	const {
		rows: [lot],
	} = await tx.execute<WeighedLot & { id: string }>(sql`
		select l.id, l.code, l.state, p.name as "productName", p.detail, p.piece_net_grams as "pieceNetGrams",
			l.pieces_harvested as "piecesHarvested",
			(select coalesce(sum(b.pieces), 0)::int from stock_balances b
				where b.producer_id = l.producer_id and b.lot_id = l.id and b.place in ('cold-room', 'ready')) as "leftPieces"
		from lots l join products p on p.producer_id = l.producer_id and p.id = l.product_id
		where l.producer_id = ${producerId} and l.code = ${code}`)
	return lot ?? null
}

/**
 * The lot and its checks, the latest first, 20 at a time. `after` is the `next` of an earlier page; one that is malformed
 * gives the first page. Null when the producer has no lot of that code.
 */
export function findScalePage(query: {
	producerId: string
	code: string
	after: string | null
}): Promise<{ lot: WeighedLot; checks: EarlierCheck[]; next: string | null } | null> {
	const { producerId, code, after } = query
	return readProducer(producerId, async (tx) => {
		const found = await readWeighedLot(tx, { producerId, code })
		if (!found) return null
		const { id: lotId, ...lot } = found
		const beyond =
			after && uuid.test(after)
				? sql`and (c.created_at, c.id) < (select a.created_at, a.id from net_checks a
					where a.producer_id = ${producerId} and a.id = ${after}::uuid)`
				: sql``
		const { rows } = await tx.execute<EarlierCheck>(sql`
			select c.id, c.checked_on::text as "checkedOn", (c.input ->> 'lotPackages')::int as "lotPackages",
				(c.worksheet -> 'plan' ->> 'sample')::int as sample, c.worksheet ->> 'average' as average,
				c.worksheet ->> 'unit' as unit, (c.worksheet ->> 'tooShort')::int as "tooShort",
				c.has_passed as "hasPassed", u.name as who
			from net_checks c left join users u on u.id = c.checked_by
			where c.producer_id = ${producerId} and c.lot_id = ${lotId} ${beyond}
			order by c.created_at desc, c.id desc
			limit ${PAGE + 1}`)
		const checks = rows.slice(0, PAGE)
		return { lot, checks, next: rows.length > PAGE ? (checks.at(-1)?.id ?? null) : null }
	})
}
