import { randomUUID } from "node:crypto"
import { lotLinks, lots, stockMoves } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Yard } from "../orders/place-yard"

/** Takes pieces of a lot from the ready shelf into a new released lot: split as they are, or cut up into another product. */
export async function makeLotFrom(
	yard: Yard,
	made: {
		fromLotId: string
		code: string
		productId: string
		kind: "split" | "cut-up"
		pieces: number
		piecesMade?: number
	},
): Promise<string> {
	const { producerId } = yard
	const { fromLotId, code, productId, kind, pieces, piecesMade = pieces } = made
	const lotId = randomUUID()
	await withProducer(producerId, async (tx) => {
		await tx.insert(lots).values({
			producerId,
			id: lotId,
			code,
			productId,
			state: "released",
			harvestedOn: "2026-07-01",
			expectedReleaseOn: "2026-07-10",
			bestBeforeOn: "2027-02-01",
			piecesHarvested: piecesMade,
		})
		const toPlace = kind === "split" ? "other-lot" : "cut-up"
		await tx.insert(stockMoves).values([
			{ producerId, lotId: fromLotId, fromPlace: "ready", toPlace, toRef: lotId, pieces, reason: `into ${code}` },
			{ producerId, lotId, toPlace: "cold-room", pieces: piecesMade, reason: "from another lot" },
		])
		await tx
			.insert(stockMoves)
			.values({ producerId, lotId, fromPlace: "cold-room", toPlace: "ready", pieces: piecesMade, reason: "released" })
		await tx.insert(lotLinks).values({ producerId, fromLotId, toLotId: lotId, kind, pieces, piecesMade })
	})
	return lotId
}
