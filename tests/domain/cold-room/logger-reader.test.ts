import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { FREEZE_TABLE } from "~/domain/cold-room/freezing"
import { type LoggerQuestion, LoggerReader } from "~/domain/cold-room/logger-reader"

const MINUTE = 60_000
const YEAR_2026 = { from: Date.UTC(2026, 0, 1), to: Date.UTC(2026, 11, 31) }
const ask: LoggerQuestion = {
	unit: null,
	dates: null,
	counts: { moments: YEAR_2026, wall: YEAR_2026 },
	isShiftDay: () => false,
}

function readIn(text: string, question: Partial<LoggerQuestion> = {}, pieceLength = 7) {
	const reader = new LoggerReader({ ...ask, ...question })
	for (let from = 0; from < text.length; from += pieceLength)
		if (!reader.feed(text.slice(from, from + pieceLength))) break
	return reader.finish()
}

function read(text: string, question: Partial<LoggerQuestion> = {}) {
	const answer = readIn(text, question)
	if (!answer.ok) throw new Error(`refused: ${answer.reason}`)
	return answer
}

const minutesOf = (answer: ReturnType<typeof read>) =>
	answer.runs.longest.map((run) => (run ? (run.to - run.from) / MINUTE : null))

const refusalOf = (text: string, question: Partial<LoggerQuestion> = {}) => {
	const answer = readIn(text, question)
	return answer.ok ? "read" : answer.reason
}

/** Five-minute readings at one temperature from an hour of August 13, each row written by `row`. */
const rows = (count: number, row: (at: Date) => string, from = Date.UTC(2026, 7, 13, 10)) =>
	Array.from({ length: count }, (_, index) => row(new Date(from + index * 5 * MINUTE))).join("\n")

const two = (n: number) => String(n).padStart(2, "0")
const iso = (at: Date) => at.toISOString().slice(0, 19)
const us = (at: Date) =>
	`${at.getUTCMonth() + 1}/${at.getUTCDate()}/${at.getUTCFullYear()} ${at.getUTCHours() % 12 || 12}:${two(at.getUTCMinutes())} ${at.getUTCHours() < 12 ? "AM" : "PM"}`
const dotted = (at: Date) =>
	`${at.getUTCDate()}.${at.getUTCMonth() + 1}.${at.getUTCFullYear()} ${two(at.getUTCHours())}:${two(at.getUTCMinutes())}`

describe("the forms a logger writes", () => {
	test.each([
		["the international form", `Time,Temp (°C)\n${rows(40, (at) => `${iso(at)},-16.2`)}`, "year-first"],
		["a zone at its end", `time;temperature °C\n${rows(40, (at) => `${iso(at)}+02:00;-16,2`)}`, "year-first"],
		["Z at its end", `time,temperature_C\n${rows(40, (at) => `${at.toISOString()},-16.2`)}`, "year-first"],
		["month first with am and pm", `Date/Time,Temp (°C)\n${rows(40, (at) => `${us(at)},-16.2`)}`, "month-first"],
		["day first with dots", `Zeit;Temp °C\r\n${rows(40, (at) => `${dotted(at)};-16,2`)}`, "day-first"],
		["tabs and quotes", `"Time"\t"Temp °C"\n${rows(40, (at) => `"${iso(at)}"\t"-16.2"`)}`, "year-first"],
		["no heads, and the unit beside the figure", rows(40, (at) => `${iso(at)},-16.2 °C`), "year-first"],
		[
			"the date and the time in two columns, after a number",
			`No.;Date;Time;Humidity %;Temp °C\n${rows(40, (at) => `7;${dotted(at).replace(" ", ";")};55;-16,2`)}`,
			"day-first",
		],
		[
			"lines of its own above the table",
			`Logger 7\nSerial;00123\nTemperature unit;°C\n\nTime;T\n${rows(40, (at) => `${iso(at)};-16.2`)}`,
			"year-first",
		],
		["a mark at the start of the file", `\uFEFFTime,Temp °C\n${rows(40, (at) => `${iso(at)},-16.2`)}`, "year-first"],
	])("%s", (_, text, dates) => {
		const answer = read(text)
		expect(answer.dates).toBe(dates)
		expect(answer.unit).toBe("C")
		expect(answer.runs.readings).toBe(40)
		expect(minutesOf(answer)).toEqual([195, 195, 195])
	})

	test("a zone makes the times moments", () => {
		const answer = read(`time,temp °C\n${rows(3, (at) => `${iso(at)}-04:00,-16`)}`)
		expect(answer.runs.span.from).toBe(Date.UTC(2026, 7, 13, 14))
		expect(answer.format.hasZone).toBe(true)
	})

	test("noon and midnight on the twelve-hour clock", () => {
		const answer = read("t,temp °C\n8/13/2026 12:00 AM,-8\n8/13/2026 12:30 AM,-8\n8/13/2026 1:00 AM,-8\n")
		expect(answer.runs.span).toEqual({ from: Date.UTC(2026, 7, 13, 0), to: Date.UTC(2026, 7, 13, 1) })
		expect(read("t,temp °C\n8/13/2026 11:30 AM,-8\n8/13/2026 12:00 PM,-8\n").runs.span.to).toBe(
			Date.UTC(2026, 7, 13, 12),
		)
	})

	test("degrees Fahrenheit are held against the table's own Fahrenheit figures", () => {
		const answer = read(`Time,Temp (°F)\n${rows(60, (at) => `${iso(at)},20.0`)}`)
		expect(answer.unit).toBe("F")
		expect(minutesOf(answer)).toEqual([295, null, null])
		expect(answer.runs.buckets[0]?.[1]).toBe(-67)
	})

	test("a temperature in a second probe is named and not read", () => {
		const answer = read(`Time,Probe 1 °C,Probe 2 °C\n${rows(5, (at) => `${iso(at)},-16,4`)}`)
		expect(answer.format).toMatchObject({ temperatureHead: "Probe 1 °C", otherTemperatures: ["Probe 2 °C"] })
	})
})

