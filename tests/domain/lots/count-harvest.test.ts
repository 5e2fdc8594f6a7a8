import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { type CountedSuper, CULLS, countHarvest } from "~/domain/lots/count-harvest"

const one = (id: string, counted: Record<string, number>): CountedSuper => ({
	id,
	label: `Hive ${id}, super 1`,
	capacityPieces: 40,
	counted,
})

const grades = fc.record({ Fancy: fc.nat(15), "No. 1": fc.nat(15), [CULLS]: fc.nat(15) })
const sum = (counted: Record<string, number>) => Object.values(counted).reduce((all, pieces) => all + pieces, 0)

describe("what comes off", () => {
	test("every piece that is counted becomes a piece of a lot, and culls are no finished sections", () => {
		fc.assert(
			fc.property(fc.array(grades, { minLength: 1, maxLength: 12 }), (counts) => {
				const supers = counts.map((counted, index) => one(String(index), counted))
				const answer = countHarvest({ supers, total: {} })
				if (counts.some((counted) => sum(counted) > 40)) {
					expect(answer.ok).toBe(false)
					return
				}
				if (!answer.ok) throw new Error(answer.message)
				const { grades: lots, finished } = answer.count
				expect(sum(lots)).toBe(counts.reduce((all, counted) => all + sum(counted), 0))
				expect(finished.reduce((all, { pieces }) => all + pieces, 0)).toBe(sum(lots) - (lots[CULLS] ?? 0))
			}),
		)
	})

	test("a count for all supers is spread over them, none beyond what it holds", () => {
		fc.assert(
			fc.property(fc.integer({ min: 1, max: 12 }), grades, (count, total) => {
				const supers = Array.from({ length: count }, (_, index) => one(String(index), {}))
				const answer = countHarvest({ supers, total })
				if (sum(total) > count * 40) {
					expect(answer.ok).toBe(false)
					return
				}
				if (!answer.ok) throw new Error(answer.message)
				const { finished } = answer.count
				expect(finished.reduce((all, { pieces }) => all + pieces, 0)).toBe(sum(total) - (total[CULLS] ?? 0))
				expect(finished.every(({ pieces }) => pieces >= 0 && pieces <= 40)).toBe(true)
			}),
		)
	})

	test("more pieces than a super holds are refused in a sentence", () => {
		expect(countHarvest({ supers: [one("12", { Fancy: 38, Culls: 5 })], total: {} })).toMatchObject({
			reason: "over-capacity",
			superId: "12",
			message: "Hive 12, super 1 holds 40 pieces, and 43 are written down.",
		})
	})

	test("a count by super and in total at once is refused", () => {
		expect(countHarvest({ supers: [one("12", { Fancy: 1 })], total: { Fancy: 1 } })).toMatchObject({
			reason: "both-ways",
		})
	})
})
