import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { addDays } from "~/domain/calendar"
import { type FinishRecord, finishSharesByStage, stageOf } from "~/domain/crop/finish-shares"
import { expectedByDay, expectedByWeek, expectedPieces, mondayOf, readyDay } from "~/domain/crop/forecast"
import { isFlowCutOff, type SuperCheck, type SuperFacts } from "~/domain/crop/super-facts"

const TODAY = "2026-08-13"
const FACTS = { today: TODAY, readyCappedPercent: 90 }
const usual = finishSharesByStage([])

const look = (checkedOn: string, filledPercent: number, cappedPercent: number): SuperCheck => ({
	checkedOn,
	filledPercent,
	cappedPercent,
	sections: "",
})
const superWith = (...checks: SuperCheck[]): SuperFacts => ({
	capacityPieces: 40,
	setOn: "2026-07-20",
	state: "on",
	clearingOn: null,
	checks,
})

const anyShares = fc
	.tuple(fc.integer({ min: 0, max: 100 }), fc.integer({ min: 0, max: 100 }))
	.map(([a, b]) => ({ filled: Math.max(a, b), capped: Math.min(a, b) }))
const anyCheck = fc
	.tuple(fc.integer({ min: 0, max: 40 }), anyShares)
	.map(([ago, { filled, capped }]) => look(addDays(TODAY, -ago), filled, capped))
const anySuper = fc.record({
	productId: fc.constantFrom("round", "basswood"),
	capacityPieces: fc.integer({ min: 1, max: 400 }),
	setOn: fc.integer({ min: 0, max: 60 }).map((ago) => addDays(TODAY, -ago)),
	state: fc.constantFrom("on" as const, "clearing" as const, "off" as const),
	clearingOn: fc.constant(TODAY),
	checks: fc
		.array(anyCheck, { maxLength: 4 })
		.map((checks) => checks.sort((a, b) => (a.checkedOn < b.checkedOn ? 1 : -1))),
})
const anyRecord: fc.Arbitrary<FinishRecord> = fc
	.record({
		stage: fc.integer({ min: 0, max: 4 }),
		supers: fc.integer({ min: 1, max: 500 }),
		shares: fc
			.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 3, maxLength: 3 })
			.map((all) => all.sort((a, b) => a - b)),
	})
	.map(({ stage, supers, shares: [low = 0, likely = 0, high = 0] }) => ({ stage, supers, low, likely, high }))

describe("the day a super comes off", () => {
	test("lies on the line through its last two checks, rounded up to a day", () => {
		// 40 points in 8 days: the 20 that are left take four days; 21 take 4.2, so five.
		expect(readyDay(superWith(look("2026-08-13", 100, 70), look("2026-08-05", 90, 30)), FACTS)).toBe("2026-08-17")
		expect(readyDay(superWith(look("2026-08-13", 100, 69), look("2026-08-05", 90, 29)), FACTS)).toBe("2026-08-18")
	})

	test("follows the usual pace while capping has hardly begun, however slowly it began", () => {
		// 46 % to fill takes 6.44 days, 82 % to cap 8.2; the line through 3 % and 8 % would never arrive.
		expect(readyDay(superWith(look("2026-08-13", 54, 8), look("2026-08-05", 32, 3)), FACTS)).toBe("2026-08-28")
	})

	test("is tomorrow at the earliest, however long it has been ready", () => {
		expect(readyDay(superWith(look("2026-07-30", 100, 95)), FACTS)).toBe("2026-08-14")
	})

	test("follows the ready share that the producer has set", () => {
		const one = superWith(look("2026-08-13", 100, 70), look("2026-08-03", 90, 20))
		expect(readyDay(one, { today: TODAY, readyCappedPercent: 100 })).toBe("2026-08-19")
		expect(readyDay(one, { today: TODAY, readyCappedPercent: 70 })).toBe("2026-08-14")
	})

	test("follows the usual pace where nothing has been capped or nobody has looked", () => {
		// 70 % still to fill at 14 days for all of it, 90 % to cap at 10: 9.8 and 9 days.
		expect(readyDay(superWith(look("2026-08-13", 30, 0)), FACTS)).toBe("2026-09-01")
		// Set on July 20: 14 and 9 days.
		expect(readyDay(superWith(), FACTS)).toBe("2026-08-14")
		expect(readyDay({ ...superWith(), setOn: TODAY }, FACTS)).toBe("2026-09-05")
	})

	test("is two days after the bee escape went in", () => {
		expect(readyDay({ ...superWith(), state: "clearing", clearingOn: TODAY }, FACTS)).toBe("2026-08-15")
	})

	test("never lies in the past, today, or more than 60 days ahead", () => {
		fc.assert(
			fc.property(anySuper, fc.integer({ min: 1, max: 100 }), (one, readyCappedPercent) => {
				const on = readyDay(one, { today: TODAY, readyCappedPercent })
				expect(on > TODAY && on <= addDays(TODAY, 60)).toBe(true)
			}),
		)
	})
})

