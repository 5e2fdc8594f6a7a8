import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { type PriceLine, priceOrder } from "~/domain/pricing/price-order"

const terms = { minimumCents: 60_000, deliveryChargeCents: 1800, freeAboveCents: 60_000 }

function line(productId: string, cases: number, caseCents: [number, number, number], more: Partial<PriceLine> = {}) {
	const [one, three, six] = caseCents
	const breaks = [
		{ minCases: 1, caseCents: one },
		{ minCases: 3, caseCents: three },
		{ minCases: 6, caseCents: six },
	]
	return { productId, cases, piecesPerCase: 12, breakFamily: productId, breaks, ...more }
}

const rounds = (cases: number, more?: Partial<PriceLine>) => line("round", cases, [11_400, 10_830, 10_260], more)
const basswood = (cases: number, more?: Partial<PriceLine>) => line("basswood", cases, [15_000, 14_250, 13_500], more)
const clearBox = (cases: number, more?: Partial<PriceLine>) => line("clear-box", cases, [13_200, 12_540, 11_880], more)
const cutComb = (cases: number, more?: Partial<PriceLine>) => line("cut-comb", cases, [9400, 8930, 8460], more)

describe("an order on the order sheet", () => {
	test("lines still to be shared out stay out of the sure total and of the delivery minimum", () => {
		const price = priceOrder({
			lines: [rounds(2), basswood(4, { toBeSharedOut: true }), clearBox(1), cutComb(2)],
			terms,
		})
		expect(price).toMatchObject({
			sureCases: 5,
			sureCents: 54_800,
			sharedCases: 4,
			sharedCents: 57_000,
			cases: 9,
			upToCents: 111_800,
			deliveryCents: 1800,
			totalCents: 56_600,
			minimumShortCents: 5200,
			freeShortCents: 5200,
		})
	})

	test("one more case can make all of them cheaper, and the line says how many more that takes", () => {
		const [two] = priceOrder({ lines: [rounds(2)], terms }).lines
		expect(two).toMatchObject({
			caseCents: 11_400,
			poundCents: null,
			lineCents: 22_800,
			pieces: 24,
			breakIndex: 0,
			nextBreak: { atCases: 3, addCases: 1, caseCents: 10_830 },
		})
		const [three] = priceOrder({ lines: [rounds(3)], terms }).lines
		expect(three).toMatchObject({ caseCents: 10_830, lineCents: 32_490, breakIndex: 1 })
		const [nine] = priceOrder({ lines: [rounds(9)], terms }).lines
		expect(nine).toMatchObject({ caseCents: 10_260, breakIndex: 2, nextBreak: null })
	})

	test("cases of one family are counted together, those still to be shared out among them", () => {
		const lines = [
			rounds(2, { breakFamily: "sections" }),
			basswood(4, { breakFamily: "sections", toBeSharedOut: true }),
			cutComb(2),
		]
		const price = priceOrder({ lines, terms })
		expect(price.lines.map((priced) => priced.caseCents)).toEqual([10_260, 13_500, 9400])
	})

	test("the third case that passes the minimum makes the delivery free", () => {
		const price = priceOrder({ lines: [rounds(3), clearBox(1), cutComb(2)], terms })
		expect(price).toMatchObject({ sureCents: 64_490, deliveryCents: 0, totalCents: 64_490, minimumShortCents: 0 })
	})

	test("exactly the free amount is delivered free, a cent less is not", () => {
		const one = (caseCents: number) => [
			{ productId: "p", cases: 1, piecesPerCase: 1, breakFamily: "p", breaks: [{ minCases: 1, caseCents }] },
		]
		expect(priceOrder({ lines: one(60_000), terms }).deliveryCents).toBe(0)
		expect(priceOrder({ lines: one(59_999), terms })).toMatchObject({ deliveryCents: 1800, freeShortCents: 1 })
	})

	test("where delivery is never free it is charged on any order, and nothing ordered costs nothing", () => {
		const never = { ...terms, freeAboveCents: null }
		expect(priceOrder({ lines: [basswood(50)], terms: never })).toMatchObject({
			deliveryCents: 1800,
			freeShortCents: null,
		})
		expect(priceOrder({ lines: [basswood(0)], terms: never })).toMatchObject({
			deliveryCents: 0,
			totalCents: 0,
			cases: 0,
		})
		expect(priceOrder({ lines: [], terms })).toMatchObject({
			deliveryCents: 0,
			totalCents: 0,
			minimumShortCents: 60_000,
		})
	})
})

