import { breaksConstraint } from "~/db/errors.server"
import { stockMoves } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Result } from "~/domain/result"
import { mayMoveByHand } from "~/domain/stock/hand-moves"
import type { Place } from "~/domain/stock/places"
import { findLotShelves, readLotShelves } from "./find-lot-shelves.server"

export type MovePieces = {
	producerId: string
	/** The lot's code. */
	code: string
	personId: string
	from: Place
	/** The market day, where the pieces come from one; the zero id elsewhere. */
	fromRef: string
	to: Place
	/** A whole number above zero. */
	pieces: number
	reason: string
	/** Made with the form, and the id of the move: a second send moves nothing more. */
	key: string
}

export type Moving = Result<
	object,
	| { ok: false; reason: "no-such-lot" }
	| { ok: false; reason: "not-by-hand" }
	| { ok: false; reason: "more-than-there"; there: number }
>

/**
 * Moves pieces of a lot by hand: a correction or a breakage, with its reason. Refused when such a move is not made by
 * hand, or when fewer pieces are there, saying how many; nothing is moved then. Whether enough is there is the database's
 * word, whoever else takes from the place at the same moment.
 */
export async function movePieces(move: MovePieces): Promise<Moving> {
	const { producerId, code, from, fromRef, to, pieces, reason } = move
	if (!mayMoveByHand(from, to)) return { ok: false, reason: "not-by-hand" }
	try {
		return await withProducer(producerId, async (tx) => {
			const lot = await readLotShelves(tx, { producerId, code })
			if (!lot) return { ok: false, reason: "no-such-lot" }
			await tx.insert(stockMoves).values({
				producerId,
				id: move.key,
				lotId: lot.lotId,
				fromPlace: from,
				fromRef,
				toPlace: to,
				pieces,
				reason,
				movedBy: move.personId,
			})
			return { ok: true }
		})
	} catch (error) {
		if (breaksConstraint(error, "stock_moves_pk")) return { ok: true }
		if (!breaksConstraint(error, "stock_balances_not_negative")) throw error
		const lot = await findLotShelves({ producerId, code })
		const shelf = lot?.shelves.find((one) => one.place === from && one.ref === fromRef)
		return { ok: false, reason: "more-than-there", there: shelf?.pieces ?? 0 }
	}
}
