import { randomUUID } from "node:crypto"
import {
	addDays,
	type Day,
	dayInZone,
	daysBetween,
	endOfMonth,
	shortMonthDay,
	timeWords,
	type Weekday,
	weekday,
	weekdayName,
} from "~/domain/calendar"
import { priceOrder } from "~/domain/pricing/price-order"
import { casesWords } from "~/domain/quantity"
import { cadenceOf, cadenceWords, ruleOf } from "~/domain/standing-orders/cadence"
import { now as askClock } from "~/platform/clock.server"
import { deliveryDaysOf } from "~/services/delivery/find-delivery-days.server"
import { findStoreDetails } from "~/services/delivery/find-store-details.server"
import { findProducts } from "~/services/standing-orders/find-products.server"
import {
	findStandingPage,
	type ShownDate,
	type StandingPage,
} from "~/services/standing-orders/find-standing-page.server"
import { findStandingYear } from "~/services/standing-orders/find-standing-year.server"
import type { StandingLine } from "~/services/standing-orders/read-standing-orders.server"
import type { SetStandingOrderAnswer } from "~/services/standing-orders/set-standing-order.server"
import { CROP_ENDS } from "~/ui/standing-orders/sentence"
import type { DateColumn } from "~/ui/standing-orders/standing-table"
import type { StoreScope } from "../guard.server"
import { findBuyFrame } from "./frame.server"
import { cadenceValues, type PostedStanding, readStanding } from "./standing-form"

/** How many coming delivery days and ends of months the sentence offers. */
const STARTS = 12
const ENDS = 12

/** What the standing-order page shows; the dates are those of `draft`, where that is whole, instead of what is saved. */
export async function loadStanding(scope: StoreScope, draft: PostedStanding | null = null) {
	const { producer, store } = scope
	const now = askClock()
	const zone = producer.timeZone
	const query = { producerId: producer.id, storeId: store.id, now, zone }
	const details = await findStoreDetails(query)
	const page = await findStandingPage({ ...query, ...draftOf(draft) })
	const { standing, schedule } = page
	const today = dayInZone(now, zone)
	const openDays = deliveryDaysOf(schedule, STARTS + 4).filter((day) => day.isOpen)
	const starts = openDays.slice(0, STARTS).map((day) => day.on)
	const lines = draft?.lines ?? standing?.lines ?? []
	const { season } = await findStandingYear(query)
	return {
		frame: await findBuyFrame(scope, { part: "standing", now, fortnight: page.fortnight }),
		hasStanding: standing !== null,
		standingId: standing?.id ?? null,
		isCommitment: standing?.isCommitment ?? false,
		pause: standing?.pausedFrom ? { from: standing.pausedFrom, until: standing.pausedUntil } : null,
		season,
		today,
		address: details.address,
		producerName: producer.name,
		weekdays: schedule.rounds.map((round) => round.weekday as Weekday),
		starts: withDay(starts, standing?.startsOn),
		ends: withDay(monthEnds(today), standing?.endsOn),
		values: valuesOf(page, firstOn(starts, schedule.rounds[0]?.weekday) ?? today),
		products: page.products,
		asked: lines.map((line) => line.productId),
		dates: page.dates.map((date) => columnOf(date, page, { usual: lines, zone, today })),
		idempotencyKey: randomUUID(),
	}
}

function draftOf(draft: PostedStanding | null) {
	if (!draft?.cadence || !draft.startsOn) return {}
	const { startsOn, endsOn, lines } = draft
	return { draft: { rule: { rule: ruleOf(draft.cadence), startsOn, endsOn }, lines } }
}

/** Reads a posted standing order with the product numbers of this store; null when the form is not ours. */
export async function readPosted(form: FormData, { producer, store }: StoreScope): Promise<PostedStanding | null> {
	const today = dayInZone(askClock(), producer.timeZone)
	return readStanding(form, await findProducts({ producerId: producer.id, storeId: store.id, today }))
}

function firstOn(days: readonly Day[], onWeekday: number | undefined): Day | undefined {
	return days.find((day) => weekday(day) === onWeekday)
}

function withDay(days: Day[], day: Day | null | undefined): Day[] {
	return day && !days.includes(day) ? [day, ...days].toSorted() : days
}

function monthEnds(today: Day): Day[] {
	const ends = [endOfMonth(today)]
	while (ends.length < ENDS) ends.push(endOfMonth(addDays(ends.at(-1) as Day, 1)))
	return ends
}

/** The form's values for what is saved, or for a standing order yet to be set. */
function valuesOf({ standing, schedule, products }: StandingPage, firstStart: Day): Record<string, string> {
	const cadence = standing ? cadenceOf(standing.rule) : null
	const sentence = cadence
		? cadenceValues(cadence)
		: { often: "every-2", weekday: String(schedule.rounds[0]?.weekday ?? "") }
	const codes = new Map(products.map((product) => [product.productId, product.code]))
	const lines = standing?.lines.flatMap(({ productId, cases, leastCases, substituteIds }) => [
		[`cases-${productId}`, String(cases)],
		[`least-${productId}`, String(leastCases)],
		[`instead-${productId}`, substituteIds.flatMap((id) => codes.get(id) ?? []).join(", ")],
	])
	return {
		...sentence,
		startsOn: standing?.startsOn ?? firstStart,
		endsOn: standing?.endsOn ?? CROP_ENDS,
		...Object.fromEntries(lines ?? []),
	}
}

