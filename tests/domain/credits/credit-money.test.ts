import fc from "fast-check"
import { expect, test } from "vitest"
import { creditForAmount, creditForPieces, type LineLeft } from "~/domain/credits/credit-money"
import { creditNumber, parseCreditNumber } from "~/domain/credits/credit-number"
import { planCredit, type WantedCredit } from "~/domain/credits/plan-credit"

const line = fc.record({
	pieces: fc.integer({ min: 1, max: 600 }),
	lineCents: fc.integer({ min: 0, max: 5_000_000 }),
	taxCents: fc.integer({ min: 0, max: 500_000 }),
})

test("a piece of a case of twelve at $114.00 is credited at $9.50", () => {
	expect(creditForPieces({ pieces: 12, lineCents: 11_400, taxCents: 0 }, 1)).toEqual({ lineCents: 950, taxCents: 0 })
})

test("three of twelve pieces take a quarter of the tax with them", () => {
	expect(creditForPieces({ pieces: 12, lineCents: 11_400, taxCents: 941 }, 3)).toEqual({
		lineCents: 2_850,
		taxCents: 235,
	})
})

test("all pieces of a line come to the whole line and its whole tax", () => {
	fc.assert(
		fc.property(line, (left) => {
			expect(creditForPieces(left, left.pieces)).toEqual({ lineCents: left.lineCents, taxCents: left.taxCents })
		}),
	)
})

test("pieces credited one lot after another never exceed the line, and all of them are exactly the line", () => {
	fc.assert(
		fc.property(line, fc.array(fc.integer({ min: 1, max: 80 }), { minLength: 1, maxLength: 12 }), (whole, steps) => {
			let left: LineLeft = whole
			const credited = { lineCents: 0, taxCents: 0 }
			for (const step of [...steps, whole.pieces]) {
				const pieces = Math.min(step, left.pieces)
				const money = creditForPieces(left, pieces)
				credited.lineCents += money.lineCents
				credited.taxCents += money.taxCents
				left = {
					pieces: left.pieces - pieces,
					lineCents: left.lineCents - money.lineCents,
					taxCents: left.taxCents - money.taxCents,
				}
				expect(left.lineCents).toBeGreaterThanOrEqual(0)
				expect(left.taxCents).toBeGreaterThanOrEqual(0)
			}
			expect(credited).toEqual({ lineCents: whole.lineCents, taxCents: whole.taxCents })
		}),
	)
})

test("no piece is credited a cent away from its even share of what is left", () => {
	fc.assert(
		fc.property(line, fc.nat(600), (left, wanted) => {
			const pieces = Math.min(wanted, left.pieces)
			const exact = (left.lineCents * pieces) / left.pieces
			expect(Math.abs(creditForPieces(left, pieces).lineCents - exact)).toBeLessThanOrEqual(0.5)
		}),
	)
})

test("amounts off a line take its tax in proportion, and the last of them all that is left of it", () => {
	fc.assert(
		fc.property(line, fc.double({ min: 0, max: 1, noNaN: true }), (whole, part) => {
			const first = creditForAmount(whole, Math.floor(whole.lineCents * part))
			const left = { lineCents: whole.lineCents - first.lineCents, taxCents: whole.taxCents - first.taxCents }
			const second = creditForAmount(left, left.lineCents)
			expect(first.lineCents + second.lineCents).toBe(whole.lineCents)
			if (left.lineCents > 0) expect(first.taxCents + second.taxCents).toBe(whole.taxCents)
			expect(first.taxCents).toBeLessThanOrEqual(whole.taxCents)
		}),
	)
})

test("more pieces or money than a line has are no credit", () => {
	const left = { pieces: 12, lineCents: 11_400, taxCents: 0 }
	expect(() => creditForPieces(left, 13)).toThrow(RangeError)
	expect(() => creditForPieces(left, -1)).toThrow(RangeError)
	expect(() => creditForAmount(left, 11_401)).toThrow(RangeError)
})

const invoice = fc.array(line, { minLength: 1, maxLength: 6 }).map((lines) => ({
	lines: lines.map((one, index) => ({ ...one, id: `${index}` })),
	totalCents: lines.reduce((sum, one) => sum + one.lineCents + one.taxCents, 0),
}))
const wishes = fc.array(
	fc.record({
		line: fc.nat(6),
		pieces: fc.nat(700),
		cents: fc.nat(6_000_000),
		isPieces: fc.boolean(),
		whole: fc.nat(10_000),
	}),
	{ minLength: 1, maxLength: 15 },
)

test("whatever is credited in whatever order, the credits of an invoice never exceed it, and each sums up", () => {
	fc.assert(
		fc.property(invoice, wishes, ({ lines: whole, totalCents }, asked) => {
			let lines = whole
			let credited = 0
			for (const { line: index, pieces, cents, isPieces, whole: wholeCents } of asked) {
				const lineId = `${index}`
				const wanted: WantedCredit[] = [isPieces ? { lineId, pieces } : { lineId, cents }]
				const plan = planCredit({ lines, leftCents: totalCents - credited, wanted, wholeCents })
				if (!plan.ok) continue
				const sum = plan.lines.reduce((total, one) => total + one.lineCents, plan.wholeCents)
				expect(plan.linesCents).toBe(sum)
				expect(plan.totalCents).toBe(plan.linesCents + plan.taxCents)
				credited += plan.totalCents
				lines = lines.map((one) => {
					const taken = plan.lines.find((planned) => planned.lineId === one.id)
					if (!taken) return one
					return {
						...one,
						pieces: one.pieces - taken.pieces,
						lineCents: one.lineCents - taken.lineCents,
						taxCents: one.taxCents - taken.taxCents,
					}
				})
				expect(lines.every((one) => one.pieces >= 0 && one.lineCents >= 0 && one.taxCents >= 0)).toBe(true)
			}
			expect(credited).toBeLessThanOrEqual(totalCents)
		}),
	)
})

test("a credit is refused in words that say what is left", () => {
	const lines = [{ id: "a", pieces: 12, lineCents: 11_400, taxCents: 0 }]
	const plan = (wanted: WantedCredit[], wholeCents = 0, leftCents = 11_400) =>
		planCredit({ lines, leftCents, wanted, wholeCents })
	expect(plan([{ lineId: "a", pieces: 13 }])).toEqual({
		ok: false,
		reason: "line-exceeded",
		lines: [{ lineId: "a", leftPieces: 12, leftCents: 11_400 }],
	})
	expect(plan([{ lineId: "b", cents: 1 }])).toMatchObject({ reason: "line-exceeded" })
	expect(plan([{ lineId: "a", pieces: 2 }], 0, 1_000)).toEqual({
		ok: false,
		reason: "invoice-exceeded",
		leftCents: 1_000,
		askedCents: 1_900,
	})
	expect(plan([{ lineId: "a", pieces: 0 }])).toEqual({ ok: false, reason: "nothing-to-credit" })
})

test("a credit's number is read back as it is printed, and an invoice's number is none", () => {
	expect(creditNumber(2026, 3)).toBe("C2026-0003")
	expect(parseCreditNumber("C2026-0003")).toEqual({ year: 2026, sequence: 3 })
	for (const text of ["2026-0003", "C2026-0000", "c2026-0003", "C2026-3", ""])
		expect(parseCreditNumber(text)).toBeNull()
})
