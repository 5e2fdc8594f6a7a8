import type { marketDayPeople, marketDays, markets, saleLines, sales } from "~/db/schema"
import { addDays, type Day, instantAt } from "~/domain/calendar"
import type { Catalogue, CatalogueProduct } from "./plan-catalogue"
import type { DemoMarket } from "./scenario"
import { minutesAfter, named, notAfter, type Season } from "./season"

export type SaleOfSeason = {
	id: string
	at: Date
	method: "card" | "cash"
	totalCents: number
	givenCents: number | null
	intentId: string | null
	soldBy: string
	lines: { product: CatalogueProduct; pieces: number }[]
}

export type MarketDayOfSeason = {
	id: string
	on: Day
	state: "planned" | "open" | "closed"
	loadedAt: Date
	/** When what was left came back; null while the day is on or to come. */
	returnedAt: Date | null
	load: { product: CatalogueProduct; pieces: number }[]
	sales: SaleOfSeason[]
}

export type MarketDays = {
	days: MarketDayOfSeason[]
	rows: {
		markets: (typeof markets.$inferInsert)[]
		days: (typeof marketDays.$inferInsert)[]
		people: (typeof marketDayPeople.$inferInsert)[]
		sales: (typeof sales.$inferInsert)[]
		saleLines: (typeof saleLines.$inferInsert)[]
	}
}

const FLOAT_CENTS = 8_000
const WEEKS_AHEAD = 3
const BILLS = [500, 1000, 2000]

/** The markets, their days behind and ahead, and what was sold on those that are over. */
export function planMarketDays(season: Season, catalogue: Catalogue): MarketDays {
	const { scenario, producerId, today, chance, userId } = season
	const plan: MarketDays = { days: [], rows: { markets: [], days: [], people: [], sales: [], saleLines: [] } }
	for (const market of scenario.markets) {
		const { name, address, opensAt, closesAt, readerId } = market
		const marketId = chance.id()
		plan.rows.markets.push({ producerId, id: marketId, name, address, opensAt, closesAt, readerId })
		for (let week = -scenario.marketWeeks; week <= WEEKS_AHEAD; week += 1) {
			const day = planDay(season, catalogue, market, addDays(today, market.weekdayAhead + 7 * week))
			plan.days.push(day)
			plan.rows.days.push({
				producerId,
				id: day.id,
				marketId,
				marketOn: day.on,
				state: day.state,
				floatCents: day.state === "planned" ? 0 : FLOAT_CENTS,
			})
			for (const person of market.people) {
				plan.rows.people.push({ producerId, marketDayId: day.id, userId: userId(person) })
			}
			for (const { id, at, lines, intentId, ...sale } of day.sales) {
				plan.rows.sales.push({
					producerId,
					id,
					marketDayId: day.id,
					...sale,
					state: "paid",
					stripePaymentIntentId: intentId,
					soldAt: at,
					paidAt: at,
				})
				for (const { product, pieces } of lines) {
					plan.rows.saleLines.push({
						producerId,
						saleId: id,
						productId: product.id,
						pieces,
						pieceCents: product.pieceCents ?? 0,
					})
				}
			}
		}
	}
	return plan
}

function planDay(season: Season, catalogue: Catalogue, market: DemoMarket, on: Day): MarketDayOfSeason {
	const { scenario, today, now, chance } = season
	const state = on < today ? "closed" : on === today ? "open" : "planned"
	const opensAt = instantAt(on, market.opensAt, scenario.timeZone)
	const closesAt = instantAt(on, market.closesAt, scenario.timeZone)
	const load =
		state === "planned"
			? []
			: Object.entries(market.load).map(([code, pieces]) => ({ product: named(catalogue.products, code), pieces }))
	return {
		id: chance.id(),
		on,
		state,
		load,
		loadedAt: notAfter(now, minutesAfter(opensAt, -150)),
		returnedAt: state === "closed" ? minutesAfter(closesAt, 60) : null,
		sales: state === "closed" ? planSales(season, market, load, { opensAt, closesAt }) : [],
	}
}

/** Sales spread over the day, never more than was loaded, with a few pieces left over of most products. */
function planSales(
	{ chance, userId, scenario }: Season,
	market: DemoMarket,
	load: MarketDayOfSeason["load"],
	{ opensAt, closesAt }: { opensAt: Date; closesAt: Date },
): SaleOfSeason[] {
	const left = new Map(load.map(({ product, pieces }) => [product.code, pieces - chance.whole(0, 3)]))
	const count = chance.whole(10, 16)
	const minutes = (closesAt.getTime() - opensAt.getTime()) / 60_000
	const soldBy = userId(market.people[0] ?? scenario.ownerEmail)
	return Array.from({ length: count }, (_, index) => {
		const onTable = load.filter(({ product }) => (left.get(product.code) ?? 0) > 0)
		const lines = chance.some(onTable, chance.whole(1, 2)).map(({ product }) => {
			const pieces = Math.min(left.get(product.code) ?? 0, chance.whole(1, 2))
			left.set(product.code, (left.get(product.code) ?? 0) - pieces)
			return { product, pieces }
		})
		const totalCents = lines.reduce((sum, line) => sum + line.pieces * (line.product.pieceCents ?? 0), 0)
		const bill = BILLS[chance.whole(0, 2)] ?? 500
		const isCard = chance.isLucky(55)
		return {
			id: chance.id(),
			at: minutesAfter(opensAt, Math.floor(((index + 0.5) * minutes) / count)),
			method: isCard ? ("card" as const) : ("cash" as const),
			totalCents,
			givenCents: isCard ? null : Math.ceil(totalCents / bill) * bill,
			intentId: isCard ? `pi_demo_${chance.hash().slice(0, 24)}` : null,
			soldBy,
			lines,
		}
	}).filter((sale) => sale.lines.length > 0)
}
