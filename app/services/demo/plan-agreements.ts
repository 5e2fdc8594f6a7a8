import type {
	orderDrafts,
	orderMessages,
	orderProposals,
	promotions,
	sharingRuns,
	sharingShares,
	standingOrderChanges,
	storePrices,
} from "~/db/schema"
import { addDays, type Day, instantAt, weekday } from "~/domain/calendar"
import type { Claim } from "~/domain/sharing/share-out"
import type { Catalogue } from "./plan-catalogue"
import type { LineOfSeason, OrderOfSeason } from "./plan-orders"
import type { Standing } from "./plan-standing"
import type { StoreOfSeason, Stores } from "./plan-stores"
import { minutesAfter, type Season } from "./season"

export type Agreements = {
	storePrices: (typeof storePrices.$inferInsert)[]
	promotions: (typeof promotions.$inferInsert)[]
	drafts: (typeof orderDrafts.$inferInsert)[]
	changes: (typeof standingOrderChanges.$inferInsert)[]
	messages: (typeof orderMessages.$inferInsert)[]
	proposals: (typeof orderProposals.$inferInsert)[]
	runs: (typeof sharingRuns.$inferInsert)[]
	shares: (typeof sharingShares.$inferInsert)[]
}

type Plans = { catalogue: Catalogue; stores: Stores; standing: Standing; orders: readonly OrderOfSeason[] }

/**
 * What producer and stores settled beside the orders themselves: prices for one store, promotions (one over, one to come,
 * so that today's prices are those of the list), a half-filled sheet, a date changed, words about orders, and the days on
 * which a short product was shared out.
 */
export function planAgreements(season: Season, plans: Plans): Agreements {
	const stores = [...plans.stores.stores.values()]
	return {
		...specialPrices(season, plans, stores),
		drafts: draft(season, plans, stores),
		changes: changedDate(season, plans),
		...wordsOnOrders(season, plans.orders),
		...sharings(season, plans.orders),
	}
}

const last = <T>(list: readonly T[]): T => {
	const item = list.at(-1)
	if (item === undefined) throw new Error("the scenario has at least one of each")
	return item
}

function specialPrices(season: Season, { catalogue }: Plans, stores: readonly StoreOfSeason[]) {
	const { producerId, chance, today } = season
	const product = last([...catalogue.products.values()])
	const [, , cheapest] = product.casePrices
	const promotion = (name: string, startsOn: Day, endsOn: Day) => ({
		producerId,
		id: chance.id(),
		name,
		productId: product.id,
		tierId: null,
		basisPoints: 1000,
		startsOn,
		endsOn,
	})
	return {
		storePrices: [
			{
				producerId,
				id: chance.id(),
				storeId: last(stores).id,
				productId: product.id,
				minCases: 1,
				caseCents: cheapest,
				validFrom: addDays(today, -40),
				validUntil: null,
			},
		],
		promotions: [
			promotion("First comb of the year", addDays(today, -60), addDays(today, -46)),
			promotion("Last comb of the year", addDays(today, 45), addDays(today, 59)),
		],
	}
}

/** A sheet that the last store of the list with a buyer began yesterday and has not sent. */
function draft({ producerId, days, now }: Season, { catalogue }: Plans, stores: readonly StoreOfSeason[]) {
	const [product] = catalogue.products.values()
	const store = stores.findLast((one) => one.buyerId !== null && one.lastOrder === undefined) ?? last(stores)
	const day = days.open.find(({ on }) => store.rounds.includes(weekday(on)))
	const updatedBy = store.buyerId
	if (!product || !day || !updatedBy) return []
	const fields = { [`cases-${product.id}`]: "2", note: "", poNumber: "" }
	return [{ producerId, storeId: store.id, deliveryOn: day.on, fields, updatedBy, updatedAt: minutesAfter(now, -1300) }]
}

/** One case more of the first line, on the third date to come of the last standing order that runs. */
function changedDate({ producerId, today }: Season, { standing, catalogue }: Plans): Agreements["changes"] {
	const running = standing.rows.orders.filter((order) => !order.endedAt)
	const order = running.at(-1)
	const planned = standing.standing.find((one) => one.id === order?.id)
	const [line] = planned?.lines ?? []
	const product = line && catalogue.products.get(line.code)
	const lastMade = planned?.made.at(-1)
	if (!order || !planned || !line || !product || !lastMade) return []
	const step = order.rule.includes("INTERVAL=2") ? 14 : 7
	const changeOn = addDays(lastMade.ruleOn, step * 3)
	if (changeOn <= today) return []
	return [{ producerId, standingOrderId: planned.id, changeOn, productId: product.id, cases: line.cases + 1 }]
}