function columnOf(
	date: ShownDate,
	page: StandingPage,
	facts: { usual: readonly StandingLine[]; zone: string; today: Day },
): DateColumn {
	const { usual, zone, today } = facts
	const { lines } = date
	const products = new Map(page.products.map((product) => [product.productId, product]))
	const priced = lines.flatMap((line) => {
		const product = products.get(line.productId)
		return product ? { ...product, cases: line.cases } : []
	})
	const price = priceOrder({
		lines: priced,
		terms: { minimumCents: 0, deliveryChargeCents: 0, freeAboveCents: null },
	})
	const forecast = date.forecast.map((line) => ({
		...line,
		cases: line.free + line.held + line.expected + line.short,
	}))
	const short = forecast.filter((line) => line.short > 0)
	return {
		ruleOn: date.ruleOn,
		deliveryOn: date.deliveryOn,
		isMoved: date.isMoved,
		isOpen: date.isOpen,
		isSkipped: date.isSkipped,
		words: dateWords(date, zone, today),
		orderNumber: date.orderNumber,
		asked: Object.fromEntries(lines.map((line) => [line.productId, line.cases])),
		usual: Object.fromEntries(usual.map((line) => [line.productId, line.cases])),
		forecast: Object.fromEntries(forecast.map((line) => [line.productId, line])),
		cases: price.cases,
		totalCents: price.upToCents,
		says: !date.isOpen
			? ""
			: short.length === 0
				? "All likely."
				: short.length === forecast.length && short.every((line) => line.short === line.cases)
					? "Nothing in sight yet."
					: short
							.slice(0, 2)
							.map(
								(line) => `${products.get(line.productId)?.name}: ${line.cases - line.short} of ${line.cases} likely.`,
							)
							.join(" "),
	}
}

/** "open until Friday noon", "open until Aug 28", "order 318", "you skip this delivery". */
function dateWords(date: ShownDate, zone: string, today: Day): string {
	if (!date.isOpen) return date.orderNumber === null ? "closed, order to come" : `order ${date.orderNumber}`
	if (date.isSkipped) return "you skip this delivery"
	const on = dayInZone(date.cutoffAt, zone)
	const when =
		daysBetween(today, on) < 7 ? `${weekdayName(weekday(on))} ${timeWords(date.cutoffAt, zone)}` : shortMonthDay(on)
	return date.isMoved ? `in place of ${shortMonthDay(date.ruleOn)}; open until ${when}` : `open until ${when}`
}

/** Words for what was refused, by field; "" is the whole form. */
export function standingRefusal(refusal: Extract<SetStandingOrderAnswer, { ok: false }>): Record<string, string> {
	switch (refusal.reason) {
		case "nothing-asked":
			return { "": "Nothing is asked for yet. Write usual cases beside a product." }
		case "no-delivery-that-weekday":
			return { weekday: "The van does not come to you on that weekday. Choose another." }
		case "no-dates":
			return { endsOn: "No delivery falls between these days. Choose a later end, or an earlier start." }
		case "not-sold":
			return { "": "A product of this standing order is no longer sold. Take it off, then save again." }
		case "stands-in-for-itself":
			return Object.fromEntries(
				refusal.productIds.map((id) => [`instead-${id}`, "A product cannot stand in for itself."]),
			)
		case "changed-meanwhile":
			return { "": "Someone else of your store has changed the standing order since you opened it." }
		case "least-above-asked":
			return Object.fromEntries(
				refusal.productIds.map((id) => [`least-${id}`, "The least cannot be more than what is usual."]),
			)
	}
}

/** What another person of the store has saved meanwhile, in a sentence: "every Tuesday; 3 cases of Cut comb, ...". */
export async function theirWords(
	{ producer, store }: StoreScope,
	theirs: { rule: string; lines: readonly StandingLine[]; createdBy: { email: string } } | null,
): Promise<string> {
	if (!theirs) return "The standing order has been stopped."
	const today = dayInZone(askClock(), producer.timeZone)
	const products = await findProducts({ producerId: producer.id, storeId: store.id, today })
	const names = new Map(products.map((product) => [product.productId, product.name]))
	const cadence = cadenceOf(theirs.rule)
	const lines = theirs.lines.map(
		(line) => `${casesWords(line.cases)} of ${names.get(line.productId) ?? "a product no longer sold"}`,
	)
	return `${theirs.createdBy.email} saved: ${cadence ? cadenceWords(cadence) : "by another rule"}; ${lines.join(", ")}.`
}
