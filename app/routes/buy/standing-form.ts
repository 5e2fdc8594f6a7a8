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
	lines: { productId: string; cases: number; leastCases: number; substituteIds: string[] }[]
	isCommitment: boolean
	/** The standing order that the form was drawn from; null where there was none, undefined where the form does not say. */
	drawnFrom: string | null | undefined
	values: Record<string, string>
	errors: Record<string, string>
}

const DATE_FIELD = /^on-([0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12})$/
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

/** What a row's numbers stand for: the products that may be ordered. */
type Sold = readonly { productId: string; code: string }[]

/**
 * Reads a posted standing order; product numbers typed as substitutes are looked up in `sold`. What cannot be read stands in
 * `errors` by field; null when the form is not ours.
 */
export function readStanding(form: FormData, sold: Sold): PostedStanding | null {
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
	const lines = readLines(values, errors, sold)
	const isCommitment = values.isCommitment === "yes"
	const drawnFrom = values.drawnFrom === undefined ? undefined : values.drawnFrom || null
	return { idempotencyKey: key.data, cadence, startsOn, endsOn, lines, isCommitment, drawnFrom, values, errors }
}

function readLines(
	values: Readonly<Record<string, string>>,
	errors: Record<string, string>,
	sold: Sold,
): PostedStanding["lines"] {
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
		if (usual.cases === 0) return []
		const instead = readSubstitutes(values[`instead-${productId}`] ?? "", { productId, sold })
		if ("problem" in instead) {
			errors[`instead-${productId}`] = instead.problem
			return []
		}
		return [{ productId, cases: usual.cases, leastCases: least.cases, substituteIds: instead.ids }]
	})
}

const MOST_SUBSTITUTES = 2

/** Reads "22, 31", the numbers of the products that may stand in, the most welcome first. */
function readSubstitutes(
	typed: string,
	{ productId, sold }: { productId: string; sold: Sold },
): { ids: string[] } | { problem: string } {
	const codes = [...new Set(typed.split(/[\s,;]+/).filter(Boolean))]
	if (codes.length > MOST_SUBSTITUTES) return { problem: "Two products at most. Take one off." }
	const ids: string[] = []
	for (const code of codes) {
		const product = sold.find((one) => one.code.toLowerCase() === code.toLowerCase())
		if (!product) return { problem: `No product has the number ${code.slice(0, 12)}.` }
		if (product.productId === productId) return { problem: "A product cannot stand in for itself." }
		ids.push(product.productId)
	}
	return { ids }
}

/** Reads what is asked on one date only: a field `on-<product>` a line. Null in `cases` with the errors by field. */
export function readDateCases(form: FormData) {
	const errors: Record<string, string> = {}
	const values: Record<string, string> = {}
	const cases: { productId: string; cases: number }[] = []
	for (const [name, typed] of form) {
		const productId = DATE_FIELD.exec(name)?.[1]
		if (!productId || typeof typed !== "string") continue
		values[name] = typed
		const read = parseCases(typed)
		if (read.ok) cases.push({ productId, cases: read.cases })
		else errors[name] = read.message
	}
	return { cases, values, errors }
}

/** Reads from when and until when to pause; an empty last day is until it is resumed. */
export function readPause(form: FormData) {
	const from = String(form.get("pauseFrom") ?? "")
	const until = String(form.get("pauseUntil") ?? "")
	const values = { pauseFrom: from, pauseUntil: until }
	const errors: Record<string, string> = {}
	if (!isDay(from)) errors.pauseFrom = "Write the first day of the pause."
	if (until !== "" && !isDay(until)) errors.pauseUntil = "Write the last day of the pause, or leave it empty."
	if (isDay(from) && isDay(until) && until < from) errors.pauseUntil = "The pause ends before it starts."
	return { pause: { from, until: until === "" ? null : until }, values, errors }
}
