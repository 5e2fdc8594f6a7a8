import type { lots, orderLineLots, saleLineLots, stockMoves } from "~/db/schema"
import { notAfter, type Season } from "./season"
import type { Shelf, Taken } from "./shelf"

type Move = typeof stockMoves.$inferInsert & { movedAt: Date }

export type Stock = {
	lots: (typeof lots.$inferInsert)[]
	/** In the order in which they happened, as no balance may fall below zero on the way. */
	moves: Move[]
	lineLots: (typeof orderLineLots.$inferInsert)[]
	saleLots: (typeof saleLineLots.$inferInsert)[]
}

/** Stock as it is being planned. */
export type Ledger = Stock & { season: Season; shelves: ReadonlyMap<string, Shelf> }

/** Notes a move by the packer, at the latest now. */
export function move(
	ledger: Ledger,
	taken: Taken,
	at: Date,
	rest: Pick<Move, "fromPlace" | "fromRef" | "toPlace" | "toRef" | "reason">,
) {
	const { producerId, chance, scenario, userId, now } = ledger.season
	ledger.moves.push({
		producerId,
		id: chance.id(),
		lotId: taken.lot.id,
		pieces: taken.pieces,
		movedAt: notAfter(now, at),
		movedBy: userId(scenario.packerEmail),
		...rest,
	})
}
