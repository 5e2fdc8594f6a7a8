import type { Refused } from "../result"
import { FreezeRunFold, type FreezeRuns, type Stretch } from "./freeze-runs"
import type { TemperatureUnit } from "./freezing"
import { LoggerFigure } from "./logger-figure"
import { cellsOf, findFormat, type LoggerFormat, unitNamed } from "./logger-format"
import { type DateOrder, LoggerTime } from "./logger-time"

/** What a person says about a file where it does not say it itself, and what counts. */
export type LoggerQuestion = {
	/** Null leaves it to the file. */
	unit: TemperatureUnit | null
	dates: "month-first" | "day-first" | null
	/** Readings from the loading up to now count, as moments and as the producer's wall clock shows them. */
	counts: { moments: Stretch; wall: Stretch }
	/** Whether clocks are put forward or back on the day of a wall-clock time. */
	isShiftDay: (wall: number) => boolean
}

export type LoggerRefusal =
	| Refused<"empty">
	| Refused<"binary">
	| Refused<"no-columns", { line: string }>
	| Refused<"decimal-comma", { line: string }>
	| Refused<"unreadable-rows", { row: number; line: string; count: number }>
	| Refused<"mixed-units", { row: number; line: string }>
	| Refused<"unit-unknown">
	| Refused<"mixed-zones", { row: number; line: string }>
	| Refused<"dates-unclear", { line: string }>
	| Refused<"unsorted", { reading: number }>
	| Refused<"in-the-future", { at: number; hasZone: boolean }>

export type LoggerReading = {
	ok: true
	format: LoggerFormat
	unit: TemperatureUnit
	dates: DateOrder
	/** Lines below the heads that hold no reading. */
	skipped: number
	runs: FreezeRuns
}

/** So many lines are looked at to find the format. */
const SAMPLE_LINES = 60
const QUOTE = 34
const LONGEST_LINE = 20_000
const FUTURE_LEEWAY = 3_600_000
/** A few lines may be notes or faults of the logger; more than one in ten are another kind of file. */
const SKIPPED_AT_MOST = 5

/**
 * Reads a logger file piece by piece and judges it as it goes: nothing but the findings is kept, however long the file
 * is. `feed` takes the text in pieces cut anywhere; it answers false once the file is refused and the rest need not be
 * read. `finish` answers the findings or why the file is refused. Times without a zone are the wall clock's; days that
 * may be read two ways are read both ways, and the whole file decides.
 */
export class LoggerReader {
	readonly #question: LoggerQuestion
	readonly #time = new LoggerTime()
	readonly #figure = new LoggerFigure()
	#rest = ""
	#sample: { line: string; number: number }[] = []
	#line = 0
	#isSampling = true
	#format: LoggerFormat | null = null
	#refusal: LoggerRefusal | null = null
	#unit: TemperatureUnit | null = null
	#row = 0
	#skipped = 0
	#firstSkipped: { row: number; line: string } | null = null
	#firstLine = ""
	#isYearFirst = false
	#monthFirst: FreezeRunFold | null = null
	#dayFirst: FreezeRunFold | null = null
	#waiting: [monthFirst: number, dayFirst: number, temperature: number][] = []

	constructor(question: LoggerQuestion) {
		this.#question = question
	}

