import { describe, expect, test } from "vitest"
import { rateOn } from "~/domain/invoicing/tax-rate"

const rates = [
	{ place: "Teasel County", validFrom: "2026-01-01", basisPoints: 700 },
	{ place: "Teasel County", validFrom: "2026-07-01", basisPoints: 725 },
	{ place: "Weld Town", validFrom: "2026-03-01", basisPoints: 825 },
]

describe("the rate of a place", () => {
	test.each([
		["2025-12-31", null],
		["2026-01-01", 700],
		["2026-06-30", 700],
		["2026-07-01", 725],
		["2030-01-01", 725],
	])("in Teasel County on %s: %s", (day, basisPoints) => {
		expect(rateOn(rates, "Teasel County", day)?.basisPoints ?? null).toBe(basisPoints)
	})

	test("is found whatever case the place is written in, and not for another place", () => {
		expect(rateOn(rates, " teasel county ", "2026-02-01")?.basisPoints).toBe(700)
		expect(rateOn(rates, "Teasel", "2026-02-01")).toBeNull()
	})
})