describe("an order that was cut short", () => {
	test("it keeps the price break of what was asked", () => {
		const [short] = priceOrder({ lines: [basswood(4, { givenCases: 2 })], terms }).lines
		expect(short).toMatchObject({ cases: 2, pieces: 24, caseCents: 14_250, lineCents: 28_500 })
	})

	test("it keeps the delivery terms of what was asked", () => {
		const price = priceOrder({ lines: [rounds(2), basswood(4, { givenCases: 1, toBeSharedOut: true })], terms })
		expect(price).toMatchObject({ sureCents: 37_050, sharedCents: 0, deliveryCents: 0, minimumShortCents: 0 })
	})

	test("where nothing is given, nothing is delivered and nothing charged", () => {
		const price = priceOrder({ lines: [basswood(2, { givenCases: 0 })], terms })
		expect(price).toMatchObject({ totalCents: 0, deliveryCents: 0, cases: 0 })
	})
})

describe("what is not priced", () => {
	test("a line without a price or with part of a case throws", () => {
		expect(() => priceOrder({ lines: [{ ...rounds(1), breaks: [] }], terms })).toThrow("has no price")
		expect(() => priceOrder({ lines: [rounds(1.5)], terms })).toThrow(RangeError)
		expect(() => priceOrder({ lines: [rounds(-1)], terms })).toThrow(RangeError)
	})
})

describe("any order", () => {
	const anyLine = fc
		.record({
			productId: fc.uuid(),
			cases: fc.integer({ min: 0, max: 99 }),
			givenCases: fc.option(fc.integer({ min: 0, max: 99 }), { nil: undefined }),
			piecesPerCase: fc.integer({ min: 1, max: 24 }),
			breakFamily: fc.constantFrom("sections", "cut", "chunk"),
			toBeSharedOut: fc.boolean(),
			firstCents: fc.integer({ min: 3000, max: 20_000 }),
		})
		.map(({ firstCents, givenCases, ...rest }) => ({
			...rest,
			...(givenCases === undefined ? {} : { givenCases: Math.min(givenCases, rest.cases) }),
			breaks: [
				{ minCases: 6, caseCents: firstCents - 1500 },
				{ minCases: 1, caseCents: firstCents },
				{ minCases: 3, caseCents: firstCents - 700 },
			],
		}))

	test("the lines sum to the totals, and the sure and the shared part to the whole", () => {
		fc.assert(
			fc.property(fc.array(anyLine, { maxLength: 10 }), (lines) => {
				const price = priceOrder({ lines, terms })
				const total = price.lines.reduce((sum, priced) => sum + priced.lineCents, 0)
				expect(price.sureCents + price.sharedCents).toBe(total)
				expect(price.upToCents).toBe(total)
				expect(price.sureCases + price.sharedCases).toBe(price.cases)
				for (const priced of price.lines) expect(priced.lineCents).toBe(priced.cases * priced.caseCents)
			}),
		)
	})

	test("asking for more of anything never makes a case dearer", () => {
		fc.assert(
			fc.property(
				fc.array(anyLine, { minLength: 1, maxLength: 6 }),
				fc.nat(),
				fc.integer({ min: 1, max: 9 }),
				(lines, at, add) => {
					const index = at % lines.length
					const more = lines.map((one, position) => (position === index ? { ...one, cases: one.cases + add } : one))
					const before = priceOrder({ lines, terms }).lines
					const after = priceOrder({ lines: more, terms }).lines
					for (const [position, priced] of after.entries()) {
						expect(priced.caseCents).toBeLessThanOrEqual(before[position]?.caseCents ?? 0)
					}
				},
			),
		)
	})

	test("adding what the line says reaches the next break, and one case less does not", () => {
		fc.assert(
			fc.property(fc.array(anyLine, { minLength: 1, maxLength: 6 }), (lines) => {
				const next = priceOrder({ lines, terms }).lines[0]?.nextBreak
				if (!next) return
				const caseCentsWith = (add: number) => {
					const more = lines.map((one, index) => (index === 0 ? { ...one, cases: one.cases + add } : one))
					return priceOrder({ lines: more, terms }).lines[0]?.caseCents
				}
				expect(caseCentsWith(next.addCases)).toBe(next.caseCents)
				expect(caseCentsWith(next.addCases - 1)).toBeGreaterThan(next.caseCents)
			}),
		)
	})

	test("the order of the lines changes no price", () => {
		fc.assert(
			fc.property(fc.array(anyLine, { maxLength: 8 }), (lines) => {
				const forward = priceOrder({ lines, terms })
				const backward = priceOrder({ lines: lines.toReversed(), terms })
				expect(backward.lines.toReversed()).toEqual(forward.lines)
				expect({ ...backward, lines: [] }).toEqual({ ...forward, lines: [] })
			}),
		)
	})
})
