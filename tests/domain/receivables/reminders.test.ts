import fc from "fast-check"
import { expect, test } from "vitest"
import { addDays } from "~/domain/calendar"
import { FIRST_STEPS, fillBlanks, stepToWrite, stepWords, unknownBlanks } from "~/domain/receivables/reminders"

const steps = [
	{ id: "before", daysAfterDue: -3 },
	{ id: "week", daysAfterDue: 7 },
	{ id: "three-weeks", daysAfterDue: 21 },
]
const invoice = { issuedOn: "2026-08-01", dueOn: "2026-08-31", isTakenByItself: false, writtenSteps: [] as string[] }
const on = (today: string, more: Partial<typeof invoice> = {}) =>
	stepToWrite({ ...invoice, ...more }, steps, today)?.id ?? null

test("a step is written on its day, and on no day before", () => {
	expect(on("2026-08-27")).toBeNull()
	expect(on("2026-08-28")).toBe("before")
	expect(on("2026-09-06")).toBeNull()
	expect(on("2026-09-07")).toBe("week")
	expect(on("2026-09-21")).toBe("three-weeks")
})

test("a job that was away for days still writes, and after a week leaves the step out", () => {
	expect(on("2026-09-13")).toBe("week")
	expect(on("2026-09-14")).toBeNull()
})

test("a step is written once, and an earlier one that was missed is not made up for", () => {
	expect(on("2026-09-08", { writtenSteps: ["week"] })).toBeNull()
	expect(on("2026-09-21", { writtenSteps: [] })).toBe("three-weeks")
})

test("an invoice due on receipt is not written to about days before it was issued", () => {
	expect(on("2026-08-31", { issuedOn: "2026-08-31" })).toBeNull()
})

test("what is taken by itself on the day it is due is only written about when it is late", () => {
	expect(on("2026-08-28", { isTakenByItself: true })).toBeNull()
	expect(on("2026-09-07", { isTakenByItself: true })).toBe("week")
})

test("whatever the schedule, no step is ever written twice for an invoice, however the days are run through", () => {
	fc.assert(
		fc.property(
			fc.uniqueArray(fc.integer({ min: -30, max: 60 }), { maxLength: 6 }),
			fc.array(fc.integer({ min: -40, max: 90 }), { maxLength: 60 }),
			(days, runs) => {
				const schedule = days.map((daysAfterDue) => ({ id: `after ${daysAfterDue}`, daysAfterDue }))
				const written: string[] = []
				for (const run of runs.toSorted((a, b) => a - b)) {
					const step = stepToWrite(
						{ ...invoice, issuedOn: "2026-06-01", writtenSteps: written },
						schedule,
						addDays(invoice.dueOn, run),
					)
					if (step) written.push(step.id)
				}
				expect(new Set(written).size).toBe(written.length)
			},
		),
	)
})

const reminded = {
	storeName: "Pantry & Plume",
	yardName: "Larkmoor Bee Yard",
	invoices: [
		{ number: "2026-0012", dueOn: "2026-09-02", openCents: 92_990 },
		{ number: "2026-0009", dueOn: "2026-08-31", openCents: 10_010 },
	],
}

test("the blanks hold the store, the invoices, what is to pay and the earliest day", () => {
	expect(fillBlanks("{store}: {amount} for {invoice}, due {due}. {yard}", reminded)).toBe(
		"Pantry & Plume: $1,030.00 for 2026-0012 and 2026-0009, due August 31, 2026. Larkmoor Bee Yard",
	)
	expect(fillBlanks("{invoice}", { ...reminded, invoices: reminded.invoices.slice(1) })).toBe("2026-0009")
	const many = Array.from({ length: 7 }, (_, index) => ({
		number: `2026-000${index}`,
		dueOn: "2026-08-31",
		openCents: 1,
	}))
	expect(fillBlanks("{invoice}", { ...reminded, invoices: many })).toBe("2026-0000, 2026-0001, 2026-0002 and 4 more")
})

test("a store that is called like a blank is written as it is called", () => {
	expect(fillBlanks("Dear {store}", { ...reminded, storeName: "The {amount} Shop" })).toBe("Dear The {amount} Shop")
})

test("a blank that there is not is named, and the steps that are offered have none", () => {
	expect(unknownBlanks("{store} {sum} {sum} {}")).toEqual(["sum", ""])
	for (const { subject, body } of FIRST_STEPS) expect(unknownBlanks(`${subject} ${body}`)).toEqual([])
})

test("a step is named by its day", () => {
	expect([-3, -1, 0, 1, 21].map(stepWords)).toEqual([
		"3 days before it falls due",
		"1 day before it falls due",
		"on the day it falls due",
		"1 day after it fell due",
		"21 days after it fell due",
	])
})
