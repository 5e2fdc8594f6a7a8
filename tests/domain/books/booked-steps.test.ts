import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { bookedSteps, type NotedStates } from "~/domain/books/booked-steps"
import { entryNumber } from "~/domain/books/entry-number"
import { includedTax } from "~/domain/books/included-tax"
import { addDays } from "~/domain/calendar"

describe("on which day a change is entered", () => {
	const refund = { id: "r", on: "2026-08-20", state: "done" as const }

	test("on its own day while no closing lies between", () => {
		expect(bookedSteps(refund, [{ until: "2026-07-31", states: {} }])).toEqual([
			{ on: "2026-08-20", from: null, to: "done" },
		])
	})

	test("on the first open day when it changed after the books were closed over it", () => {
		const closings = [{ until: "2026-08-31", states: { r: "asked" } }]
		expect(bookedSteps(refund, closings)).toEqual([
			{ on: "2026-08-20", from: null, to: "asked" },
			{ on: "2026-09-01", from: "asked", to: "done" },
		])
	})

	test("on the first open day when it came to be known only after the closing", () => {
		expect(bookedSteps(refund, [{ until: "2026-08-31", states: {} }])).toEqual([
			{ on: "2026-09-01", from: null, to: "done" },
		])
	})

	test("whatever happens afterwards, no closed day gains, loses or changes an entry", () => {
		const state = fc.constantFrom("asked", "done", "won")
		const closing = fc.record({ gap: fc.integer({ min: 1, max: 40 }), state })
		fc.assert(
			fc.property(fc.nat(60), fc.nat(4), fc.array(closing, { minLength: 1, maxLength: 6 }), state, (...drawn) => {
				const [offset, knownFrom, history, last] = drawn
				const thing = { id: "x", on: addDays("2026-01-01", offset) }
				const closings: NotedStates[] = []
				let until = "2026-01-01"
				for (const [index, { gap, state: now }] of history.entries()) {
					const before = until
					until = addDays(until, gap)
					const known = index >= knownFrom ? bookedSteps({ ...thing, state: now }, closings) : []
					const held = known.filter((step) => step.on <= until)
					const noted = held.filter((step) => step.on > before || index === 0).at(-1)
					closings.push({ until, states: noted ? { x: noted.to } : {} })
					const later = bookedSteps({ ...thing, state: last }, closings).filter((step) => step.on <= until)
					expect(later).toEqual(held)
				}
			}),
		)
	})
})

test("a price contains its tax: $108.25 at 8.25 % contains $8.25, and half a cent is rounded up", () => {
	expect(includedTax(10_825, 825)).toBe(825)
	expect(includedTax(1_400, 0)).toBe(0)
	// 21 cents at 5 %: exactly one cent. 1 cent at 100 %: half a cent.
	expect(includedTax(21, 500)).toBe(1)
	expect(includedTax(1, 10_000)).toBe(1)
	expect(() => includedTax(-1, 825)).toThrow(RangeError)
})

test("price without tax, taxed anew, is within a cent of the price", () => {
	fc.assert(
		fc.property(fc.nat(1_000_000), fc.nat(3_000), (cents, rate) => {
			const net = cents - includedTax(cents, rate)
			expect(Math.abs(net * (10_000 + rate) - cents * 10_000)).toBeLessThanOrEqual((10_000 + rate) / 2)
		}),
	)
})

test("entries are numbered within their day", () => {
	expect(entryNumber("2026-08-18", 3)).toBe("20260818-003")
	expect(() => entryNumber("2026-08-18", 0)).toThrow(RangeError)
})
