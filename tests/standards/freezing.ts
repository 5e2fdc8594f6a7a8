import { describe, expect, test } from "vitest"
import {
	enteredRuns,
	FREEZE_TABLE,
	judgeFreezing,
	meetsPlainAdvice,
	rowReached,
	type TemperatureUnit,
} from "~/domain/cold-room/freezing"
import { THAW_ADVICE, waxAt } from "~/domain/cold-room/wax"
import type { PublishedValues } from "./published-values"

const judged = (temperature: number, unit: TemperatureUnit, minutes: number) =>
	judgeFreezing(enteredRuns({ temperature, unit, minutes }))

/** Makes one test of each row of the freezing table, of what lies between rows, and of what is said about comb and wax. */
export function holdFreezing({ storage_and_freezing: values }: PublishedValues): void {
	const rows = values?.freeze_table ?? []
	if (rows.length > 0) {
		describe("freezing against wax moth", () => {
			test.each(rows)("comb at $temp_c °C: $hours h", ({ temp_c, temp_f, hours }) => {
				const minutes = hours * 60
				expect(judged(temp_c, "C", minutes).isProven).toBe(true)
				expect(judged(temp_c, "C", minutes - 1)).toMatchObject({ isProven: false, missingMinutes: 1 })
				expect(rowReached(temp_c, "C")?.minutes).toBe(minutes)
				if (temp_f === undefined) return
				expect(rowReached(temp_f, "F")).toBe(rowReached(temp_c, "C"))
				expect(judged(temp_f, "F", minutes).isProven).toBe(true)
				expect(judged(temp_f, "F", minutes - 1).isProven).toBe(false)
			})

			// A file may name single rows: what lies between rows, and above all, is told by the whole table alone.
			const isWholeTable = rows.length === FREEZE_TABLE.length
			const pairs = (isWholeTable ? rows : [])
				.toSorted((a, b) => b.temp_c - a.temp_c)
				.slice(0, -1)
				.map((warmer, index) => ({ warmer, colder: rows.toSorted((a, b) => b.temp_c - a.temp_c)[index + 1] ?? warmer }))
			test.each(pairs)("between $warmer.temp_c and $colder.temp_c °C the warmer row decides", ({ warmer, colder }) => {
				for (const temperature of [(warmer.temp_c + colder.temp_c) / 2, colder.temp_c + 0.1]) {
					expect(judged(temperature, "C", warmer.hours * 60 - 1).isProven).toBe(false)
					expect(judged(temperature, "C", warmer.hours * 60).isProven).toBe(true)
				}
			})

			if (isWholeTable)
				test("nothing warmer than the warmest row is treated", () => {
					const warmest = Math.max(...rows.map(({ temp_c }) => temp_c))
					expect(rowReached(warmest + 0.1, "C")).toBeNull()
					expect(FREEZE_TABLE[0]?.tenthsC).toBe(warmest * 10)
				})
		})
	}

	const practice = values?.freeze_practice
	if (practice) {
		test(`0 °C or colder is plain advice beyond ${practice.hours_min} h, and decides nothing`, () => {
			expect(meetsPlainAdvice(practice.hours_min * 60)).toBe(false)
			expect(meetsPlainAdvice(practice.hours_min * 60 + 1)).toBe(true)
			expect(judged(0, "C", practice.hours_min * 60 + 1).isProven).toBe(false)
		})
	}

	const thaw = values?.thaw
	if (thaw) {
		test("the advice on thawing says what the rule says", () => {
			const advice = THAW_ADVICE.join(" ").toLowerCase()
			const demands = ["sealed", "room temperature", "dry", "mould", "moths"].filter((word) => thaw.rule.includes(word))
			expect(demands).not.toEqual([])
			for (const word of demands) expect(advice).toContain(word)
		})
	}

	const wax = values?.wax_c
	if (wax) {
		test(`wax melts from ${wax.melts[0]} to ${wax.melts[1]} °C, is brittle below ${wax.brittle_below}, soft from ${wax.soft_from}`, () => {
			expect([waxAt(wax.melts[0] - 0.1), waxAt(wax.melts[0])]).toEqual(["soft", "melting"])
			expect([waxAt(wax.melts[1]), waxAt(wax.melts[1] + 0.1)]).toEqual(["melting", "molten"])
			expect([waxAt(wax.brittle_below - 0.1), waxAt(wax.brittle_below)]).toEqual(["brittle", "firm"])
			expect([waxAt(wax.soft_from - 0.1), waxAt(wax.soft_from)]).toEqual(["firm", "soft"])
		})
	}
}
