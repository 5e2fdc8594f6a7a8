import { z } from "zod"
import { type Day, isDay, type Weekday } from "~/domain/calendar"
import { parseCases } from "~/domain/quantity"
import type { Cadence, NthWeekday } from "~/domain/standing-orders/cadence"
import { CROP_ENDS } from "~/ui/standing-orders/sentence"

/** What a posted standing order says; null in `cadence` or `startsOn` where it cannot be read. */
export type PostedStanding = {
	idempotencyKey: string
	cadence: Cadence | null
	startsOn: Day | null
	/** Null is until the crop ends. */
	endsOn: Day | null
	lines: { productId: string; cases: number; leastCases: number }[]
	values: Record<string, string>
	errors: Record<string, string>
}

const LINE_FIELD = /^cases-([0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12})$/

/** What the sentence says: "every-2" and "2" are every other Tuesday, "month--1" and "5" the last Friday of a month. */
function readCadence(often: string | undefined, weekday: string | undefined): Cadence | null {
	const [, unit, count] = /^(every|month)-(-?\d)$/.exec(often ?? "") ?? []
	if (!unit || !/^[1-7]$/.test(weekday ?? "")) return null
	const day = Number(weekday) as Weekday
	const number = Number(count)
	if (unit === "every")
		return number >= 1 && number <= 8 ? { every: "week", interval: number, weekday: day, months: [] } : null
	return [1, 2, 3, 4, -1].includes(number)
		? { every: "month", nth: number as NthWeekday, weekday: day, months: [] }
		: null
}

/** The sentence's values for a cadence: the inverse of reading it. */
export function cadenceValues(cadence: Cadence): { often: string; weekday: string } {
	const often = cadence.every === "week" ? `every-${cadence.interval}` : `month-${cadence.nth}`
	return { often, weekday: String(cadence.weekday) }
}

/** Reads a posted standing order. What cannot be read stands in `errors` by field; null when the form is not ours. */
export function readStanding(form: FormData): PostedStanding | null {
	const values = Object.fromEntries(
		[...form].flatMap(([name, value]) => (typeof value === "string" ? [[name, value]] : [])),
	)
	const key = z.uuid().safeParse(values.idempotencyKey)
	if (!key.success) return null
	const errors: Record<string, string> = {}
	const cadence = readCadence(values.often, values.weekday)
	if (!cadence) errors.often = "Choose how often and on which weekday."
	const startsOn = isDay(values.startsOn ?? "") ? (values.startsOn ?? null) : null
	if (!startsOn) errors.startsOn = "Choose the day it starts on."
	const isEndless = values.endsOn === CROP_ENDS
	const endsOn = !isEndless && isDay(values.endsOn ?? "") ? (values.endsOn ?? null) : null
	if (!isEndless && !endsOn) errors.endsOn = "Choose until when."
	if (startsOn && endsOn && endsOn < startsOn) errors.endsOn = "It ends before it starts. Choose a later end."
	return { idempotencyKey: key.data, cadence, startsOn, endsOn, lines: readLines(values, errors), values, errors }
}

function readLines(values: Readonly<Record<string, string>>, errors: Record<string, string>): PostedStanding["lines"] {
	return Object.entries(values).flatMap(([name, typed]) => {
		const productId = LINE_FIELD.exec(name)?.[1]
		if (!productId) return []
		const leastName = `least-${productId}`
		const usual = parseCases(typed)
		const least = parseCases(values[leastName] ?? "")
		if (!usual.ok) errors[name] = usual.message
		if (!least.ok) errors[leastName] = least.message
		if (!usual.ok || !least.ok) return []
		if (least.cases > usual.cases) {
			errors[leastName] = "The least cannot be more than what is usual."
			return []
		}
		return usual.cases === 0 ? [] : [{ productId, cases: usual.cases, leastCases: least.cases }]
	})
}
