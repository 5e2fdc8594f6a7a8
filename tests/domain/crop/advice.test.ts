import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { addDays } from "~/domain/calendar"
import { adviseOn } from "~/domain/crop/advice"
import { SECTION_STATES, sectionsOf, superGrid } from "~/domain/crop/super-drawing"
import type { SuperCheck, SuperFacts } from "~/domain/crop/super-facts"

const TODAY = "2026-08-13"
const look = (ago: number, filledPercent: number, cappedPercent: number, sections = ""): SuperCheck => ({
	checkedOn: addDays(TODAY, -ago),
	filledPercent,
	cappedPercent,
	sections,
})
const superWith = (...checks: SuperCheck[]): SuperFacts => ({
	capacityPieces: 40,
	setOn: addDays(TODAY, -20),
	state: "on",
	clearingOn: null,
	checks,
})
const kinds = (facts: SuperFacts, isLastOnHive = true, readyCappedPercent = 90) =>
	adviseOn(facts, { today: TODAY, readyCappedPercent, isLastOnHive }).map(({ kind }) => kind)

describe("advice on a super", () => {
	test("the next super is due at 60 % filled, before capping begins, and only beside the last one on the hive", () => {
		expect(kinds(superWith(look(1, 60, 8)))).toEqual(["next-super"])
		expect(kinds(superWith(look(1, 59, 8)))).toEqual([])
		expect(kinds(superWith(look(1, 80, 25)))).toEqual([])
		expect(kinds(superWith(look(1, 60, 8)), false)).toEqual([])
	})

	test("it is ready at the capped share that the producer has set", () => {
		expect(kinds(superWith(look(1, 100, 90)))).toEqual(["ready"])
		expect(kinds(superWith(look(1, 100, 89)))).toEqual([])
		expect(kinds(superWith(look(1, 100, 80)), true, 80)).toEqual(["ready"])
	})

	test("a flow that is cut off is said in place of the next super", () => {
		expect(kinds(superWith(look(0, 70, 10), look(7, 70, 5)))).toEqual(["flow-cut-off"])
		expect(kinds(superWith(look(0, 71, 10), look(7, 70, 5)))).toEqual(["next-super"])
	})

	test("with the bee escape in, only when it clears is said", () => {
		const facts: SuperFacts = { ...superWith(look(12, 100, 95)), state: "clearing", clearingOn: "2026-08-12" }
		expect(adviseOn(facts, { today: TODAY, readyCappedPercent: 90, isLastOnHive: true })).toEqual([
			{ kind: "clearing", since: "2026-08-12", clearFrom: "2026-08-13", clearBy: "2026-08-14" },
		])
	})

	test("ten days without a look are noted, from the day it was set on when nobody ever looked", () => {
		expect(kinds(superWith(look(10, 20, 0)))).toEqual(["not-looked-at"])
		expect(kinds(superWith(look(9, 20, 0)))).toEqual([])
		expect(kinds({ ...superWith(), setOn: addDays(TODAY, -9) })).toEqual([])
		expect(kinds(superWith())).toEqual(["not-looked-at"])
	})

	test("there is none on a super that is off", () => {
		expect(kinds({ ...superWith(look(30, 100, 100)), state: "off" })).toEqual([])
	})
})

describe("the drawing of a super", () => {
	const countOf = (facts: SuperFacts, ...states: string[]) =>
		sectionsOf(facts).filter((state) => states.includes(state)).length

	test("shows the check's own sections, with bare ones where it noted too few", () => {
		expect(sectionsOf({ ...superWith(look(0, 50, 20, "01234")), capacityPieces: 6 })).toEqual([
			...SECTION_STATES,
			"bare",
		])
	})

	test("lays noted shares from the middle outwards", () => {
		const sections = sectionsOf(superWith(look(0, 60, 10)))
		expect(sections.slice(14, 16)).toEqual(["capped", "capped"])
		expect([0, 9, 30, 39].map((corner) => sections[corner])).toEqual(["bare", "bare", "bare", "bare"])
	})

	test("never shows more capped than were noted, and counts a section being filled as half", () => {
		fc.assert(
			fc.property(
				fc.integer({ min: 1, max: 400 }),
				fc.integer({ min: 0, max: 100 }),
				fc.integer({ min: 0, max: 100 }),
				(capacityPieces, a, b) => {
					const [capped, filled] = [Math.min(a, b), Math.max(a, b)]
					const facts = { ...superWith(look(0, filled, capped)), capacityPieces }
					expect(sectionsOf(facts)).toHaveLength(capacityPieces)
					expect(countOf(facts, "capped")).toBe(Math.round((capacityPieces * capped) / 100))
					const amount = countOf(facts, "capped", "full") + countOf(facts, "filling") / 2
					expect(amount).toBe(Math.round((capacityPieces * filled) / 100))
				},
			),
		)
	})

	test("has four rows of ten for the usual box, and room for every section of any other", () => {
		expect(superGrid(40)).toEqual({ rows: 4, across: 10 })
		expect(superGrid(8)).toEqual({ rows: 1, across: 8 })
		for (let capacity = 1; capacity <= 400; capacity++) {
			const { rows, across } = superGrid(capacity)
			expect(rows * across).toBeGreaterThanOrEqual(capacity)
		}
	})
})
