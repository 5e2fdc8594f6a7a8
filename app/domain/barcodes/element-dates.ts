import { type Day, endOfMonth, isDay } from "../calendar"

/** A day as six digits, YYMMDD. */
export function elementDate(day: Day): string {
	if (!isDay(day)) throw new RangeError(`not a day: ${day}`)
	return day.slice(2).replaceAll("-", "")
}

/**
 * The day that six digits stand for; day 00 is the last of the month. The century is the one that puts the year between 49
 * before and 50 after `thisYear`. Null when there is no such day. Source: GS1 General Specifications, 7.12 and 3.4.
 */
export function readElementDate(digits: string, thisYear: number): Day | null {
	const [, yy, month, dayOfMonth] = /^(\d\d)(\d\d)(\d\d)$/.exec(digits) ?? []
	if (!yy || !month || !dayOfMonth) return null
	const distance = Number(yy) - (thisYear % 100)
	const century = Math.floor(thisYear / 100) + (distance >= 51 ? -1 : distance <= -50 ? 1 : 0)
	const first = `${century}${yy}-${month}-01`
	if (!isDay(first)) return null
	const day = dayOfMonth === "00" ? endOfMonth(first) : `${century}${yy}-${month}-${dayOfMonth}`
	return isDay(day) ? day : null
}
