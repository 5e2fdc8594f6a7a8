import { describe, expect, test } from "vitest"
import { verifiedDeclaration } from "~/domain/labelling/verified-declaration"
import { allowableVariation } from "~/domain/scale/allowable-variation"
import { decideLot } from "~/domain/scale/decide-lot"
import { asNumber, exactly, type Fraction, meanOf, minus, plus } from "~/domain/scale/fraction"
import { tareRanges } from "~/domain/scale/net-contents"
import { samplingPlan } from "~/domain/scale/sampling-plan"
import { parseWeight, type Weight, type WeightUnit, weightIn } from "~/domain/scale/weight-units"
import type { Entry } from "./scale-shapes"

const UNITS = ["g", "lb", "oz"] as const

/** What an example says under a name, with or without its unit: errors, errors_g, gross_lb. */
function given(entry: Entry, ...names: string[]): { value: unknown; unit: WeightUnit | null } | null {
	for (const name of names) {
		if (entry[name] !== undefined && entry[name] !== null) return { value: entry[name], unit: null }
		const unit = UNITS.find((each) => entry[`${name}_${each}`] !== undefined)
		if (unit) return { value: entry[`${name}_${unit}`], unit }
	}
	return null
}

const numbers = (value: unknown) => (Array.isArray(value) ? value : [value]).map((each) => exactly(Number(each)))

/** The weights of a label in words: "12 oz (340 g)" is two, "1 lb 8 oz" one. */
function labelWeights(text: string): Weight[] {
	return text.split(/[(),/]/).flatMap((part) => {
		const read = /\d/.test(part) ? parseWeight(part.replace(/net wt\.?/i, ""), "g") : null
		return read?.ok ? [read.weight] : []
	})
}

/** The unit an example is worked in, and how large that unit is: "0.001 lb" is a thousandth of a pound. */
function unitOf(example: Entry): { unit: WeightUnit; size: Fraction } {
	const named = typeof example.unit === "string" ? /^([\d.]*)\s*(g|oz|lb)$/.exec(example.unit) : null
	if (named) return { unit: named[2] as WeightUnit, size: exactly(named[1] || "1") }
	const unit = given(example, "errors", "gross", "label", "label_used", "tare_sample")?.unit
	const used = UNITS.find((each) => example[`label_${each}_used`] !== undefined)
	return { unit: unit ?? used ?? "g", size: exactly(1) }
}

/** Of two declarations the one that is verified. */
function larger(weights: readonly Weight[]): Weight {
	return verifiedDeclaration({
		inchPound: weights.find((weight) => weight.unit !== "g") ?? null,
		metric: weights.find((weight) => weight.unit === "g") ?? null,
	}).weight
}

/** The labelled weight of each package; one for all, or one each. Null when the example leaves labels out. */
function labelsOf(example: Entry, unit: WeightUnit): Weight[] | null {
	const used = UNITS.find((each) => example[`label_${each}_used`] !== undefined)
	if (used) return [{ amount: exactly(Number(example[`label_${used}_used`])), unit: used }]
	const declared = UNITS.flatMap((each) => {
		const figure = example[`label_${each}`]
		return typeof figure === "number" ? [{ amount: exactly(figure), unit: each }] : []
	})
	if (declared.length > 1) return [larger(declared)]
	const found = given(example, "labels", "label", "labelled", "declared", "target")
	if (!found) return null
	const each = Array.isArray(found.value) ? found.value : [found.value]
	return each.map((label) => {
		if (typeof label !== "string" || /^[\d.]+$/.test(label))
			return { amount: exactly(Number(label)), unit: found.unit ?? unit }
		return larger(labelWeights(label))
	})
}

type Worked = {
	errors: Fraction[]
	averageTare: Fraction | null
	nominal: Fraction[]
	labels: Weight[] | null
	unit: WeightUnit
	size: Fraction
}

