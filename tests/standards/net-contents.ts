import { describe, expect, test } from "vitest"
import { verifiedDeclaration } from "~/domain/labelling/verified-declaration"
import { allowableVariation, coarsestDivision, usualDivision } from "~/domain/scale/allowable-variation"
import { inUnitsOfMeasure } from "~/domain/scale/decide-lot"
import { asNumber, exactly, plainDecimal, plus } from "~/domain/scale/fraction"
import { lessAllowance, moistureAllowance, moistureListing, moreAllowance } from "~/domain/scale/moisture"
import { samplingPlan } from "~/domain/scale/sampling-plan"
import { parseWeight, type Weight, type WeightUnit, weightIn } from "~/domain/scale/weight-units"
import { holdNetExamples } from "./net-examples"
import type { PublishedValues } from "./published-values"
import type { Entry } from "./scale-shapes"

/** A weight as a file writes it: "0.25 lb", "+0.060 lb", "1 lb 8 oz". */
function weightOf(text: string): Weight {
	const read = parseWeight(text.trim(), "g")
	if (!read.ok) throw new Error(`not a weight in the file: ${text}`)
	return read.weight
}

const number = (value: unknown) => (typeof value === "number" ? value : null)

/** Holds a figure to the decimals it is printed with; a whole number printed of a finer one would be too loose. */
function expectPrinted(found: number, printed: number, what: string): void {
	const places = `${printed}`.split(".")[1]?.length ?? 0
	expect(Math.abs(found - printed), `${what}: ${found} for ${printed}`).toBeLessThanOrEqual(0.5 * 10 ** -places + 1e-9)
}

/** Boundaries of a table, with a step to the next thing on either side. */
function holdPlan(name: string, category: "A" | "B", rows: readonly Entry[]): void {
	if (rows.length === 0) return
	describe(name, () => {
		const cases = rows.flatMap((row) =>
			[number(row.lot_min), number(row.lot_max) ?? 10 * Number(row.lot_min)].flatMap((lot) =>
				lot === null ? [] : [{ lot, sample: row.sample, row }],
			),
		)
		test.each(cases)("a lot of $lot is judged by $sample", ({ lot, row }) => {
			const plan = samplingPlan(lot, category)
			expect(plan.sample).toBe(row.sample)
			expect(plan.shortAllowed).toBe(row.ume_allowed)
			expect(plan.tares).toBe(row.initial_tare)
			if ("scf" in row) expect(plan.correctionFactor && Number(plan.correctionFactor)).toBe(row.scf)
			if ("initial_tare_glass_aerosol" in row) expect(plan.glassTares).toBe(row.initial_tare_glass_aerosol)
			expect([plan.from, plan.to]).toEqual([row.lot_min, row.lot_max ?? Number.POSITIVE_INFINITY])
		})
	})
}

function variationOf(label: Weight, unit: WeightUnit): number {
	const found = allowableVariation(label, unit)
	if (!found.ok) throw new Error(`no variation for ${plainDecimal(label.amount)} ${label.unit}`)
	return asNumber(found.variation)
}

/** A fraction of an ounce as printed: "7/16", "1 1/8". */
const ounces = (printed: unknown) => asNumber(weightOf(`${printed} oz`).amount)

const STEP: Record<"lb" | "g", string> = { lb: "0.000001", g: "0.001" }

/** Every boundary in both units: at it and just under it the row's own figure, just over it the next row's. */
function holdVariations(rows: readonly Entry[]): void {
	const boundaries = rows.flatMap((row, place) =>
		(["lb", "g"] as const).flatMap((unit) => {
			const to = number(row[`to_${unit}`])
			return to === null ? [] : [{ to, unit, row, next: rows[place + 1] ?? null }]
		}),
	)
	if (boundaries.length === 0) return
	describe("maximum allowable variations", () => {
		test.each(boundaries)("a label of $to $unit, just under and just over it", ({ to, unit, row, next }) => {
			const near = (by: string): Weight => ({ amount: plus(exactly(to), exactly(by)), unit })
			for (const label of [near("0"), near(`-${STEP[unit]}`)]) {
				const own = row[`mav_${unit}`] ?? asNumber(label.amount) / 10
				expect(variationOf(label, unit)).toBeCloseTo(Number(own), 9)
				if (row.mav_oz !== undefined) expect(variationOf(label, "oz")).toBe(ounces(row.mav_oz))
			}
			const over = allowableVariation(near(STEP[unit]), unit)
			if (next?.[`over_${unit}`] === to) expect(over.ok && asNumber(over.variation)).toBe(next[`mav_${unit}`])
			else
				expect(over.ok ? asNumber(over.variation) : Number.POSITIVE_INFINITY).toBeGreaterThan(
					variationOf(near("0"), unit),
				)
		})
	})
}

