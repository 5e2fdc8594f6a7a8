import { and, eq, sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { stockMoves, stockTakeLines, stockTakes } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { type CountedLot, type CountMove, movesOfCount } from "~/domain/stock/count-place"
import type { CountPlace } from "./find-count-sheet.server"

/** What was counted of one lot, beside what the ledger had when that was shown. */
export type CountLine = { lotId: string; counted: number; shown: number; reason: string }

export type StockTake = CountPlace & {
	producerId: string
	personId: string
	takenOn: Day
	/** "the cold room": stands in the reason of each move. */
	placeWords: string
	/** Each lot once; lots that were not counted are left out and stay as they are. */
	lines: readonly CountLine[]
	idempotencyKey: string
}

export type Posting = Result<
	{ takeId: string },
	| { ok: false; reason: "nothing-counted" }
	| { ok: false; reason: "no-such-lot" }
	| { ok: false; reason: "ledger-changed" }
>

/**
 * Posts a count: records it, and moves what differs, in one transaction. Refused whole when nothing was counted, when a
 * lot is not there, or when the ledger has changed at the place since the differences were shown. Sending the same form
 * again answers the first count. The lots are locked in the order of their ids, so nothing of them moves meanwhile.
 */
export async function postStockTake(take: StockTake): Promise<Posting> {
	if (take.lines.length === 0) return { ok: false, reason: "nothing-counted" }
	try {
		return await withProducer(take.producerId, (tx) => post(tx, take))
	} catch (error) {
		if (breaksConstraint(error, "stock_takes_sent_once")) return postStockTake(take)
		throw error
	}
}

async function post(tx: Tx, take: StockTake): Promise<Posting> {
	const { producerId, place, ref, lines } = take
	const [earlier] = await tx
		.select({ id: stockTakes.id })
		.from(stockTakes)
		.where(and(eq(stockTakes.producerId, producerId), eq(stockTakes.idempotencyKey, take.idempotencyKey)))
	if (earlier) return { ok: true, takeId: earlier.id }

	const lots = await lockCounted(tx, take)
	if (lots.length < lines.length) return { ok: false, reason: "no-such-lot" }
	const shown = new Map(lines.map(({ lotId, shown }) => [lotId, shown]))
	if (lots.some(({ lotId, ledger }) => ledger !== shown.get(lotId))) return { ok: false, reason: "ledger-changed" }

	const [written] = await tx
		.insert(stockTakes)
		.values({
			producerId,
			place,
			placeRef: ref,
			takenOn: take.takenOn,
			takenBy: take.personId,
			idempotencyKey: take.idempotencyKey,
		})
		.returning({ id: stockTakes.id })
	if (!written) throw new Error("a stock-take that was inserted has an id")
	await tx.insert(stockTakeLines).values(
		lots.map(({ lotId, counted, ledger }) => ({
			producerId,
			stockTakeId: written.id,
			lotId,
			countedPieces: counted,
			ledgerPieces: ledger,
		})),
	)
	await writeMoves(tx, take, movesOfCount(place, lots))
	return { ok: true, takeId: written.id }
}

/** The lots of a count as they stand, by id, locked until the transaction ends. */
async function lockCounted(tx: Tx, take: StockTake): Promise<CountedLot[]> {
	const { producerId, place, ref, lines } = take
	const lotIds = sql.param(lines.map(({ lotId }) => lotId))
	await tx.execute(sql`
		select id from lots where producer_id = ${producerId} and id = any(${lotIds}::uuid[]) order by id for update`)
	// Read after the locks are held: another's moves that were waited for are seen.
	const { rows } = await tx.execute<Omit<CountedLot, "counted">>(sql`
		select l.id as "lotId",
			coalesce(sum(b.pieces) filter (where b.place = ${place} and b.place_ref = ${ref}), 0)::int as ledger,
			coalesce(sum(b.pieces) filter (where b.place = 'missing'), 0)::int as missing
		from lots l
		left join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id and b.place in (${place}, 'missing')
		where l.producer_id = ${producerId} and l.id = any(${lotIds}::uuid[])
		group by l.id
		order by l.id`)
	const counted = new Map(lines.map((line) => [line.lotId, line.counted]))
	return rows.map((row) => ({ ...row, counted: counted.get(row.lotId) as number }))
}

async function writeMoves(tx: Tx, take: StockTake, moves: readonly CountMove[]): Promise<void> {
	if (moves.length === 0) return
	const { producerId, place, ref } = take
	const reasons = new Map(take.lines.map(({ lotId, reason }) => [lotId, reason.trim()]))
	const unwritten = moves.filter(({ from }) => from === null)
	if (unwritten.length > 0) {
		await tx.execute(sql`
			update lots set pieces_harvested = pieces_harvested + more.pieces
			from unnest(${sql.param(unwritten.map(({ lotId }) => lotId))}::uuid[],
				${sql.param(unwritten.map(({ pieces }) => pieces))}::int[]) as more(lot_id, pieces)
			where lots.producer_id = ${producerId} and lots.id = more.lot_id`)
	}
	const refOf = (end: string | null) => (end === place ? { ref } : {})
	await tx.insert(stockMoves).values(
		moves.map(({ lotId, from, to, pieces }) => {
			const { ref: fromRef } = refOf(from)
			const { ref: toRef } = refOf(to)
			const reason = reasons.get(lotId)
			return {
				producerId,
				lotId,
				fromPlace: from,
				...(fromRef ? { fromRef } : {}),
				toPlace: to,
				...(toRef ? { toRef } : {}),
				pieces,
				reason: `count of ${take.placeWords}${reason ? `: ${reason}` : ""}`,
				movedBy: take.personId,
			}
		}),
	)
}
