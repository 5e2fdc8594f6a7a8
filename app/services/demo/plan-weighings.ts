import type { lots, netChecks } from "~/db/schema"
import { dayInZone, instantAt } from "~/domain/calendar"
import { judgeNetContents, type NetContentsInput } from "~/domain/scale/net-contents"
import { samplingPlan } from "~/domain/scale/sampling-plan"
import { labelledGrams } from "~/domain/weight"
import type { Catalogue, CatalogueProduct } from "./plan-catalogue"
import { minutesAfter, named, notAfter, type Season } from "./season"

type Lot = typeof lots.$inferInsert

export type Weighings = {
	/** The check that each lot passed, by the lot's id. */
	passed: ReadonlyMap<string, string>
	rows: (typeof netChecks.$inferInsert)[]
}

const GRAMS_PER_OUNCE = 28.349523125

/**
 * A check of the net contents of every released lot, which it passed, and of one held lot, which is a steady six grams
 * short and fails. Culls are not weighed as packages.
 */
export function planWeighings(season: Season, catalogue: Catalogue, stock: readonly Lot[]): Weighings {
	const { scenario, now } = season
	const products = new Map([...catalogue.products.values()].map((product) => [product.id, product]))
	const passed = new Map<string, string>()
	const rows: Weighings["rows"] = []
	const weigh = (lot: Lot, at: Date, overGrams: number) => {
		const row = checkRow(season, { lot, product: named(products, lot.productId), at, overGrams })
		rows.push(row)
		if (row.hasPassed) passed.set(lot.id ?? "", row.id ?? "")
	}
	for (const lot of stock) {
		if (lot.state !== "released" || lot.grade === "Culls") continue
		weigh(lot, notAfter(now, minutesAfter(instantAt(lot.expectedReleaseOn, "17:00", scenario.timeZone), -60)), 3)
	}
	const held = stock.filter((lot) => lot.state === "held")[1] ?? stock.find((lot) => lot.state === "held")
	if (held) weigh(held, minutesAfter(now, -45), -6)
	return { passed, rows }
}

function checkRow(
	season: Season,
	{ lot, product, at, overGrams }: { lot: Lot; product: CatalogueProduct; at: Date; overGrams: number },
): Weighings["rows"][number] {
	const { producerId, chance, scenario, userId } = season
	const input = weighed(season, { lot, product, overGrams })
	const judged = judgeNetContents(input)
	if (!judged.ok) throw new Error(`the demo weighs ${lot.code} wrongly: ${judged.reason}`)
	return {
		producerId,
		id: chance.id(),
		lotId: lot.id ?? "",
		checkedOn: dayInZone(at, scenario.timeZone),
		input,
		worksheet: judged.worksheet,
		hasPassed: judged.worksheet.hasPassed,
		note: judged.worksheet.hasPassed ? "" : "The same corner is light on every piece: the cutting frame stands askew.",
		checkedBy: userId(scenario.packerEmail),
		createdAt: at,
	}
}

/** What the scale showed: packages that lie about `overGrams` over the label, a few grams either way. */
function weighed(
	{ chance }: Season,
	{ lot, product, overGrams }: { lot: Lot; product: CatalogueProduct; overGrams: number },
): NetContentsInput {
	const plan = samplingPlan(lot.piecesHarvested)
	const jar = product.form === "chunk"
	const tareGrams = jar ? 212 : 24
	const label = Math.ceil(product.netOunces * GRAMS_PER_OUNCE)
	return {
		lotPackages: lot.piecesHarvested,
		label: {
			inchPound: { amount: String(product.netOunces), unit: "oz" },
			metric: { amount: String(labelledGrams(product.netOunces)), unit: "g" },
		},
		unit: "g",
		division: "1",
		tare: {
			kind: "weighed",
			weights: Array.from({ length: jar ? plan.glassTares : plan.tares }, (_, index) =>
				String(tareGrams + (index % 2)),
			),
		},
		packages: Array.from({ length: plan.sample }, () => ({
			gross: String(tareGrams + label + overGrams + chance.whole(-2, 3)),
		})),
	}
}
