import { expect, test } from "vitest"
import { type GradingFacts, gradeComb, type Separators } from "~/domain/grading/grade-comb"
import { comb, hundredths, schemeOf } from "./combs"
import type { PublishedValues } from "./published-values"

type Historic = NonNullable<NonNullable<PublishedValues["comb_grades"]>["historic"]>[number]

const FRACTIONS: Record<string, number> = { "one-eighth": 12.5, "three-quarters": 75, half: 50 }

/** The first fraction in words of a text, in hundredths of a percent. */
function fractionIn(text: string): number {
	const [word] = /one-eighth|three-quarters|half/.exec(text) ?? []
	if (!word) throw new Error(`no fraction that can be read in: ${text}`)
	return hundredths(FRACTIONS[word] as number)
}

const whole = { attachedPercent: 10_000, sealedPercent: 10_000, soiledPercent: 0, fullWeightPercent: 10_000 }

function holdColorado({ case_of: pieces, case_net_lb: net = {}, min_section_oz: section = 0 }: Historic): void {
	const scheme = schemeOf(/^Colorado/)
	const [best] = scheme.grades
	const keys: [string, Separators][] = [
		["separatored", "separators"],
		["half_separatored_min", "half"],
		["unseparatored_min", "none"],
	]
	const graded = (pounds: number, separators: Separators, oz = section) => {
		const facts = comb(
			{ netOz: hundredths(oz) },
			{ caseWeighed: { hundredthsLb: Math.round(pounds * 100), separators } },
		)
		return gradeComb(scheme, facts).grade === best?.name
	}
	for (const [key, separators] of keys) {
		const pounds = net[key]
		if (pounds === undefined) continue
		test(`Colorado: a case of ${pieces}, ${key}, weighs ${pounds} lb net`, () => {
			expect(scheme.caseRule?.pieces).toBe(pieces)
			expect([graded(pounds, separators), graded(pounds - 0.01, separators)]).toEqual([true, false])
		})
	}
	if (section > 0) {
		test(`Colorado: no section under ${section} oz`, () => {
			expect([graded(30, "none"), graded(30, "none", section - 0.01)]).toEqual([true, false])
		})
	}
}

function holdEastern({ fancy, no_1, no_2, no_3 }: Historic): void {
	const scheme = schemeOf(/^Eastern/)
	const graded = (measured: GradingFacts["measured"], more: Partial<GradingFacts> = {}) =>
		gradeComb(scheme, comb({ ...whole, ...measured }, more)).grade
	if (fancy) {
		test(`Eastern Fancy: ${fancy}`, () => {
			expect(graded({})).toBe("Fancy")
			if (/straight/.test(fancy)) expect(graded({}, { faults: ["crooked"] })).not.toBe("Fancy")
			if (/four sides/.test(fancy)) expect(graded({ attachedPercent: 7500 })).not.toBe("Fancy")
			expect(graded({}, { isOutsideRowOpen: true })).not.toBe("Fancy")
		})
	}
	if (no_1) {
		test(`Eastern No. 1: ${no_1}`, () => {
			const soiled = fractionIn(no_1)
			const open = { isOutsideRowOpen: true }
			expect(graded({ soiledPercent: soiled }, open)).toBe("No. 1")
			expect(graded({ soiledPercent: soiled + 1 }, open)).not.toBe("No. 1")
		})
	}
	const soiledThrough = { soiledPercent: 5000 }
	if (no_2) {
		test(`Eastern No. 2: ${no_2}`, () => {
			const sealed = fractionIn(no_2)
			expect(graded({ ...soiledThrough, sealedPercent: sealed }, { isOutsideRowOpen: true })).toBe("No. 2")
			expect(graded({ ...soiledThrough, sealedPercent: sealed - 1 }, { isOutsideRowOpen: true })).toBe("No. 3")
		})
	}
	if (no_3) {
		test(`Eastern No. 3: ${no_3}`, () => {
			const weight = fractionIn(no_3)
			const poor = { ...soiledThrough, sealedPercent: 1000 }
			expect(graded({ ...poor, fullWeightPercent: weight }, { isOutsideRowOpen: true })).toBe("No. 3")
			expect(graded({ ...poor, fullWeightPercent: weight - 1 }, { isOutsideRowOpen: true })).toBe("Ungraded")
		})
	}
}

function holdNational({ uncapped_cells_per_side_excluding_outer_row: cells = {} }: Historic): void {
	const scheme = schemeOf(/^National/)
	const names: Record<string, string> = { fancy: "Fancy", no_1: "No. 1" }
	test.each(Object.entries(cells))("National %s: up to %i uncapped cells a side", (key, most) => {
		const graded = (count: number) => gradeComb(scheme, comb({ unsealedCells: hundredths(count) })).grade
		expect(names[key], `a rule for ${key}`).toBeDefined()
		expect(graded(most)).toBe(names[key])
		expect(graded(most + 1)).not.toBe(names[key])
	})
}

/** Makes tests of each historic scheme that the product has a template for; others are printed. */
export function holdHistoricGrades(schemes: readonly Historic[]): void {
	for (const historic of schemes) {
		if (/^Colorado/.test(historic.scheme)) holdColorado(historic)
		else if (/^Eastern/.test(historic.scheme)) holdEastern(historic)
		else if (/^National/.test(historic.scheme)) holdNational(historic)
		else console.info(`No rule yet for part of comb_grades.historic: ${historic.scheme}`)
	}
}
