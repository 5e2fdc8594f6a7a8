import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { cutoffWords } from "~/domain/delivery/last-orders"
import { type LinePart, lineParts } from "~/domain/orders/line-parts"
import { type OrderPrice, priceOrder } from "~/domain/pricing/price-order"
import { env } from "~/platform/env.server"
import { queueMail } from "~/services/mail/queue-mail.server"
import { takeNumber } from "~/services/numbers/take-number.server"
import type { CheckedLine } from "./check-asked.server"
import type { PlacingFacts } from "./find-placing-facts.server"

/** Orders are numbered on through the years: a store speaks of "order 318", not of a year's. */
export const NO_YEAR = 0

/** An order that has been checked and is about to be written. */
export type NewOrder = {
	producerId: string
	storeId: string
	facts: PlacingFacts
	deliveryOn: Day
	/** At least one. */
	lines: readonly CheckedLine[]
	poNumber: string
	note: string
	idempotencyKey: string
	placedAt: Date
	/** Who placed it; null when a standing order did. */
	placedBy: string | null
	standing: { standingOrderId: string; on: Day } | null
	/** Who gets the acknowledgement, and until when the order can be changed (null = no more). */
	acknowledgeTo: string | null
	openUntil: Date | null
}

/**
 * Writes an order with its lines at the prices in force, its first event and its audit entry, and queues the
 * acknowledgement. Returns id and number. The number comes last but for the writing, since others wait for theirs.
 */
export async function writeOrder(tx: Tx, order: NewOrder): Promise<{ id: string; number: number }> {
	const priced = priceLines(order)
	const id = randomUUID()
	const number = await takeNumber(tx, { producerId: order.producerId, series: "order", year: NO_YEAR })
	await insertOrder(tx, { ...order, id, number, priced })
	if (order.acknowledgeTo !== null) {
		await queueMail(tx, {
			producerId: order.producerId,
			to: order.acknowledgeTo,
			template: "order-received",
			onceKey: `order-received:${id}`,
			props: orderLetter({ ...order, number, sentTo: order.acknowledgeTo }, priced),
		})
	}
	return { id, number }
}

/** The parts of an order's lines with the price of the whole, line by line: `price.lines[i]` is that of `parts[i]`. */
type PricedLines = {
	parts: LinePart<CheckedLine>[]
	price: OrderPrice
	/** What each line costs: a case, and a pound where it is priced by weight. */
	prices: { caseCents: number; poundCents: number | null }[]
}

/** Prices lines that have been checked, each at the break that all cases asked of its family reach. */
export function priceLines(order: Pick<NewOrder, "lines" | "facts">): PricedLines {
	const parts = order.lines.flatMap((line) => lineParts(line))
	const price = priceOrder({
		lines: parts.map(({ line, ...part }) => ({ ...line.product, ...part })),
		terms: order.facts.terms,
	})
	const priceOf = new Map(price.lines.map((line) => [line.productId, line]))
	const prices = order.lines.map(({ product }) => priceOf.get(product.productId) ?? { caseCents: 0, poundCents: null })
	return { parts, price, prices }
}

/** The lines as one set of rows, for a statement that writes them. */
export function lineRows(lines: readonly CheckedLine[], { prices }: PricedLines) {
	return sql`unnest(
		${sql.param(lines.map((line) => line.product.productId))}::uuid[],
		${sql.param(lines.map((line) => line.cases))}::smallint[],
		${sql.param(lines.map((line) => line.isToShare))}::boolean[],
		${sql.param(lines.map((line) => line.promisedCases))}::smallint[],
		${sql.param(lines.map((line) => line.leastCases))}::smallint[],
		${sql.param(prices.map(({ caseCents }) => caseCents))}::integer[],
		${sql.param(prices.map(({ poundCents }) => poundCents))}::integer[],
		${sql.param(lines.map((line) => line.product.piecesPerCase))}::smallint[]
	)`
}

/** One statement for all rows: while it runs, others wait for the number and for the products. */
async function insertOrder(
	tx: Tx,
	order: NewOrder & { id: string; number: number; priced: PricedLines },
): Promise<void> {
	const { producerId, id, lines, priced, standing } = order
	const detail = JSON.stringify({
		number: order.number,
		deliveryOn: order.deliveryOn,
		...(standing ? { standingOrderId: standing.standingOrderId } : {}),
	})
	await tx.execute(sql`
		with placed as (
			insert into orders (producer_id, id, number, store_id, delivery_on, po_number, note, delivery_cents, placed_by,
				placed_at, standing_order_id, standing_on, idempotency_key)
			values (${producerId}, ${id}, ${order.number}, ${order.storeId}, ${order.deliveryOn}, ${order.poNumber},
				${order.note}, ${priced.price.deliveryCents}, ${order.placedBy}, ${order.placedAt.toISOString()},
				${standing?.standingOrderId ?? null}, ${standing?.on ?? null}, ${order.idempotencyKey})
		), lines as (
			insert into order_lines (producer_id, order_id, product_id, asked_cases, is_to_share, promised_cases, least_cases,
				case_cents, pound_cents, pieces_per_case)
			select ${producerId}::uuid, ${id}::uuid, line.* from ${lineRows(lines, priced)} as line
		), draft as (
			delete from order_drafts
			where producer_id = ${producerId} and store_id = ${order.storeId} and delivery_on = ${order.deliveryOn}
				and ${order.placedBy !== null}
		), event as (
			insert into order_events (producer_id, order_id, kind, at, user_id, detail)
			values (${producerId}, ${id}, 'placed', ${order.placedAt.toISOString()}, ${order.placedBy}, ${detail}::jsonb)
		)
		insert into audit_entries (producer_id, at, user_id, action, subject_type, subject_id, detail)
		values (${producerId}, ${order.placedAt.toISOString()}, ${order.placedBy}, 'place-order', 'order', ${id},
			${detail}::jsonb)`)
}

/** What the acknowledgement of an order says; a line of which a part is to be shared out stands there as two. */
export function orderLetter(
	order: Pick<NewOrder, "facts" | "deliveryOn" | "openUntil"> & { number: number; sentTo: string },
	{ parts, price }: PricedLines,
) {
	const { facts, number } = order
	return {
		yard: facts.yard,
		sentTo: order.sentTo,
		storeName: facts.storeName,
		orderNumber: String(number),
		deliveryOn: order.deliveryOn,
		orderUrl: `${env.BASE_URL}/buy/${facts.producerSlug}/${facts.storeSlug}/orders/${number}`,
		changeUntil: order.openUntil && cutoffWords(order.openUntil, facts.zone),
		lines: parts.map(({ line: { product }, cases, toBeSharedOut }, index) => ({
			productName: product.name,
			productNote: [product.detail, `case of ${product.piecesPerCase}`].filter(Boolean).join(", "),
			cases,
			priceCents: price.lines[index]?.caseCents ?? 0,
			amountCents: toBeSharedOut ? 0 : (price.lines[index]?.lineCents ?? 0),
			toBeShared: toBeSharedOut,
		})),
		charges: [{ label: "Delivery", cents: price.deliveryCents }],
		totalCents: price.totalCents,
	}
}
