import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { addDays, type Day, dayInZone } from "~/domain/calendar"
import { CULLS } from "~/domain/lots/count-harvest"
import {
	type ExpectedSupply,
	planSeason,
	type SeasonDemand,
	type SeasonSupply,
	type SeasonWeek,
	seasonWeeks,
} from "~/domain/orders/season"
import { cadenceOf } from "~/domain/standing-orders/cadence"
import { linesOnDate } from "~/domain/standing-orders/lines-on-date"
import { findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { readStandingOrders } from "~/services/standing-orders/read-standing-orders.server"
import { newDateMemory, standingDates } from "~/services/standing-orders/standing-dates.server"

/** Half a year: a season with what is committed before it. */
const WEEKS = 26

/** A product of the season ahead, week by week. */
export type SeasonRow = { productId: string; code: string; name: string; piecesPerCase: number; weeks: SeasonWeek[] }

/** The season ahead; `figure` is the figure of the crop that the producer counts on. Products with nothing are left out. */
export type Season = {
	weeks: Day[]
	figure: "low" | "likely"
	products: SeasonRow[]
	/** Stores whose standing order has a rule that cannot be read: it makes no orders until it is set anew. */
	unreadStores: string[]
}

type Facts = {
	code: string
	name: string
	piecesPerCase: number
	reserve: number
	stock: SeasonSupply[]
	expected: ExpectedSupply[]
	demands: SeasonDemand[]
}

/**
 * What stores have committed to, ordered and will order by their standing orders in the coming 26 weeks, against stock and
 * expected crop. A date of a standing order that has become an order counts as that order. Seven statements, however many
 * products, stores and orders there are.
 */
export function findSeason(query: { producerId: string; now: Date; zone: string }): Promise<Season> {
	const { producerId, now, zone } = query
	const today = dayInZone(now, zone)
	const weeks = seasonWeeks(today, WEEKS)
	const to = addDays(weeks.at(-1) ?? today, 6)
	return readProducer(producerId, async (tx) => {
		const { products, figure } = await findProducts(tx, producerId)
		await addSupplies(tx, { producerId, today, to, products })
		const made = await addOrders(tx, { producerId, today, to, products })
		const unreadStores = await addStanding(tx, { ...query, to, products, made })
		return {
			weeks,
			figure,
			unreadStores,
			products: [...products]
				.filter(([, one]) => one.demands.length + one.stock.length + one.expected.length > 0)
				.map(([productId, { code, name, piecesPerCase, ...facts }]) => ({
					productId,
					code,
					name,
					piecesPerCase,
					weeks: planSeason({ ...facts, piecesPerCase }, weeks),
				})),
		}
	})
}

type Products = Map<string, Facts>

async function findProducts(tx: Tx, producerId: string): Promise<{ products: Products; figure: "low" | "likely" }> {
	const { rows } = await tx.execute<{
		id: string
		code: string
		name: string
		piecesPerCase: number
		reserve: number
		figure: "low" | "likely"
	}>(sql`
		select p.id, p.code, p.name, p.pieces_per_case as "piecesPerCase", p.reserve_pieces as reserve,
			coalesce(s.crop_figure, 'low') as figure
		from products p left join producer_settings s on s.producer_id = p.producer_id
		where p.producer_id = ${producerId}
		order by length(p.code), p.code`)
	const products = new Map(
		rows.map(({ id, figure: _, ...row }) => [id, { ...row, stock: [], expected: [], demands: [] } as Facts]),
	)
	return { products, figure: rows[0]?.figure ?? "low" }
}

async function addSupplies(
	tx: Tx,
	query: { producerId: string; today: Day; to: Day; products: Products },
): Promise<void> {
	const { producerId, today, to, products } = query
	const { rows: stock } = await tx.execute<SeasonSupply & { productId: string }>(sql`
		select l.product_id as "productId", l.best_before_on::text as until, sum(b.pieces)::int as pieces,
			(case l.state when 'released' then ${today}::date else greatest(l.expected_release_on, ${today}::date) end)::text as on
		from lots l
		join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
		where l.producer_id = ${producerId} and l.state in ('released', 'held') and l.best_before_on >= ${today}
			and l.grade <> ${CULLS} and b.place in ('cold-room', 'ready') and b.pieces > 0
			and b.place_ref = '00000000-0000-0000-0000-000000000000'
		group by 1, 2, 4`)
	for (const { productId, ...supply } of stock) products.get(productId)?.stock.push(supply)
	const { rows: expected } = await tx.execute<ExpectedSupply & { productId: string }>(sql`
		select e.product_id as "productId", e.expected_on::text as on,
			(e.expected_on + coalesce(s.best_before_days, 300)::int)::text as until,
			sum(e.low_pieces)::int as low, sum(e.likely_pieces)::int as likely, sum(e.high_pieces)::int as high
		from expected_supplies e
		left join producer_settings s on s.producer_id = e.producer_id
		where e.producer_id = ${producerId} and e.expected_on between ${today} and ${to}
		group by 1, 2, 3`)
	for (const { productId, ...supply } of expected) products.get(productId)?.expected.push(supply)
}

/** Adds what is ordered; answers which dates of standing orders have become orders, in whatever state. */
async function addOrders(
	tx: Tx,
	query: { producerId: string; today: Day; to: Day; products: Products },
): Promise<Set<string>> {
	const { producerId, today, to, products } = query
	const { rows } = await tx.execute<{
		standing: string | null
		productId: string
		on: Day
		class: SeasonDemand["class"]
		pieces: number
		isOpen: boolean
	}>(sql`
		select o.standing_order_id || ' ' || o.standing_on::text as standing, l.product_id as "productId",
			greatest(o.delivery_on, ${today}::date)::text as on, o.state in ('placed', 'confirmed') as "isOpen",
			case when so.id is null then 'single' when so.is_commitment then 'commitment' else 'standing' end as class,
			sum(coalesce(l.given_cases, l.asked_cases) * l.pieces_per_case)::int as pieces
		from orders o
		join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
		left join standing_orders so on so.producer_id = o.producer_id and so.id = o.standing_order_id
		where o.producer_id = ${producerId} and o.delivery_on <= ${to}
			and (o.state in ('placed', 'confirmed') or (o.standing_on is not null and o.delivery_on >= ${today}))
		group by 1, 2, 3, 4, 5`)
	for (const { productId, on, pieces, isOpen, class: ofClass } of rows) {
		if (isOpen && pieces > 0) products.get(productId)?.demands.push({ on, pieces, class: ofClass })
	}
	return new Set(rows.flatMap(({ standing }) => standing ?? []))
}

/** Adds the dates of running standing orders that are still to become orders; answers the stores of those that cannot be read. */
async function addStanding(
	tx: Tx,
	query: { producerId: string; now: Date; zone: string; to: Day; products: Products; made: ReadonlySet<string> },
): Promise<string[]> {
	const { producerId, to, products, made } = query
	const standing = await readStandingOrders(tx, producerId, sql`so.ended_at is null`)
	if (standing.length === 0) return []
	const all = await findDeliverySchedule(tx, { ...query, storeId: null })
	const weekdays = await findWeekdays(tx, producerId)
	const memory = newDateMemory()
	for (const order of standing) {
		const ofStore = weekdays.get(order.storeId) ?? []
		const schedule = { ...all, rounds: all.rounds.filter((one) => ofStore.includes(one.weekday)) }
		const ofClass = order.isCommitment ? "commitment" : "standing"
		for (const { ruleOn, deliveryOn, isSkipped } of standingDates(order, schedule, WEEKS, memory)) {
			if (isSkipped || deliveryOn > to || made.has(`${order.id} ${ruleOn}`)) continue
			for (const { productId, cases } of linesOnDate(order.lines, order.changes, ruleOn)) {
				const product = products.get(productId)
				product?.demands.push({ on: deliveryOn, class: ofClass, pieces: cases * product.piecesPerCase })
			}
		}
	}
	const unread = standing.filter(({ rule }) => cadenceOf(rule) === null)
	return findStoreNames(
		tx,
		producerId,
		unread.map(({ storeId }) => storeId),
	)
}

async function findStoreNames(tx: Tx, producerId: string, storeIds: readonly string[]): Promise<string[]> {
	if (storeIds.length === 0) return []
	const { rows } = await tx.execute<{ name: string }>(sql`
		select name from stores
		where producer_id = ${producerId} and id = any(${sql.param([...storeIds])}::uuid[]) order by name`)
	return rows.map(({ name }) => name)
}

/** On which weekdays the van comes to each store. */
async function findWeekdays(tx: Tx, producerId: string): Promise<Map<string, number[]>> {
	const { rows } = await tx.execute<{ storeId: string; weekdays: number[] }>(sql`
		select s.store_id as "storeId", array_agg(r.weekday) as weekdays
		from store_rounds s join delivery_rounds r on r.producer_id = s.producer_id and r.id = s.round_id
		where s.producer_id = ${producerId}
		group by s.store_id`)
	return new Map(rows.map(({ storeId, weekdays }) => [storeId, weekdays]))
}
