import { and, eq } from "drizzle-orm"
import { stockBalances, stockMoves } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"

/** Moves all that lies packed for an order: sold with it, or back to the ready shelf. Lots in the order of their ids. */
export async function movePacked(
	tx: Tx,
	query: { producerId: string; orderId: string; to: "sold" | "ready"; reason: string; personId: string },
): Promise<void> {
	const { producerId, orderId, to, reason, personId } = query
	const packed = await tx
		.select({ lotId: stockBalances.lotId, pieces: stockBalances.pieces })
		.from(stockBalances)
		.where(
			and(
				eq(stockBalances.producerId, producerId),
				eq(stockBalances.place, "packed"),
				eq(stockBalances.placeRef, orderId),
			),
		)
		.orderBy(stockBalances.lotId)
	const moves = packed
		.filter(({ pieces }) => pieces > 0)
		.map(({ lotId, pieces }) => ({
			producerId,
			lotId,
			fromPlace: "packed" as const,
			fromRef: orderId,
			toPlace: to,
			...(to === "sold" ? { toRef: orderId } : {}),
			pieces,
			reason,
			movedBy: personId,
		}))
	if (moves.length > 0) await tx.insert(stockMoves).values(moves)
}
