import { inArray } from "drizzle-orm"
import * as schema from "~/db/schema"
import { type Tx, withPlatform, withProducer } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { refreshExpected } from "~/services/crop/refresh-expected.server"
import { startChance } from "./chance"
import { insertAll } from "./insert-all.server"
import { larkmoor } from "./larkmoor"
import { type DemoPerson, demoPeople } from "./people"
import { planAgreements } from "./plan-agreements"
import { planBreakage } from "./plan-breakage.server"
import { planCatalogue } from "./plan-catalogue"
import { planHistory } from "./plan-history.server"
import { planInvoices } from "./plan-invoices"
import { planMarketDays } from "./plan-market-days"
import { planOrders } from "./plan-orders"
import { planPayments } from "./plan-payments"
import { planReceivables } from "./plan-receivables.server"
import { planRecords } from "./plan-records.server"
import { planStanding } from "./plan-standing"
import { planStock } from "./plan-stock"
import { planStores } from "./plan-stores"
import { planStripe } from "./plan-stripe"
import type { DemoScenario } from "./scenario"
import { minutesAfter, named, type Season, seasonDays } from "./season"
import { tansyKnoll } from "./tansy-knoll"
import { writeCounts, writeCrop, writeReleases } from "./write-history.server"
import { writeMoney } from "./write-money.server"

/**
 * Fills the database with two producers and a season of their work, as of today, and answers whom to sign in as. A
 * producer that is there already is left as it is, so a second run changes nothing; each is written whole or not at
 * all. The same day gives the same rows. Runs under row security, as the application does.
 */
export async function seedDemo(): Promise<DemoPerson[]> {
	const userIds = await seedPeople()
	const now = askClock()
	for (const scenario of [larkmoor, tansyKnoll]) await seedProducer(scenario, userIds, now)
	return [...demoPeople]
}

async function seedPeople(): Promise<Map<string, string>> {
	const emails = demoPeople.map((person) => person.email)
	return withPlatform(async (tx) => {
		await tx
			.insert(schema.users)
			.values(demoPeople.map(({ name, email }) => ({ name, email })))
			.onConflictDoNothing()
		const users = await tx
			.select({ id: schema.users.id, email: schema.users.email })
			.from(schema.users)
			.where(inArray(schema.users.email, emails))
		return new Map(users.map(({ id, email }) => [email, id]))
	})
}

async function seedProducer(scenario: DemoScenario, userIds: ReadonlyMap<string, string>, now: Date): Promise<void> {
	const chance = startChance(scenario.seed)
	const producerId = chance.id()
	const today = dayInZone(now, scenario.timeZone)
	const season: Season = {
		scenario,
		producerId,
		now,
		today,
		chance,
		userId: (email) => named(userIds, email),
		days: seasonDays(scenario, today, now),
	}
	await withProducer(producerId, async (tx) => {
		const { slug, name, county, timeZone, settings } = scenario
		const createdAt = minutesAfter(now, -7 * 1440 * (scenario.seasonWeeks + 4))
		const made = await tx
			.insert(schema.producers)
			.values({ id: producerId, slug, name, county, timeZone, createdAt })
			.onConflictDoNothing()
			.returning({ id: schema.producers.id })
		if (made.length === 0) return
		await tx.insert(schema.producerSettings).values({ producerId, ...settings })
		await writeSeason(tx, season)
	})
}

