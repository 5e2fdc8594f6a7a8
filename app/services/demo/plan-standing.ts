import type { standingOrderLines, standingOrderSkips, standingOrders } from "~/db/schema"
import { addDays, weekday } from "~/domain/calendar"
import { ruleOf } from "~/domain/standing-orders/cadence"
import { nextDeliveryDates, type StandingDate } from "~/domain/standing-orders/delivery-dates"
import type { Catalogue } from "./plan-catalogue"
import type { StoreOfSeason, Stores } from "./plan-stores"
import { minutesAfter, named, type Season } from "./season"

/** A standing order with those of its dates for which an order has been made. */
export type StandingOfSeason = {
	id: string
	store: StoreOfSeason
	lines: readonly { code: string; cases: number; least: number }[]
	made: StandingDate[]
}

export type Standing = {
	standing: StandingOfSeason[]
	rows: {
		orders: (typeof standingOrders.$inferInsert)[]
		lines: (typeof standingOrderLines.$inferInsert)[]
		skips: (typeof standingOrderSkips.$inferInsert)[]
	}
}

const WEEKS_AGO = 9
const ENDED_DAYS_AGO = 24

/** The standing orders of the stores. Every date whose orders have closed has its order; skips lie ahead. */
export function planStanding(season: Season, catalogue: Catalogue, { stores }: Stores): Standing {
	const { producerId, now, today, chance, days, scenario, userId } = season
	const plan: Standing = { standing: [], rows: { orders: [], lines: [], skips: [] } }
	const weeksAgo = Math.min(WEEKS_AGO, scenario.seasonWeeks - 1)
	const lastMadeOn = [...days.past, days.closed].filter((day) => day.cutoffAt <= now).at(-1)?.on ?? today
	for (const store of stores.values()) {
		const { standing } = store
		const [round] = store.rounds
		if (!standing || round === undefined) continue
		const id = chance.id()
		const from = addDays(today, -7 * weeksAgo)
		const startsOn = addDays(from, (round - weekday(from) + 7) % 7)
		const rule = ruleOf({ every: "week", interval: standing.weeks, weekday: round, months: [] })
		const dates = nextDeliveryDates(
			{
				rule,
				startsOn,
				endsOn: null,
				pausedFrom: null,
				deliveryWeekdays: store.rounds,
				shutDays: days.shut.map((day) => day.on),
				skips: [],
			},
			startsOn,
			weeksAgo + 12,
		)
		const lastOn = standing.hasEnded ? addDays(today, -ENDED_DAYS_AGO) : lastMadeOn
		const toCome = dates.filter((date) => date.deliveryOn > lastMadeOn)
		const createdAt = minutesAfter(now, -(weeksAgo + 1) * 7 * 1440)
		plan.standing.push({
			id,
			store,
			lines: standing.lines,
			made: dates.filter((date) => date.deliveryOn <= lastOn),
		})
		plan.rows.orders.push({
			producerId,
			id,
			storeId: store.id,
			rule,
			startsOn,
			createdBy: store.buyerId ?? userId(scenario.deskEmail),
			createdAt,
			endedAt: standing.hasEnded ? minutesAfter(now, -ENDED_DAYS_AGO * 1440) : null,
			idempotencyKey: chance.id(),
		})
		for (const line of standing.lines) {
			plan.rows.lines.push({
				producerId,
				standingOrderId: id,
				productId: named(catalogue.products, line.code).id,
				cases: line.cases,
				leastCases: line.least,
			})
		}
		for (const index of standing.skips) {
			const date = toCome[index]
			if (date) plan.rows.skips.push({ producerId, standingOrderId: id, skipOn: date.ruleOn })
		}
	}
	return plan
}
