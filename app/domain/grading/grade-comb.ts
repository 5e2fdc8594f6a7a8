import { type Fault, faults } from "./faults"
import { type Measure, measureNames, measures, measureWords } from "./measures"

/** Forms of comb that a scheme can cover: those of products. */
export const combForms = ["round", "basswood", "clear-box", "cut-comb", "half-piece", "chunk", "frame"] as const
export type CombForm = (typeof combForms)[number]

/** One grade of a scheme: what it asks for. A measure without a limit is not asked. */
export type GradeRule = {
	name: string
	/** Hundredths of each measure's unit; whether it is the least or the most, the measure says. */
	limits: Partial<Record<Measure, number>>
	/** Whether the row of cells next to the wood may be unsealed. */
	outsideRowMayBeOpen: boolean
	/** What must not be seen. */
	excludes: Fault[]
	/** Names of the scheme's colour bands that the grade takes; empty takes any. */
	colours: string[]
}

/** A colour name of a scheme: from the end of the band before it, up to and with (or, `isUnder`, just under) a reading. */
export type SchemeColour = { name: string; toPfundTenths: number | null; isUnder: boolean }

/** A case of sections weighed together: the least net weight in whole pounds, by how the sections were separated. */
export type CaseRule = { pieces: number; leastNetLb: Record<Separators, number> }
export type Separators = "separators" | "half" | "none"

/** A grade scheme as data: a published one, or a producer's own. Grades stand best first. */
export type GradeScheme = {
	/** Where the limits come from, and how sure they are. */
	source: string
	forms: CombForm[]
	grades: GradeRule[]
	colours: SchemeColour[]
	caseRule: CaseRule | null
	/** Pieces of a lot that may be below its grade, in percent by count. */
	belowPercent: number
}

/** What was seen on a lot. What was not looked at is left out, and is then not known to be met. */
export type GradingFacts = {
	/** Hundredths of each measure's unit. */
	measured: Partial<Record<Measure, number>>
	isOutsideRowOpen: boolean
	faults: Fault[]
	pfundTenths: number | null
	/** The net weight of a case, in hundredths of a pound, and how its sections were separated. */
	caseWeighed: { hundredthsLb: number; separators: Separators } | null
	piecesSeen: number
	/** Of those, how many are below what is written above. */
	piecesBelow: number
}

export type Grading = {
	/** A grade of the scheme, or "Ungraded". */
	grade: string
	/** Every reason why no better grade was given, as sentences. */
	reasons: string[]
	/** The scheme's own name of the colour, where it has one and there is a reading. */
	colour: string | null
}

/** What is not sold to a grade. Source: Wis. Admin. Code ATCP 87.07. */
export const UNGRADED = "Ungraded"

/** The scheme's name for a colour: the first band that the reading in tenths of a millimetre Pfund lies in. */
export function schemeColour(colours: readonly SchemeColour[], pfundTenths: number): string | null {
	const band = colours.find(
		({ toPfundTenths: to, isUnder }) => to === null || (isUnder ? pfundTenths < to : pfundTenths <= to),
	)
	return band?.name ?? null
}

/**
 * The grade of a lot: the best grade of the scheme whose every limit is met, with one sentence for each thing that kept
 * it from a better one; "Ungraded" when none is met. What was not measured does not meet a limit. The worst piece looked
 * at is what is written down, but for the share of pieces by count that the scheme lets be below it.
 */
export function gradeComb(scheme: GradeScheme, facts: GradingFacts): Grading {
	const colour = facts.pfundTenths === null ? null : schemeColour(scheme.colours, facts.pfundTenths)
	const lot = lotReasons(scheme, facts)
	const reasons: string[] = []
	for (const rule of scheme.grades) {
		const missed = [...ruleReasons(rule, facts, colour), ...lot.map((reason) => `${rule.name}: ${reason}`)]
		if (missed.length === 0) return { grade: rule.name, reasons, colour }
		reasons.push(...missed)
	}
	return { grade: UNGRADED, reasons, colour }
}

function ruleReasons(rule: GradeRule, facts: GradingFacts, colour: string | null): string[] {
	const found = [
		...measureNames.map((measure) => limitReason(rule, measure, facts.measured[measure])),
		facts.isOutsideRowOpen && !rule.outsideRowMayBeOpen && "the row next to the wood must be sealed.",
		...rule.excludes
			.filter((fault) => facts.faults.includes(fault))
			.map((fault) => `${faults[fault].toLowerCase()} was seen.`),
		colourReason(rule, colour),
	]
	return found.filter((reason) => typeof reason === "string").map((reason) => `${rule.name}: ${reason}`)
}

function limitReason(rule: GradeRule, measure: Measure, measured: number | undefined): string | null {
	const limit = rule.limits[measure]
	if (limit === undefined) return null
	const { label, side } = measures[measure]
	const asked = `at ${side} ${measureWords(measure, limit)}`
	const what = label.charAt(0).toLowerCase() + label.slice(1)
	if (measured === undefined) return `${what} must be ${asked}, and was not measured.`
	const isMet = side === "least" ? measured >= limit : measured <= limit
	return isMet ? null : `${what} must be ${asked}, and is ${measureWords(measure, measured)}.`
}

function colourReason(rule: GradeRule, colour: string | null): string | null {
	if (rule.colours.length === 0 || (colour !== null && rule.colours.includes(colour))) return null
	const asked = `the colour must be ${rule.colours.join(" or ")}`
	return colour === null ? `${asked}, and there is no Pfund reading.` : `${asked}, and is ${colour}.`
}

/** What keeps a lot as a whole out of every grade of its scheme. */
function lotReasons({ caseRule, belowPercent }: GradeScheme, facts: GradingFacts): string[] {
	const reasons: string[] = []
	if (facts.piecesBelow * 100 > facts.piecesSeen * belowPercent) {
		const share = belowPercent === 0 ? "none" : `at most ${belowPercent} % by count`
		reasons.push(`${facts.piecesBelow} of ${facts.piecesSeen} pieces are below it, and ${share} may be. Sort them out.`)
	}
	if (caseRule && !facts.caseWeighed) reasons.push(`a case of ${caseRule.pieces} must be weighed, and was not.`)
	if (caseRule && facts.caseWeighed) {
		const least = caseRule.leastNetLb[facts.caseWeighed.separators]
		if (facts.caseWeighed.hundredthsLb < least * 100) {
			const weighed = facts.caseWeighed.hundredthsLb / 100
			reasons.push(`a case of ${caseRule.pieces} must weigh at least ${least} lb net, and weighs ${weighed} lb.`)
		}
	}
	return reasons
}
