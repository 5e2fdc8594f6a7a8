const SPACES = [32, 9, 160, 8239]
const isSpace = (code: number) => code === 32 || SPACES.includes(code)
const isDigit = (code: number) => code >= 48 && code <= 57

/** How the days of a file may be written. */
export type DateOrder = "year-first" | "month-first" | "day-first"

/**
 * Reads the times of a logger file in the forms that are usual: 2026-08-13T14:05:00, the same with Z or +02:00,
 * 2026/08/13 14:05, 8/13/2026 2:05 PM, 13.8.2026 14:05, with or without seconds, the date in one cell with the time or
 * beside it. Days written with dots have the day first; with strokes or dashes either may be meant, and both are given.
 * One object reads a file through: it allocates nothing for a row.
 */
export class LoggerTime {
	/** Milliseconds of the last reading if the month stands first, and if the day does; NaN where there is no such day. */
	monthFirst = Number.NaN
	dayFirst = Number.NaN
	/** Whether the last reading named its zone; without, its milliseconds are those of the wall clock, as if in UTC. */
	hasZone = false
	/** Whether the last reading gave a time of day. */
	hasTime = false
	/** Whether the year stood first in the last reading. */
	isYearFirst = false
	/** Whether the day of the last reading can be read in one way only by how it is written. */
	isOneWay = false

	#at = 0
	#a = -1
	#b = -1
	#c = -1
	#separator = 0
	#width = 0
	#monthMidnight = Number.NaN
	#dayMidnight = Number.NaN