/** A question and its answer about one order, and a change that the store accepted on another. */
function wordsOnOrders({ producerId, chance, userId, scenario }: Season, orders: readonly OrderOfSeason[]) {
	const sent = orders.filter((order) => order.sentAt && order.lines.length > 0 && order.store.buyerId)
	const [asked, changed] = [last(sent), last(sent.slice(0, -1))]
	const desk = userId(scenario.deskEmail)
	const message = (side: "store" | "desk", body: string, minutes: number) => ({
		producerId,
		id: chance.id(),
		orderId: asked.id,
		side,
		body,
		writtenBy: side === "desk" ? desk : (asked.store.buyerId ?? desk),
		writtenAt: minutesAfter(asked.placedAt, minutes),
	})
	const [line] = changed.lines as [LineOfSeason]
	const cases = { from: line.asked, to: line.given ?? line.asked }
	return {
		messages: [
			message("store", "Can it come before nine? We open late that day.", 40),
			message("desk", "Yes. The van is with you at half past eight.", 95),
		],
		proposals: [
			{
				producerId,
				id: chance.id(),
				orderId: changed.id,
				lines: [
					{
						lineId: line.id,
						fromCases: cases.from,
						toCases: cases.to,
						fromCents: line.caseCents,
						toCents: line.caseCents,
					},
				],
				reason: "Two supers came off lighter than they looked.",
				state: "accepted" as const,
				proposedBy: desk,
				proposedAt: minutesAfter(changed.placedAt, 180),
				answeredBy: changed.store.buyerId ?? desk,
				answeredAt: minutesAfter(changed.placedAt, 260),
			},
		],
	}
}

const MOST_RUNS = 8

type Sharing = { product: LineOfSeason["product"]; on: Day; lines: { line: LineOfSeason; order: OrderOfSeason }[] }

/** The latest days on which somebody got less than they asked of a product, as runs of equal shares. */
function sharings(season: Season, orders: readonly OrderOfSeason[]): Pick<Agreements, "runs" | "shares"> {
	const { producerId, chance, userId, scenario } = season
	const runs: Agreements["runs"] = []
	const shares: Agreements["shares"] = []
	for (const { product, on, lines } of shortDays(orders).slice(-MOST_RUNS)) {
		const id = chance.id()
		const supplyCases = lines.reduce((sum, { line }) => sum + (line.given ?? 0), 0)
		runs.push({
			producerId,
			id,
			productId: product.id,
			deliveryOn: on,
			rule: "equal-shares",
			supplyCases,
			claims: lines.map(claimOf),
			sharedBy: userId(scenario.ownerEmail),
			sharedAt: instantAt(addDays(on, -2), "18:20", scenario.timeZone),
		})
		for (const { line, order } of lines) {
			const given = line.given ?? 0
			shares.push({
				producerId,
				runId: id,
				orderLineId: line.id,
				storeId: order.store.id,
				askedCases: line.asked,
				ruleCases: given,
				givenCases: given,
				sentence:
					given === line.asked
						? `You asked ${line.asked} and get all of it.`
						: `You asked ${line.asked} and get ${given}. We gave one case each until the ${supplyCases} were gone.`,
			})
		}
	}
	return { runs, shares }
}

function shortDays(orders: readonly OrderOfSeason[]): Sharing[] {
	const days = new Map<string, Sharing>()
	for (const order of orders) {
		if (order.sentAt === null) continue
		for (const line of order.lines) {
			const key = `${order.on} ${line.product.id}`
			const day = days.get(key) ?? { product: line.product, on: order.on, lines: [] }
			day.lines.push({ line, order })
			days.set(key, day)
		}
	}
	return [...days.values()]
		.filter(({ lines }) => lines.some(({ line }) => (line.given ?? 0) < line.asked))
		.toSorted((a, b) => (a.on < b.on ? -1 : a.on > b.on ? 1 : a.product.code < b.product.code ? -1 : 1))
}

function claimOf({ line, order }: Sharing["lines"][number]): Claim {
	return {
		id: line.id,
		claimClass: order.standing ? "standing" : "single",
		asked: line.asked,
		least: line.least,
		weight: 1,
		lastPart: null,
		placed: order.number,
	}
}
