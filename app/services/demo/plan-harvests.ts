import type { harvests, lots, superChecks, supers } from "~/db/schema"
import { addDays, type Day, instantAt } from "~/domain/calendar"
import type { Catalogue, CatalogueProduct } from "./plan-catalogue"
import { SUPER_PIECES, type Yards } from "./plan-yards"
import { grouped, named, type Season } from "./season"
import { looksInto } from "./super-looks"

type Lot = typeof lots.$inferInsert

export type Harvests = {
	harvests: (typeof harvests.$inferInsert)[]
	/** The supers that are off, with the looks into them. */
	supers: (typeof supers.$inferInsert)[]
	checks: (typeof superChecks.$inferInsert)[]
}

/** Pieces that a good super gives. */
const USUAL_PIECES = 38
const SEASONS_BEFORE = 2
const SUPERS_OF_A_SEASON = 18
const CULLS = "Culls"

/**
 * The harvest of each day on which lots came off, with the supers behind them, and the supers of earlier seasons, whose
 * lots are long gone. Writes the harvest into each of `lots` that was not made from another lot.
 */
export function planHarvests(
	season: Season,
	plans: { catalogue: Catalogue; yards: Yards; lots: readonly Lot[]; madeFromLots: ReadonlySet<string> },
): Harvests {
	const plan: Harvests = { harvests: [], supers: [], checks: [] }
	const fromHives = plans.lots.filter((lot) => !plans.madeFromLots.has(lot.id ?? ""))
	const products = new Map([...plans.catalogue.products.values()].map((product) => [product.id, product]))
	for (const [harvestedOn, lotsOfDay] of grouped(fromHives, (lot) => lot.harvestedOn)) {
		const harvestId = season.chance.id()
		plan.harvests.push(harvestRow(season, harvestId, harvestedOn, lotsOfDay))
		for (const lot of lotsOfDay) {
			lot.harvestId = harvestId
			// Culls came out of the supers that stand behind the day's other lots.
			if (lot.grade === CULLS) continue
			takeOff(season, plans.yards, plan, {
				product: named(products, lot.productId),
				pieces: lot.piecesHarvested,
				offOn: harvestedOn,
				harvestId,
			})
		}
	}
	for (let back = 1; back <= SEASONS_BEFORE; back += 1) earlierSeason(season, plans, plan, back)
	return plan
}

function harvestRow(
	{ producerId, chance, scenario, userId }: Season,
	id: string,
	harvestedOn: Day,
	lotsOfDay: readonly Lot[],
): Harvests["harvests"][number] {
	const yards = [...new Set(lotsOfDay.map((lot) => lot.yard))]
	return {
		producerId,
		id,
		harvestedOn,
		note: yards.join(", "),
		enteredBy: userId(scenario.packerEmail),
		idempotencyKey: chance.id(),
		createdAt: instantAt(harvestedOn, "16:00", scenario.timeZone),
	}
}

/** Supers of one product that come off on one day and hold `pieces` finished ones together. */
function takeOff(
	season: Season,
	yards: Yards,
	plan: Harvests,
	off: { product: CatalogueProduct; pieces: number; offOn: Day; harvestId: string },
): void {
	const count = Math.ceil(off.pieces / USUAL_PIECES)
	for (let index = 0; index < count; index += 1) {
		const finished = Math.floor((off.pieces * (index + 1)) / count) - Math.floor((off.pieces * index) / count)
		writeOff(season, yards, plan, { ...off, finished, full: season.chance.whole(finished, SUPER_PIECES) })
	}
}

/** Supers that came off in the same weeks of an earlier year: most of them well finished, one in nine given up. */
function earlierSeason(
	season: Season,
	{ catalogue, yards }: { catalogue: Catalogue; yards: Yards },
	plan: Harvests,
	back: number,
): void {
	const { chance, scenario, today } = season
	const products = [...catalogue.products.values()]
	for (let count = 0; count < SUPERS_OF_A_SEASON; count += 1) {
		const product = products[count % products.length]
		if (!product) continue
		const full = count % 9 === 8 ? chance.whole(8, 18) : chance.whole(32, SUPER_PIECES)
		writeOff(season, yards, plan, {
			product,
			finished: Math.max(0, full - chance.whole(0, 4)),
			full,
			offOn: addDays(today, -365 * back - 7 * chance.whole(0, scenario.seasonWeeks)),
			harvestId: null,
		})
	}
}

function writeOff(
	season: Season,
	yards: Yards,
	plan: Harvests,
	off: { product: CatalogueProduct; finished: number; full: number; offOn: Day; harvestId: string | null },
): void {
	const { producerId, chance } = season
	const hiveIds = named(yards.hiveIds, off.product.yard)
	const id = chance.id()
	const setOn = addDays(off.offOn, -chance.whole(22, 36))
	plan.supers.push({
		producerId,
		id,
		hiveId: hiveIds[chance.whole(0, hiveIds.length - 1)] ?? "",
		productId: off.product.id,
		capacityPieces: SUPER_PIECES,
		setOn,
		level: chance.whole(1, 2),
		state: "off",
		clearingOn: addDays(off.offOn, -1),
		offOn: off.offOn,
		finishedPieces: off.finished,
		harvestId: off.harvestId,
	})
	plan.checks.push(
		...looksInto(season, {
			superId: id,
			capacity: SUPER_PIECES,
			setOn,
			lastOn: addDays(off.offOn, -3),
			full: off.full,
			capped: off.finished,
			note: "",
			isDrawn: false,
		}),
	)
}
