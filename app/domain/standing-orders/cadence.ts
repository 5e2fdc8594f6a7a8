import { monthName, type Weekday, weekdayName } from "~/domain/calendar"

/** Which weekday of a month: first to fourth, or -1 for the last. */
export type NthWeekday = 1 | 2 | 3 | 4 | -1

/** How often a standing order comes, as chosen in the form. `months` are 1 to 12; an empty list is the whole year. */
export type Cadence =
	| { every: "week"; interval: number; weekday: Weekday; months: readonly number[] }
	| { every: "month"; nth: NthWeekday; weekday: Weekday; months: readonly number[] }

const MAX_INTERVAL = 8
const DAY_CODES: readonly string[] = ["MO", "TU", "WE", "TH", "FR", "SA", "SU"]
const INTERVAL_WORDS = ["", "", " other", " third", " fourth", " fifth", " sixth", " seventh", " eighth"] as const
const NTH_WORDS: Record<NthWeekday, string> = { 1: "first", 2: "second", 3: "third", 4: "fourth", [-1]: "last" }

/**
 * Writes a cadence as an iCalendar rule: "FREQ=WEEKLY;INTERVAL=2;BYDAY=TU", "FREQ=MONTHLY;BYMONTH=5,6;BYDAY=-1FR".
 * Months come sorted and once. Throws RangeError on an interval outside 1 to 8 weeks or a month outside 1 to 12.
 * Source: RFC 5545, 3.3.10.
 */
export function ruleOf(cadence: Cadence): string {
	const months = [...new Set(cadence.months)].toSorted((a, b) => a - b)
	if (months.some((month) => !Number.isInteger(month) || month < 1 || month > 12)) throw new RangeError("no such month")
	const byMonth = months.length === 0 || months.length === 12 ? "" : `;BYMONTH=${months.join(",")}`
	const day = DAY_CODES[cadence.weekday - 1]
	if (cadence.every === "month") return `FREQ=MONTHLY${byMonth};BYDAY=${cadence.nth}${day}`
	const { interval } = cadence
	if (!Number.isInteger(interval) || interval < 1 || interval > MAX_INTERVAL)
		throw new RangeError(`every ${interval} weeks`)
	return `FREQ=WEEKLY${interval === 1 ? "" : `;INTERVAL=${interval}`}${byMonth};BYDAY=${day}`
}

/** Reads a rule that `ruleOf` wrote back into the choices of the form; null for any other rule. */
export function cadenceOf(rule: string): Cadence | null {
	const match =
		/^FREQ=(WEEKLY|MONTHLY)(?:;INTERVAL=(\d))?(?:;BYMONTH=([\d,]+))?;BYDAY=(-?\d)?(MO|TU|WE|TH|FR|SA|SU)$/.exec(rule)
	if (!match) return null
	const [, freq, interval = "1", byMonth, nth, code] = match
	const day = (DAY_CODES.indexOf(code ?? "") + 1) as Weekday
	const months = byMonth ? byMonth.split(",").map(Number) : []
	const cadence: Cadence =
		freq === "WEEKLY"
			? { every: "week", interval: Number(interval), weekday: day, months }
			: { every: "month", nth: Number(nth) as NthWeekday, weekday: day, months }
	try {
		return ruleOf(cadence) === rule && (cadence.every === "week" || cadence.nth in NTH_WORDS) ? cadence : null
	} catch {
		return null
	}
}

function monthsWords(months: readonly number[]): string {
	const sorted = [...new Set(months)].toSorted((a, b) => a - b)
	const [first, last] = [sorted[0], sorted.at(-1)]
	if (first === undefined || last === undefined || sorted.length === 12) return ""
	const names = sorted.map(monthName)
	if (sorted.length > 2 && last - first + 1 === sorted.length) return `, from ${monthName(first)} to ${monthName(last)}`
	return names.length === 1 ? `, in ${names[0]}` : `, in ${names.slice(0, -1).join(", ")} and ${names.at(-1)}`
}

/**
 * A cadence as it reads after "Deliver": "every Tuesday", "every other Tuesday, from May to September",
 * "on the last Friday of the month, in June and August".
 */
export function cadenceWords(cadence: Cadence): string {
	const day = weekdayName(cadence.weekday)
	const often =
		cadence.every === "week"
			? `every${INTERVAL_WORDS[cadence.interval] ?? ` ${cadence.interval}th`} ${day}`
			: `on the ${NTH_WORDS[cadence.nth]} ${day} of the month`
	return `${often}${monthsWords(cadence.months)}`
}
