import { allOf, type RegroupAnswer, type RegroupQuery, refuseRegroup, regroup } from "./regroup-lots.server"

/**
 * Splits pieces off a lot into a lot of their own, which keeps its facts; of a released lot it is released too, and its
 * release says where it came from. Pieces leave the ready shelf first. Refuses more than lies on the shelves, all of
 * them (then there is nothing to split), and a withdrawn lot.
 */
export function splitLot(query: RegroupQuery & { code: string; pieces: number }): Promise<RegroupAnswer> {
	const { code, pieces } = query
	return regroup({ ...query, codes: [code] }, async (_tx, [lot]) => {
		if (!lot) return refuseRegroup("This lot is not there any more.")
		if (lot.state === "withdrawn") return refuseRegroup("A withdrawn lot stays as it is.")
		const there = allOf(lot.shelves)
		if (pieces > there) return refuseRegroup(`Only ${there} pieces of this lot are on the shelves.`, "pieces")
		if (pieces === there) return refuseRegroup("That is all there is of it on the shelves. Write fewer.", "pieces")
		const ready = Math.min(pieces, lot.shelves.ready)
		const { id: _, code: __, shelves: ___, productCode, pieceNetGrams: ____, state, ...facts } = lot
		return {
			ok: true,
			kind: "split",
			taken: [{ from: lot, pieces: { ready, "cold-room": pieces - ready }, piecesMade: pieces }],
			becomes: facts,
			productCode,
			isReleased: state === "released",
			lossGrams: 0,
			reason: `split from lot ${lot.code}`,
		}
	})
}