	/** Reads a date, and a time if one follows, in `text` from `from` up to `to`. False when there is none or it is wrong. */
	read(text: string, from: number, to: number): boolean {
		this.hasZone = false
		this.hasTime = false
		this.#at = from
		if (!this.#readDate(text, to)) return false
		this.#skipBetween(text, to)
		return this.#at >= to || this.#readTime(text, to)
	}

	/** Reads a time of day that stands in a cell of its own and adds it to the date read last. */
	addTime(text: string, from: number, to: number): boolean {
		this.#at = from
		this.#skipBetween(text, to)
		return !this.hasTime && this.#readTime(text, to)
	}

	#readDate(text: string, to: number): boolean {
		this.#skipBetween(text, to)
		const start = this.#at
		const a = this.#number(text, to)
		const firstWidth = this.#at - start
		const separator = text.charCodeAt(this.#at)
		if (a < 0 || this.#at >= to || (separator !== 45 && separator !== 46 && separator !== 47)) return false
		this.#at += 1
		const b = this.#number(text, to)
		if (b < 0 || this.#at >= to || text.charCodeAt(this.#at) !== separator) return false
		this.#at += 1
		const yearAt = this.#at
		const c = this.#number(text, to)
		const width = firstWidth === 4 ? 4 : -(this.#at - yearAt)
		if (c < 0 || (width !== 4 && width !== -4 && width !== -2)) return false
		return this.#setDay(a, b, c, separator, width)
	}

	/** The days that three numbers can mean; those of the row before are kept, as most rows share their day. */
	#setDay(a: number, b: number, c: number, separator: number, width: number): boolean {
		if (a !== this.#a || b !== this.#b || c !== this.#c || separator !== this.#separator || width !== this.#width) {
			this.#a = a
			this.#b = b
			this.#c = c
			this.#separator = separator
			this.#width = width
			this.isYearFirst = width === 4
			this.isOneWay = width === 4 || separator === 46
			const year = width === -2 ? 2000 + c : c
			this.#dayMidnight = width === 4 ? epochOf(a, b, c) : epochOf(year, b, a)
			this.#monthMidnight = this.isOneWay ? this.#dayMidnight : epochOf(year, a, b)
		}
		this.monthFirst = this.#monthMidnight
		this.dayFirst = this.#dayMidnight
		return !(Number.isNaN(this.monthFirst) && Number.isNaN(this.dayFirst))
	}

	#readTime(text: string, to: number): boolean {
		let hour = this.#number(text, to)
		if (hour < 0 || this.#at >= to || text.charCodeAt(this.#at) !== 58) return false
		this.#at += 1
		const minute = this.#number(text, to)
		let seconds = 0
		if (text.charCodeAt(this.#at) === 58 && this.#at < to) {
			this.#at += 1
			seconds = this.#number(text, to) + this.#fraction(text, to)
		}
		this.#skipSpaces(text, to)
		const half = this.#half(text, to)
		if (half !== 0) {
			if (hour < 1 || hour > 12) return false
			hour = (hour % 12) + (half === 2 ? 12 : 0)
		}
		if (hour > 23 || minute < 0 || minute > 59 || seconds < 0 || seconds >= 60) return false
		const offset = this.#zone(text, to)
		if (Number.isNaN(offset)) return false
		const time = (hour * 60 + minute - offset) * 60_000 + Math.round(seconds * 1000)
		this.monthFirst += time
		this.dayFirst += time
		this.hasTime = true
		return true
	}

	/** 1 for am, 2 for pm, 0 for neither. */
	#half(text: string, to: number): 0 | 1 | 2 {
		const letter = text.charCodeAt(this.#at) | 32
		if (this.#at >= to || (letter !== 97 && letter !== 112)) return 0
		let end = this.#at + 1
		if (text.charCodeAt(end) === 46) end += 1
		if ((text.charCodeAt(end) | 32) !== 109) return 0
		end += 1
		if (text.charCodeAt(end) === 46) end += 1
		this.#at = end
		return letter === 97 ? 1 : 2
	}

	/** Minutes ahead of UTC; 0 when no zone is named; NaN when something else follows. */
	#zone(text: string, to: number): number {
		this.#skipSpaces(text, to)
		if (this.#at >= to) return 0
		const code = text.charCodeAt(this.#at)
		if (code === 90 && this.#at + 1 === to) {
			this.hasZone = true
			return 0
		}
		const rest = text.slice(this.#at, to).trim()
		if (/^(?:UTC|GMT)$/i.test(rest)) {
			this.hasZone = true
			return 0
		}
		const [, hours, minutes = "0"] = /^[+−-](\d{2}):?(\d{2})?$/.exec(rest) ?? []
		if (hours === undefined) return Number.NaN
		this.hasZone = true
		return (code === 43 ? 1 : -1) * (Number(hours) * 60 + Number(minutes))
	}

	#fraction(text: string, to: number): number {
		const code = text.charCodeAt(this.#at)
		if (this.#at >= to || (code !== 46 && code !== 44)) return 0
		this.#at += 1
		const start = this.#at
		const digits = this.#number(text, to)
		return digits < 0 ? 0 : digits / 10 ** (this.#at - start)
	}

	/** The whole number at the place reached, which moves on; -1 when there is none. */
	#number(text: string, to: number): number {
		let value = -1
		for (let code = text.charCodeAt(this.#at); this.#at < to && isDigit(code); code = text.charCodeAt(this.#at)) {
			value = (value < 0 ? 0 : value * 10) + code - 48
			this.#at += 1
		}
		return value
	}

	#skipSpaces(text: string, to: number): void {
		while (this.#at < to && isSpace(text.charCodeAt(this.#at))) this.#at += 1
	}

	/** Spaces, the T of the international form, a comma and quotes may stand around a date and a time. */
	#skipBetween(text: string, to: number): void {
		while (this.#at < to) {
			const code = text.charCodeAt(this.#at)
			if (!isSpace(code) && code !== 84 && code !== 44 && code !== 34) return
			this.#at += 1
		}
	}
}

/** Midnight of a day that exists, in milliseconds; NaN for one that does not. */
function epochOf(year: number, month: number, day: number): number {
	if (month < 1 || month > 12 || day < 1 || day > 31 || year < 1970 || year > 2200) return Number.NaN
	const epoch = Date.UTC(year, month - 1, day)
	return new Date(epoch).getUTCDate() === day ? epoch : Number.NaN
}