/** Plans the season subject by subject and writes it in the order that the foreign keys ask for. */
async function writeSeason(tx: Tx, season: Season): Promise<void> {
	const catalogue = planCatalogue(season)
	const stores = planStores(season, catalogue)
	const standing = planStanding(season, catalogue, stores)
	const orders = planOrders(season, { catalogue, stores, standing: standing.standing })
	const markets = planMarketDays(season, catalogue)
	const stock = planStock(season, { catalogue, orders, marketDays: markets.days })
	// A row of chances of its own, so that what stands behind the lots changes nothing of what was ordered.
	const chance = startChance(season.scenario.seed + 1)
	const history = await planHistory({ ...season, chance }, { catalogue, stock, orders })
	const agreements = planAgreements({ ...season, chance }, { catalogue, stores, standing, orders })
	const invoices = planInvoices(season, orders)
	const money = planPayments(season, invoices)
	const ownChance = { ...season, chance: startChance(season.scenario.seed + 2) }
	const receivables = await planReceivables(ownChance, { stores, invoices, money })
	const stripe = planStripe(ownChance, { invoices, money, markets })
	const breakage = await planBreakage(ownChance, { stock, invoices, money })
	const records = planRecords(season, { orders, invoices, payments: money })
	const { producerId } = season

	await insertAll(tx, schema.priceTiers, catalogue.rows.tiers)
	await insertAll(tx, schema.products, catalogue.rows.products)
	await insertAll(tx, schema.prices, catalogue.rows.prices)
	await insertAll(tx, schema.deliveryRounds, stores.rows.rounds)
	await insertAll(tx, schema.shutDays, stores.rows.shutDays)
	await insertAll(tx, schema.stores, stores.rows.stores)
	await insertAll(tx, schema.storeRounds, stores.rows.storeRounds)
	await insertAll(tx, schema.memberships, stores.rows.memberships)
	await insertAll(tx, schema.invitations, stores.rows.invitations)
	await insertAll(tx, schema.standingOrders, standing.rows.orders)
	await insertAll(tx, schema.standingOrderLines, standing.rows.lines)
	await insertAll(tx, schema.standingOrderSkips, standing.rows.skips)
	await insertAll(tx, schema.standingOrderChanges, agreements.changes)
	await insertAll(tx, schema.storePrices, agreements.storePrices)
	await insertAll(tx, schema.promotions, agreements.promotions)
	await insertAll(tx, schema.orderDrafts, agreements.drafts)
	await insertAll(
		tx,
		schema.orders,
		orders.map((order) => ({
			producerId,
			id: order.id,
			number: order.number,
			storeId: order.store.id,
			deliveryOn: order.on,
			state: order.state,
			poNumber: order.poNumber,
			note: order.note,
			deliveryCents: order.deliveryCents,
			placedBy: order.standing ? null : (order.store.buyerId ?? season.userId(season.scenario.deskEmail)),
			placedAt: order.placedAt,
			standingOrderId: order.standing?.id ?? null,
			standingOn: order.standing?.on ?? null,
		})),
	)
	await insertAll(
		tx,
		schema.orderLines,
		orders.flatMap((order) =>
			order.lines.map((line) => ({
				producerId,
				id: line.id,
				orderId: order.id,
				productId: line.product.id,
				askedCases: line.asked,
				leastCases: line.least,
				isToShare: line.isToShare,
				givenCases: line.given,
				caseCents: line.caseCents,
				piecesPerCase: line.product.piecesPerCase,
			})),
		),
	)
	await insertAll(tx, schema.orderMessages, agreements.messages)
	await insertAll(tx, schema.orderProposals, agreements.proposals)
	await insertAll(tx, schema.sharingRuns, agreements.runs)
	await insertAll(tx, schema.sharingShares, agreements.shares)
	await writeCrop(tx, history)
	await insertAll(tx, schema.lots, stock.lots)
	await writeReleases(tx, history)
	await insertAll(tx, schema.markets, markets.rows.markets)
	await insertAll(tx, schema.marketDays, markets.rows.days)
	await insertAll(tx, schema.marketDayPeople, markets.rows.people)
	await insertAll(tx, schema.stockMoves, stock.moves)
	await writeCounts(tx, history)
	await insertAll(tx, schema.orderLineLots, stock.lineLots)
	await writeMoney(tx, { invoices, money, stripe, breakage, receivables })
	await insertAll(tx, schema.sales, markets.rows.sales)
	await insertAll(tx, schema.saleLines, markets.rows.saleLines)
	await insertAll(tx, schema.saleLineLots, stock.saleLots)
	await insertAll(tx, schema.orderEvents, records.events)
	await insertAll(tx, schema.auditEntries, records.audit)
	await insertAll(tx, schema.outboxMails, records.mails)
	await insertAll(tx, schema.counters, [...records.counters, ...history.counters, ...breakage.counters])
	await refreshExpected(tx, { producerId, today: season.today })
}
