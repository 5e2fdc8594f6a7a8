import fc from "fast-check"
import { Temporal } from "temporal-polyfill"
import { describe, expect, test } from "vitest"
import {
	addDays,
	dayInZone,
	daysBetween,
	dayWords,
	endOfMonth,
	fortnight,
	fullDay,
	instantAt,
	isDay,
	monthDay,
	monthName,
	shortDay,
	shortMonthDay,
	timeLeftWords,
	timeWords,
	weekday,
	weekdayName,
} from "~/domain/calendar"

const ZONE = "America/New_York"
const anyDay = fc
	.integer({ min: Date.UTC(1971, 0, 1) / 86_400_000, max: Date.UTC(2099, 11, 31) / 86_400_000 })
	.map((days) => new Date(days * 86_400_000).toISOString().slice(0, 10))

describe("days", () => {
	test("a day exists where the calendar of the language says so, and nothing else is a day", () => {
		fc.assert(
			fc.property(
				fc.integer({ min: 0, max: 9999 }),
				fc.integer({ min: 0, max: 13 }),
				fc.integer({ min: 0, max: 32 }),
				(year, month, date) => {
					const text = [
						String(year).padStart(4, "0"),
						String(month).padStart(2, "0"),
						String(date).padStart(2, "0"),
					].join("-")
					const at = new Date(`${text}T00:00:00Z`)
					expect(isDay(text)).toBe(!Number.isNaN(at.getTime()) && at.toISOString().slice(0, 10) === text)
				},
			),
			{ numRuns: 2_000 },
		)
		for (const none of ["", "2026-1-1", "2026-01-01 ", "26-01-01", "2026-01-01T00:00:00Z", "twenty"])
			expect(isDay(none)).toBe(false)
	})

	test("days are counted over month ends, leap days and year ends", () => {
		expect(addDays("2026-02-28", 1)).toBe("2026-03-01")
		expect(addDays("2028-02-28", 1)).toBe("2028-02-29")
		expect(addDays("2026-12-31", 1)).toBe("2027-01-01")
		expect(addDays("2026-03-01", -1)).toBe("2026-02-28")
		expect(daysBetween("2026-08-13", "2026-08-18")).toBe(5)
		expect(daysBetween("2026-08-18", "2026-08-13")).toBe(-5)
	})

	test("a fortnight is fourteen days that begin with the one given", () => {
		const days = fortnight("2026-08-13")
		expect(days).toHaveLength(14)
		expect(days[0]).toBe("2026-08-13")
		expect(days[13]).toBe("2026-08-26")
	})

	test("a day that does not exist is told from one that does, and counting with it throws", () => {
		expect(isDay("2028-02-29")).toBe(true)
		for (const text of ["2026-02-29", "2026-13-01", "2026-8-1", "tomorrow", "", "2026-08-18T00:00"]) {
			expect(isDay(text)).toBe(false)
			expect(() => addDays(text, 1)).toThrow(RangeError)
		}
	})

	test("the month ends on its own last day", () => {
		expect(endOfMonth("2026-02-10")).toBe("2026-02-28")
		expect(endOfMonth("2028-02-10")).toBe("2028-02-29")
		expect(endOfMonth("2026-12-20")).toBe("2026-12-31")
		expect(endOfMonth("2026-09-30")).toBe("2026-09-30")
	})

	test("counting days agrees with the standard calendar, there and back again", () => {
		fc.assert(
			fc.property(anyDay, fc.integer({ min: -4000, max: 4000 }), (day, count) => {
				const expected = Temporal.PlainDate.from(day).add({ days: count }).toString()
				expect(addDays(day, count)).toBe(expected)
				expect(daysBetween(day, expected)).toBe(count)
				expect(weekday(day)).toBe(Temporal.PlainDate.from(day).dayOfWeek)
				expect(endOfMonth(day)).toBe(
					Temporal.PlainDate.from(day).with({ day: 31 }, { overflow: "constrain" }).toString(),
				)
			}),
		)
	})
})

describe("words for days and times", () => {
	test("a date is a weekday plus a date", () => {
		expect(dayWords("2026-08-18")).toBe("Tuesday, August 18")
		expect(shortDay("2026-08-18")).toBe("Tue 18")
		expect(monthDay("2026-08-01")).toBe("August 1")
		expect(shortMonthDay("2026-09-01")).toBe("Sep 1")
		expect(fullDay("2026-08-18")).toBe("August 18, 2026")
		expect(weekdayName(7)).toBe("Sunday")
		expect(monthName(5)).toBe("May")
		expect(() => monthName(13)).toThrow(RangeError)
	})

	test("a time is said as people say it", () => {
		expect(timeWords(new Date("2026-08-14T16:00:00Z"), ZONE)).toBe("noon")
		expect(timeWords(new Date("2026-08-14T04:00:00Z"), ZONE)).toBe("midnight")
		expect(timeWords(new Date("2026-08-13T18:15:00Z"), ZONE)).toBe("2:15 pm")
		expect(timeWords(new Date("2026-08-13T14:00:00Z"), ZONE)).toBe("10 am")
		expect(timeWords(new Date("2026-08-14T04:05:00Z"), ZONE)).toBe("12:05 am")
		expect(timeWords(new Date("2026-08-14T16:30:00Z"), ZONE)).toBe("12:30 pm")
	})

	test("the time left until last orders is told in hours and minutes, then in days", () => {
		const now = new Date("2026-08-13T18:15:00Z")
		expect(timeLeftWords(now, new Date("2026-08-14T16:00:00Z"))).toBe("21 h 45 min")
		expect(timeLeftWords(now, new Date("2026-08-13T20:15:00Z"))).toBe("2 h")
		expect(timeLeftWords(now, new Date("2026-08-13T18:20:59Z"))).toBe("5 min")
		expect(timeLeftWords(now, new Date("2026-08-16T22:15:00Z"))).toBe("3 days 4 h")
		expect(timeLeftWords(now, new Date("2026-08-15T18:15:00Z"))).toBe("2 days")
		expect(timeLeftWords(now, new Date("2026-08-13T18:00:00Z"))).toBe("0 min")
	})
})

