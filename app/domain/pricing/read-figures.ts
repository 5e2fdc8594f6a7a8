import { type Day, isDay } from "../calendar"

const MOST_CENTS = 100_000_000
const SIGNS = /(?:US?\$|USD|EUR|CAD|[$€£])/gi
const BLANKS = /[\s\u00a0\u2009\u202f'’]/g

/**
 * Reads an amount as a person or a spreadsheet writes it, in whole cents: "$1,118.00", "1.118,00", "1 118", "114,5". Of a
 * point and a comma the later one parts the cents; one sign alone before exactly three digits parts thousands. Null for
 * what is no amount, has more than two decimals, is below zero or above a million. This product's own rule.
 */
export function readCents(text: string): number | null {
	const bare = text.replace(SIGNS, "").replace(BLANKS, "")
	const [, whole, part = ""] = /^([1-9]\d{0,2}(?:[.,]\d{3})+|\d+)(?:[.,](\d{1,2}))?$/.exec(bare) ?? []
	if (whole === undefined) return null
	const thousands = new Set(whole.replaceAll(/\d/g, ""))
	const cents = bare.slice(whole.length, whole.length + 1)
	if (thousands.size > 1 || thousands.has(cents)) return null
	const amount = Number(whole.replaceAll(/\D/g, "")) * 100 + Number(part.padEnd(2, "0"))
	return amount <= MOST_CENTS ? amount : null
}

/** A whole number of cases from 1 to 999, as it is typed; null for anything else. */
export function readLeastCases(text: string): number | null {
	const [, figures] = /^(\d{1,3})(?:\s*(?:cases?|cs)\.?|\+)?$/i.exec(text.trim()) ?? []
	return figures === undefined || Number(figures) === 0 ? null : Number(figures)
}

/**
 * Reads a day as 2026-08-18, 8/18/2026 (month first, as here) or 18.8.2026 (day first, as a decimal comma comes with). Null
 * for what is no day.
 */
export function readDay(text: string): Day | null {
	const typed = text.trim()
	const [, month, day, year] = /^(\d{1,2})\/(\d{1,2})\/(\d{4})$/.exec(typed) ?? []
	const [, dayFirst, monthSecond, yearLast] = /^(\d{1,2})\.(\d{1,2})\.(\d{4})$/.exec(typed) ?? []
	const two = (part = "") => part.padStart(2, "0")
	const iso = year
		? `${year}-${two(month)}-${two(day)}`
		: yearLast
			? `${yearLast}-${two(monthSecond)}-${two(dayFirst)}`
			: typed
	return isDay(iso) ? iso : null
}

/** A share in hundredths of a percent: "10", "12.5 %", "7,25". Above 0 to 100; null for anything else. */
export function readBasisPoints(text: string): number | null {
	const [, whole, part = ""] = /^(\d{1,3})(?:[.,](\d{1,2}))?\s*%?$/.exec(text.trim()) ?? []
	if (whole === undefined) return null
	const points = Number(whole) * 100 + Number(part.padEnd(2, "0"))
	return points > 0 && points <= 10_000 ? points : null
}
