import type { orders } from "~/db/schema"
import { addDays, type Day, instantAt, weekday } from "~/domain/calendar"
import type { DeliveryDay } from "~/domain/delivery/delivery-days"
import { priceOrder } from "~/domain/pricing/price-order"
import type { Catalogue, CatalogueProduct } from "./plan-catalogue"
import type { StandingOfSeason } from "./plan-standing"
import type { StoreOfSeason, Stores } from "./plan-stores"
import type { DemoComingOrder } from "./scenario"
import { minutesAfter, named, notAfter, type Season } from "./season"

export type OrderState = NonNullable<(typeof orders.$inferInsert)["state"]>

export type LineOfSeason = {
	id: string
	product: CatalogueProduct
	asked: number
	least: number
	given: number | null
	isToShare: boolean
	caseCents: number
	/** Filled by `planStock` for orders that were packed. */
	lots: { lotId: string; code: string; pieces: number }[]
}

export type OrderOfSeason = {
	id: string
	/** Rises with the time of placing. */
	number: number
	store: StoreOfSeason
	on: Day
	state: OrderState
	lines: LineOfSeason[]
	deliveryCents: number
	poNumber: string
	note: string
	standing: { id: string; on: Day } | null
	placedAt: Date
	/** When it reached each later state; null where it has not. */
	confirmedAt: Date | null
	packedAt: Date | null
	sentAt: Date | null
	receivedAt: Date | null
	cancelledAt: Date | null
}

type Asked = { code: string; cases: number; least?: number; isToShare?: boolean; given?: number }

/** All orders of the season, the earlier placed first, numbered from 1. */
export function planOrders(
	season: Season,
	plans: { catalogue: Catalogue; stores: Stores; standing: readonly StandingOfSeason[] },
): OrderOfSeason[] {
	const orders = [
		...season.days.past.flatMap((day) => pastOrders(season, plans, day)),
		...standingOrdersDue(season, plans),
		...season.scenario.comingOrders.map((coming) => comingOrder(season, plans, coming)),
	].toSorted((a, b) => a.placedAt.getTime() - b.placedAt.getTime())
	for (const [index, order] of orders.entries()) order.number = index + 1
	return orders
}

type Plans = Parameters<typeof planOrders>[1]

/** What the stores ordered for a delivery that is over, but for the standing orders. */
function pastOrders(season: Season, plans: Plans, day: DeliveryDay): OrderOfSeason[] {
	const { chance, days } = season
	const isLast = day === days.past.at(-1)
	return [...plans.stores.stores.values()].flatMap((store) => {
		if (!store.rounds.includes(weekday(day.on))) return []
		const isStanding = plans.standing.some(
			(standing) => standing.store === store && standing.made.some((date) => date.deliveryOn === day.on),
		)
		const mustOrder = isLast && store.lastOrder !== undefined
		if (!mustOrder && (isStanding || !chance.isLucky(store.ordersPercent))) return []
		const asked = mustOrder ? (store.lastOrder ?? []) : usualLines(season, plans.catalogue, store)
		const isCancelled = !mustOrder && chance.isLucky(3)
		return [
			makeOrder(season, plans, {
				store,
				day,
				state: isCancelled ? "cancelled" : stateAfter(season, day),
				asked,
				placedAt: minutesAfter(day.cutoffAt, -chance.whole(20, 2600)),
			}),
		]
	})
}

function usualLines(season: Season, catalogue: Catalogue, store: StoreOfSeason): Asked[] {
	const { chance } = season
	const products = [...catalogue.products.values()]
	return chance.some(products, chance.whole(2, 5)).map(({ code }) => {
		const cases = chance.whole(1, store.mostCases)
		return { code, cases, given: chance.isLucky(6) && cases > 1 ? cases - 1 : cases }
	})
}

/** What was sent on the last days is not yet signed for by everyone; all before is. */
function stateAfter({ today, chance }: Season, day: DeliveryDay): OrderState {
	if (day.on === today) return "sent"
	return day.on < addDays(today, -4) || chance.isLucky(60) ? "received" : "sent"
}

