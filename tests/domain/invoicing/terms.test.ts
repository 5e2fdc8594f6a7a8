import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { addDays, daysBetween } from "~/domain/calendar"
import { discountCents, dueDates, type Terms, termsWords } from "~/domain/invoicing/terms"

const plain = { days: 30, discountBasisPoints: 0, discountDays: 0 }
const onReceipt: Terms = { kind: "on-receipt", ...plain }
const net30: Terms = { kind: "net", ...plain }
const twoTenNet30: Terms = { kind: "net", days: 30, discountBasisPoints: 200, discountDays: 10 }
const monthEndPlus10: Terms = { kind: "end-of-month", ...plain, days: 10 }

describe("when an invoice is due", () => {
	test("on receipt is the day of the invoice, net days count from it", () => {
		expect(dueDates(onReceipt, "2026-08-18")).toEqual({ dueOn: "2026-08-18", discountUntil: null })
		expect(dueDates(net30, "2026-01-31")).toEqual({ dueOn: "2026-03-02", discountUntil: null })
		expect(dueDates({ ...net30, days: 14 }, "2026-08-18").dueOn).toBe("2026-09-01")
	})

	test("the days of a discount count from the invoice", () => {
		expect(dueDates(twoTenNet30, "2026-12-20")).toEqual({ dueOn: "2027-01-19", discountUntil: "2026-12-30" })
	})

	test("end of month counts from the month's last day, early and late in the month alike", () => {
		expect(dueDates(monthEndPlus10, "2026-02-10").dueOn).toBe("2026-03-10")
		expect(dueDates(monthEndPlus10, "2026-01-31").dueOn).toBe("2026-02-10")
		expect(dueDates({ ...monthEndPlus10, days: 0 }, "2028-02-03").dueOn).toBe("2028-02-29")
	})

	test("days that are none throw", () => {
		expect(() => dueDates({ ...net30, days: -1 }, "2026-08-18")).toThrow(RangeError)
		expect(() => dueDates({ ...twoTenNet30, discountDays: 1.5 }, "2026-08-18")).toThrow(RangeError)
		expect(() => dueDates(net30, "2026-02-30")).toThrow(RangeError)
	})

	test("no invoice is due before it is written, and a later invoice is never due earlier", () => {
		const day = fc.integer({ min: 0, max: 800 }).map((ahead) => addDays("2026-01-01", ahead))
		fc.assert(
			fc.property(day, day, fc.constantFrom(onReceipt, net30, monthEndPlus10), fc.nat(90), (a, b, terms, days) => {
				const [earlier, later] = a < b ? [a, b] : [b, a]
				const due = dueDates({ ...terms, days }, earlier).dueOn
				expect(daysBetween(earlier, due)).toBeGreaterThanOrEqual(0)
				expect(dueDates({ ...terms, days }, later).dueOn >= due).toBe(true)
			}),
		)
	})
})

describe("terms in words", () => {
	test.each<[Terms, string]>([
		[onReceipt, "due on receipt"],
		[net30, "net 30 days"],
		[{ ...net30, days: 1 }, "net 1 day"],
		[twoTenNet30, "2 % off within 10 days, net 30 days"],
		[{ ...twoTenNet30, discountBasisPoints: 150 }, "1.5 % off within 10 days, net 30 days"],
		[{ ...twoTenNet30, discountBasisPoints: 1000 }, "10 % off within 10 days, net 30 days"],
		[monthEndPlus10, "due 10 days after the month ends"],
		[{ ...monthEndPlus10, days: 0 }, "due at the end of the month"],
	])("%j reads “%s”", (terms, words) => {
		expect(termsWords(terms)).toBe(words)
	})

	test("the discount is rounded once to whole cents", () => {
		expect(discountCents(twoTenNet30, 92_990)).toBe(1860)
		expect(discountCents(net30, 92_990)).toBe(0)
	})
})
