/** How a digit of a price is weighed: twice less its tens, three times, five times plus or less its tens. */
export const priceWeights = {
	two_minus: (digit: number) => (2 * digit - Math.floor((2 * digit) / 10)) % 10,
	three: (digit: number) => (3 * digit) % 10,
	five_plus: (digit: number) => (5 * digit + Math.floor((5 * digit) / 10)) % 10,
	five_minus: (digit: number) => (5 * digit - Math.floor((5 * digit) / 10) + 10) % 10,
} as const

const { two_minus, three, five_plus, five_minus } = priceWeights
const FOUR = [two_minus, two_minus, three, five_minus]
const FIVE = [five_plus, two_minus, five_minus, five_plus, two_minus]

/**
 * The digit that guards the price inside a code for weighed goods, for prices of four or five digits in cents.
 * Throws RangeError on any other length. Source: GS1 General Specifications, 7.9.2 to 7.9.4 (read as coded in the library biip).
 */
export function priceCheckDigit(price: string): number {
	if (!/^\d{4,5}$/.test(price)) throw new RangeError(`not a price of four or five digits: ${price}`)
	const weights = price.length === 4 ? FOUR : FIVE
	const sum = [...price].reduce((total, digit, place) => total + (weights[place]?.(Number(digit)) ?? 0), 0)
	if (price.length === 4) return (3 * sum) % 10
	const wanted = (10 - (sum % 10)) % 10
	return [0, 1, 2, 3, 4, 5, 6, 7, 8, 9].find((digit) => five_minus(digit) === wanted) ?? 0
}
