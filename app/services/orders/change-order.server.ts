import { sql } from "drizzle-orm"
import { type Tx, withProducer } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { changeWords, type LineChange } from "~/domain/orders/change-words"
import { isOpenToChange, type OrderState } from "~/domain/orders/order-states"
import type { Result } from "~/domain/result"
import { deliveryDayOn, findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { queueMail } from "~/services/mail/queue-mail.server"
import { findStorePrices } from "~/services/pricing/find-store-prices.server"
import { type CheckedLine, checkAsked, type LineRefusal } from "./check-asked.server"
import { promisedCases } from "./find-most-cases.server"
import { findPlacingFacts } from "./find-placing-facts.server"
import { type LockedOrder, lockOrder } from "./lock-order.server"
import type { PlaceOrder } from "./place-order.server"
import { recordChange } from "./record-change.server"
import { lineRows, orderLetter, priceLines } from "./write-order.server"

export type ChangeOrder = Omit<PlaceOrder, "deliveryOn"> & { number: number }

export type ChangeOrderAnswer = Result<
	{ number: number },
	| { ok: false; reason: "unknown" }
	| { ok: false; reason: "nothing-asked" }
	| { ok: false; reason: "too-late"; state: OrderState }
	| { ok: false; reason: "shared-out" }
	| { ok: false; reason: "lines"; refused: LineRefusal[] }
>

/**
 * Puts other lines, number and note in the place of those of a store's own order, while it is only placed, before last
 * orders, and before any line of it was shared out. Checked and priced as a new order is, its own promises set aside; the
 * timeline says what changed, and whoever changed it gets a letter. Sending the same form again changes nothing more.
 */
export function changeOrder(query: ChangeOrder): Promise<ChangeOrderAnswer> {
	return withProducer(query.producerId, (tx) => changeInTransaction(tx, query))
}

async function changeInTransaction(tx: Tx, query: ChangeOrder): Promise<ChangeOrderAnswer> {
	const { producerId, storeId, now, zone, number } = query
	const order = await lockOrder(tx, { producerId, number })
	if (!order || order.storeId !== storeId) return { ok: false, reason: "unknown" }
	if (await wasChangedBy(tx, order, query.idempotencyKey)) return { ok: true, number }
	if (query.lines.length === 0) return { ok: false, reason: "nothing-asked" }
	const { deliveryOn } = order
	const day = deliveryDayOn(await findDeliverySchedule(tx, query), deliveryOn)
	if (!day || !isOpenToChange(order.state, day.cutoffAt, now)) {
		return { ok: false, reason: "too-late", state: order.state }
	}
	if (await wasSharedOut(tx, order)) return { ok: false, reason: "shared-out" }

	const today = dayInZone(now, zone)
	// The products of both the old lines and the new: what an old one sets free, another may take.
	const productIds = [...new Set([...order.lines, ...query.lines].map((line) => line.productId))]
	const products = await findStorePrices(tx, { producerId, storeId, today, productIds, lock: true })
	const own = order.lines.map((line) => ({
		productId: line.productId,
		pieces: promisedCases(line) * line.piecesPerCase,
	}))
	const { lines, refused } = await checkAsked(tx, { producerId, today, deliveryOn, asked: query.lines, products, own })
	if (refused.length > 0) return { ok: false, reason: "lines", refused }
	if (lines.length === 0) return { ok: false, reason: "nothing-asked" }
	await writeChange(tx, { ...query, order, lines, openUntil: day.cutoffAt })
	return { ok: true, number }
}

async function wasChangedBy(tx: Tx, order: LockedOrder, idempotencyKey: string): Promise<boolean> {
	const { rows } = await tx.execute(sql`
		select 1 from order_events
		where producer_id = ${order.producerId} and order_id = ${order.id} and kind = 'changed'
			and detail ->> 'idempotencyKey' = ${idempotencyKey}`)
	return rows.length > 0
}

/** Also when the sharing was taken back: its record names the lines, which must stay for it. */
async function wasSharedOut(tx: Tx, order: LockedOrder): Promise<boolean> {
	const { rows } = await tx.execute(sql`
		select 1 from order_lines l
		where l.producer_id = ${order.producerId} and l.order_id = ${order.id} and (l.given_cases is not null or exists (
			select 1 from sharing_shares s where s.producer_id = l.producer_id and s.order_line_id = l.id))
		limit 1`)
	return rows.length > 0
}

async function writeChange(
	tx: Tx,
	query: Omit<ChangeOrder, "lines"> & { order: LockedOrder; lines: CheckedLine[]; openUntil: Date },
): Promise<void> {
	const { producerId, storeId, order, lines, idempotencyKey, person, number } = query
	const facts = await findPlacingFacts(tx, { producerId, storeId, idempotencyKey })
	const priced = priceLines({ lines, facts })
	await tx.execute(sql`
		update orders set po_number = ${query.poNumber}, note = ${query.note},
			delivery_cents = ${priced.price.deliveryCents}
		where producer_id = ${producerId} and id = ${order.id}`)
	await tx.execute(sql`delete from order_lines where producer_id = ${producerId} and order_id = ${order.id}`)
	await tx.execute(sql`
		insert into order_lines (producer_id, order_id, product_id, asked_cases, is_to_share, promised_cases, least_cases,
			case_cents, pound_cents, pieces_per_case)
		select ${producerId}::uuid, ${order.id}::uuid, line.* from ${lineRows(lines, priced)} as line`)
	const changes = lineChanges(order, lines)
	await recordChange(tx, {
		producerId,
		orderId: order.id,
		kind: "changed",
		userId: person.id,
		detail: { idempotencyKey, lines: changes, reason: changeWords(changes) },
	})
	await queueMail(tx, {
		producerId,
		to: person.email,
		template: "order-received",
		onceKey: `order-changed:${order.id}:${idempotencyKey}`,
		props: {
			...orderLetter(
				{ facts, deliveryOn: order.deliveryOn, openUntil: query.openUntil, number, sentTo: person.email },
				priced,
			),
			isChanged: true,
		},
	})
}

function lineChanges(order: LockedOrder, lines: readonly CheckedLine[]): LineChange[] {
	const before = new Map(order.lines.map((line) => [line.productId, line]))
	const after = new Map(lines.map((line) => [line.product.productId, line]))
	return [...new Set([...before.keys(), ...after.keys()])].flatMap((productId) => {
		const [old, fresh] = [before.get(productId), after.get(productId)]
		const product = fresh?.product ?? old?.product
		const [from, to] = [old?.askedCases ?? 0, fresh?.cases ?? 0]
		return product && from !== to ? [{ code: product.code, name: product.name, from, to }] : []
	})
}