describe("days that can be read two ways", () => {
	const slashed = (day: string, hours: number) =>
		Array.from({ length: hours * 2 }, (_, half) => `${day} ${Math.floor(half / 2)}:${half % 2 ? "30" : "00"},-16`).join(
			"\n",
		)

	test("one day above twelve anywhere in the file settles it", () => {
		const month = read(`t,temp °C\n${slashed("8/12/2026", 24)}\n${slashed("8/13/2026", 5)}`)
		expect(month.dates).toBe("month-first")
		const day = read(`t,temp °C\n${slashed("12/8/2026", 24)}\n${slashed("13/8/2026", 5)}`)
		expect(day.dates).toBe("day-first")
		expect(day.runs.span.from).toBe(Date.UTC(2026, 7, 12))
		expect(minutesOf(day)[0]).toBe(28.5 * 60)
	})

	test("a file that runs on over midnight is read the way that leaves no gaps", () => {
		const answer = read(`t,temp °C\n${slashed("8/9/2026", 24)}\n${slashed("8/10/2026", 5)}`)
		expect(answer.dates).toBe("month-first")
		expect(answer.runs.gaps.count).toBe(0)
	})

	test("the way that lies in the future is not the one", () => {
		const wall = { from: YEAR_2026.from, to: Date.UTC(2026, 7, 20) }
		const answer = read(`t,temp °C\n${slashed("8/9/2026", 5)}`, { counts: { moments: wall, wall } })
		expect(answer.dates).toBe("month-first")
	})

	test("the way that lies all before the loading is not the one", () => {
		const wall = { from: Date.UTC(2026, 8, 1), to: Date.UTC(2026, 11, 1) }
		expect(read(`t,temp °C\n${slashed("8/9/2026", 5)}`, { counts: { moments: wall, wall } }).dates).toBe("day-first")
	})

	test("a single day is asked about, and the answer is taken", () => {
		const text = `t,temp °C\n${slashed("8/9/2026", 5)}`
		expect(refusalOf(text)).toBe("dates-unclear")
		expect(read(text, { dates: "day-first" }).runs.span.from).toBe(Date.UTC(2026, 8, 8))
		expect(read(text, { dates: "month-first" }).runs.span.from).toBe(Date.UTC(2026, 7, 9))
	})

	test("both orders in one file are refused", () => {
		expect(refusalOf("t,temp °C\n13/8/2026 10:00,-16\n8/14/2026 10:00,-16\n")).toBe("dates-unclear")
	})
})

