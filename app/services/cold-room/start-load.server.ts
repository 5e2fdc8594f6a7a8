import { sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { auditEntries, freezerLoadLots, freezerLoads } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import type { Result } from "~/domain/result"
import { takeNumber } from "~/services/numbers/take-number.server"

/** Loads are numbered on from year to year. */
const NO_YEAR = 0

export type LoadedLot = { lotId: string; pieces: number }

export type StartLoad = {
	producerId: string
	personId: string
	/** Made with the form: a second send finds the load that the first made. */
	loadId: string
	freezer: string
	loadedAt: Date
	now: Date
	/** Pieces above zero, each lot once. */
	lots: readonly LoadedLot[]
}

export type RefusedLot = { lotId: string; why: "gone" | "not-held" | "too-many"; piecesThere: number }

export type StartLoadAnswer = Result<
	{ number: number },
	| { ok: false; reason: "nothing-loaded" }
	| { ok: false; reason: "in-the-future" }
	| { ok: false; reason: "lots"; refused: RefusedLot[] }
>

/**
 * Writes down that pieces of held lots went into a freezer together. The lots' rows are held meanwhile. Refuses the whole
 * when nothing is loaded, when the time is still to come, or naming each lot that is not held any more or of which more
 * is loaded than lies in the cold room and on the ready shelf; nothing is written then.
 */
export async function startLoad(load: StartLoad): Promise<StartLoadAnswer> {
	try {
		return await withProducer(load.producerId, (tx) => startInTransaction(tx, load))
	} catch (error) {
		// Two sends of one form at the same time meet here; the second finds the load of the first.
		if (breaksConstraint(error, "freezer_loads_pk")) return startLoad(load)
		throw error
	}
}

async function startInTransaction(tx: Tx, load: StartLoad): Promise<StartLoadAnswer> {
	const { producerId, loadId, personId, lots } = load
	const earlier = await findNumber(tx, load)
	if (earlier !== null) return { ok: true, number: earlier }
	if (lots.length === 0) return { ok: false, reason: "nothing-loaded" }
	if (load.loadedAt > load.now) return { ok: false, reason: "in-the-future" }
	const refused = await refuseLots(tx, load)
	if (refused.length > 0) return { ok: false, reason: "lots", refused }
	const number = await takeNumber(tx, { producerId, series: "load", year: NO_YEAR })
	const { freezer, loadedAt } = load
	await tx.insert(freezerLoads).values({ producerId, id: loadId, number, freezer, loadedAt, loadedBy: personId })
	await tx.insert(freezerLoadLots).values(lots.map((lot) => ({ producerId, loadId, ...lot })))
	await tx.insert(auditEntries).values({
		producerId,
		userId: personId,
		action: "freezer load started",
		subjectType: "freezer load",
		subjectId: loadId,
		detail: { number, freezer, lots },
	})
	return { ok: true, number }
}

async function findNumber(tx: Tx, { producerId, loadId }: StartLoad): Promise<number | null> {
	const { rows } = await tx.execute<{ number: number }>(
		sql`select number from freezer_loads where producer_id = ${producerId} and id = ${loadId}`,
	)
	return rows[0]?.number ?? null
}

/** Locks the lots by id and names those that cannot be loaded so. */
async function refuseLots(tx: Tx, { producerId, lots }: StartLoad): Promise<RefusedLot[]> {
	const ids = sql.param(lots.map(({ lotId }) => lotId))
	await tx.execute(sql`
		select id from lots where producer_id = ${producerId} and id = any(${ids}::uuid[]) order by id for no key update`)
	const { rows } = await tx.execute<{ id: string; state: string; pieces: number }>(sql`
		select l.id, l.state, coalesce(sum(b.pieces), 0)::int as pieces
		from lots l
		left join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id and b.place in ('cold-room', 'ready')
		where l.producer_id = ${producerId} and l.id = any(${ids}::uuid[])
		group by l.producer_id, l.id`)
	return lots.flatMap(({ lotId, pieces }): RefusedLot[] => {
		const lot = rows.find(({ id }) => id === lotId)
		if (!lot) return [{ lotId, why: "gone", piecesThere: 0 }]
		if (lot.state !== "held") return [{ lotId, why: "not-held", piecesThere: lot.pieces }]
		return pieces > lot.pieces ? [{ lotId, why: "too-many", piecesThere: lot.pieces }] : []
	})
}
