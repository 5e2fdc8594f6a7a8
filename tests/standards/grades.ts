import { describe, expect, test } from "vitest"
import { colourByDensity, colourByPfund } from "~/domain/grading/colour"
import type { Fault } from "~/domain/grading/faults"
import { CALIFORNIA_BELOW_PERCENT, gradeCautions } from "~/domain/grading/grade-cautions"
import { type GradeScheme, type GradingFacts, gradeComb, schemeColour, UNGRADED } from "~/domain/grading/grade-comb"
import { schemeTemplates } from "~/domain/grading/templates"
import { moistureAdvice } from "~/domain/lots/keeping"
import { comb, hundredths, schemeOf } from "./combs"
import { holdHistoricGrades } from "./historic-grades"
import type { PublishedValues } from "./published-values"

type Grades = NonNullable<PublishedValues["comb_grades"]>

/** What the texts call what must not be there, as the product's own words. Good quality is a list of its own. */
const FAULT_WORDS: readonly [RegExp, readonly Fault[]][] = [
	[/no propolis or other stain/, ["stain"]],
	[/no travel stain/, ["travel-stain"]],
	[/not projecting/, ["projecting"]],
	[/uniform colour/, ["mixed-colour"]],
	[/evenly capped/, ["uneven"]],
	[/good quality/, ["weeping"]],
	[/pollen cells/, ["pollen-cells"]],
	[/honeydew/, ["honeydew"]],
	[/extensive granulation/, ["granulation"]],
	[/poorly ripened/, ["unripe"]],
	[/^sour/, ["sour"]],
	[/^weeping/, ["weeping"]],
	[/leaking, injured or patched/, ["leaking"]],
]

function faultsIn(words: readonly string[]): { words: string; fault: Fault }[] {
	return words.flatMap((text) => {
		if (/firmly attached/.test(text)) return []
		const found = FAULT_WORDS.find(([pattern]) => pattern.test(text))
		if (!found) console.info(`No rule yet for part of comb_grades.wisconsin: ${text}`)
		return (found?.[1] ?? []).map((fault) => ({ words: text, fault }))
	})
}

function holdWisconsin(wisconsin: NonNullable<Grades["wisconsin"]>): void {
	const scheme = schemeOf(/Wisconsin, sections/)
	const attached = Number(/(\d+(?:\.\d+)?)\s*%/.exec(wisconsin.fancy_white?.attachment ?? "")?.[1] ?? 85)
	const published = [
		{ grade: "Wisconsin Fancy White", limits: wisconsin.fancy_white },
		{ grade: "Wisconsin No. 1", limits: wisconsin.no_1 },
	]
	for (const { grade, limits } of published) {
		if (!limits) continue
		const least = {
			netOz: hundredths(limits.min_net_oz),
			grossOz: hundredths(limits.min_gross_oz),
			attachedPercent: hundredths(attached),
		}
		const graded = (facts: GradingFacts) => gradeComb(scheme, facts)

		describe(`${grade}, as published`, () => {
			test(`${limits.min_net_oz} oz net and ${limits.min_gross_oz} oz gross, ${attached} % attached, are enough`, () => {
				expect(graded(comb(least)).grade).toBe(grade)
			})
			test.each(["netOz", "grossOz", "attachedPercent"] as const)("a hundredth less of %s is not", (measure) => {
				const { grade: given, reasons } = graded(comb({ ...least, [measure]: least[measure] - 1 }))
				expect(given).not.toBe(grade)
				expect(reasons.some((reason) => reason.startsWith(`${grade}: `))).toBe(true)
			})
			test(`unsealed: ${limits.unsealed}`, () => {
				expect(limits.unsealed).toMatch(/outside row/)
				expect(graded(comb(least, { isOutsideRowOpen: true })).grade).toBe(grade)
				const oneMore = graded(comb({ ...least, unsealedCells: 100 })).grade
				if (/^only/.test(limits.unsealed)) expect(oneMore).not.toBe(grade)
				else expect(oneMore).toBe(grade)
			})
			test.each(faultsIn(limits.also ?? []))("asks for: $words", ({ fault }) => {
				expect(graded(comb(least, { faults: [fault] })).grade).not.toBe(grade)
			})
		})
	}

	const excluded = faultsIn(wisconsin.good_quality_excludes ?? [])
	if (excluded.length > 0) {
		test.each(excluded)("good quality excludes $words", ({ fault }) => {
			const heavy = { netOz: 1600, grossOz: 1700, attachedPercent: 10_000 }
			expect(gradeComb(scheme, comb(heavy, { faults: [fault] })).grade).toBe(UNGRADED)
		})
	}
	if (wisconsin.chunk) holdChunk(wisconsin.chunk)
	if (wisconsin.colour_mm_pfund) holdWisconsinColours(wisconsin.colour_mm_pfund, scheme)
	if (wisconsin.ungraded_rule) {
		test(`not sold to grade: ${wisconsin.ungraded_rule}`, () => {
			const [mark] = gradeCautions({ grade: UNGRADED, faults: [] })
			expect(mark?.words).toMatch(/“Ungraded” on each container or section and on each case/)
			const [binds] = gradeCautions({ grade: "Wisconsin No. 1", faults: [] })
			expect(binds?.words).toMatch(/part of an annual crop sells the whole crop/)
		})
	}
}

