import { type SQL, sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { LotState } from "~/services/desk/list-lots.server"
import type { TracedLink } from "./find-forward-trace.server"
import { ancestorsOf } from "./lot-family.server"

/** A super that went into a lot. */
export type TracedSuper = { hive: string; yard: string; setOn: Day; offOn: Day | null; finishedPieces: number | null }

/** All that is known of where a lot comes from and what was proven of it. */
export type LotHistory = {
	code: string
	productName: string
	detail: string
	state: LotState
	harvestedOn: Day
	bestBeforeOn: Day
	piecesHarvested: number
	yard: string
	flora: string
	harvestNote: string
	supers: TracedSuper[]
	gradings: { gradedOn: Day; grade: string; schemeName: string }[]
	freezings: { loadNumber: number; freezer: string; provenOn: Day | null }[]
	weighings: { checkedOn: Day; hasPassed: boolean }[]
	release: { kind: "proven" | "by-hand"; reason: string; releasedOn: Day; by: string | null } | null
}

export type BackwardTrace = {
	/** The lots that were asked for, first, then those they were made from, the latest harvest first. */
	lots: LotHistory[]
	links: TracedLink[]
}

/** Where the lots of `start` (a select of their ids) come from: ancestors, harvests, supers and proofs. One statement. */
async function readBackwardTrace(
	tx: Tx,
	query: { producerId: string; zone: string; start: SQL },
): Promise<BackwardTrace> {
	const { producerId, zone, start } = query
	const { rows } = await tx.execute<BackwardTrace>(sql`
		with recursive asked (lot_id) as materialized (${start}),
		${ancestorsOf(producerId, sql`select lot_id from asked`)},
		traced as materialized (
			select l.*, p.name as product_name, p.detail
			from family f
			join lots l on l.producer_id = ${producerId} and l.id = f.lot_id
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
		)
		select
			(select coalesce(json_agg(json_build_object(
				'code', t.code, 'productName', t.product_name, 'detail', t.detail, 'state', t.state,
				'harvestedOn', t.harvested_on, 'bestBeforeOn', t.best_before_on, 'piecesHarvested', t.pieces_harvested,
				'yard', t.yard, 'flora', t.flora,
				'harvestNote', coalesce((select h.note from harvests h
					where h.producer_id = t.producer_id and h.id = t.harvest_id), ''),
				'supers', (select coalesce(json_agg(json_build_object(
					'hive', h.label, 'yard', y.name, 'setOn', u.set_on, 'offOn', u.off_on, 'finishedPieces', u.finished_pieces
				) order by y.name, h.label, u.level), '[]'::json)
					from supers u
					join hives h on h.producer_id = u.producer_id and h.id = u.hive_id
					join yards y on y.producer_id = h.producer_id and y.id = h.yard_id
					where u.producer_id = t.producer_id and u.harvest_id = t.harvest_id and u.product_id = t.product_id),
				'gradings', (select coalesce(json_agg(json_build_object(
					'gradedOn', g.graded_on, 'grade', g.grade, 'schemeName', g.scheme_name
				) order by g.created_at), '[]'::json)
					from gradings g where g.producer_id = t.producer_id and g.lot_id = t.id),
				'freezings', (select coalesce(json_agg(json_build_object(
					'loadNumber', f.number, 'freezer', f.freezer, 'provenOn', (f.proven_at at time zone ${zone})::date
				) order by f.loaded_at), '[]'::json)
					from freezer_load_lots x
					join freezer_loads f on f.producer_id = x.producer_id and f.id = x.load_id
					where x.producer_id = t.producer_id and x.lot_id = t.id),
				'weighings', (select coalesce(json_agg(json_build_object(
					'checkedOn', c.checked_on, 'hasPassed', c.has_passed) order by c.created_at), '[]'::json)
					from net_checks c where c.producer_id = t.producer_id and c.lot_id = t.id),
				'release', (select json_build_object(
					'kind', r.kind, 'reason', r.reason, 'releasedOn', (r.released_at at time zone ${zone})::date, 'by', u.name)
					from lot_releases r left join users u on u.id = r.released_by
					where r.producer_id = t.producer_id and r.lot_id = t.id)
			) order by (select count(*) from asked a where a.lot_id = t.id) desc, t.harvested_on desc, t.code), '[]'::json)
				from traced t) as lots,
			(select coalesce(json_agg(json_build_object(
				'from', a.code, 'to', b.code, 'kind', k.kind, 'pieces', k.pieces, 'piecesMade', k.pieces_made
			) order by k.at, k.id), '[]'::json)
				from traced b
				join lot_links k on k.producer_id = b.producer_id and k.to_lot_id = b.id
				join traced a on a.id = k.from_lot_id) as links`)
	const [trace] = rows
	if (!trace) throw new Error("a statement without a from answers one row")
	return trace
}

/** Where one lot comes from, by its code; null when the producer has none of that code. `zone` is the producer's. */
export async function findBackwardTrace(query: {
	producerId: string
	zone: string
	code: string
}): Promise<BackwardTrace | null> {
	const { producerId, zone, code } = query
	const start = sql`select id from lots where producer_id = ${producerId} and code = ${code}`
	const trace = await readProducer(producerId, (tx) => readBackwardTrace(tx, { producerId, zone, start }))
	return trace.lots.length === 0 ? null : trace
}

/** An order, the lots it was packed from and where they come from. */
export type OrderTrace = BackwardTrace & {
	storeName: string
	deliveryOn: Day
	state: string
	packed: { productName: string; lot: string; pieces: number }[]
}

/** Where everything in an order comes from, by the order's number; null when the producer has no such order. */
export async function findOrderTrace(query: {
	producerId: string
	zone: string
	number: number
}): Promise<OrderTrace | null> {
	const { producerId, zone, number } = query
	return readProducer(producerId, async (tx) => {
		const {
			rows: [order],
		} = await tx.execute<Omit<OrderTrace, keyof BackwardTrace>>(sql`
			select s.name as "storeName", o.delivery_on::text as "deliveryOn", o.state,
				(select coalesce(json_agg(json_build_object('productName', p.name, 'lot', l.code, 'pieces', x.pieces)
					order by p.code, l.code), '[]'::json)
					from order_lines e
					join order_line_lots x on x.producer_id = e.producer_id and x.order_line_id = e.id
					join lots l on l.producer_id = x.producer_id and l.id = x.lot_id
					join products p on p.producer_id = e.producer_id and p.id = e.product_id
					where e.producer_id = o.producer_id and e.order_id = o.id) as packed
			from orders o join stores s on s.producer_id = o.producer_id and s.id = o.store_id
			where o.producer_id = ${producerId} and o.number = ${number}`)
		if (!order) return null
		const start = sql`
			select x.lot_id from orders o
			join order_lines e on e.producer_id = o.producer_id and e.order_id = o.id
			join order_line_lots x on x.producer_id = e.producer_id and x.order_line_id = e.id
			where o.producer_id = ${producerId} and o.number = ${number}`
		return { ...order, ...(await readBackwardTrace(tx, { producerId, zone, start })) }
	})
}