/** The orders that came from standing orders, for deliveries whose orders have closed. */
function standingOrdersDue(season: Season, plans: Plans): OrderOfSeason[] {
	const { days, now } = season
	return plans.standing.flatMap((standing) =>
		standing.made.flatMap((date) => {
			const day = [...days.past, days.closed].find((day) => day.on === date.deliveryOn)
			if (!day) return []
			return makeOrder(season, plans, {
				store: standing.store,
				day,
				state: days.past.includes(day) ? stateAfter(season, day) : "confirmed",
				asked: standing.lines,
				placedAt: notAfter(now, day.cutoffAt),
				standing: { id: standing.id, on: date.ruleOn },
			})
		}),
	)
}

function comingOrder(season: Season, plans: Plans, coming: DemoComingOrder): OrderOfSeason {
	const { days, now } = season
	const day = coming.openDay < 0 ? days.closed : days.open[coming.openDay]
	if (!day) throw new Error("the demo has fewer delivery days to come than its orders name")
	const lastMoment = minutesAfter(day.cutoffAt, -60)
	const placedAt = notAfter(lastMoment, minutesAfter(now, -60 * coming.hoursAgo))
	return makeOrder(season, plans, {
		...coming,
		store: named(plans.stores.stores, coming.store),
		day,
		asked: coming.lines,
		placedAt,
	})
}

function makeOrder(
	season: Season,
	{ catalogue }: Plans,
	order: {
		store: StoreOfSeason
		day: DeliveryDay
		state: OrderState
		asked: readonly Asked[]
		placedAt: Date
		standing?: { id: string; on: Day }
		note?: string
		poNumber?: string
	},
): OrderOfSeason {
	const { chance, now, scenario } = season
	const { store, day, state } = order
	const isDecided = state !== "placed" && state !== "cancelled"
	const products = order.asked.map((asked) => ({ ...asked, product: named(catalogue.products, asked.code) }))
	const price = priceOrder({
		lines: products.map(({ product, cases, isToShare }) => ({
			productId: product.id,
			cases,
			piecesPerCase: product.piecesPerCase,
			breakFamily: product.breakFamily,
			breaks: catalogue.breaks(store.tier, product.code),
			toBeSharedOut: isToShare ?? false,
		})),
		terms: store,
	})
	const step = (reached: readonly OrderState[], at: Date) => (reached.includes(state) ? notAfter(now, at) : null)
	const decidedAt = minutesAfter(order.placedAt, chance.whole(30, 200))
	const confirmedAt = order.standing ? minutesAfter(order.placedAt, 30) : decidedAt
	const beforeAt = instantAt(addDays(day.on, -1), "15:00", scenario.timeZone)
	const packedAt = beforeAt > confirmedAt ? beforeAt : minutesAfter(confirmedAt, 45)
	const sentAt = instantAt(day.on, "06:30", scenario.timeZone)
	return {
		id: chance.id(),
		number: 0,
		store,
		on: day.on,
		state,
		lines: products.map(({ product, cases, least = 0, given, isToShare }, index) => ({
			id: chance.id(),
			product,
			asked: cases,
			least,
			given: isDecided ? (given ?? cases) : null,
			isToShare: isToShare ?? false,
			caseCents: price.lines[index]?.caseCents ?? 0,
			lots: [],
		})),
		deliveryCents: price.deliveryCents,
		poNumber: order.poNumber ?? "",
		note: order.note ?? "",
		standing: order.standing ?? null,
		placedAt: notAfter(now, order.placedAt),
		confirmedAt: step(["confirmed", "packed", "sent", "received"], confirmedAt),
		packedAt: step(["packed", "sent", "received"], packedAt),
		sentAt: step(["sent", "received"], sentAt),
		receivedAt: step(["received"], minutesAfter(sentAt, chance.whole(40, 320))),
		cancelledAt: step(["cancelled"], decidedAt),
	}
}