describe("time zones", () => {
	test("late in the evening it is still today at the producer's, whatever the server's zone", () => {
		expect(dayInZone(new Date("2026-08-14T03:59:59Z"), ZONE)).toBe("2026-08-13")
		expect(dayInZone(new Date("2026-08-14T04:00:00Z"), ZONE)).toBe("2026-08-14")
		expect(() => dayInZone(new Date(0), "Nowhere/Atall")).toThrow(RangeError)
	})

	test("noon is noon in summer and in winter", () => {
		expect(instantAt("2026-08-14", "12:00", ZONE).toISOString()).toBe("2026-08-14T16:00:00.000Z")
		expect(instantAt("2026-12-14", "12:00", ZONE).toISOString()).toBe("2026-12-14T17:00:00.000Z")
	})

	test("a time that the clocks skip in spring moves forward by the gap", () => {
		expect(instantAt("2026-03-08", "02:30", ZONE).toISOString()).toBe("2026-03-08T07:30:00.000Z")
		expect(timeWords(instantAt("2026-03-08", "02:30", ZONE), ZONE)).toBe("3:30 am")
	})

	test("a time that comes twice in autumn is the first of the two", () => {
		expect(instantAt("2026-11-01", "01:30", ZONE).toISOString()).toBe("2026-11-01T05:30:00.000Z")
	})

	test("finds the same instant as Temporal does, in zones that change by an hour, by half of one and by a day", () => {
		const zones = ["America/New_York", "Europe/Berlin", "Australia/Lord_Howe", "Pacific/Apia", "Asia/Kathmandu", "UTC"]
		fc.assert(
			fc.property(anyDay, fc.constantFrom(...zones), fc.integer({ min: 0, max: 1439 }), (day, zone, minutes) => {
				const time = Temporal.PlainTime.from("00:00").add({ minutes }).toString().slice(0, 5)
				const local = Temporal.PlainDateTime.from(`${day}T${time}`)
				const expected = local.toZonedDateTime(zone, { disambiguation: "compatible" }).epochMilliseconds
				expect(instantAt(day, time, zone).getTime()).toBe(expected)
			}),
			{ numRuns: 2000 },
		)
		for (const [day, zone] of [
			["2011-12-30", "Pacific/Apia"],
			["2026-10-04", "Australia/Lord_Howe"],
			["2026-04-05", "Australia/Lord_Howe"],
			["2026-03-29", "Europe/Berlin"],
			["2026-10-25", "Europe/Berlin"],
		] as const) {
			for (const time of ["00:30", "01:45", "02:15", "02:30", "03:00", "12:00"]) {
				const expected = Temporal.PlainDateTime.from(`${day}T${time}`).toZonedDateTime(zone).epochMilliseconds
				expect(instantAt(day, time, zone).getTime(), `${day} ${time} ${zone}`).toBe(expected)
			}
		}
	})

	test("a time or a day that does not exist throws", () => {
		expect(() => instantAt("2026-02-30", "12:00", ZONE)).toThrow(RangeError)
		expect(() => instantAt("2026-02-20", "25:00", ZONE)).toThrow(RangeError)
	})

	test("the day and the time of an instant agree with the standard calendar in any zone", () => {
		const zones = ["America/New_York", "America/Phoenix", "Pacific/Honolulu", "Australia/Lord_Howe", "Europe/Dublin"]
		fc.assert(
			fc.property(anyDay, fc.integer({ min: 0, max: 1439 }), fc.constantFrom(...zones), (day, minute, zone) => {
				const time = `${String(Math.floor(minute / 60)).padStart(2, "0")}:${String(minute % 60).padStart(2, "0")}`
				const instant = instantAt(day, time, zone)
				const there = Temporal.Instant.fromEpochMilliseconds(instant.getTime()).toZonedDateTimeISO(zone)
				expect(dayInZone(instant, zone)).toBe(there.toPlainDate().toString())
				const skipped = there.toPlainTime().toString().slice(0, 5) !== time
				if (!skipped) expect(dayInZone(instant, zone)).toBe(day)
			}),
		)
	})
})
