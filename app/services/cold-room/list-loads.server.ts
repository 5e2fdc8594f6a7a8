import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

export type ListedLoad = {
	number: number
	freezer: string
	loadedAt: Date
	provenAt: Date | null
	lotCodes: string[]
	pieces: number
	/** How many readings were tried; none of them proved it while `provenAt` is null. */
	proofs: number
}

/** A held lot with pieces on the shelves, and how many of them went into a load so far. */
export type HeldLot = {
	lotId: string
	code: string
	productName: string
	detail: string
	expectedReleaseOn: Day
	piecesOnShelves: number
	piecesLoaded: number
	/** The latest load that it lies in. */
	loadNumber: number | null
}

const PAGE = 30
/** A form with more rows than this is filled in by nobody; the lots due first come first. */
const MOST_HELD = 100

/**
 * The cold room: loads, the latest first, 30 at a time, and all held lots with pieces on the shelves, those due first
 * before the others (100 at most; `moreHeld` says how many more there are). `after` is the `next` of an earlier page.
 */
export function listLoads(query: {
	producerId: string
	after: string | null
}): Promise<{ loads: ListedLoad[]; next: string | null; held: HeldLot[]; moreHeld: number }> {
	const { producerId } = query
	const beyond = /^[1-9]\d{0,8}$/.test(query.after ?? "") ? Number(query.after) : null
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<
			Omit<ListedLoad, "loadedAt" | "provenAt"> & { loadedAt: string; provenAt: string }
		>(sql`
			with page as (
				select d.* from freezer_loads d
				where d.producer_id = ${producerId} ${beyond === null ? sql`` : sql`and d.number < ${beyond}`}
				order by d.number desc limit ${PAGE + 1}
			)
			select d.number, d.freezer, d.loaded_at as "loadedAt", d.proven_at as "provenAt",
				array_agg(l.code order by l.code) as "lotCodes", sum(m.pieces)::int as pieces,
				(select count(*)::int from freeze_proofs p where p.producer_id = d.producer_id and p.load_id = d.id) as proofs
			from page d
			join freezer_load_lots m on m.producer_id = d.producer_id and m.load_id = d.id
			join lots l on l.producer_id = m.producer_id and l.id = m.lot_id
			group by d.producer_id, d.id, d.number, d.freezer, d.loaded_at, d.proven_at
			order by d.number desc`)
		const loads = rows.slice(0, PAGE).map((load) => ({
			...load,
			loadedAt: new Date(load.loadedAt),
			provenAt: load.provenAt && new Date(load.provenAt),
		}))
		const held = await findHeld(tx, producerId)
		return {
			loads: loads.map((load) => ({ ...load, provenAt: load.provenAt || null })),
			next: rows.length > PAGE ? String(loads.at(-1)?.number) : null,
			...held,
		}
	})
}

async function findHeld(tx: Tx, producerId: string): Promise<{ held: HeldLot[]; moreHeld: number }> {
	const { rows } = await tx.execute<HeldLot & { total: number }>(sql`
		select l.id as "lotId", l.code, p.name as "productName", p.detail, l.expected_release_on::text as "expectedReleaseOn",
			b.pieces as "piecesOnShelves", coalesce(m.pieces, 0)::int as "piecesLoaded", m.number as "loadNumber",
			count(*) over ()::int as total
		from lots l
		join products p on p.producer_id = l.producer_id and p.id = l.product_id
		join lateral (
			select sum(s.pieces)::int as pieces from stock_balances s
			where s.producer_id = l.producer_id and s.lot_id = l.id and s.place in ('cold-room', 'ready')
		) b on b.pieces > 0
		left join lateral (
			select sum(x.pieces) as pieces, max(d.number) as number
			from freezer_load_lots x join freezer_loads d on d.producer_id = x.producer_id and d.id = x.load_id
			where x.producer_id = l.producer_id and x.lot_id = l.id
		) m on true
		where l.producer_id = ${producerId} and l.state = 'held'
		order by (coalesce(m.pieces, 0) >= b.pieces), l.expected_release_on, l.code
		limit ${MOST_HELD}`)
	return {
		held: rows.map(({ total: _, ...lot }) => lot),
		moreHeld: Math.max(0, (rows[0]?.total ?? 0) - MOST_HELD),
	}
}