describe("what breaks a run", () => {
	test("a warmer reading", () => {
		const text = `t,temp °C\n${rows(30, (at) => `${iso(at)},-16`)}\n2026-08-13T12:30:00,-5\n${rows(10, (at) => `${iso(at)},-16`, Date.UTC(2026, 7, 13, 12, 35))}`
		expect(minutesOf(read(text))).toEqual([145, 145, 145])
	})

	test("a gap, which is told with its length", () => {
		const text = `t,temp °C\n${rows(30, (at) => `${iso(at)},-16`)}\n${rows(20, (at) => `${iso(at)},-16`, Date.UTC(2026, 7, 13, 14))}`
		const answer = read(text)
		expect(minutesOf(answer)).toEqual([145, 145, 145])
		expect(answer.runs.gaps).toEqual({
			count: 1,
			longest: 95 * MINUTE,
			first: [{ from: Date.UTC(2026, 7, 13, 12, 25), to: Date.UTC(2026, 7, 13, 14) }],
		})
	})

	test("the clock put back at the end of summer time, whose hour is not counted twice", () => {
		const back = `t,temp °C\n${rows(24, (at) => `${iso(at)},-16`, Date.UTC(2026, 10, 1, 0))}\n${rows(20, (at) => `${iso(at)},-16`, Date.UTC(2026, 10, 1, 1))}`
		const answer = read(back)
		expect(answer.runs.clockSteps).toEqual([{ at: Date.UTC(2026, 10, 1, 1), minutes: -60 }])
		expect(minutesOf(answer)).toEqual([115, 115, 115])
		expect(answer.runs.gaps.count).toBe(0)
		const halfAnHour = `t,temp °C\n${rows(24, (at) => `${iso(at)},-16`)}\n${rows(4, (at) => `${iso(at)},-16`, Date.UTC(2026, 7, 13, 11, 30))}`
		expect(refusalOf(halfAnHour)).toBe("unsorted")
	})

	test("the clock put forward, on the day it is; on another day an hour is a gap", () => {
		const text = `t,temp °C\n${rows(24, (at) => `${iso(at)},-16`, Date.UTC(2026, 2, 8, 0))}\n${rows(10, (at) => `${iso(at)},-16`, Date.UTC(2026, 2, 8, 3))}`
		const isShiftDay = (wall: number) => new Date(wall).toISOString().startsWith("2026-03-08")
		expect(read(text, { isShiftDay }).runs).toMatchObject({ gaps: { count: 0 }, clockSteps: [{ minutes: 60 }] })
		expect(read(text).runs).toMatchObject({ gaps: { count: 1 }, clockSteps: [] })
		expect(minutesOf(read(text, { isShiftDay }))).toEqual([115, 115, 115])
	})

	test("readings more than an hour apart prove nothing", () => {
		const text = `t,temp °C\n2026-08-13T01:00,-16\n2026-08-13T03:00,-16\n2026-08-13T05:00,-16\n`
		expect(minutesOf(read(text))).toEqual([0, 0, 0])
	})

	test("readings from before the loading, which are drawn and do not count", () => {
		const wall = { from: Date.UTC(2026, 7, 13, 11), to: YEAR_2026.to }
		const answer = read(`t,temp °C\n${rows(37, (at) => `${iso(at)},-16`)}`, { counts: { moments: wall, wall } })
		expect(minutesOf(answer)).toEqual([120, 120, 120])
		expect(answer.runs.outside).toBe(12)
	})
})

describe("times that repeat or run the other way", () => {
	test("a repeated time is told, and a warmer reading in it breaks the run", () => {
		const text = `t,temp °C\n2026-08-13T10:00,-16\n2026-08-13T10:05,-16\n2026-08-13T10:05,-4\n2026-08-13T10:10,-16\n2026-08-13T10:15,-16\n`
		const answer = read(text)
		expect(answer.runs.repeated).toBe(1)
		expect(minutesOf(answer)).toEqual([5, 5, 5])
	})

	test("a file that gives the latest reading first is read as it is", () => {
		const text = `t,temp °C\n${rows(40, (at) => `${iso(at)},-16`)
			.split("\n")
			.toReversed()
			.join("\n")}`
		const answer = read(text)
		expect(answer.runs.isBackwards).toBe(true)
		expect(minutesOf(answer)).toEqual([195, 195, 195])
		expect(answer.runs.span).toEqual({ from: Date.UTC(2026, 7, 13, 10), to: Date.UTC(2026, 7, 13, 13, 15) })
	})

	test("rows out of order are refused, with the first of them", () => {
		const text = `t,temp °C\n${rows(10, (at) => `${iso(at)},-16`)}\n2026-08-13T10:02:00,3\n`
		expect(readIn(text)).toEqual({ ok: false, reason: "unsorted", reading: 11 })
	})
})