describe("what a super comes to", () => {
	test("is the share of common practice where the producer has no record", () => {
		const { low, likely, high } = expectedPieces(superWith(look(TODAY, 100, 90)), usual)
		expect([low, likely, high].map((pieces) => pieces.toFixed(6))).toEqual(["34.000000", "36.800000", "39.200000"])
	})

	test("is half own, half common practice with ten own supers, and nearly all own with hundreds", () => {
		const record = (supers: number) => [{ stage: 4, supers, low: 0.4, likely: 0.5, high: 0.6 }]
		expect(finishSharesByStage(record(10))[4]?.likely).toBeCloseTo(0.71)
		expect(finishSharesByStage(record(990))[4]?.likely).toBeCloseTo(0.5042)
	})

	test("a poor record late in a super's growth lowers what younger ones come to as well", () => {
		const shares = finishSharesByStage([{ stage: 4, supers: 990, low: 0.1, likely: 0.2, high: 0.3 }])
		expect(shares[0]?.likely).toBeCloseTo(0.2072)
	})

	test("once the flow is cut off, at most what is filled is likely, and the low figure is what is capped", () => {
		const cutOff = superWith(look("2026-08-13", 50, 10), look("2026-08-06", 50, 5))
		expect(isFlowCutOff(cutOff)).toBe(true)
		expect(expectedPieces(cutOff, usual)).toEqual({ low: 4, likely: 20, high: 20 })
		const risen = superWith(look("2026-08-13", 51, 10), look("2026-08-06", 50, 5))
		expect(isFlowCutOff(risen)).toBe(false)
	})

	test("a super that stays bare for a week is likely to come to nothing", () => {
		const bare = superWith(look("2026-08-13", 0, 0), look("2026-08-06", 0, 0))
		expect(expectedPieces(bare, usual)).toEqual({ low: 0, likely: 0, high: 0 })
		expect(isFlowCutOff(superWith(look("2026-08-13", 100, 10), look("2026-08-06", 100, 5)))).toBe(false)
	})

	test("checks less than a week apart say nothing of the flow", () => {
		expect(isFlowCutOff(superWith(look("2026-08-13", 50, 10), look("2026-08-07", 50, 5)))).toBe(false)
	})

	test("low is at most likely, likely at most high, high at most the sections there are", () => {
		fc.assert(
			fc.property(fc.array(anySuper, { maxLength: 12 }), fc.array(anyRecord, { maxLength: 5 }), (supers, records) => {
				const days = expectedByDay(supers, { ...FACTS, sharesByStage: finishSharesByStage(records) })
				const sums = { low: 0, likely: 0, high: 0 }
				for (const { low, likely, high } of days) {
					expect(0 <= low && low <= likely && likely <= high).toBe(true)
					sums.low += low
					sums.likely += likely
					sums.high += high
				}
				const onHives = supers.filter(({ state }) => state !== "off")
				expect(sums.high).toBeLessThanOrEqual(onHives.reduce((sum, { capacityPieces }) => sum + capacityPieces, 0))
				const weeks = expectedByWeek(days)
				expect(weeks.reduce((sum, { likely }) => sum + likely, 0)).toBe(sums.likely)
			}),
		)
	})

	test("a super that is seen to be filled or capped further is never worth less", () => {
		fc.assert(
			fc.property(
				anySuper.filter(({ checks }) => checks.length > 0),
				fc.array(anyRecord, { maxLength: 5 }),
				anyShares,
				(one, records, { filled, capped }) => {
					const [latest, ...earlier] = one.checks as [SuperCheck, ...SuperCheck[]]
					const further = {
						...latest,
						filledPercent: Math.max(latest.filledPercent, filled),
						cappedPercent: Math.max(latest.cappedPercent, capped),
					}
					const shares = finishSharesByStage(records)
					const before = expectedPieces(one, shares)
					const after = expectedPieces({ ...one, checks: [further, ...earlier] }, shares)
					expect(after.low).toBeGreaterThanOrEqual(before.low)
					expect(after.likely).toBeGreaterThanOrEqual(before.likely)
					expect(after.high).toBeGreaterThanOrEqual(before.high)
				},
			),
		)
	})

	test("stages run from just set on to all but capped", () => {
		expect(
			[
				superWith(),
				...[
					[20, 0],
					[40, 30],
					[90, 30],
					[100, 69],
					[100, 70],
				].map(([f = 0, c = 0]) => superWith(look(TODAY, f, c))),
			].map(stageOf),
		).toEqual([0, 1, 2, 3, 3, 4])
	})

	test("a week begins on its Monday", () => {
		expect([mondayOf("2026-08-16"), mondayOf("2026-08-17"), mondayOf("2026-08-23")]).toEqual([
			"2026-08-10",
			"2026-08-17",
			"2026-08-17",
		])
	})
})
