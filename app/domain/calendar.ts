/** A calendar day as ISO text, "2026-08-18". Days compare and sort as text. */
export type Day = string

/** A weekday as ISO 8601 counts it: 1 is Monday, 7 is Sunday. */
export type Weekday = 1 | 2 | 3 | 4 | 5 | 6 | 7

const MS_PER_DAY = 86_400_000

const WEEKDAY_NAMES = ["Monday", "Tuesday", "Wednesday", "Thursday", "Friday", "Saturday", "Sunday"] as const
const MONTH_NAMES = [
	"January",
	"February",
	"March",
	"April",
	"May",
	"June",
	"July",
	"August",
	"September",
	"October",
	"November",
	"December",
] as const

const DAY = /^(\d{4})-(\d{2})-(\d{2})$/

/** Whether `text` is a day that exists, written "YYYY-MM-DD". Asked of every day that is reckoned with: no date is made. */
export function isDay(text: string): boolean {
	const [, year, month, date] = DAY.exec(text) ?? []
	return year !== undefined && Number(date) >= 1 && Number(date) <= daysInMonth(Number(year), Number(month))
}

/** By the Gregorian calendar, as ISO 8601 has it; 0 for a month that there is not. */
function daysInMonth(year: number, month: number): number {
	if (month === 2) return year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0) ? 29 : 28
	if (month < 1 || month > 12) return 0
	return month === 4 || month === 6 || month === 9 || month === 11 ? 30 : 31
}

/** Sorts days, the earlier first. */
export function compareDays(a: Day, b: Day): number {
	return a < b ? -1 : a > b ? 1 : 0
}

function epochDay(day: Day): number {
	if (!isDay(day)) throw new RangeError(`not a calendar day: ${day}`)
	return Date.parse(`${day}T00:00:00Z`) / MS_PER_DAY
}

function dayOfEpoch(days: number): Day {
	return new Date(days * MS_PER_DAY).toISOString().slice(0, 10)
}

function partsOf(day: Day): { year: number; month: number; date: number } {
	epochDay(day)
	const [year = 0, month = 0, date = 0] = day.split("-").map(Number)
	return { year, month, date }
}

/** The day `count` days after `day`; a negative count goes back. Throws RangeError when `day` is no day. */
export function addDays(day: Day, count: number): Day {
	return dayOfEpoch(epochDay(day) + count)
}

/** Whole days from `from` to `to`, negative when `to` is earlier. Throws RangeError when either is no day. */
export function daysBetween(from: Day, to: Day): number {
	return epochDay(to) - epochDay(from)
}

/** The ISO weekday of `day`: 1 Monday to 7 Sunday. Throws RangeError when `day` is no day. */
export function weekday(day: Day): Weekday {
	// 1970-01-01 was a Thursday.
	return (((((epochDay(day) + 3) % 7) + 7) % 7) + 1) as Weekday
}

/** The last day of the month that `day` lies in. Throws RangeError when `day` is no day. */
export function endOfMonth(day: Day): Day {
	const { year, month } = partsOf(day)
	const firstOfNext = month === 12 ? `${year + 1}-01-01` : `${day.slice(0, 4)}-${String(month + 1).padStart(2, "0")}-01`
	return addDays(firstOfNext, -1)
}

/** The fourteen days of the ribbon, `from` first. Throws RangeError when `from` is no day. */
export function fortnight(from: Day): Day[] {
	return Array.from({ length: 14 }, (_, index) => addDays(from, index))
}

/** "Monday" to "Sunday". */
export function weekdayName(day: Weekday): string {
	return WEEKDAY_NAMES[day - 1] as string
}

/** "January" to "December" for 1 to 12. Throws RangeError for any other month. */
export function monthName(month: number): string {
	const name = MONTH_NAMES[month - 1]
	if (!name) throw new RangeError(`not a month: ${month}`)
	return name
}

/** "August 18". */
export function monthDay(day: Day): string {
	const { month, date } = partsOf(day)
	return `${monthName(month)} ${date}`
}

/** "Aug 18", for column heads. */
export function shortMonthDay(day: Day): string {
	const { month, date } = partsOf(day)
	return `${monthName(month).slice(0, 3)} ${date}`
}

/** "Tuesday, August 18". */
export function dayWords(day: Day): string {
	return `${weekdayName(weekday(day))}, ${monthDay(day)}`
}

