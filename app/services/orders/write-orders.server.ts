import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { takeNumbers } from "~/services/numbers/take-number.server"
import { type NewOrder, NO_YEAR, orderLetter, priceLines } from "./write-order.server"

type Numbered = NewOrder & { id: string; number: number; priced: ReturnType<typeof priceLines> }

/**
 * Writes many orders of one producer as `writeOrder` writes one, in a handful of statements for all of them. Answers the
 * id of each, in their order. Nobody's kept sheet is thrown away: it is for orders that nobody places by hand.
 */
export async function writeOrders(tx: Tx, producerId: string, orders: readonly NewOrder[]): Promise<string[]> {
	if (orders.length === 0) return []
	const priced = orders.map((order) => ({ ...order, id: randomUUID(), priced: priceLines(order) }))
	const first = await takeNumbers(tx, { producerId, series: "order", year: NO_YEAR, count: orders.length })
	const numbered = priced.map((order, index) => ({ ...order, number: first + index }))
	await insertOrders(tx, producerId, numbered)
	await queueMails(tx, producerId, numbered.flatMap(acknowledgement))
	return numbered.map(({ id }) => id)
}

async function insertOrders(tx: Tx, producerId: string, orders: readonly Numbered[]): Promise<void> {
	await tx.execute(sql`
		with new as materialized (
			select * from jsonb_to_recordset(${JSON.stringify(orders.map(orderRow))}::jsonb) as new (id uuid, number integer,
				store_id uuid, delivery_on date, po_number text, note text, delivery_cents integer, placed_by uuid,
				placed_at timestamptz, standing_order_id uuid, standing_on date, idempotency_key uuid, detail jsonb)
		), placed as (
			insert into orders (producer_id, id, number, store_id, delivery_on, po_number, note, delivery_cents, placed_by,
				placed_at, standing_order_id, standing_on, idempotency_key)
			select ${producerId}::uuid, id, number, store_id, delivery_on, po_number, note, delivery_cents, placed_by,
				placed_at, standing_order_id, standing_on, idempotency_key from new
		), lines as (
			insert into order_lines (producer_id, order_id, product_id, asked_cases, is_to_share, promised_cases, least_cases,
				case_cents, pound_cents, pieces_per_case)
			select ${producerId}::uuid, line.* from jsonb_to_recordset(${JSON.stringify(orders.flatMap(lineRow))}::jsonb) as line
				(order_id uuid, product_id uuid, asked_cases smallint, is_to_share boolean, promised_cases smallint,
				least_cases smallint, case_cents integer, pound_cents integer, pieces_per_case smallint)
		), event as (
			insert into order_events (producer_id, order_id, kind, at, user_id, detail)
			select ${producerId}::uuid, id, 'placed', placed_at, placed_by, detail from new
		)
		insert into audit_entries (producer_id, at, user_id, action, subject_type, subject_id, detail)
		select ${producerId}::uuid, placed_at, placed_by, 'place-order', 'order', id, detail from new`)
}

function orderRow(order: Numbered) {
	const { id, number, deliveryOn, standing } = order
	return {
		id,
		number,
		store_id: order.storeId,
		delivery_on: deliveryOn,
		po_number: order.poNumber,
		note: order.note,
		delivery_cents: order.priced.price.deliveryCents,
		placed_by: order.placedBy,
		placed_at: order.placedAt.toISOString(),
		standing_order_id: standing?.standingOrderId ?? null,
		standing_on: standing?.on ?? null,
		idempotency_key: order.idempotencyKey,
		detail: { number, deliveryOn, ...(standing ? { standingOrderId: standing.standingOrderId } : {}) },
	}
}

function lineRow({ id, lines, priced }: Numbered) {
	return lines.map((line, index) => ({
		order_id: id,
		product_id: line.product.productId,
		asked_cases: line.cases,
		is_to_share: line.isToShare,
		promised_cases: line.promisedCases,
		least_cases: line.leastCases,
		case_cents: priced.prices[index]?.caseCents ?? 0,
		pound_cents: priced.prices[index]?.poundCents ?? null,
		pieces_per_case: line.product.piecesPerCase,
	}))
}

function acknowledgement(order: Numbered) {
	const { acknowledgeTo, id } = order
	if (acknowledgeTo === null) return []
	const props = orderLetter({ ...order, sentTo: acknowledgeTo }, order.priced)
	return [{ to: acknowledgeTo, template: "order-received" as const, onceKey: `order-received:${id}`, props }]
}