type Chunk = NonNullable<NonNullable<Grades["wisconsin"]>["chunk"]>

function holdChunk({ comb_share_of_net_weight: share, max_pieces: most, broken_pieces: broken }: Chunk): void {
	const scheme = schemeOf(/Wisconsin, chunk/)
	const [best] = scheme.grades
	const just = {
		combPercent: hundredths(share * 100),
		combPieces: hundredths(most),
		brokenPieces: hundredths(broken),
	}
	test(`chunk: ${share} of the net weight is comb, in at most ${most} pieces, ${broken} broken`, () => {
		expect(gradeComb(scheme, comb(just)).grade).toBe(best?.name)
		expect(gradeComb(scheme, comb({ ...just, combPercent: just.combPercent - 1 })).grade).toBe(UNGRADED)
		expect(gradeComb(scheme, comb({ ...just, combPieces: just.combPieces + 100 })).grade).toBe(UNGRADED)
		expect(gradeComb(scheme, comb({ ...just, brokenPieces: just.brokenPieces + 100 })).grade).toBe(UNGRADED)
	})
}

function holdWisconsinColours(colours: Record<string, string>, { colours: bands }: GradeScheme): void {
	test.each(Object.entries(colours))("the Wisconsin colour %s is %s mm", (name, words) => {
		const given = (mm: number) => schemeColour(bands, Math.round(mm * 10))?.toLowerCase()
		const [, under] = /^under (\d+(?:\.\d+)?)$/.exec(words) ?? []
		const [, from, to] = /^(\d+(?:\.\d+)?) to (\d+(?:\.\d+)?)$/.exec(words) ?? []
		const [, over] = /^over (\d+(?:\.\d+)?)$/.exec(words) ?? []
		expect(under ?? from ?? over, "a range that can be read").toBeDefined()
		if (under) expect([given(Number(under) - 0.1), given(Number(under)) === name]).toEqual([name, false])
		if (from && to) {
			expect([given(Number(from)), given(Number(to))]).toEqual([name, name])
			expect([given(Number(from) - 0.1), given(Number(to) + 0.1)]).not.toContain(name)
		}
		if (over) expect([given(Number(over) + 0.1), given(Number(over)) === name]).toEqual([name, false])
	})
}

type Band = NonNullable<NonNullable<Grades["usda_colour_mm_pfund"]>["bands"]>[number]

