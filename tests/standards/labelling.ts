import { describe, expect, test } from "vitest"
import { netDeclaration, RANDOM_WEIGHT_DECIMALS } from "~/domain/labelling/net-declaration"
import {
	BOTTOM_PERCENT,
	FREE_PANEL_SQUARE_INCHES,
	inchWords,
	isFreeOfPlace,
	leastTypeSixteenths,
	type Panel,
	panelArea,
} from "~/domain/labelling/type-size"
import { centsPerOunce, centsPerPound, unitPriceWords } from "~/domain/labelling/unit-price"
import { plainMoney, weighedPriceCents } from "~/domain/money"
import { asNumber, decimalText, exactly, over, plus } from "~/domain/scale/fraction"
import { labelledGrams } from "~/domain/weight"
import type { PublishedValues } from "./published-values"
import type { Entry } from "./scale-shapes"

/** A decimal text as a whole number of the given places: "1.125" to three places is 1125. */
function whole(decimal: string, places: number): number {
	const [units = "", part = ""] = decimal.split(".")
	if (part.replace(/0+$/, "").length > places) throw new Error(`${decimal} has more than ${places} places`)
	return Number(units + part.slice(0, places).padEnd(places, "0"))
}

function holdTypeSizes(rows: readonly Entry[]): void {
	if (rows.length === 0) return
	test.each(rows)("panels over $pdp_over_sq_in to $pdp_to_sq_in square inches: $min_height_in inch", (row) => {
		const heightAt = (area: string) => inchWords(leastTypeSixteenths(exactly(area)))
		const [above, to] = [Number(row.pdp_over_sq_in ?? 0), row.pdp_to_sq_in ?? null]
		expect(heightAt(decimalText(plus(exactly(above), exactly("0.0001")), 4))).toBe(row.min_height_in)
		if (above > 0) expect(heightAt(`${above}`)).not.toBe(row.min_height_in)
		if (to !== null) {
			expect(heightAt(`${to}`)).toBe(row.min_height_in)
			expect(heightAt(`${Number(to) + 0.0001}`)).not.toBe(row.min_height_in)
		} else expect(heightAt(`${above * 100}`)).toBe(row.min_height_in)
	})
}

/** A panel as described: "4.25 x 4.25 in", "cylinder 4.25 in diameter x 1.5 in high", "other shape, surface 60 sq in". */
function panelOf(words: string): Panel | null {
	const figures = (words.split(":")[0] ?? "").match(/\d+(?:\.\d+)?/g)?.map(exactly) ?? []
	const [first, second] = figures
	if (!first) return null
	if (/surface|other/i.test(words) && !second) return { shape: "other", surface: first }
	if (!second) return null
	if (!/cylind|round|diameter/i.test(words)) return { shape: "rectangle", width: first, height: second }
	const isHeightFirst = /^[^\d]*[\d.]+\s*(?:in\s*)?high/i.test(words)
	return { shape: "cylinder", diameter: isHeightFirst ? second : first, height: isHeightFirst ? first : second }
}

function holdPanels(examples: readonly Entry[]): void {
	const known = examples.flatMap((entry) => {
		const panel = panelOf(`${entry.panel}`)
		return panel ? [{ ...entry, panel, words: entry.panel }] : []
	})
	if (known.length < examples.length) console.info("No rule for part of labelling.pdp_examples: a panel not described")
	if (known.length === 0) return
	test.each(known as (Entry & { panel: Panel })[])("panel $words: $area square inches, $min_type inch", (entry) => {
		const area = panelArea(entry.panel)
		const places = `${entry.area}`.split(".")[1]?.length ?? 0
		expect(Number(decimalText(area, places))).toBe(entry.area)
		expect(inchWords(leastTypeSixteenths(area))).toBe(entry.min_type)
		expect(isFreeOfPlace(area)).toBe(Number(entry.area) <= FREE_PANEL_SQUARE_INCHES)
	})
}

