/**
 * An exact number: `top` over `bottom`, in lowest terms, `bottom` above zero. Weights, errors and their averages are
 * compared as such, so that a package exactly at a limit is never moved over it by binary arithmetic.
 */
export type Fraction = { readonly top: bigint; readonly bottom: bigint }

function gcd(a: bigint, b: bigint): bigint {
	return b === 0n ? a : gcd(b, a % b)
}

const size = (value: bigint) => (value < 0n ? -value : value)

/** `top` over `bottom` in lowest terms. Throws RangeError on a bottom of zero. */
export function fraction(top: bigint, bottom = 1n): Fraction {
	if (bottom === 0n) throw new RangeError("nothing is divided by zero")
	const shared = gcd(size(top), size(bottom)) || 1n
	const sign = bottom < 0n ? -1n : 1n
	return { top: (sign * top) / shared, bottom: (sign * bottom) / shared }
}

export const ZERO = fraction(0n)

/**
 * A decimal as it is written ("-0.194", "16.3", 0.008), exactly. A number is taken by its shortest decimal form, which is
 * what was typed. Throws RangeError on anything else.
 */
export function exactly(decimal: string | number): Fraction {
	const [, sign, whole = "", part = "", power = "0"] = /^([+-]?)(\d*)\.?(\d*)(?:e([+-]?\d+))?$/.exec(`${decimal}`) ?? []
	if (whole + part === "") throw new RangeError(`not a decimal: ${decimal}`)
	const top = BigInt(`${sign === "-" ? "-" : ""}${whole}${part}`)
	const places = part.length - Number(power)
	return places >= 0 ? fraction(top, 10n ** BigInt(places)) : fraction(top * 10n ** BigInt(-places))
}

export const plus = (a: Fraction, b: Fraction) => fraction(a.top * b.bottom + b.top * a.bottom, a.bottom * b.bottom)
export const minus = (a: Fraction, b: Fraction) => plus(a, { top: -b.top, bottom: b.bottom })
export const times = (a: Fraction, b: Fraction) => fraction(a.top * b.top, a.bottom * b.bottom)
export const over = (a: Fraction, b: Fraction) => fraction(a.top * b.bottom, a.bottom * b.top)
export const negative = (a: Fraction): Fraction => ({ top: -a.top, bottom: a.bottom })

/** Below zero when `a` is the smaller, zero when they are equal, above zero when `a` is the larger. */
export function compare(a: Fraction, b: Fraction): number {
	const difference = a.top * b.bottom - b.top * a.bottom
	return difference < 0n ? -1 : difference > 0n ? 1 : 0
}

export const sumOf = (all: readonly Fraction[]) => all.reduce(plus, ZERO)

/** The average. Throws RangeError when there is nothing to average. */
export const meanOf = (all: readonly Fraction[]) => over(sumOf(all), fraction(BigInt(all.length)))

export const smallest = (all: readonly Fraction[]) =>
	all.reduce((least, each) => (compare(each, least) < 0 ? each : least))
export const largest = (all: readonly Fraction[]) => all.reduce((most, each) => (compare(each, most) > 0 ? each : most))

/** Rounded to `places` decimals (none below zero places: tens, hundreds), half away from zero; still exact. */
export function rounded(value: Fraction, places: number): Fraction {
	const step = places >= 0 ? fraction(1n, 10n ** BigInt(places)) : fraction(10n ** BigInt(-places))
	const { top, bottom } = over(value, step)
	const whole = (2n * size(top) + bottom) / (2n * bottom)
	return times(fraction(top < 0n ? -whole : whole), step)
}

/** Rounded to `figures` significant figures: what a conversion "good to six figures" gives. */
export function toFigures(value: Fraction, figures: number): Fraction {
	if (value.top === 0n) return value
	const exponent = Math.floor(Math.log10(Math.abs(asNumber(value))) + 1e-12)
	return rounded(value, figures - 1 - exponent)
}

/** As text with exactly `places` decimals, half away from zero: "-1.8607". Never "-0.00". */
export function decimalText(value: Fraction, places: number): string {
	const { top, bottom } = times(rounded(value, places), fraction(10n ** BigInt(places)))
	const digits = `${size(top / bottom)}`.padStart(places + 1, "0")
	const sign = top < 0n ? "-" : ""
	return places === 0 ? `${sign}${digits}` : `${sign}${digits.slice(0, -places)}.${digits.slice(-places)}`
}

/** As text with all its decimals up to `most`, without zeros at the end: "0.75", "340.194". */
export function plainDecimal(value: Fraction, most = 6): string {
	const text = decimalText(value, most)
	return most === 0 ? text : text.replace(/\.?0+$/, "")
}

/** The nearest number, for drawing and for square roots; decisions never rest on it. */
export function asNumber(value: Fraction): number {
	return Number(value.top) / Number(value.bottom)
}