/** "August 18, 2026", for papers that outlive the season. */
export function fullDay(day: Day): string {
	return `${monthDay(day)}, ${partsOf(day).year}`
}

/** "Tue 18", for day tabs. */
export function shortDay(day: Day): string {
	return `${weekdayName(weekday(day)).slice(0, 3)} ${partsOf(day).date}`
}

/** Making a clock costs a hundred times what reading it does; there are as many as zones in use. */
const clocks = new Map<string, Intl.DateTimeFormat>()

function clockOf(zone: string): Intl.DateTimeFormat {
	const made =
		clocks.get(zone) ??
		new Intl.DateTimeFormat("en-CA", {
			timeZone: zone,
			calendar: "gregory",
			numberingSystem: "latn",
			hourCycle: "h23",
			year: "numeric",
			month: "2-digit",
			day: "2-digit",
			hour: "2-digit",
			minute: "2-digit",
		})
	clocks.set(zone, made)
	return made
}

function wallClock(instant: Date, zone: string): { day: Day; hour: number; minute: number } {
	const parts = clockOf(zone).formatToParts(instant)
	const of = (type: Intl.DateTimeFormatPartTypes) => parts.find((part) => part.type === type)?.value ?? ""
	return {
		day: `${of("year").padStart(4, "0")}-${of("month")}-${of("day")}`,
		hour: Number(of("hour")),
		minute: Number(of("minute")),
	}
}

/** The calendar day it is at `instant` in the time zone `zone` ("America/New_York"). Throws on an unknown zone. */
export function dayInZone(instant: Date, zone: string): Day {
	return wallClock(instant, zone).day
}

/**
 * The instant at which clocks in `zone` show `time` ("12:00") on `day`. When the clocks skip that time it is the same
 * time before the change, moved forward by the gap; when they show it twice it is the first. Throws RangeError when
 * day, time or zone does not exist. Source: RFC 5545, 3.3.5, as Temporal's "compatible" rule.
 */
export function instantAt(day: Day, time: string, zone: string): Date {
	if (!isDay(day)) throw new RangeError(`not a day: ${day}`)
	if (!/^([01]\d|2[0-3]):[0-5]\d(:[0-5]\d)?$/.test(time)) throw new RangeError(`not a time: ${time}`)
	const wanted = Date.parse(`${day}T${time}Z`)
	// No zone changes its clocks twice within two days: what holds a day before and a day after is all that can hold.
	const before = wanted - offsetAt(wanted - MS_PER_DAY, zone)
	const after = wanted - offsetAt(wanted + MS_PER_DAY, zone)
	const shown = [before, after].filter((at) => at + offsetAt(at, zone) === wanted)
	return new Date(shown.length > 0 ? Math.min(...shown) : before)
}

/** How far the clocks of a zone are ahead of UTC at an instant, in milliseconds, whole minutes. */
function offsetAt(at: number, zone: string): number {
	const { day, hour, minute } = wallClock(new Date(at), zone)
	return Date.parse(`${day}T00:00Z`) + (hour * 60 + minute) * 60_000 - Math.floor(at / 60_000) * 60_000
}

/** The wall-clock time at `instant` in `zone` as people say it: "2:15 pm", "10 am", "noon", "midnight". */
export function timeWords(instant: Date, zone: string): string {
	const { hour, minute } = wallClock(instant, zone)
	if (minute === 0 && hour === 12) return "noon"
	if (minute === 0 && hour === 0) return "midnight"
	const minutes = minute === 0 ? "" : `:${String(minute).padStart(2, "0")}`
	return `${hour % 12 === 0 ? 12 : hour % 12}${minutes} ${hour < 12 ? "am" : "pm"}`
}

/** How long from `now` to `then`, rounded down to minutes: "21 h 45 min", "3 days 4 h", "0 min" once it has passed. */
export function timeLeftWords(now: Date, then: Date): string {
	const minutes = Math.max(0, Math.floor((then.getTime() - now.getTime()) / 60_000))
	const days = Math.floor(minutes / 1440)
	const hours = Math.floor((minutes % 1440) / 60)
	if (days >= 2) return hours === 0 ? `${days} days` : `${days} days ${hours} h`
	const allHours = Math.floor(minutes / 60)
	if (allHours === 0) return `${minutes} min`
	return minutes % 60 === 0 ? `${allHours} h` : `${allHours} h ${minutes % 60} min`
}
