import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { type Day, isDay } from "~/domain/calendar"
import { findMissing, type MissingForRelease } from "~/services/lots/find-missing.server"

export type LotState = "held" | "released" | "withdrawn"

/** A lot in the list; pieces by where they are. `left` is in the cold room or ready. */
export type ListedLot = {
	code: string
	productName: string
	detail: string
	grade: string
	state: LotState
	/** What a held lot still lacks before it can be released; empty for others. */
	missing: MissingForRelease[]
	harvestedOn: Day
	expectedReleaseOn: Day
	bestBeforeOn: Day
	piecesHarvested: number
	piecesPerCase: number
	leftPieces: number
	packedPieces: number
}

const PAGE = 30

/**
 * The producer's lots, the latest harvest first, 30 at a time, of one state where it is named. `after` is the `next` of
 * an earlier page; one that is malformed gives the first page. `next` is null on the last page.
 */
export function listLots(query: {
	producerId: string
	state: LotState | null
	after: string | null
}): Promise<{ lots: ListedLot[]; next: string | null }> {
	const { producerId, state } = query
	const [, on = "", code = ""] = /^([\d-]+)_(.+)$/.exec(query.after ?? "") ?? []
	const beyond = isDay(on) ? sql`and (l.harvested_on, l.code) < (${on}::date, ${code}::text)` : sql``
	const ofState = state ? sql`and l.state = ${state}` : sql``
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Omit<ListedLot, "missing"> & { id: string }>(sql`
			with page as (
				select l.* from lots l
				where l.producer_id = ${producerId} ${ofState} ${beyond}
				order by l.harvested_on desc, l.code desc
				limit ${PAGE + 1}
			)
			select l.id, l.code, p.name as "productName", p.detail, l.grade, l.state, l.harvested_on::text as "harvestedOn",
				l.expected_release_on::text as "expectedReleaseOn", l.best_before_on::text as "bestBeforeOn",
				l.pieces_harvested as "piecesHarvested", p.pieces_per_case as "piecesPerCase",
				coalesce(sum(b.pieces) filter (where b.place in ('cold-room', 'ready')), 0)::int as "leftPieces",
				coalesce(sum(b.pieces) filter (where b.place in ('packed', 'van')), 0)::int as "packedPieces"
			from page l
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
			left join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
			group by l.id, l.code, p.name, p.detail, l.grade, l.state, l.harvested_on, l.expected_release_on, l.best_before_on,
				l.pieces_harvested, p.pieces_per_case
			order by l.harvested_on desc, l.code desc`)
		const page = rows.slice(0, PAGE)
		const last = page.at(-1)
		const held = page.filter((lot) => lot.state === "held").map(({ id }) => id)
		const missing = await findMissing(tx, { producerId, lotIds: held })
		const lots = page.map(({ id, ...lot }) => ({ ...lot, missing: missing.get(id) ?? [] }))
		return { lots, next: rows.length > PAGE && last ? `${last.harvestedOn}_${last.code}` : null }
	})
}
