import { and, eq, inArray } from "drizzle-orm"
import { orders } from "~/db/schema"
import { readProducer, type Tx } from "~/db/transaction.server"
import { addDays, type Day } from "~/domain/calendar"
import { linesOnDate } from "~/domain/standing-orders/lines-on-date"
import { type DeliverySchedule, findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { findOwnLines } from "~/services/orders/find-asked-days.server"
import { type FortnightDay, fortnightOf } from "~/services/orders/find-fortnight.server"
import { findStorePrices, type StoreProduct } from "~/services/pricing/find-store-prices.server"
import { findOutlooks } from "~/services/promise/find-outlooks.server"
import { forecastDates, type LineForecast } from "./forecast-dates.server"
import { readStoreStandingOrder, type StandingLine, type StandingOrder } from "./read-standing-orders.server"
import { type DatedRule, type DueDate, standingDates } from "./standing-dates.server"

/** How many dates ahead the page shows. */
const SHOWN_DATES = 6

/** A date as the page shows it: what it asks, how that can be met, and `orderNumber` once it has become an order. */
export type ShownDate = DueDate & { orderNumber: number | null; lines: StandingLine[]; forecast: LineForecast[] }

export type StandingPage = {
	standing: StandingOrder | null
	schedule: DeliverySchedule
	products: StoreProduct[]
	fortnight: FortnightDay[]
	dates: ShownDate[]
}

/**
 * What the standing-order page of one store shows, read at one moment. With `draft` the dates are those of a rule and
 * lines that are not saved yet.
 */
export function findStandingPage(query: {
	producerId: string
	storeId: string
	now: Date
	zone: string
	draft?: { rule: Pick<DatedRule, "rule" | "startsOn" | "endsOn">; lines: readonly StandingLine[] }
}): Promise<StandingPage> {
	const { producerId, storeId, draft } = query
	return readProducer(producerId, async (tx) => {
		const standing = await readStoreStandingOrder(tx, query)
		const schedule = await findDeliverySchedule(tx, query)
		const { today } = schedule
		const products = await findStorePrices(tx, { producerId, storeId, today })
		const productIds = products.map((product) => product.productId)
		const outlooks = await findOutlooks(tx, { producerId, today, productIds })
		const ownLines = await findOwnLines(tx, {
			producerId,
			storeId,
			from: today,
			to: addDays(today, 13),
			lastBefore: today,
		})
		// Saving takes over skips, pause and changes, so a draft shows them too.
		const bends = { skips: [], pausedFrom: null, pausedUntil: null, ...standing, createdAt: null, endedAt: null }
		const rule = draft ? { ...bends, ...draft.rule } : standing
		const usual = draft?.lines ?? standing?.lines ?? []
		const linesOn = (ruleOn: Day) => linesOnDate(usual, standing?.changes ?? [], ruleOn)
		const dates = rule ? standingDates(rule, schedule, SHOWN_DATES) : []
		const made = standing ? await findMadeOrders(tx, { producerId, standingOrderId: standing.id, dates }) : new Map()
		const ahead = dates.filter((date) => date.isOpen && !date.isSkipped)
		const forecasts = forecastDates(
			ahead.map((date) => ({ on: date.deliveryOn, lines: linesOn(date.ruleOn) })),
			outlooks,
		)
		return {
			standing,
			schedule,
			products,
			fortnight: fortnightOf({ schedule, from: today, outlooks: [...outlooks.values()], ownLines }),
			dates: dates.map((date) => ({
				...date,
				orderNumber: made.get(date.ruleOn) ?? null,
				forecast: forecasts[ahead.indexOf(date)] ?? [],
				lines: linesOn(date.ruleOn),
			})),
		}
	})
}

async function findMadeOrders(
	tx: Tx,
	query: { producerId: string; standingOrderId: string; dates: readonly DueDate[] },
): Promise<Map<Day, number>> {
	const closed = query.dates.filter((date) => !date.isOpen).map((date) => date.ruleOn)
	if (closed.length === 0) return new Map()
	const rows = await tx
		.select({ on: orders.standingOn, number: orders.number })
		.from(orders)
		.where(
			and(
				eq(orders.producerId, query.producerId),
				eq(orders.standingOrderId, query.standingOrderId),
				inArray(orders.standingOn, closed),
			),
		)
	return new Map(rows.flatMap(({ on, number }) => (on === null ? [] : [[on, number] as const])))
}
