import type { lotReleases, lots } from "~/db/schema"
import { instantAt } from "~/domain/calendar"
import type { ColdRoom } from "./plan-cold-room"
import type { Weighings } from "./plan-weighings"
import type { Regrouping } from "./regroup-lots"
import { notAfter, type Season } from "./season"

type Lot = typeof lots.$inferInsert

/**
 * Why each released lot was released: proven by its freezing and weighing (a lot split off by the freezing of the one it
 * came from), but for one that the owner released by hand, and culls, which are not sold.
 */
export function planReleases(
	season: Season,
	plans: {
		lots: readonly Lot[]
		byHand: Lot | undefined
		regrouping: Regrouping
		coldRoom: ColdRoom
		weighings: Weighings
	},
): (typeof lotReleases.$inferInsert)[] {
	const { producerId, scenario, userId, now } = season
	const released = plans.lots.filter((lot) => lot.state === "released")
	return released.map((lot) => {
		const lotId = lot.id ?? ""
		const isCulls = lot.grade === "Culls"
		const isByHand = isCulls || lot === plans.byHand
		const link = plans.regrouping.links.find((link) => link.toLotId === lotId && link.kind === "split")
		return {
			producerId,
			lotId,
			kind: isByHand ? "by-hand" : "proven",
			reason: !isByHand ? "" : isCulls ? "Culls: cut up as a whole, nothing of this lot is sold by itself." : BY_HAND,
			freezeProofId: isByHand ? null : plans.coldRoom.proofs.get(link?.fromLotId ?? lotId),
			netCheckId: isByHand ? null : plans.weighings.passed.get(lotId),
			releasedBy: userId(isByHand ? scenario.ownerEmail : scenario.packerEmail),
			releasedAt: notAfter(now, instantAt(lot.expectedReleaseOn, "17:00", scenario.timeZone)),
		}
	})
}

const BY_HAND =
	"Frozen before loads were written down here: the notebook has it at 0 °F and below for two days and nights."