describe("files that are refused", () => {
	test.each([
		["nothing", "", "empty"],
		["a picture", "\u0089PNG\r\n\u001a\n\0\0\0\rIHDR", "binary"],
		["one endless line", "x".repeat(30_000), "binary"],
		["words", "Dear Ida,\nthe freezer is fine.\n", "no-columns"],
		["times without temperatures", "Time,Door\n2026-08-13T10:00,open\n2026-08-13T10:05,shut\n", "no-columns"],
		["commas for cells and for decimals", "Zeit,Temp °C\n13.08.2026 14:00,-18,5\n", "decimal-comma"],
		["no word on the unit", rows(40, (at) => `${iso(at)},-16`), "unit-unknown"],
		["two units beside the figures", "2026-08-13T10:00,-16 °C\n2026-08-13T10:05,3 °F\n", "mixed-units"],
		["a figure against its heads", "t,temp °C\n2026-08-13T10:00,-16\n2026-08-13T10:05,3 F\n", "mixed-units"],
		[
			"a second table in another unit",
			"t,temp °C\n2026-08-13T10:00,-16\nt,temp °F\n2026-08-13T10:05,3\n",
			"mixed-units",
		],
		["some times with a zone", "t,temp °C\n2026-08-13T10:00Z,-16\n2026-08-13T10:05,-16\n", "mixed-zones"],
		["times to come", "t,temp °C\n2027-08-13T10:00,-16\n2027-08-13T10:05,-16\n", "in-the-future"],
		[
			"mostly faults",
			`t,temp °C\n${rows(20, (at) => `${iso(at)},-16`)}\n${rows(20, (at) => `${iso(at)},ERR`)}`,
			"unreadable-rows",
		],
	])("%s", (_, text, reason) => {
		expect(refusalOf(text)).toBe(reason)
	})

	test("a unit that the file leaves out can be chosen", () => {
		expect(
			read(
				rows(40, (at) => `${iso(at)},-16`),
				{ unit: "C" },
			).unit,
		).toBe("C")
	})

	test("a row that cannot be read is named by its line in the file", () => {
		expect(readIn("t,temp °C\n\n2026-08-13T10:00,-16\n2026-08-13T10:05,3 F\n")).toMatchObject({ row: 4 })
	})

	test("a few faults are passed over and counted, and break the run", () => {
		const answer = read(`t,temp °C\n${rows(20, (at) => `${iso(at)},${at.getUTCMinutes() === 30 ? "---" : "-16"}`)}`)
		expect(answer.skipped).toBe(2)
		expect(answer.runs.gaps.count).toBe(1 + 1)
	})
})

describe("reading as it comes", () => {
	test("a hundred thousand rows leave at most 600 stretches of curve", () => {
		const reader = new LoggerReader(ask)
		reader.feed("Time,Temp °C\n")
		const from = Date.UTC(2026, 2, 1)
		for (let index = 0; index < 100_000; index += 1)
			reader.feed(`${iso(new Date(from + index * 30_000))},${(-17 + Math.sin(index / 500)).toFixed(2)}\n`)
		const answer = reader.finish()
		if (!answer.ok) throw new Error(answer.reason)
		const buckets = answer.runs.buckets
		expect(answer.runs.readings).toBe(100_000)
		expect(buckets.length).toBeLessThanOrEqual(600)
		expect(buckets.length).toBeGreaterThan(250)
		expect(Math.min(...buckets.map(([, lowest]) => lowest))).toBe(-180)
		expect(Math.max(...buckets.map(([, , highest]) => highest))).toBe(-160)
		expect(minutesOf(answer)).toEqual([49_999.5, 49_999.5, 49_999.5])
	})

	test("it does not matter where the pieces are cut", () => {
		const text = `Time;Temp °C\r\n${rows(30, (at) => `${dotted(at)};-16,2`)}\r\n`
		const whole = readIn(text, {}, text.length)
		fc.assert(
			fc.property(fc.integer({ min: 1, max: 200 }), (length) => {
				const answer = readIn(text, {}, length)
				if (!answer.ok || !whole.ok) throw new Error("refused")
				expect(answer.runs.longest).toEqual(whole.runs.longest)
				expect(answer.runs.buckets).toEqual(whole.runs.buckets)
			}),
		)
	})

	test("the longest runs are those of a plain search over all readings", () => {
		const temperatures = fc.array(fc.constantFrom(-20, -13, -8, -7, -3, 4), { minLength: 2, maxLength: 150 })
		fc.assert(
			fc.property(temperatures, (list) => {
				const text = list
					.map((t, index) => `${iso(new Date(Date.UTC(2026, 4, 1) + index * 5 * MINUTE))},${t}`)
					.join("\n")
				const found = minutesOf(read(`t,temp °C\n${text}`))
				const plain = FREEZE_TABLE.map(({ tenthsC }) => {
					const runs = list
						.map((t) => (t <= tenthsC / 10 ? "x" : " "))
						.join("")
						.split(" ")
					const longest = Math.max(...runs.map((run) => run.length))
					return longest === 0 ? null : (longest - 1) * 5
				})
				expect(found).toEqual(plain)
			}),
		)
	})
})
