import { type Dinero, dinero, halfAwayFromZero, multiply, toDecimal, toSnapshot, transformScale } from "dinero.js"
import { USD } from "dinero.js/currencies"

const CENTS_SCALE = 2
const GRAMS_PER_POUND_AT_SCALE_5 = 45_359_237n
const SCALE_5 = 100_000n

function dollars(cents: number): Dinero<number, "USD"> {
	if (!Number.isSafeInteger(cents)) throw new RangeError(`not whole cents: ${cents}`)
	return dinero({ amount: cents, currency: USD })
}

/**
 * The one rounding of money: a finer amount becomes whole cents, and exactly half a cent goes away from zero, so that a
 * credit mirrors its invoice. Source: NIST Handbook 44, G-S.5.5 (from memory, high), leaves the tie open.
 */
function roundHalfUp(amount: Dinero<number, "USD">): number {
	const cents = toSnapshot(transformScale(amount, CENTS_SCALE, halfAwayFromZero)).amount
	return cents === 0 ? 0 : cents
}

/** Cents as figures in a column: "1,118.00", "-52.00". Throws RangeError unless `cents` is a safe integer. */
export function plainMoney(cents: number): string {
	const [whole = "0", part = "00"] = toDecimal(dollars(cents)).split(".")
	return `${whole.replace(/\B(?=(\d{3})+$)/g, ",")}.${part}`
}

/** Cents with the currency sign: "$1,118.00", "-$52.00". Throws RangeError unless `cents` is a safe integer. */
export function formatMoney(cents: number): string {
	const plain = plainMoney(cents)
	return plain.startsWith("-") ? `-$${plain.slice(1)}` : `$${plain}`
}

/**
 * `basisPoints` hundredths of a percent of `cents` (825 is 8.25 %), rounded once to whole cents, half away from zero.
 * Throws RangeError unless both are safe integers.
 */
export function percentOf(cents: number, basisPoints: number): number {
	if (!Number.isSafeInteger(basisPoints)) throw new RangeError(`not whole basis points: ${basisPoints}`)
	return roundHalfUp(multiply(dollars(cents), { amount: basisPoints, scale: 4 }))
}

/**
 * The price of what was weighed: `weight` is a whole number of `unit`s, `perLbCents` the price of a pound; the product is
 * formed exactly and rounded once to whole cents, half up. A scale in pounds gives thousandths of a pound, a scale in
 * grams is converted by the exact pound of 453.59237 g. Throws RangeError on a negative or fractional input.
 * Source: NIST Handbook 44, G-S.5.5 (from memory, high); half-up on an exact half cent is this product's choice.
 */
export function weighedPriceCents(weight: number, unit: "lb/1000" | "g", perLbCents: number): number {
	for (const given of [weight, perLbCents]) {
		if (!Number.isSafeInteger(given) || given < 0) throw new RangeError(`not a whole weight or price: ${given}`)
	}
	const product = BigInt(weight) * BigInt(perLbCents)
	const [top, bottom] = unit === "g" ? [product * SCALE_5, GRAMS_PER_POUND_AT_SCALE_5] : [product, 1000n]
	return Number((2n * top + bottom) / (2n * bottom))
}

/**
 * Splits `totalCents` in proportion to `weights` by largest remainder: each part is its exact share rounded toward zero,
 * and the cents left over go one each to the largest remainders, the earlier part first on ties. Returns whole cents in
 * the order of `weights`; they always sum to `totalCents`. A negative total is split as its mirror image.
 * Throws RangeError on a fractional total, a negative or fractional weight, or when nothing has weight but there are
 * cents to split. Source: Hamilton's method (published values "allocation"); the tie order is this product's choice.
 */
export function splitByLargestRemainder(totalCents: number, weights: readonly number[]): number[] {
	if (!Number.isSafeInteger(totalCents)) throw new RangeError(`not a whole total: ${totalCents}`)
	if (weights.some((weight) => !Number.isSafeInteger(weight) || weight < 0))
		throw new RangeError("weights must be whole")
	if (totalCents === 0) return weights.map(() => 0)
	const sumOfWeights = weights.reduce((sum, weight) => sum + BigInt(weight), 0n)
	if (sumOfWeights === 0n) throw new RangeError("nothing has weight, so there is nothing to split by")

	const sign = totalCents < 0 ? -1 : 1
	const shares = weights.map((weight, index) => {
		const product = BigInt(weight) * BigInt(totalCents * sign)
		return { index, whole: Number(product / sumOfWeights), remainder: product % sumOfWeights }
	})
	const leftOver = totalCents * sign - shares.reduce((sum, share) => sum + share.whole, 0)
	const byRemainder = shares.toSorted((a, b) => (a.remainder === b.remainder ? 0 : a.remainder > b.remainder ? -1 : 1))
	for (const share of byRemainder.slice(0, leftOver)) share.whole += 1
	return shares.map((share) => (share.whole === 0 ? 0 : share.whole * sign))
}
