import type { lotReleases, uploads } from "~/db/schema"
import { drawPhoto } from "./draw-photo.server"
import type { Stock } from "./ledger"
import type { Catalogue } from "./plan-catalogue"
import { type ColdRoom, planColdRoom } from "./plan-cold-room"
import { planForecasts } from "./plan-forecasts"
import { type Gradings, planGradings } from "./plan-gradings"
import { type Harvests, planHarvests } from "./plan-harvests"
import type { OrderOfSeason } from "./plan-orders"
import type { Records } from "./plan-records.server"
import { planReleases } from "./plan-releases"
import { planStockTakes, type StockTakes } from "./plan-stock-takes"
import { planWeighings, type Weighings } from "./plan-weighings"
import { planWithdrawal, type Withdrawal } from "./plan-withdrawal"
import { planYards, type Yards } from "./plan-yards"
import { type Regrouping, regroupLots } from "./regroup-lots"
import type { Season } from "./season"

export type History = {
	yards: Yards
	harvests: Harvests
	uploads: (typeof uploads.$inferInsert)[]
	forecasts: ReturnType<typeof planForecasts>
	gradings: Gradings
	coldRoom: ColdRoom
	weighings: Weighings
	releases: (typeof lotReleases.$inferInsert)[]
	regrouping: Regrouping
	takes: StockTakes
	withdrawal: Withdrawal
	counters: Records["counters"]
}

/** Loads and withdrawals are counted on over the years; the counter's year says so. */
const NO_YEAR = 0

/**
 * All that stands behind the lots of the season, from the hive to their release, and what was done with them since.
 * Completes the rows of `stock`; what is ready of each product stays as it was.
 */
export async function planHistory(
	season: Season,
	{ catalogue, stock, orders }: { catalogue: Catalogue; stock: Stock; orders: readonly OrderOfSeason[] },
): Promise<History> {
	const { producerId } = season
	const gradings = planGradings(season, catalogue, stock.lots)
	const regrouping = regroupLots(season, catalogue, stock)
	const { madeFromLots } = regrouping
	const takes = planStockTakes(season, stock, madeFromLots)
	const withdrawal = planWithdrawal(season, stock, orders, madeFromLots)

	const yards = planYards(season, catalogue)
	const harvests = planHarvests(season, { catalogue, yards, lots: stock.lots, madeFromLots })
	const byHand = stock.lots.find((lot) => lot.state === "released" && !madeFromLots.has(lot.id ?? ""))
	const coldRoom = planColdRoom(season, stock.lots, new Set([...regrouping.splitOff, byHand?.id ?? ""]))
	const weighings = planWeighings(season, catalogue, stock.lots)
	return {
		yards,
		harvests,
		uploads: await photoOf(season, yards),
		forecasts: planForecasts(season, stock.lots, madeFromLots),
		gradings,
		coldRoom,
		weighings,
		releases: planReleases(season, { lots: stock.lots, byHand, regrouping, coldRoom, weighings }),
		regrouping,
		takes,
		withdrawal,
		counters: [
			{ producerId, series: "load", year: NO_YEAR, last: coldRoom.rows.loads.length },
			{ producerId, series: "withdrawal", year: NO_YEAR, last: withdrawal.withdrawals.length },
		],
	}
}

/** A picture, taken at the last check with a note, or at the last of all. */
async function photoOf({ producerId, chance, scenario, userId }: Season, yards: Yards): Promise<History["uploads"]> {
	const check = yards.rows.checks.findLast(({ note }) => note !== "") ?? yards.rows.checks.at(-1)
	if (!check) return []
	const id = chance.id()
	check.photoId = id
	const uploadedBy = userId(scenario.ownerEmail)
	return [{ producerId, id, ...(await drawPhoto()), uploadedBy, createdAt: check.receivedAt }]
}
