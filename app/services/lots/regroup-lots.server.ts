import { sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { lotLinks, lots, stockMoves } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import type { LotFacts } from "~/domain/lots/regroup"
import type { Result } from "~/domain/result"
import { copyReleases } from "./copy-releases.server"
import { type LockedLot, lockLots, SHELVES, type ShelfPieces } from "./lock-lots.server"
import { takeLotCodes } from "./take-lot-codes.server"
import { writeLots } from "./write-lots.server"

/** What every regrouping of lots is given. */
export type RegroupQuery = {
	producerId: string
	personId: string
	/** The id of the new lot, made with the form: a second send finds what the first made. */
	newLotId: string
	/** The new lot's code as typed and read, or null for one by the producer's pattern. */
	newCode: string | null
}

/** A sentence that says what cannot be done, beside which field, if any. */
export type RegroupRefusal = { ok: false; reason: "refused" | "no-such-lot"; field?: string; message: string }
export type RegroupAnswer = Result<{ code: string }, RegroupRefusal>

/** Pieces that leave one lot for the new one; `piecesMade` came of them. */
export type Taken = { from: LockedLot; pieces: ShelfPieces; piecesMade: number }

/** What a rule makes of the locked lots: who gives what, and what the new lot is. */
export type RegroupPlan = {
	kind: "split" | "merge" | "cut-up"
	taken: readonly Taken[]
	becomes: Omit<LotFacts, "state">
	productCode: string
	/** A new lot that is released at once carries the release of those it came from. */
	isReleased: boolean
	lossGrams: number
	/** Of the new lot's pieces: "split from lot 2126-004". */
	reason: string
}

export const refuseRegroup = (message: string, field?: string): RegroupRefusal => ({
	ok: false,
	reason: "refused",
	message,
	...(field ? { field } : {}),
})

/** Pieces that leave both shelves together. */
export const allOf = (pieces: ShelfPieces) => SHELVES.reduce((sum, shelf) => sum + pieces[shelf], 0)

/**
 * Regroups lots in one transaction: the lots are locked, `plan` decides, pieces leave to "other-lot" or "cut-up", the new
 * lot begins with its pieces in the cold room, and a link keeps the history. Harvested stays the sum over places for every
 * lot. The same form sent again answers the lot that the first made; a lot code that is taken, and pieces that somebody
 * moved meanwhile, are refused.
 */
export async function regroup(
	query: RegroupQuery & { codes: readonly string[] },
	plan: (tx: Tx, locked: readonly LockedLot[]) => Promise<({ ok: true } & RegroupPlan) | RegroupRefusal>,
): Promise<RegroupAnswer> {
	try {
		return await withProducer(query.producerId, async (tx) => {
			const locked = await lockLots(tx, query)
			const earlier = await findCode(tx, query)
			if (earlier) return { ok: true, code: earlier }
			if (locked.length < new Set(query.codes).size) {
				return { ok: false, reason: "no-such-lot", message: "One of these lots is not there any more." } as const
			}
			const planned = await plan(tx, locked)
			return planned.ok ? await write(tx, { query, planned }) : planned
		})
	} catch (error) {
		if (error instanceof CodeTaken) return refuseRegroup(error.message, "code")
		if (breaksConstraint(error, "lots_pk")) return regroup(query, plan)
		if (!breaksConstraint(error, "stock_balances_not_negative")) throw error
		return refuseRegroup("Somebody has just moved these pieces. Look at what is left and try again.")
	}
}

class CodeTaken extends Error {}

async function findCode(tx: Tx, { producerId, newLotId }: RegroupQuery): Promise<string | null> {
	const { rows } = await tx.execute<{ code: string }>(
		sql`select code from lots where producer_id = ${producerId} and id = ${newLotId}`,
	)
	return rows[0]?.code ?? null
}

async function write(
	tx: Tx,
	{ query, planned }: { query: RegroupQuery; planned: RegroupPlan },
): Promise<{ ok: true; code: string }> {
	const { producerId, personId, newLotId } = query
	const { kind, taken, becomes, lossGrams } = planned
	const pieces = taken.reduce((sum, { piecesMade }) => sum + piecesMade, 0)
	const named = await takeLotCodes(tx, {
		producerId,
		harvestedOn: becomes.harvestedOn,
		lots: [{ productCode: planned.productCode, code: query.newCode }],
	})
	if ("taken" in named) throw new CodeTaken(`Lot ${named.taken} is there already. Write another code.`)
	const [code = ""] = named.codes
	const isCut = kind === "cut-up"
	const away = { toPlace: isCut ? ("cut-up" as const) : ("other-lot" as const), toRef: newLotId, movedBy: personId }
	const moves = taken.flatMap(({ from, pieces: shelves }) =>
		SHELVES.filter((shelf) => shelves[shelf] > 0).map((shelf) => ({
			producerId,
			lotId: from.id,
			fromPlace: shelf,
			...away,
			pieces: shelves[shelf],
			reason: isCut ? `cut up into lot ${code}` : `into lot ${code}`,
		})),
	)
	await tx.insert(stockMoves).values(moves)
	const newLot = { ...becomes, id: newLotId, code, pieces, harvestId: null, reason: planned.reason }
	await writeLots(tx, { producerId, personId, lots: [newLot] })
	await tx.insert(lotLinks).values(
		taken.map(({ from, pieces: shelves, piecesMade }, index) => ({
			producerId,
			fromLotId: from.id,
			toLotId: newLotId,
			kind,
			pieces: allOf(shelves),
			piecesMade,
			lossGrams: index === 0 ? lossGrams : 0,
		})),
	)
	if (planned.isReleased) {
		await copyReleases(tx, { producerId, personId, toLotId: newLotId, kind, from: taken.map(({ from }) => from) })
		await tx.execute(sql`update ${lots} set state = 'released' where producer_id = ${producerId} and id = ${newLotId}`)
	}
	return { ok: true, code }
}