	feed(text: string): boolean {
		if (this.#refusal) return false
		if (text.includes("\0") || (this.#isSampling && isMostlyControl(text)))
			return this.#refuse({ ok: false, reason: "binary" })
		const all = this.#rest + text
		let from = 0
		for (let end = all.indexOf("\n"); end !== -1; end = all.indexOf("\n", from)) {
			if (!this.#takeLine(all, from, end)) return false
			from = end + 1
		}
		this.#rest = all.slice(from)
		if (this.#rest.length > LONGEST_LINE) return this.#refuse({ ok: false, reason: "binary" })
		return true
	}

	finish(): LoggerReading | LoggerRefusal {
		if (!this.#refusal && this.#rest !== "") this.#takeLine(this.#rest, 0, this.#rest.length)
		if (!this.#refusal && this.#isSampling) this.#settleFormat()
		if (this.#refusal) return this.#refusal
		return this.#conclude()
	}

	#refuse(refusal: LoggerRefusal): false {
		this.#refusal ??= refusal
		return false
	}

	#takeLine(text: string, from: number, to: number): boolean {
		this.#line += 1
		let end = to
		while (end > from && text.charCodeAt(end - 1) <= 32) end -= 1
		if (end === from) return true
		if (!this.#isSampling) return this.#takeRow(text, from, end)
		this.#sample.push({ line: text.slice(from, end).replace(/^\uFEFF/, ""), number: this.#line })
		return this.#sample.length < SAMPLE_LINES || this.#settleFormat()
	}

	#settleFormat(): boolean {
		const lines = this.#sample
		const reached = this.#line
		this.#isSampling = false
		this.#sample = []
		if (lines.length === 0) return this.#refuse({ ok: false, reason: "empty" })
		const format = findFormat(lines.map(({ line }) => line))
		const last = shortened(lines.at(-1)?.line ?? "")
		if (format === "none") return this.#refuse({ ok: false, reason: "no-columns", line: last })
		if (format === "decimal-comma") return this.#refuse({ ok: false, reason: "decimal-comma", line: last })
		this.#format = format
		this.#unit = format.unit
		let hasBegun = false
		for (const { line, number } of lines) {
			this.#line = number
			// What stands above the first reading are heads and notes, and no rows that failed.
			hasBegun ||= this.#readCells(line, 0, line.length)
			if (hasBegun && !this.#takeRow(line, 0, line.length)) return false
		}
		this.#line = reached
		return true
	}

	#takeRow(text: string, from: number, to: number): boolean {
		this.#row += 1
		if (!this.#readCells(text, from, to)) return this.#skip(text, from, to)
		if (this.#time.hasZone !== this.#format?.hasZone)
			return this.#refuse({
				ok: false,
				reason: "mixed-zones",
				row: this.#line,
				line: shortened(text.slice(from, to)),
			})
		if (this.#figure.unit !== null && !this.#agreesOnUnit(this.#figure.unit))
			return this.#refuse({
				ok: false,
				reason: "mixed-units",
				row: this.#line,
				line: shortened(text.slice(from, to)),
			})
		if (this.#firstLine === "") {
			this.#firstLine = shortened(text.slice(from, to))
			this.#isYearFirst = this.#time.isYearFirst
		}
		return this.#judge(this.#time.monthFirst, this.#time.dayFirst, this.#figure.value)
	}

	/** A row without a reading: a note, a fault, or the heads of a second table, which may name another unit. */
	#skip(text: string, from: number, to: number): boolean {
		const line = shortened(text.slice(from, to))
		this.#skipped += 1
		this.#firstSkipped ??= { row: this.#line, line }
		const unit = unitNamed(line)
		if (unit === null || unit === (this.#unit ?? unit)) return true
		return this.#refuse({ ok: false, reason: "mixed-units", row: this.#line, line })
	}

	/** A sign beside a figure must agree with the heads and with every other figure. */
	#agreesOnUnit(unit: TemperatureUnit): boolean {
		this.#unit ??= unit
		return this.#unit === unit
	}

	/** Finds time and temperature in a row; false when either is not there. */
	#readCells(text: string, from: number, to: number): boolean {
		const format = this.#format as LoggerFormat
		const code = format.delimiter.charCodeAt(0)
		const last = Math.max(format.timeColumn, format.clockColumn, format.temperatureColumn)
		let start = from
		let clockFrom = -1
		let clockTo = -1
		let found = 0
		for (let column = 0; column <= last; column += 1) {
			if (start > to) return false
			let end = start
			for (let letter = text.charCodeAt(end); end < to && letter !== code; letter = text.charCodeAt(end)) {
				if (letter === QUOTE) return this.#readQuoted(text.slice(from, to), format)
				end += 1
			}
			if (column === format.timeColumn) {
				if (!this.#time.read(text, start, end)) return false
				found += 1
			} else if (column === format.clockColumn) {
				clockFrom = start
				clockTo = end
			} else if (column === format.temperatureColumn) {
				if (!this.#figure.read(text, start, end)) return false
				found += 1
			}
			start = end + 1
		}
		return found === 2 && (clockFrom === -1 || this.#time.addTime(text, clockFrom, clockTo))
	}

	#readQuoted(line: string, format: LoggerFormat): boolean {
		const cells = cellsOf(line, format.delimiter)
		const at = cells[format.timeColumn] ?? ""
		const clock = cells[format.clockColumn] ?? ""
		const figure = cells[format.temperatureColumn] ?? ""
		return (
			this.#time.read(at, 0, at.length) &&
			(format.clockColumn === -1 || this.#time.addTime(clock, 0, clock.length)) &&
			this.#figure.read(figure, 0, figure.length)
		)
	}

	/** Gives a reading to both ways to read the days, and gives up the one in which a day does not exist. */
	#judge(monthFirst: number, dayFirst: number, temperature: number): boolean {
		if (!this.#monthFirst && !this.#dayFirst && !this.#begin()) {
			this.#waiting.push([monthFirst, dayFirst, temperature])
			return this.#waiting.length <= SAMPLE_LINES || this.#refuse({ ok: false, reason: "unit-unknown" })
		}
		if (Number.isNaN(monthFirst)) this.#monthFirst = null
		if (Number.isNaN(dayFirst)) this.#dayFirst = null
		this.#monthFirst?.add(monthFirst, temperature)
		this.#dayFirst?.add(dayFirst, temperature)
		if (this.#monthFirst || this.#dayFirst) return true
		return this.#refuse({ ok: false, reason: "dates-unclear", line: this.#firstLine })
	}

	/** Begins to judge once the unit is known; until then a few readings wait. */
	#begin(): boolean {
		const { unit, counts, isShiftDay, dates } = this.#question
		const known = this.#unit ?? unit
		if (known === null) return false
		this.#unit = known
		const hasZone = this.#format?.hasZone ?? false
		const fold = () =>
			new FreezeRunFold(known, hasZone ? counts.moments : counts.wall, hasZone ? () => false : isShiftDay)
		// Where the year stands first, or days have dots, both ways are one.
		const { isOneWay } = this.#time
		if (dates !== "month-first" || isOneWay) this.#dayFirst = fold()
		if (dates !== "day-first" && !isOneWay) this.#monthFirst = fold()
		for (const [monthFirst, dayFirst, temperature] of this.#waiting.splice(0))
			this.#judge(monthFirst, dayFirst, temperature)
		return true
	}

	#conclude(): LoggerReading | LoggerRefusal {
		if (this.#waiting.length > 0) return { ok: false, reason: "unit-unknown" }
		if (this.#skipped > SKIPPED_AT_MOST && this.#skipped * 10 > this.#row && this.#firstSkipped)
			return { ok: false, reason: "unreadable-rows", count: this.#skipped, ...this.#firstSkipped }
		const ways = [
			...(this.#monthFirst ? [{ dates: "month-first" as const, runs: this.#monthFirst.finish() }] : []),
			...(this.#dayFirst
				? [
						{
							dates: this.#isYearFirst ? ("year-first" as const) : ("day-first" as const),
							runs: this.#dayFirst.finish(),
						},
					]
				: []),
		]
		const [best, other] = ways.toSorted((a, b) => this.#doubt(a.runs) - this.#doubt(b.runs))
		if (!best || !this.#format || !this.#unit) return { ok: false, reason: "empty" }
		if (other && this.#doubt(best.runs) === this.#doubt(other.runs) && best.runs.span.from !== other.runs.span.from)
			return { ok: false, reason: "dates-unclear", line: this.#firstLine }
		if (best.runs.unsorted) return { ok: false, reason: "unsorted", reading: best.runs.unsorted.reading }
		if (this.#isAhead(best.runs))
			return { ok: false, reason: "in-the-future", at: best.runs.span.to, hasZone: this.#format.hasZone }
		return { ok: true, format: this.#format, unit: this.#unit, skipped: this.#skipped, ...best }
	}

	/** How little a way to read the days fits: times to come, times out of order, all before the loading, then gaps. */
	#doubt(runs: FreezeRuns): number {
		const isOutside = runs.outside === runs.readings
		return (this.#isAhead(runs) ? 4e9 : 0) + (runs.unsorted ? 2e9 : 0) + (isOutside ? 1e9 : 0) + runs.gaps.count
	}

	#isAhead(runs: FreezeRuns): boolean {
		const { moments, wall } = this.#question.counts
		return runs.span.to > (this.#format?.hasZone ? moments : wall).to + FUTURE_LEEWAY
	}
}

const shortened = (line: string) => (line.length > 80 ? `${line.slice(0, 79)}…` : line)

/** Whether a text holds what no table does: one control character, or one that could not be read, in a hundred. */
function isMostlyControl(text: string): boolean {
	let strange = 0
	const length = Math.min(text.length, 4096)
	for (let at = 0; at < length; at += 1) {
		const code = text.charCodeAt(at)
		if ((code < 32 && code !== 9 && code !== 10 && code !== 13) || code === 127) strange += 1
	}
	return strange * 100 > length
}
