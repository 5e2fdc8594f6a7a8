import fc from "fast-check"
import { expect, test } from "vitest"
import { caseCentsAfter } from "~/domain/pricing/price-in-force"
import { priceOrder } from "~/domain/pricing/price-order"

/** A rational number of cents: exact, and written without any function of the product. */
type Ratio = { top: bigint; bottom: bigint }
const times = (a: Ratio, b: Ratio): Ratio => ({ top: a.top * b.top, bottom: a.bottom * b.bottom })
const ratio = (top: number, bottom = 1): Ratio => ({ top: BigInt(top), bottom: BigInt(bottom) })
const halfUp = ({ top, bottom }: Ratio): bigint => (2n * top + bottom) / (2n * bottom)

/** An order as it comes: cases, a family, three falling breaks from 1, `second` and `third` cases, and what is off. */
const lineArbitrary = fc.record({
	cases: fc.integer({ min: 0, max: 60 }),
	family: fc.constantFrom("sections", "cut comb", "chunk"),
	second: fc.integer({ min: 2, max: 8 }),
	third: fc.integer({ min: 9, max: 30 }),
	cents: fc.tuple(...([1, 2, 3] as const).map(() => fc.integer({ min: 0, max: 40_000 }))),
	off: fc.integer({ min: 0, max: 10_000 }),
	grams: fc.integer({ min: 100, max: 2000 }),
	pieces: fc.integer({ min: 1, max: 24 }),
	isByWeight: fc.boolean(),
	isShared: fc.boolean(),
})
type Line = typeof lineArbitrary extends fc.Arbitrary<infer T> ? T : never

const STEPS = ["first", "second", "third"] as const

function asPriced(line: Line, index: number) {
	const product = { pieceNetGrams: line.grams, piecesPerCase: line.pieces }
	const minCases = [1, line.second, line.third]
	return {
		productId: String(index),
		cases: line.cases,
		piecesPerCase: line.pieces,
		breakFamily: line.family,
		breaks: STEPS.map((_, step) => {
			const cents = line.cents[step] ?? 0
			const price = line.isByWeight ? { caseCents: 0, poundCents: cents } : { caseCents: cents, poundCents: null }
			return { minCases: minCases[step] ?? 0, caseCents: caseCentsAfter(price, product, line.off).caseCents }
		}),
		toBeSharedOut: line.isShared,
	}
}

/** What a case of the line costs, once more, in exact fractions. */
function exactCaseCents(line: Line, familyCases: number): bigint {
	const step = familyCases >= line.third ? 2 : familyCases >= line.second ? 1 : 0
	const reduced = halfUp(times(ratio(line.cents[step] ?? 0), ratio(10_000 - line.off, 10_000)))
	if (!line.isByWeight) return reduced
	const pounds = times(ratio(line.grams * line.pieces), ratio(100_000, 45_359_237))
	return halfUp(times({ top: reduced, bottom: 1n }, pounds))
}

test("an order's totals are those of a second computation in exact fractions", () => {
	fc.assert(
		fc.property(
			fc.array(lineArbitrary, { maxLength: 12 }),
			fc.integer({ min: 0, max: 100_000 }),
			fc.option(fc.integer({ min: 0, max: 300_000 })),
			(lines, deliveryChargeCents, freeAboveCents) => {
				const terms = { minimumCents: 60_000, deliveryChargeCents, freeAboveCents }
				const priced = priceOrder({ lines: lines.map(asPriced), terms })

				const family = (name: string) =>
					lines.filter((line) => line.family === name).reduce((sum, line) => sum + line.cases, 0)
				const amounts = lines.map((line) => BigInt(line.cases) * exactCaseCents(line, family(line.family)))
				const total = (isShared: boolean) =>
					amounts.reduce((sum, amount, index) => (lines[index]?.isShared === isShared ? sum + amount : sum), 0n)
				const isEmpty = lines.every((line) => line.cases === 0)
				const isFree = freeAboveCents !== null && total(false) >= BigInt(freeAboveCents)
				const delivery = isEmpty || isFree ? 0n : BigInt(deliveryChargeCents)

				expect(priced.lines.map((line) => BigInt(line.lineCents))).toEqual(amounts)
				expect(BigInt(priced.sureCents)).toBe(total(false))
				expect(BigInt(priced.upToCents)).toBe(total(false) + total(true))
				expect(BigInt(priced.totalCents)).toBe(total(false) + delivery)
			},
		),
		{ numRuns: 2000 },
	)
})
