import type { cropForecasts, lots } from "~/db/schema"
import { addDays, compareDays } from "~/domain/calendar"
import { mondayOf } from "~/domain/crop/forecast"
import { grouped, type Season } from "./season"

type Lot = typeof lots.$inferInsert
type Forecast = typeof cropForecasts.$inferInsert

const WEEKS_AHEAD = [3, 2, 1] as const
/** How far off a forecast was at most, in percent of what came off, by how many weeks ahead it was made. */
const OFF_BY = { 3: 30, 2: 18, 1: 9 } as const

/** What was expected of each week in which lots came off, as it stood three, two and one week before. */
export function planForecasts(season: Season, stock: readonly Lot[], madeFromLots: ReadonlySet<string>): Forecast[] {
	const { producerId, chance, today } = season
	const fromHives = stock.filter((lot) => !madeFromLots.has(lot.id ?? "") && lot.grade !== "Culls")
	return [...grouped(fromHives, (lot) => `${mondayOf(lot.harvestedOn)} ${lot.productId}`).values()].flatMap((lots) => {
		const [first] = lots
		if (!first) return []
		const weekOn = mondayOf(first.harvestedOn)
		const cameOff = lots.reduce((sum, lot) => sum + lot.piecesHarvested, 0)
		return WEEKS_AHEAD.flatMap((weeks) => {
			const madeOn = addDays(weekOn, -7 * weeks)
			if (compareDays(madeOn, today) >= 0) return []
			const likely = Math.round((cameOff * (100 + chance.whole(-OFF_BY[weeks], OFF_BY[weeks]))) / 100)
			return {
				producerId,
				productId: first.productId,
				madeOn,
				weekOn,
				lowPieces: Math.floor((likely * (96 - 6 * weeks)) / 100),
				likelyPieces: likely,
				highPieces: Math.ceil((likely * (103 + 5 * weeks)) / 100),
			}
		})
	})
}
