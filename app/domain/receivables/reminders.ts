import { addDays, compareDays, type Day, daysBetween, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"

/** A step of the schedule: so many days after an invoice falls due, below 0 before it. */
export type ReminderStep = { id: string; daysAfterDue: number }

/** A job that was away catches up with a step for so long; after that the step is left out. */
const DAYS_LATE = 7

/**
 * The step that an open invoice has reached on `today` and that is still to be written, or null: the last one it has
 * reached, unless that was written already or is a week past. Earlier steps are not made up for, and one from before the
 * invoice was issued never counts. `isTakenByItself` leaves out what comes before it is late. This product's own rule.
 */
export function stepToWrite<Step extends ReminderStep>(
	invoice: { issuedOn: Day; dueOn: Day; isTakenByItself: boolean; writtenSteps: readonly string[] },
	steps: readonly Step[],
	today: Day,
): Step | null {
	const reached = steps
		.map((step) => ({ step, on: addDays(invoice.dueOn, step.daysAfterDue) }))
		.filter(({ step, on }) => {
			if (invoice.isTakenByItself && step.daysAfterDue <= 0) return false
			return compareDays(on, today) <= 0 && compareDays(on, invoice.issuedOn) >= 0
		})
		.toSorted((a, b) => compareDays(b.on, a.on))[0]
	if (!reached || invoice.writtenSteps.includes(reached.step.id)) return null
	return daysBetween(reached.on, today) < DAYS_LATE ? reached.step : null
}

/** The blanks that the words of a step may have, and what stands in them. */
export const BLANKS = {
	store: "the store’s name",
	invoice: "the number of the invoice, or the numbers of several",
	amount: "what is still to pay on them",
	due: "the day the first of them fell or falls due",
	yard: "your own name",
} as const
type Blank = keyof typeof BLANKS

const BLANK = /\{([^{}]*)\}/g
const isBlank = (name: string): name is Blank => Object.hasOwn(BLANKS, name)

/** The blanks in `text` that there are not, as they stand there, each once. */
export function unknownBlanks(text: string): string[] {
	const names = [...text.matchAll(BLANK)].map(([, name = ""]) => name)
	return [...new Set(names.filter((name) => !isBlank(name)))]
}

/** What a reminder is about. */
export type Reminded = {
	storeName: string
	yardName: string
	invoices: readonly { number: string; dueOn: Day; openCents: number }[]
}

/**
 * Fills the blanks of a step's words, each once: what is put in is not looked at again. A blank that there is not stays as
 * it is. Of more than four invoices three are named and the others counted: the letter lists them all.
 */
export function fillBlanks(text: string, { storeName, yardName, invoices }: Reminded): string {
	const values: Record<Blank, string> = {
		store: storeName,
		invoice: numbersInWords(invoices.map(({ number }) => number)),
		amount: formatMoney(invoices.reduce((sum, { openCents }) => sum + openCents, 0)),
		due: invoices.length === 0 ? "" : fullDay(invoices.map(({ dueOn }) => dueOn).toSorted(compareDays)[0] as Day),
		yard: yardName,
	}
	return text.replace(BLANK, (whole, name: string) => (isBlank(name) ? values[name] : whole))
}

/** "2026-0012", "2026-0012 and 2026-0013", "2026-0012, 2026-0013, 2026-0014 and 5 more". */
function numbersInWords(numbers: readonly string[]): string {
	if (numbers.length < 2) return numbers.join("")
	const named = numbers.length > 4 ? numbers.slice(0, 3) : numbers.slice(0, -1)
	return `${named.join(", ")} and ${numbers.length > 4 ? `${numbers.length - 3} more` : numbers.at(-1)}`
}

/** "3 days before it falls due", "on the day it falls due", "1 day after it fell due". */
export function stepWords(daysAfterDue: number): string {
	if (daysAfterDue === 0) return "on the day it falls due"
	const days = Math.abs(daysAfterDue) === 1 ? "1 day" : `${Math.abs(daysAfterDue)} days`
	return daysAfterDue < 0 ? `${days} before it falls due` : `${days} after it fell due`
}

/** Steps to begin with, which nobody has to take. Common practice, no source. */
export const FIRST_STEPS: readonly { daysAfterDue: number; subject: string; body: string }[] = [
	{
		daysAfterDue: -3,
		subject: "{yard}: {amount} is due on {due}",
		body: "Dear {store},\n\nthis is only to say that {amount} for invoice {invoice} is due on {due}. If it is on its way already, there is nothing to do.\n\nThank you, {yard}",
	},
	{
		daysAfterDue: 7,
		subject: "{yard}: {amount} was due on {due}",
		body: "Dear {store},\n\nwe have not had {amount} for invoice {invoice} yet, which was due on {due}. Would you look whether it was overlooked? If something on it is not right, tell us and we will mend it.\n\nThank you, {yard}",
	},
	{
		daysAfterDue: 21,
		subject: "{yard}: {amount} is three weeks late",
		body: "Dear {store},\n\nwe still wait for {amount} for invoice {invoice}, due since {due}. Please pay it this week, or call us so that we can agree on a day.\n\n{yard}",
	},
]
