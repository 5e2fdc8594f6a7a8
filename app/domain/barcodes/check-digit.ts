/**
 * The check digit for the digits before it: from the right they weigh 3, 1, 3, 1 and so on, and the digit lifts the sum to
 * the next ten. The same for GTIN-8, -12, -13, -14 and SSCC. Throws RangeError on anything but digits.
 * Source: GS1 General Specifications, 7.9.1.
 */
export function checkDigit(body: string): number {
	if (!/^\d+$/.test(body)) throw new RangeError(`not digits: ${body}`)
	const sum = [...body].reverse().reduce((total, digit, place) => total + Number(digit) * (place % 2 === 0 ? 3 : 1), 0)
	return (10 - (sum % 10)) % 10
}

/** Whether the last digit of a code is its check digit. */
export function hasRightCheckDigit(code: string): boolean {
	return /^\d{2,}$/.test(code) && checkDigit(code.slice(0, -1)) === Number(code.at(-1))
}