/** The package errors of an example: as given, or from gross weights, tare and label. Null when neither is there. */
function work(example: Entry): Worked | null {
	const { unit, size } = unitOf(example)
	const labels = labelsOf(example, unit)
	const tares = given(example, "tare_sample", "tares", "tare_weights")
	const tare = given(example, "average_tare", "tare")
	const averageTare = tares ? meanOf(numbers(tares.value)) : tare ? meanOf(numbers(tare.value)) : null
	const targets = labels?.map((label) => weightIn(label, unit)) ?? []
	const printedNominal = given(example, "nominal_gross")
	const nominal =
		averageTare && labels
			? targets.map((target) => plus(averageTare, target))
			: printedNominal
				? numbers(printedNominal.value)
				: []
	const [only] = nominal
	const base = { averageTare, nominal, labels, unit, size }

	const gross = given(example, "gross", "gross_weights")
	if (gross && only) {
		return { ...base, errors: numbers(gross.value).map((weight, place) => minus(weight, nominal[place] ?? only)) }
	}
	const net = given(example, "net", "net_weights")
	const [target] = targets
	if (net && target) {
		return { ...base, errors: numbers(net.value).map((weight, place) => minus(weight, targets[place] ?? target)) }
	}
	const errors = given(example, "errors", "package_errors")
	return errors ? { ...base, errors: numbers(errors.value) } : null
}

/** The variation of each package in the unit of the example: as given, or from the table by its label. */
function variationsOf(example: Entry, { labels, unit, size }: Worked): Fraction | Fraction[] {
	const printed = given(example, "mav", "mavs") ?? given((example.expected ?? {}) as Entry, "mav", "mavs")
	const fromTable = (labels ?? []).map((label) => {
		const found = allowableVariation(label, unit)
		if (!found.ok) throw new Error(`no variation for the label of ${example.id}`)
		return { top: found.variation.top * size.bottom, bottom: found.variation.bottom * size.top }
	})
	if (printed && fromTable.length > 0) {
		const figures = numbers(printed.value).map(asNumber)
		for (const [place, figure] of figures.entries()) {
			expect(asNumber(fromTable[place] ?? (fromTable[0] as Fraction)), "mav by the table").toBeCloseTo(figure, 9)
		}
	}
	const all = printed ? numbers(printed.value) : fromTable
	const [only] = all
	if (!only) throw new Error(`example ${example.id} gives neither a variation nor a label`)
	return all.length === 1 ? only : all
}

/** Holds a figure to half of the last place printed. */
function expectNear(found: number | null, printed: unknown, what: string): void {
	if (printed === null) {
		expect(found, what).toBeNull()
		return
	}
	const figure = Number(printed)
	const places = `${figure}`.split(".")[1]?.length ?? 0
	// A figure of one place or none may have lost zeros at its end: it is held to three.
	const slack = 0.5 * 10 ** -(places >= 2 ? places : 3) + 1e-9
	expect(Math.abs((found ?? Number.NaN) - figure), `${what}: ${found} for ${figure}`).toBeLessThanOrEqual(slack)
}

const passWords = (met: boolean) => (met ? "pass" : "fail")

function expectWorked(example: Entry, worked: Worked): void {
	if (example.average_tare_g !== undefined)
		expectNear(worked.averageTare && asNumber(worked.averageTare), example.average_tare_g, "tare")
	const nominal = given(example, "nominal_gross")
	if (nominal) {
		for (const [place, printed] of [nominal.value].flat().entries()) {
			expectNear(asNumber(worked.nominal[place] as Fraction), printed, "nominal gross")
		}
	}
	const errors = given(example, "errors")
	if (errors) {
		expect(worked.errors).toHaveLength(numbers(errors.value).length)
		for (const [place, printed] of [errors.value].flat().entries()) {
			expectNear(asNumber(worked.errors[place] as Fraction), printed, `error ${place + 1}`)
		}
	}
	const pair = example.initial_pair as Entry | undefined
	const tares = given(example, "tare_sample", "tares")
	if (pair && tares) {
		const ranges = tareRanges(numbers(pair.net), numbers(tares.value))
		expectNear(asNumber(ranges.errors), pair.Rc, "Rc")
		expectNear(asNumber(ranges.tares), pair.Rt, "Rt")
		expectNear(ranges.ratio && asNumber(ranges.ratio), pair.ratio ?? null, "Rc/Rt")
	}
}

