import type { withdrawalLots, withdrawalNotices, withdrawals } from "~/db/schema"
import { growLot } from "./grow-lot"
import type { Stock } from "./ledger"
import { piecesAt } from "./pieces-at"
import type { OrderOfSeason } from "./plan-orders"
import { grouped, minutesAfter, notAfter, type Season } from "./season"

export type Withdrawal = {
	withdrawals: (typeof withdrawals.$inferInsert)[]
	lots: (typeof withdrawalLots.$inferInsert)[]
	notices: (typeof withdrawalNotices.$inferInsert)[]
}

const MINUTES_A_DAY = 1440
/** Pieces that never left the cold room, and are held there now. */
const LEFT = 6

/**
 * One lot that was called back after all of it had been sold, but for a few pieces in the cold room. The stores that had
 * it were called, as no letter could be written to them; the first has opened its notice and answered.
 */
export function planWithdrawal(
	season: Season,
	stock: Stock,
	orders: readonly OrderOfSeason[],
	madeFromLots: ReadonlySet<string>,
): Withdrawal {
	const { producerId, chance, scenario, userId, now } = season
	const lot = lotToCallBack(season, stock, orders, madeFromLots)
	growLot(stock, lot.id, LEFT, ["cold-room"])
	const startedAt = notAfter(now, minutesAfter(lot.lastAt, 2 * MINUTES_A_DAY))
	const withdrawalId = chance.id()
	return {
		withdrawals: [
			{
				producerId,
				id: withdrawalId,
				number: 1,
				reason: "Some pieces of this lot are weeping: honey has come out under the lids since they were packed.",
				instructions:
					"Take what is left off the shelf and keep it apart. We fetch it with the next delivery and credit it.",
				startedBy: userId(scenario.ownerEmail),
				startedAt,
				idempotencyKey: chance.id(),
			},
		],
		lots: [{ producerId, withdrawalId, lotId: lot.id, piecesOut: lot.piecesOut }],
		notices: lot.stores.map(({ storeId, pieces }, index) => {
			const isAnswered = index === 0
			return {
				producerId,
				id: chance.id(),
				withdrawalId,
				storeId,
				pieces,
				tokenHash: chance.hash(),
				openedAt: isAnswered ? notAfter(now, minutesAfter(startedAt, 95)) : null,
				answeredAt: isAnswered ? notAfter(now, minutesAfter(startedAt, 130)) : null,
				heldPieces: isAnswered ? Math.min(4, pieces) : null,
				answerNote: isAnswered ? "Put aside behind the counter." : "",
			}
		}),
	}
}

/** Of the lots that are sold to the last piece, the one that fewest stores had, but two where there is such a one. */
function lotToCallBack(
	{ now }: Season,
	stock: Stock,
	orders: readonly OrderOfSeason[],
	madeFromLots: ReadonlySet<string>,
) {
	const ready = piecesAt(stock.moves, "ready", now)
	const sold = piecesAt(stock.moves, "sold", now)
	const packed = piecesAt(stock.moves, "packed", now)
	const market = piecesAt(stock.moves, "market", now)
	const taken = orders.flatMap((order) =>
		order.lines.flatMap((line) => line.lots.map((some) => ({ ...some, storeId: order.store.id }))),
	)
	const storesOf = grouped(taken, (some) => some.lotId)
	const candidates = stock.lots.flatMap((lot) => {
		const id = lot.id ?? ""
		const isGone = [ready, packed, market].every((places) => (places.get(id) ?? 0) === 0)
		const last = stock.moves.findLast((move) => move.lotId === id)
		const stores = [...grouped(storesOf.get(id) ?? [], (some) => some.storeId)].map(([storeId, some]) => ({
			storeId,
			pieces: some.reduce((sum, { pieces }) => sum + pieces, 0),
		}))
		if (!isGone || !last || stores.length === 0 || madeFromLots.has(id)) return []
		return [{ id, stores, lastAt: last.movedAt, piecesOut: sold.get(id) ?? 0 }]
	})
	const [chosen] = candidates.toSorted((a, b) => awayFromTwo(a.stores) - awayFromTwo(b.stores))
	if (!chosen) throw new Error("the demo has sold no lot to the last piece")
	return chosen
}

const awayFromTwo = (stores: readonly unknown[]) => (stores.length < 2 ? 1_000 : stores.length - 2)