function holdUsdaColours(bands: readonly Band[]): void {
	test.each(bands)("$name is over $over to $to mm", ({ name, over, to, optical_density_max: density }) => {
		const tenths = (mm: number) => Math.round(mm * 10)
		if (over !== null) {
			expect(colourByPfund(tenths(over) + 1)).toBe(name)
			expect(colourByPfund(tenths(over))).not.toBe(name)
		}
		if (to !== null) {
			expect(colourByPfund(tenths(to))).toBe(name)
			expect(colourByPfund(tenths(to) - 1)).toBe(name)
			expect(colourByPfund(tenths(to) + 1)).not.toBe(name)
		}
		if (density !== undefined) {
			expect(colourByDensity(Math.round(density * 10_000))).toBe(name)
			expect(colourByDensity(Math.round(density * 10_000) + 1)).not.toBe(name)
		}
	})
}

function holdUsda1967(usda: NonNullable<Grades["usda_comb_1967"]>): void {
	if (!usda.do_not_assert) {
		console.info("No rule yet for comb_grades.usda_comb_1967: its limits were never verified")
		return
	}
	test("the names of USDA 1967 are offered without limits, and say so", () => {
		const template = schemeTemplates.find(({ name }) => /USDA 1967/.test(name))
		expect(template?.isVerified).toBe(false)
		expect(template?.scheme.grades.map(({ limits }) => limits)).toEqual(template?.scheme.grades.map(() => ({})))
		expect(template?.scheme.source).toMatch(/not verified/)
	})
}

function holdCalifornia(california: NonNullable<Grades["california"]>): void {
	const { crystallised_comb: marked, moisture_max_pct: water, extracted_lot_tolerance_pct_by_count: below } = california
	if (marked) {
		test(`California: crystallised comb ${marked}`, () => {
			const word = /crystalli[sz]ed/.exec(marked)?.[0] ?? ""
			const cautions = gradeCautions({ grade: UNGRADED, faults: ["granulation"] })
			expect(word).not.toBe("")
			expect(cautions.some(({ words }) => words.includes("placard") && words.includes(`“${word}”`))).toBe(true)
		})
	}
	if (water !== undefined) {
		test(`California: at most ${water} % of water`, () => {
			expect(moistureAdvice(Math.round(water * 10))?.source ?? "").not.toMatch(/Cal\./)
			expect(moistureAdvice(Math.round(water * 10) + 1)).toMatchObject({
				isOverLimit: true,
				source: expect.stringMatching(/Cal\./),
			})
		})
	}
	if (below !== undefined) {
		test(`California: ${below} % by count may be below grade`, () => {
			expect(CALIFORNIA_BELOW_PERCENT).toBe(below)
			const scheme = { ...schemeOf(/Wisconsin, sections/), belowPercent: below }
			const heavy = { netOz: 1300, grossOz: 1400, attachedPercent: 9000 }
			const graded = (piecesBelow: number) => gradeComb(scheme, comb(heavy, { piecesSeen: 1000, piecesBelow })).grade
			expect(graded(below * 10)).toBe("Wisconsin Fancy White")
			expect(graded(below * 10 + 1)).toBe(UNGRADED)
		})
	}
}

/** Makes tests of each published grade, colour name and rule of marking. */
export function holdGrades({ comb_grades: grades }: PublishedValues): void {
	if (!grades) return
	if (grades.wisconsin) describe("Wisconsin grades", () => holdWisconsin(grades.wisconsin as never))
	if (grades.usda_comb_1967) describe("USDA 1967", () => holdUsda1967(grades.usda_comb_1967 as never))
	const bands = grades.usda_colour_mm_pfund?.bands ?? []
	if (bands.length > 0) describe("USDA honey colours", () => holdUsdaColours(bands))
	if (grades.california) describe("California", () => holdCalifornia(grades.california as never))
	if (grades.historic && grades.historic.length > 0) {
		describe("historic grades", () => holdHistoricGrades(grades.historic ?? []))
	}
}