function holdPlacement(placement: Entry): void {
	if (placement.zone === undefined) return
	test("the net weight stands in the lower part of the panel", () => {
		expect(`${placement.zone}`).toContain(`${BOTTOM_PERCENT}%`)
		expect(FREE_PANEL_SQUARE_INCHES).toBe(placement.exempt_pdp_sq_in ?? FREE_PANEL_SQUARE_INCHES)
	})
}

function holdDeclarations(declarations: readonly { net_oz: number; text: string }[], terms: Entry): void {
	if (declarations.length === 0) return
	test.each(declarations)("a label of $net_oz oz reads $text", ({ net_oz, text }) => {
		expect(netDeclaration(net_oz)).toBe(text)
		const [, grams] = /(\d+) g\b/.exec(text) ?? []
		if (grams) expect(labelledGrams(net_oz)).toBe(Number(grams))
	})
	const { abbreviations } = terms
	if (Array.isArray(abbreviations)) {
		test.each(declarations)("the label of $net_oz oz uses no other abbreviation", ({ net_oz }) => {
			const words = netDeclaration(net_oz).match(/[A-Z]+/g) ?? []
			for (const word of words.filter((each) => each !== "NET")) expect(abbreviations).toContain(word.toLowerCase())
		})
	}
}

function holdUnitPrices(examples: readonly Entry[]): void {
	if (examples.length === 0) return
	test.each(examples)("$price for $net_oz oz", (entry) => {
		const cents = whole(`${entry.price}`, 2)
		const ounce = centsPerOunce(cents, Number(entry.net_oz))
		const pound = centsPerPound(cents, Number(entry.net_oz))
		const exact = `${entry.per_oz_cents_exact ?? ""}`
		const checks: [unknown, string][] = [
			[entry.per_oz_cents_exact, decimalText(ounce, exact.split(".")[1]?.length ?? 0)],
			[entry.tenth, decimalText(ounce, 1)],
			[entry.whole, decimalText(ounce, 0)],
			[entry.per_oz, decimalText(over(ounce, exactly(100)), 2)],
			[entry.per_lb, decimalText(over(pound, exactly(100)), 2)],
		]
		expect(checks.some(([printed]) => printed !== undefined)).toBe(true)
		for (const [printed, found] of checks) if (printed !== undefined) expect(found).toBe(`${printed}`)
		const isUnderADollar = asNumber(ounce) < 100
		expect(unitPriceWords(ounce)).toBe(
			isUnderADollar ? `${decimalText(ounce, 1)}¢` : `$${decimalText(over(ounce, exactly(100)), 2)}`,
		)
		if (entry.whole !== undefined) expect(unitPriceWords(ounce, "whole")).toBe(`${entry.whole}¢`)
	})
}

/** Makes tests of type sizes, panels, declarations, unit prices and of weight times price. */
export function holdLabelling({ labelling }: PublishedValues): void {
	if (!labelling) return
	describe("labels", () => {
		holdTypeSizes(labelling.type_size ?? [])
		holdPlacement(labelling.placement ?? {})
		holdPanels(labelling.pdp_examples ?? [])
		holdDeclarations(labelling.declarations ?? [], labelling.terms ?? {})
		holdUnitPrices(labelling.unit_price?.examples ?? [])
		const random = labelling.random_package
		if (random?.cfr_decimals_lb !== undefined) {
			test("a random weight has no more decimals than either rule allows", () => {
				const allowed = [random.cfr_decimals_lb, random.fpla_decimals_lb].flatMap((each) => each ?? [])
				expect(RANDOM_WEIGHT_DECIMALS).toBe(Math.min(...allowed.map(Number)))
			})
		}
	})

	const prices = labelling.computed_price?.examples ?? []

	if (prices.length > 0) {
		describe("weight times price", () => {
			test.each(prices)("$weight lb at $unit_price a pound is $half_up", ({ weight, unit_price, half_up }) => {
				expect(plainMoney(weighedPriceCents(whole(weight, 3), "lb/1000", whole(unit_price, 2)))).toBe(half_up)
			})
		})
	}
}
