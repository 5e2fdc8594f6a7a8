import { type VerifiedDeclaration, verifiedDeclaration } from "../labelling/verified-declaration"
import type { Result } from "../result"
import { allowableVariation, coarsestDivision } from "./allowable-variation"
import { decideLot, inUnitsOfMeasure, type LotDecision } from "./decide-lot"
import {
	compare,
	decimalText,
	exactly,
	type Fraction,
	largest,
	meanOf,
	minus,
	over,
	plainDecimal,
	plus,
	smallest,
	ZERO,
} from "./fraction"
import { type SamplingPlan, samplingPlan } from "./sampling-plan"
import { type Weight, type WeightUnit, weightIn } from "./weight-units"

/** A weight as decimal text with its unit, for what is stored. */
export type WrittenWeight = { amount: string; unit: WeightUnit }

type WrittenLabel = { inchPound: WrittenWeight | null; metric: WrittenWeight | null }

/** What was weighed. Weights are decimal text in `unit`; packages stand in the order in which they were drawn. */
export type NetContentsInput = {
	/** Packages in the lot that is judged. */
	lotPackages: number
	label: WrittenLabel
	unit: WeightUnit
	/** The division of the scale, in `unit`; null when it was not given. */
	division: string | null
	tare: { kind: "entered"; weight: string } | { kind: "weighed"; weights: string[] }
	/** Full packages; a package of random weight brings its own label. */
	packages: { gross: string; label?: WrittenLabel }[]
}

/** One line of the worksheet; figures in the unit of the check, `units` in units of measure. */
export type PackageLine = {
	gross: string
	nominalGross: string
	error: string
	units: string | null
	isTooShort: boolean
	/** Short by exactly the variation, which counts as within it. */
	isJustWithin: boolean
}

/** Every step to the decision, as decimal text, as it would stand on paper. */
export type NetContentsWorksheet = {
	unit: WeightUnit
	plan: Omit<SamplingPlan, "to"> & { to: number | null }
	/** Null when every package carries its own label. */
	verified: {
		declaration: VerifiedDeclaration["verified"]
		weight: WrittenWeight
		target: string
		inchPoundGrams: string | null
		metricGrams: string | null
		isRaised: boolean
	} | null
	/** The largest of the packages' variations where they differ. */
	variation: string
	coarsestDivision: string
	division: string | null
	isDivisionFine: boolean | null
	unitOfMeasure: string | null
	tares: string[]
	averageTare: string
	isTareEntered: boolean
	/** Ranges in the first packages, where their tares were weighed and more might have to be. */
	ranges: { errors: string; tares: string; ratio: string | null } | null
	packages: PackageLine[]
	total: string
	average: string
	deviation: string | null
	limit: string | null
	tooShort: number
	isVariationMet: boolean
	isAverageAsked: boolean
	isAverageMet: boolean
	isAverageAtLimit: boolean
	hasPassed: boolean
}

export type NetContentsRefusal =
	| { ok: false; reason: "no-label" | "over-the-table" | "no-packages" }
	| { ok: false; reason: "sample-size"; needed: number; given: number }
	| { ok: false; reason: "too-few-tares"; needed: number; given: number }
	| { ok: false; reason: "tare-too-heavy" | "not-a-weight"; places: number[] }

const weightOf = ({ amount, unit }: WrittenWeight): Weight => ({ amount: exactly(amount), unit })

/** Six decimals at most: enough for a thousandth of a gram in pounds. */
const figure = (value: Fraction) => plainDecimal(value, 6)

type Target = { declared: VerifiedDeclaration; target: Fraction; variation: Fraction }

function targetOf(label: WrittenLabel, unit: WeightUnit): Result<{ target: Target }, NetContentsRefusal> {
	const { inchPound, metric } = label
	if (!inchPound && !metric) return { ok: false, reason: "no-label" }
	const declared = verifiedDeclaration({
		inchPound: inchPound && weightOf(inchPound),
		metric: metric && weightOf(metric),
	})
	const found = allowableVariation(declared.weight, unit)
	if (!found.ok) return found
	return { ok: true, target: { declared, target: weightIn(declared.weight, unit), variation: found.variation } }
}

/** The smallest decimal place of a scale: 0.001 lb where its division is 0.002 lb. */
function unitOfMeasure(division: string): Fraction {
	return exactly(`1e-${division.split(".")[1]?.length ?? 0}`)
}

/**
 * Range of the errors and range of the tares of the first packages, and their ratio, which picks in the handbook how many
 * tares are opened in all (its table is not at hand). Source: NIST Handbook 133 (2026), 2.3.5.
 */
export function tareRanges(net: readonly Fraction[], tares: readonly Fraction[]) {
	const errors = minus(largest(net), smallest(net))
	const range = minus(largest(tares), smallest(tares))
	return { errors, tares: range, ratio: compare(range, ZERO) === 0 ? null : over(errors, range) }
}

function refusalOf(input: NetContentsInput, plan: SamplingPlan, averageTare: Fraction): NetContentsRefusal | null {
	const gross = input.packages.map(({ gross }) => exactly(gross))
	const placesWhere = (holds: (weight: Fraction) => boolean) =>
		gross.flatMap((weight, place) => (holds(weight) ? [place] : []))
	const none = placesWhere((weight) => compare(weight, ZERO) <= 0)
	if (none.length > 0) return { ok: false, reason: "not-a-weight", places: none }
	if (gross.length !== plan.sample)
		return { ok: false, reason: "sample-size", needed: plan.sample, given: gross.length }
	const weighed = input.tare.kind === "weighed" ? input.tare.weights.length : plan.tares
	if (weighed < plan.tares) return { ok: false, reason: "too-few-tares", needed: plan.tares, given: weighed }
	const light = placesWhere((weight) => compare(weight, averageTare) <= 0)
	return light.length > 0 ? { ok: false, reason: "tare-too-heavy", places: light } : null
}

