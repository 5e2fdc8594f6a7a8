import { mergedFacts, mergeRefusal } from "~/domain/lots/regroup"
import { allOf, type RegroupAnswer, type RegroupQuery, refuseRegroup, regroup } from "./regroup-lots.server"

/**
 * Makes one lot of all that lies on the shelves of several: of one product, all held or all released. The earliest best
 * before stands. Refuses what `mergeRefusal` refuses, and a lot of which nothing is left.
 */
export function mergeLots(query: RegroupQuery & { codes: readonly string[] }): Promise<RegroupAnswer> {
	return regroup(query, async (_tx, lots) => {
		const refusal = mergeRefusal(lots)
		if (refusal !== null) return refuseRegroup(refusal, "with")
		const gone = lots.find(({ shelves }) => allOf(shelves) === 0)
		if (gone) return refuseRegroup(`Nothing of lot ${gone.code} is left on the shelves.`, "with")
		const { state, ...becomes } = mergedFacts(lots)
		return {
			ok: true,
			kind: "merge",
			taken: lots.map((from) => ({ from, pieces: from.shelves, piecesMade: allOf(from.shelves) })),
			becomes,
			productCode: lots[0]?.productCode ?? "",
			isReleased: state === "released",
			lossGrams: 0,
			reason: `merged from lots ${lots.map(({ code }) => code).join(", ")}`,
		}
	})
}