/** The weights in a text: "113 g (0.25 lb)" are two that mean the same. */
const weightsIn = (text: unknown) => `${text}`.match(/[\d./\s]*\d\s*(?:g|oz|lbs?)\b/g)?.map(weightOf) ?? []

function holdCrossChecks(entries: readonly Entry[]): void {
	const pairs = entries.filter((entry) => entry.label !== undefined && entry.mav !== undefined)
	if (pairs.length === 0) return
	test.each(pairs)("a label of $label may be short by $mav", ({ label, mav }) => {
		const variations = weightsIn(mav)
		expect(variations.length).toBeGreaterThan(0)
		for (const declared of weightsIn(label)) {
			for (const { amount, unit } of variations) expect(variationOf(declared, unit)).toBe(asNumber(amount))
		}
	})
}

/** What a look-up is about: words of a label, or a figure in a field named by its unit. */
function labelOf(entry: Entry): Weight | null {
	const unit = (["lb", "oz", "g"] as const).find(
		(each) => entry[each] !== undefined || entry[`label_${each}`] !== undefined,
	)
	if (unit) return { amount: exactly(Number(entry[unit] ?? entry[`label_${unit}`])), unit }
	const [first] = typeof entry.label === "string" ? weightsIn(entry.label) : []
	return first ?? null
}

function holdLookups(entries: readonly Entry[]): void {
	const known = entries.flatMap((entry) => {
		const label = labelOf(entry)
		const asked = Object.keys(entry).flatMap((key) => {
			const [, what, unit] = /^(mav|max_scale_division)_(lb|oz|g)$/.exec(key) ?? []
			return what && unit ? [{ key, what, unit: unit as WeightUnit }] : []
		})
		return label && asked.length > 0 ? [{ entry, label, asked, name: entry.label ?? JSON.stringify(entry) }] : []
	})
	if (known.length < entries.length) {
		console.info(`No rule for ${entries.length - known.length} of net_contents.mav_lookups: no label or no figure`)
	}
	if (known.length === 0) return
	test.each(known)("look-up of a label of $name", ({ entry, label, asked }) => {
		for (const { key, what, unit } of asked) {
			const printed = typeof entry[key] === "string" ? ounces(entry[key]) : Number(entry[key])
			if (what === "mav") expect(variationOf(label, unit), key).toBeCloseTo(printed, 9)
			else expectPrinted(asNumber(coarsestDivision(exactly(variationOf(label, unit)))), printed, key)
		}
	})
}

function holdScaleRule(example: unknown): void {
	const found = [...`${example}`.matchAll(/([\d.]+) (g|lb|oz) -> ([\d.]+) \2(?:, so an? ([\d.]+) \2 division)?/g)]
	if (found.length === 0) return
	const cases = found.map(([, variation = "", unit = "", most = "", division]) => ({ variation, unit, most, division }))
	test.each(cases)("a variation of $variation $unit allows a division of $most $unit", (given) => {
		const coarsest = asNumber(coarsestDivision(exactly(given.variation)))
		const usual = asNumber(usualDivision(exactly(given.variation)))
		// The handbook gives the sixth itself, or the sixth rounded down to the scale's place.
		expect([plainDecimal(exactly(coarsest.toFixed(6))), `${usual}`]).toContain(given.most)
		expect(usual).toBe(Number(given.division ?? given.most))
		expect(usual).toBeLessThanOrEqual(coarsest)
	})
}