/** A requirement as printed: pass or fail, or that it is not asked for. */
function expectRequirement(isAsked: boolean, isMet: boolean, printed: unknown, what: string): void {
	const isLeftOut = printed === null || /not|n\/a|none|skip/i.test(`${printed}`)
	if (isLeftOut) expect(isAsked, what).toBe(false)
	else expect(passWords(isMet), what).toBe(`${printed}`.toLowerCase())
}

/** The plan of the lot's size; where that is left out, the one that asks for as many packages as were weighed. */
function planOf(example: Entry, weighed: number) {
	const category = example.category === "B" ? "B" : "A"
	if (example.lot_size !== undefined) return samplingPlan(Number(example.lot_size), category)
	const plans = [weighed, 251, 3201].map((lot) => samplingPlan(lot, category))
	const plan = plans.find(({ sample }) => sample === weighed)
	if (!plan) throw new Error(`no lot is judged by ${weighed}`)
	return plan
}

function expectExample(example: Entry): void {
	const worked = work(example)
	if (!worked) throw new Error("neither errors nor weights")
	expectWorked(example, worked)
	const expected = (example.expected ?? {}) as Entry
	const isCategoryB = example.category === "B"
	const plan = planOf(example, worked.errors.length)
	const size = example.sample_size ?? expected.n
	if (example.lot_size !== undefined) expect(worked.errors.length, "sample").toBe(plan.sample)
	if (size !== undefined) expect(worked.errors.length, "sample").toBe(size)
	const factor = "scf" in example ? example.scf : expected.scf
	if (factor !== undefined) expect(plan.correctionFactor && Number(plan.correctionFactor), "scf").toBe(factor)
	const allowed = example.ume_allowed ?? expected.ume_allowed
	if (allowed !== undefined) expect(plan.shortAllowed, "allowed").toBe(allowed)

	const decision = decideLot({
		errors: worked.errors,
		variations: variationsOf(example, worked),
		shortAllowed: plan.shortAllowed,
		correctionFactor: plan.correctionFactor,
		withoutLimit: isCategoryB,
	})
	const figures: Record<string, number | null> = {
		total_error: asNumber(decision.total),
		average_error: asNumber(decision.average),
		sample_std_dev: decision.deviation,
		s: decision.deviation,
		sample_error_limit: decision.limit,
		sel: decision.limit,
		unreasonable_minus_errors: decision.tooShort.length,
	}
	for (const [key, found] of Object.entries(figures)) if (key in expected) expectNear(found, expected[key], key)
	if ("mav_requirement" in expected) {
		expectRequirement(true, decision.variationMet, expected.mav_requirement, "variation")
	}
	if ("average_requirement" in expected) {
		expectRequirement(decision.isAverageAsked, decision.averageMet, expected.average_requirement, "average")
	}
	expect(expected.lot, "the example names its verdict").toBeDefined()
	expect(passWords(decision.isMet), "lot").toBe(`${expected.lot}`.toLowerCase())
}

/** Makes one test of each worked example, from package errors or from gross weights, tare and label. */
export function holdNetExamples(examples: readonly Entry[]): void {
	if (examples.length === 0) return
	describe("net contents of a lot", () => {
		const named = examples.map((example, place) => ({ id: example.id ?? `example ${place + 1}`, example }))
		test.each(named)("$id: every figure and the verdict", ({ example }) => expectExample(example))
	})
}
