import type { stockTakeLines, stockTakes } from "~/db/schema"
import { addDays, instantAt } from "~/domain/calendar"
import { growLot } from "./grow-lot"
import type { Stock } from "./ledger"
import { piecesAt } from "./pieces-at"
import type { Season } from "./season"

export type StockTakes = {
	takes: (typeof stockTakes.$inferInsert)[]
	lines: (typeof stockTakeLines.$inferInsert)[]
}

/** Pieces that the last count did not find. */
const MISSED = 2

/**
 * Two counts of the ready shelf: one that agreed with the ledger, and one that missed two pieces of the lot released last
 * before it. Those two came off the hives on top, so that what is ready now stays the same.
 */
export function planStockTakes(season: Season, stock: Stock, madeFromLots: ReadonlySet<string>): StockTakes {
	const plan: StockTakes = { takes: [], lines: [] }
	take(season, stock, plan, { daysAgo: 23, missed: 0, madeFromLots })
	take(season, stock, plan, { daysAgo: 9, missed: MISSED, madeFromLots })
	return plan
}

function take(
	season: Season,
	stock: Stock,
	plan: StockTakes,
	{ daysAgo, missed, madeFromLots }: { daysAgo: number; missed: number; madeFromLots: ReadonlySet<string> },
): void {
	const { producerId, chance, scenario, userId, today } = season
	const takenOn = addDays(today, -daysAgo)
	const at = instantAt(takenOn, "18:00", scenario.timeZone)
	const released = stock.moves.findLast(
		({ reason, movedAt, lotId }) => reason === "released" && movedAt < at && !madeFromLots.has(lotId),
	)
	if (missed > 0 && released) growLot(stock, released.lotId, missed, ["cold-room", "ready"])
	const onShelf = piecesAt(stock.moves, "ready", at)
	const stockTakeId = chance.id()
	const takenBy = userId(scenario.packerEmail)
	plan.takes.push({
		producerId,
		id: stockTakeId,
		place: "ready",
		takenOn,
		takenBy,
		postedAt: at,
		idempotencyKey: chance.id(),
	})
	for (const [lotId, ledgerPieces] of onShelf) {
		if (ledgerPieces === 0) continue
		const countedPieces = lotId === released?.lotId ? ledgerPieces - missed : ledgerPieces
		plan.lines.push({ producerId, stockTakeId, lotId, countedPieces, ledgerPieces })
	}
	if (missed === 0 || !released) return
	const after = stock.moves.findIndex(({ movedAt }) => movedAt > at)
	stock.moves.splice(after < 0 ? stock.moves.length : after, 0, {
		producerId,
		id: chance.id(),
		lotId: released.lotId,
		fromPlace: "ready",
		toPlace: "missing",
		pieces: missed,
		reason: "count of the ready shelf",
		movedBy: takenBy,
		movedAt: at,
	})
}