function holdDeclarations(cases: readonly Entry[]): void {
	if (cases.length === 0) return
	test.each(cases)("the label $label is held to $verify", (entry) => {
		const weights = `${entry.label}`.split(/,|\(|\)|\//).flatMap((part) => (part.trim() ? [weightOf(part)] : []))
		const found = verifiedDeclaration({
			inchPound: weights.find(({ unit }) => unit !== "g") ?? null,
			metric: weights.find(({ unit }) => unit === "g") ?? null,
		})
		const verify = weightOf(`${entry.verify}`)
		expect(found.verified).toBe(verify.unit === "g" ? "metric" : "inch-pound")
		expect(found.weight).toEqual(verify)
		const other = found.verified === "metric" ? found.inchPoundGrams : found.metricGrams
		if (entry.verify_g !== undefined)
			expectPrinted(asNumber(weightIn(found.weight, "g")), Number(entry.verify_g), "verify_g")
		if (entry.other_g !== undefined)
			expectPrinted(other ? asNumber(other) : Number.NaN, Number(entry.other_g), "other_g")
	})
}

function holdUnits(cases: readonly Entry[]): void {
	if (cases.length === 0) return
	test.each(cases)("an error of $error is $units units of $unit", ({ error, unit, units }) => {
		const [off, measure] = [weightOf(`${error}`), weightOf(`${unit}`)]
		expect(asNumber(inUnitsOfMeasure(weightIn(off, measure.unit), measure.amount))).toBe(units)
	})
}

function holdMoisture(moisture: Entry): void {
	const foods = Array.isArray(moisture.listed) ? moisture.listed.map(String) : []
	const named = foods.map((words) => {
		const [, food = "", percent] = /^(.+?)\s*(?:\((?!wet)|([\d.]+)\s*%|$)/.exec(words) ?? []
		return { words, food, percent: percent ? Number(percent) : null }
	})
	if (named.length > 0) {
		test.each(named)("moisture allowance: $words", ({ food, percent }) => {
			expect(moistureListing(food)).toEqual({ isListed: true, percent })
		})
	}
	if (moisture.honey_listed !== undefined) {
		test("honey has no moisture allowance set beforehand", () => {
			expect(moistureListing("honey").isListed).toBe(moisture.honey_listed)
		})
	}
	const sums = Array.isArray(moisture.arithmetic) ? (moisture.arithmetic as Entry[]) : []
	if (sums.length > 0) {
		test.each(sums.map((sum) => ({ sum, name: JSON.stringify(sum) })))("moisture arithmetic: $name", ({ sum }) => {
			const [allowanceKey = ""] = Object.keys(sum).filter((key) => /^allowance/.test(key))
			const allowance = exactly(Number(sum[allowanceKey]))
			const [resultKey = ""] = Object.keys(sum).filter((key) => /^adjusted_/.test(key))
			const base = exactly(Number(sum[resultKey.replace("adjusted_", "")] ?? sum.label_g ?? sum.label_lb))
			if (resultKey === "") {
				const places = `${sum[allowanceKey]}`.split(".")[1]?.length ?? 0
				expect(moistureAllowance(base, exactly(Number(sum.pct)), places)).toEqual(allowance)
			} else {
				const adjust = resultKey.includes("nominal") ? lessAllowance : moreAllowance
				expect(adjust(base, allowance)).toEqual(exactly(Number(sum[resultKey])))
			}
		})
	}
}

/** Makes tests of sampling plans, variations, scale divisions, declarations, units of measure, moisture and decisions. */
export function holdNetContents({ net_contents: topic }: PublishedValues): void {
	if (!topic) return
	holdPlan("sampling plan, category A", "A", topic.sampling_category_a?.rows ?? [])
	holdPlan("sampling plan, category B, never for honey", "B", topic.sampling_category_b?.rows ?? [])
	holdVariations(topic.mav_by_weight?.rows ?? [])
	holdCrossChecks(topic.mav_by_weight?.cross_checks ?? [])
	holdLookups(topic.mav_lookups ?? [])
	holdScaleRule(topic.scale_rule?.example)
	holdDeclarations(topic.larger_declaration?.cases ?? [])
	holdUnits(topic.dimensionless ?? [])
	holdMoisture(topic.moisture ?? {})
	holdNetExamples(topic.examples ?? [])
}
