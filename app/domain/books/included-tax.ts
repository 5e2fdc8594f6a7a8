/**
 * The sales tax that a price contains: of `cents` paid at `basisPoints` (825 is 8.25 %) it is cents × rate / (1 + rate),
 * rounded once to whole cents, half up. Throws RangeError on a negative or fractional amount or rate. Local rules decide
 * what is taxed and at which rate.
 */
export function includedTax(cents: number, basisPoints: number): number {
	for (const given of [cents, basisPoints])
		if (!Number.isSafeInteger(given) || given < 0) throw new RangeError(`not whole cents or basis points: ${given}`)
	const top = BigInt(cents) * BigInt(basisPoints)
	const bottom = 10_000n + BigInt(basisPoints)
	return Number((2n * top + bottom) / (2n * bottom))
}
