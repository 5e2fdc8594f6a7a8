import { type SQL, sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import {
	type AskedProduct,
	type BoardYard,
	type CropFigure,
	type CropWeek,
	type ExpectedDay,
	type HiveFacts,
	lackingCases,
	layBoard,
	weeksOf,
} from "~/domain/crop/board"
import { lastChecksOf } from "./last-checks.server"

const PAGE = 60

/** A yard in use, with what stands in it. */
type YardSummary = {
	id: string
	name: string
	hives: number
	supers: number
	/** The supers that are to come off, with the labels of their hives. */
	ready: { superId: string; hive: string }[]
}

/** The crop as it stands on the hives. */
type CropBoard = {
	/** One page of hives, by yard and label. */
	yards: BoardYard[]
	/** Every yard in use, whatever the page shows. */
	summaries: YardSummary[]
	/** The key of the next page of hives, or null. */
	next: string | null
	weeks: CropWeek[]
	/** Whole cases in lots that are held. */
	heldCases: number
	lacking: { cases: number; coveredIn: Day | null }
	figure: CropFigure
	readyCappedPercent: number
}

/**
 * The crop board: hives with the supers on them, 60 at a time by yard and label, of one yard where it is named; what is
 * ready in all yards; and the cases expected by week. `after` is the `next` of an earlier page; one of another producer or
 * malformed gives the first page.
 */
export function findBoard(query: {
	producerId: string
	today: Day
	yardId: string | null
	after: string | null
}): Promise<CropBoard> {
	const { producerId, today } = query
	return readProducer(producerId, async (tx) => {
		const { figure, readyCappedPercent } = await findCropSettings(tx, producerId)
		const hives = await findHives(tx, query)
		const summaries = await findSummaries(tx, { producerId, readyCappedPercent })
		const expected = await findExpected(tx, query)
		const asked = await findAsked(tx, query)
		const shown = hives.slice(0, PAGE)
		return {
			yards: layBoard(shown, { today, readyCappedPercent }),
			summaries,
			next: hives.length > PAGE ? (shown.at(-1)?.id ?? null) : null,
			weeks: weeksOf(expected, figure),
			heldCases: asked.reduce((sum, one) => sum + Math.floor(one.heldPieces / one.piecesPerCase), 0),
			lacking: lackingCases(asked, expected, figure),
			figure,
			readyCappedPercent,
		}
	})
}

/** Which figure counts as supply, and the capped share at which a super is ready. */
async function findCropSettings(
	tx: Tx,
	producerId: string,
): Promise<{ figure: CropFigure; readyCappedPercent: number }> {
	const { rows } = await tx.execute<{ figure: CropFigure; readyCappedPercent: number }>(sql`
		select crop_figure as figure, ready_capped_percent as "readyCappedPercent"
		from producer_settings where producer_id = ${producerId}`)
	return rows[0] ?? { figure: "low", readyCappedPercent: 90 }
}

/** The same, read by itself. */
export function readCropSettings(producerId: string): Promise<{ figure: CropFigure; readyCappedPercent: number }> {
	return readProducer(producerId, (tx) => findCropSettings(tx, producerId))
}

const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/i

/** Labels in the order people count: "9" before "10", and words after numbers. */
export const labelOrder = (label: SQL): SQL =>
	sql`coalesce(substring(${label} from '\\d{1,9}')::integer, 2147483647), ${label}`

async function findHives(
	tx: Tx,
	query: { producerId: string; yardId: string | null; after: string | null },
): Promise<HiveFacts[]> {
	const { producerId, yardId, after } = query
	const ofYard = yardId && UUID.test(yardId) ? sql`and h.yard_id = ${yardId}::uuid` : sql``
	const beyond =
		after && UUID.test(after)
			? sql`and (y.name, ${labelOrder(sql`h.label`)}) > (
				select z.name, ${labelOrder(sql`g.label`)} from hives g
				join yards z on z.producer_id = g.producer_id and z.id = g.yard_id
				where g.producer_id = ${producerId} and g.id = ${after}::uuid
			)`
			: sql``
	const { rows } = await tx.execute<HiveFacts>(sql`
		with page as (
			select h.producer_id, h.id, h.label, y.id as yard_id, y.name, y.flora
			from hives h join yards y on y.producer_id = h.producer_id and y.id = h.yard_id
			where h.producer_id = ${producerId} and h.is_active ${ofYard} ${beyond}
			order by y.name, ${labelOrder(sql`h.label`)}
			limit ${PAGE + 1}
		)
		select h.id, h.label, json_build_object('id', h.yard_id, 'name', h.name, 'flora', h.flora) as yard,
			coalesce(json_agg(json_build_object('id', s.id, 'productName', p.name, 'level', s.level,
				'capacityPieces', s.capacity_pieces, 'setOn', s.set_on::text, 'state', s.state,
				'clearingOn', s.clearing_on::text, 'checks', c.checks)) filter (where s.id is not null), '[]') as supers
		from page h
		left join supers s on s.producer_id = h.producer_id and s.hive_id = h.id and s.state <> 'off'
		left join products p on p.producer_id = s.producer_id and p.id = s.product_id
		left join lateral ${lastChecksOf("s")} c on true
		group by h.id, h.label, h.yard_id, h.name, h.flora
		order by h.name, ${labelOrder(sql`h.label`)}`)
	return rows
}

async function findSummaries(
	tx: Tx,
	query: { producerId: string; readyCappedPercent: number },
): Promise<YardSummary[]> {
	const { producerId, readyCappedPercent } = query
	const { rows } = await tx.execute<YardSummary>(sql`
		select y.id, y.name, count(distinct h.id)::int as hives, count(s.id)::int as supers,
			coalesce(json_agg(json_build_object('superId', s.id, 'hive', h.label)
				order by ${labelOrder(sql`h.label`)}, s.level)
				filter (where s.state = 'clearing' or c.capped_percent >= ${readyCappedPercent}), '[]') as ready
		from yards y
		left join hives h on h.producer_id = y.producer_id and h.yard_id = y.id and h.is_active
		left join supers s on s.producer_id = h.producer_id and s.hive_id = h.id and s.state <> 'off'
		left join lateral (
			select k.capped_percent from super_checks k
			where k.producer_id = s.producer_id and k.super_id = s.id
			order by k.checked_on desc, k.received_at desc, k.id desc
			limit 1
		) c on true
		where y.producer_id = ${producerId} and y.is_active
		group by y.id, y.name
		order by y.name`)
	return rows
}

async function findExpected(tx: Tx, query: { producerId: string; today: Day }): Promise<ExpectedDay[]> {
	const { rows } = await tx.execute<ExpectedDay>(sql`
		select e.product_id as "productId", e.expected_on::text as "on", p.pieces_per_case as "piecesPerCase",
			e.low_pieces as low, e.likely_pieces as likely, e.high_pieces as high
		from expected_supplies e join products p on p.producer_id = e.producer_id and p.id = e.product_id
		where e.producer_id = ${query.producerId} and e.expected_on >= ${query.today}
		order by e.expected_on`)
	return rows
}

async function findAsked(
	tx: Tx,
	query: { producerId: string; today: Day },
): Promise<(AskedProduct & { heldPieces: number })[]> {
	const { producerId, today } = query
	const { rows } = await tx.execute<AskedProduct & { heldPieces: number }>(sql`
		with asked as (
			select l.product_id, sum(coalesce(l.given_cases, l.asked_cases) * l.pieces_per_case) as pieces
			from orders o join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
			where o.producer_id = ${producerId} and o.state in ('placed', 'confirmed')
			group by 1
		), stock as (
			select l.product_id, sum(b.pieces) as pieces, sum(b.pieces) filter (where l.state = 'held') as held
			from lots l join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
			where l.producer_id = ${producerId} and l.state in ('released', 'held') and l.best_before_on >= ${today}
				and b.place in ('cold-room', 'ready') and b.pieces > 0
			group by 1
		)
		select p.id as "productId", p.pieces_per_case as "piecesPerCase", coalesce(a.pieces, 0)::int as "askedPieces",
			coalesce(s.pieces, 0)::int as "stockPieces", coalesce(s.held, 0)::int as "heldPieces"
		from products p left join asked a on a.product_id = p.id left join stock s on s.product_id = p.id
		where p.producer_id = ${producerId} and (a.pieces > 0 or s.pieces > 0)`)
	return rows
}
