import { createHash } from "node:crypto"
import { sql } from "drizzle-orm"
import { type Tx, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { linesOnDate } from "~/domain/standing-orders/lines-on-date"
import type { DeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { type CheckedLine, checkAgainst, type Keep } from "~/services/orders/check-asked.server"
import { findPlacingFactsOf, type PlacingFacts } from "~/services/orders/find-placing-facts.server"
import { lockProducts } from "~/services/orders/lock-products.server"
import type { NewOrder } from "~/services/orders/write-order.server"
import { writeOrders } from "~/services/orders/write-orders.server"
import { findPricesOfStores } from "~/services/pricing/find-prices-of-stores.server"
import { findOutlooks, type ProductOutlook } from "~/services/promise/find-outlooks.server"
import type { StandingLine, StandingOrder } from "./read-standing-orders.server"
import type { DueDate } from "./standing-dates.server"

/** A date of a standing order that is to become an order. */
export type Due = { standing: StandingOrder; date: DueDate; schedule: DeliverySchedule }

/**
 * Makes the orders of some dates of one day in one transaction. A standing order that another worker has in hand is passed
 * over, or waited for; what was made already and what asks for nothing that is sold is left.
 */
export function makeOrders(
	producerId: string,
	{ due, short, waits }: { due: readonly Due[]; short: ReadonlySet<string>; waits: boolean },
): Promise<{ made: number; passedOver: number }> {
	return withProducer(producerId, async (tx) => {
		const [first] = due
		const inHand = await takeInHand(tx, producerId, { due, waits })
		if (!first || inHand.length === 0) return { made: 0, passedOver: due.length }
		const { today } = first.schedule
		const { deliveryOn } = first.date
		const storeIds = inHand.map(({ standing }) => standing.storeId)
		const productIds = [...new Set(inHand.flatMap(({ asked }) => asked.map(({ productId }) => productId)))]
		const facts = await findPlacingFactsOf(tx, {
			producerId,
			asked: inHand.map(({ standing, key }) => ({ storeId: standing.storeId, idempotencyKey: key })),
		})
		const prices = await findPricesOfStores(tx, { producerId, storeIds, today, productIds })
		await lockProducts(tx, { producerId, productIds })
		const outlooks = await findOutlooks(tx, { producerId, today, productIds })
		const orders = inHand.flatMap((one) => {
			const known = facts.get(one.key)
			if (!known || known.earlier) return []
			const products = prices.get(one.standing.storeId) ?? []
			const asked = one.asked.map(({ productId, cases, leastCases }) => {
				const keep: Keep = short.has(productId) ? "share" : true
				return { productId, cases, leastCases, keep }
			})
			const { lines } = checkAgainst(outlooks, { deliveryOn, asked, products })
			promise(outlooks, deliveryOn, lines)
			return lines.length === 0 ? [] : [newOrder(producerId, { ...one, facts: known, lines })]
		})
		const orderIds = await writeOrders(tx, producerId, orders)
		await copySubstitutes(tx, { producerId, orderIds })
		return { made: orders.length, passedOver: due.length - inHand.length }
	})
}

type InHand = Due & { key: string; asked: ReturnType<typeof linesOnDate<StandingLine>> }

/** Locks the standing orders, so that no other worker makes an order of theirs before this transaction ends. */
async function takeInHand(
	tx: Tx,
	producerId: string,
	{ due, waits }: { due: readonly Due[]; waits: boolean },
): Promise<InHand[]> {
	const { rows } = await tx.execute<{ id: string }>(sql`
		select id from standing_orders
		where producer_id = ${producerId} and id = any(${sql.param(due.map(({ standing }) => standing.id))}::uuid[])
		order by id for no key update ${waits ? sql`` : sql`skip locked`}`)
	const ours = new Set(rows.map(({ id }) => id))
	return due
		.filter(({ standing }) => ours.has(standing.id))
		.map((one) => ({
			...one,
			key: keyOf(one.standing.id, one.date.ruleOn),
			asked: linesOnDate(one.standing.lines, one.standing.changes, one.date.ruleOn),
		}))
}

/** What was just promised is no longer free for the next. */
function promise(outlooks: Map<string, ProductOutlook>, on: Day, lines: readonly CheckedLine[]): void {
	for (const { product, cases, isToShare } of lines) {
		const outlook = outlooks.get(product.productId)
		if (!outlook || isToShare) continue
		const quantity = cases * product.piecesPerCase
		outlooks.set(product.productId, { ...outlook, promises: [...outlook.promises, { on, quantity }] })
	}
}

function newOrder(
	producerId: string,
	{ standing, date, schedule, key, facts, lines }: InHand & { facts: PlacingFacts; lines: CheckedLine[] },
): NewOrder {
	return {
		producerId,
		storeId: standing.storeId,
		facts,
		deliveryOn: date.deliveryOn,
		lines,
		poNumber: "",
		note: "",
		idempotencyKey: key,
		placedAt: schedule.now,
		placedBy: null,
		standing: { standingOrderId: standing.id, on: date.ruleOn },
		acknowledgeTo: standing.createdBy.email,
		openUntil: null,
	}
}

/** The orders' lines take over what may stand in for them, for the sharing out that may follow. */
async function copySubstitutes(tx: Tx, query: { producerId: string; orderIds: readonly string[] }): Promise<void> {
	if (query.orderIds.length === 0) return
	await tx.execute(sql`
		update order_lines set substitute_ids = usual.substitute_ids
		from orders o
		join standing_order_lines usual on usual.producer_id = o.producer_id
			and usual.standing_order_id = o.standing_order_id and usual.substitute_ids <> '{}'
		where o.producer_id = ${query.producerId} and o.id = any(${sql.param([...query.orderIds])}::uuid[])
			and order_lines.producer_id = o.producer_id and order_lines.order_id = o.id
			and usual.product_id = order_lines.product_id`)
}

/** A key that is the same for the same date of the same standing order, in the form of a UUID (RFC 9562, version 8). */
function keyOf(standingOrderId: string, ruleOn: Day): string {
	const hex = createHash("sha256").update(`${standingOrderId} ${ruleOn}`).digest("hex")
	return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-8${hex.slice(13, 16)}-8${hex.slice(17, 20)}-${hex.slice(20, 32)}`
}