/**
 * The check of the net contents of a lot, step by step: plan by lot size, which declaration is verified, average tare,
 * nominal gross weight, the error of every package, both tests, the decision. Refused when there is no label, the label is
 * beyond the table, the packages or tares are not as many as the plan asks for, or a package is no heavier than its tare.
 * Source: NIST Handbook 133 (2026), 2.3.3 to 2.3.7, category A; no allowance for moisture is made.
 */
export function judgeNetContents(
	input: NetContentsInput,
): Result<{ worksheet: NetContentsWorksheet }, NetContentsRefusal> {
	if (!Number.isSafeInteger(input.lotPackages) || input.lotPackages < 1) return { ok: false, reason: "no-packages" }
	const plan = samplingPlan(input.lotPackages)
	const tares = (input.tare.kind === "weighed" ? input.tare.weights : [input.tare.weight]).map(exactly)
	if (tares.length === 0) return { ok: false, reason: "too-few-tares", needed: plan.tares, given: 0 }
	const averageTare = meanOf(tares)
	const refusal = refusalOf(input, plan, averageTare)
	if (refusal) return refusal

	const targets: Target[] = []
	for (const { label = input.label } of input.packages) {
		const found = targetOf(label, input.unit)
		if (!found.ok) return found
		targets.push(found.target)
	}
	const gross = input.packages.map((each) => exactly(each.gross))
	const nominal = targets.map(({ target }) => plus(averageTare, target))
	const errors = gross.map((weight, place) => minus(weight, nominal[place] ?? ZERO))
	const variations = targets.map(({ variation }) => variation)
	const { correctionFactor, shortAllowed } = plan
	const decision = decideLot({ errors, variations, shortAllowed, correctionFactor })
	const labelled = input.packages.some(({ label }) => label) ? null : (targets[0] ?? null)
	return {
		ok: true,
		worksheet: {
			...headOf(input, plan, labelled, largest(variations)),
			tares: tares.map(figure),
			averageTare: figure(averageTare),
			isTareEntered: input.tare.kind === "entered",
			ranges: input.tare.kind === "weighed" && plan.sample >= 12 ? rangesOf(errors, tares) : null,
			packages: linesOf({ input, gross, nominal, errors, decision }),
			...verdictOf(decision),
		},
	}
}

function headOf(input: NetContentsInput, plan: SamplingPlan, labelled: Target | null, variation: Fraction) {
	const coarsest = coarsestDivision(variation)
	const { division, unit } = input
	return {
		unit,
		plan: { ...plan, to: Number.isFinite(plan.to) ? plan.to : null },
		verified: labelled && {
			declaration: labelled.declared.verified,
			weight: { amount: figure(labelled.declared.weight.amount), unit: labelled.declared.weight.unit },
			target: figure(labelled.target),
			inchPoundGrams: labelled.declared.inchPoundGrams && figure(labelled.declared.inchPoundGrams),
			metricGrams: labelled.declared.metricGrams && figure(labelled.declared.metricGrams),
			isRaised: labelled.declared.isRaised,
		},
		variation: figure(variation),
		coarsestDivision: figure(coarsest),
		division,
		isDivisionFine: division === null ? null : compare(exactly(division), coarsest) <= 0,
		unitOfMeasure: division === null ? null : figure(unitOfMeasure(division)),
	}
}

function rangesOf(errors: readonly Fraction[], tares: readonly Fraction[]) {
	const ranges = tareRanges(errors.slice(0, tares.length), tares)
	return {
		errors: figure(ranges.errors),
		tares: figure(ranges.tares),
		ratio: ranges.ratio && decimalText(ranges.ratio, 2),
	}
}

function linesOf(sheet: {
	input: NetContentsInput
	gross: readonly Fraction[]
	nominal: readonly Fraction[]
	errors: readonly Fraction[]
	decision: LotDecision
}): PackageLine[] {
	const { division } = sheet.input
	return sheet.errors.map((error, place) => ({
		gross: figure(sheet.gross[place] ?? ZERO),
		nominalGross: figure(sheet.nominal[place] ?? ZERO),
		error: figure(error),
		units: division === null ? null : plainDecimal(inUnitsOfMeasure(error, unitOfMeasure(division)), 3),
		isTooShort: sheet.decision.tooShort.includes(place),
		isJustWithin: sheet.decision.justWithin.includes(place),
	}))
}

function verdictOf(decision: LotDecision) {
	const root = (value: number | null) => (value === null ? null : `${Number(value.toFixed(6))}`)
	return {
		total: figure(decision.total),
		average: figure(decision.average),
		deviation: root(decision.deviation),
		limit: root(decision.limit),
		tooShort: decision.tooShort.length,
		isVariationMet: decision.variationMet,
		isAverageAsked: decision.isAverageAsked,
		isAverageMet: decision.averageMet,
		isAverageAtLimit: decision.isAverageAtLimit,
		hasPassed: decision.isMet,
	}
}
