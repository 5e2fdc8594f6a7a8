import { and, eq, isNull, sql } from "drizzle-orm"
import { auditEntries, standingOrderChanges, standingOrderLines, standingOrderSkips, standingOrders } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { cutoffWords } from "~/domain/delivery/last-orders"
import type { Result } from "~/domain/result"
import { type Cadence, cadenceWords, ruleOf } from "~/domain/standing-orders/cadence"
import { env } from "~/platform/env.server"
import { type DeliverySchedule, findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { queueMail } from "~/services/mail/queue-mail.server"
import { findPlacingFacts, type PlacingFacts } from "~/services/orders/find-placing-facts.server"
import { findStorePrices, type StoreProduct } from "~/services/pricing/find-store-prices.server"
import { readStoreStandingOrder, type StandingLine, type StandingOrder } from "./read-standing-orders.server"
import { standingDates } from "./standing-dates.server"

export type SetStandingOrder = {
	producerId: string
	storeId: string
	/** Who sets it, and gets the acknowledgement. */
	person: { id: string; email: string }
	zone: string
	now: Date
	cadence: Cadence
	startsOn: Day
	/** The last day it may fall on; null is until the crop ends. */
	endsOn: Day | null
	/** Cases above zero, each product once. */
	lines: readonly StandingLine[]
	/** Whether the store commits to it for the season: served first when short. */
	isCommitment: boolean
	/** The id of the standing order that the form was drawn from, null where there was none; left out, none is asked about. */
	drawnFrom?: string | null
	/** Made with the form: a second send changes nothing. */
	idempotencyKey: string
}

export type SetStandingOrderAnswer = Result<
	object,
	| { ok: false; reason: "nothing-asked" | "no-delivery-that-weekday" | "no-dates" }
	| { ok: false; reason: "not-sold" | "least-above-asked" | "stands-in-for-itself"; productIds: string[] }
	| { ok: false; reason: "changed-meanwhile"; theirs: StandingOrder | null }
>

/** How many of the next dates the acknowledgement names. */
const DATES_IN_LETTER = 6

/**
 * Sets the standing order of a store, in place of the one before, whose dates from here on it takes over (dates skipped
 * stay skipped, a pause and changes of one date stay). Refused where another person of the store has
 * changed it since the form was drawn. What has closed already stays with the one before. Refuses lines and rules that cannot be met, writing
 * nothing. Recorded, and acknowledged by mail with the next dates; a second send of the same form changes nothing.
 */
export function setStandingOrder(order: SetStandingOrder): Promise<SetStandingOrderAnswer> {
	const { producerId, storeId } = order
	return withProducer(producerId, async (tx) => {
		// Two people of one store who save at once do it one after the other, and the later one stands.
		await tx.execute(sql`select id from stores where producer_id = ${producerId} and id = ${storeId} for no key update`)
		const isSameForm = and(
			eq(standingOrders.producerId, producerId),
			eq(standingOrders.storeId, storeId),
			eq(standingOrders.idempotencyKey, order.idempotencyKey),
		)
		const [sent] = await tx.select({ id: standingOrders.id }).from(standingOrders).where(isSameForm)
		if (sent) return { ok: true }

		const schedule = await findDeliverySchedule(tx, order)
		const productIds = [...new Set(order.lines.flatMap((line) => [line.productId, ...line.substituteIds]))]
		const products = await findStorePrices(tx, { producerId, storeId, today: schedule.today, productIds })
		const refusal = refuse(order, schedule, products)
		if (refusal) return refusal
		const before = await readStoreStandingOrder(tx, order)
		if (order.drawnFrom !== undefined && order.drawnFrom !== (before?.id ?? null)) {
			return { ok: false, reason: "changed-meanwhile", theirs: before }
		}
		const id = await replace(tx, order, before)
		const facts = await findPlacingFacts(tx, { producerId, storeId, idempotencyKey: order.idempotencyKey })
		await acknowledge(tx, { id, order, schedule, products, facts })
		return { ok: true }
	})
}

function refuse(
	order: SetStandingOrder,
	schedule: DeliverySchedule,
	products: readonly StoreProduct[],
): Extract<SetStandingOrderAnswer, { ok: false }> | null {
	const { lines, cadence } = order
	if (lines.length === 0) return { ok: false, reason: "nothing-asked" }
	const sold = new Set(products.map((product) => product.productId))
	const refused = (isWrong: (line: StandingLine) => boolean) => lines.filter(isWrong).map((line) => line.productId)
	const notSold = refused((line) => ![line.productId, ...line.substituteIds].every((id) => sold.has(id)))
	if (notSold.length > 0) return { ok: false, reason: "not-sold", productIds: notSold }
	const above = refused((line) => line.leastCases > line.cases)
	if (above.length > 0) return { ok: false, reason: "least-above-asked", productIds: above }
	const itself = refused((line) => line.substituteIds.includes(line.productId))
	if (itself.length > 0) return { ok: false, reason: "stands-in-for-itself", productIds: itself }
	if (!schedule.rounds.some((round) => round.weekday === cadence.weekday)) {
		return { ok: false, reason: "no-delivery-that-weekday" }
	}
	const rule = { ...ruleFacts(order), skips: [], createdAt: order.now }
	return standingDates(rule, schedule, 1).length === 0 ? { ok: false, reason: "no-dates" } : null
}

function ruleFacts({ cadence, startsOn, endsOn }: SetStandingOrder) {
	return { rule: ruleOf(cadence), startsOn, endsOn, pausedFrom: null, pausedUntil: null, endedAt: null }
}

async function replace(tx: Tx, order: SetStandingOrder, before: StandingOrder | null): Promise<string> {
	const { producerId, storeId, now } = order
	await tx
		.update(standingOrders)
		.set({ endedAt: now })
		.where(
			and(
				eq(standingOrders.producerId, producerId),
				eq(standingOrders.storeId, storeId),
				isNull(standingOrders.endedAt),
			),
		)
	const { rule, startsOn, endsOn } = ruleFacts(order)
	const [row] = await tx
		.insert(standingOrders)
		.values({
			producerId,
			storeId,
			rule,
			startsOn,
			endsOn,
			pausedFrom: before?.pausedFrom ?? null,
			pausedUntil: before?.pausedUntil ?? null,
			isCommitment: order.isCommitment,
			createdBy: order.person.id,
			createdAt: now,
			idempotencyKey: order.idempotencyKey,
		})
		.returning({ id: standingOrders.id })
	if (!row) throw new Error("an insert returns its row")
	const standingOrderId = row.id
	await tx.insert(standingOrderLines).values(order.lines.map((line) => ({ producerId, standingOrderId, ...line })))
	if (before) await takeOver(tx, { order, standingOrderId, before })
	await tx.insert(auditEntries).values({
		producerId,
		at: now,
		userId: order.person.id,
		action: "set-standing-order",
		subjectType: "standing-order",
		subjectId: standingOrderId,
		detail: {
			rule,
			startsOn,
			endsOn,
			isCommitment: order.isCommitment,
			lines: order.lines,
			replaces: before?.id ?? null,
		},
	})
	return standingOrderId
}

/** What was said of single dates stays, but for products that are asked no more. */
async function takeOver(
	tx: Tx,
	taken: { order: SetStandingOrder; standingOrderId: string; before: StandingOrder },
): Promise<void> {
	const { standingOrderId, before, order } = taken
	const { producerId } = order
	if (before.skips.length > 0) {
		await tx.insert(standingOrderSkips).values(before.skips.map((skipOn) => ({ producerId, standingOrderId, skipOn })))
	}
	const asked = new Set(order.lines.map((line) => line.productId))
	const changes = before.changes.filter((change) => asked.has(change.productId))
	if (changes.length === 0) return
	await tx
		.insert(standingOrderChanges)
		.values(changes.map(({ on, ...change }) => ({ producerId, standingOrderId, changeOn: on, ...change })))
}

async function acknowledge(
	tx: Tx,
	set: {
		id: string
		order: SetStandingOrder
		schedule: DeliverySchedule
		products: readonly StoreProduct[]
		facts: PlacingFacts
	},
): Promise<void> {
	const { order, facts, schedule } = set
	const standing = await readStoreStandingOrder(tx, order)
	if (!standing) throw new Error("it has just been written")
	const dates = standingDates(standing, schedule, DATES_IN_LETTER).filter((date) => !date.isSkipped)
	// A store that skips all of the next dates has seen them on the page; there is nothing to write.
	if (dates.length === 0) return
	await queueMail(tx, {
		producerId: order.producerId,
		to: order.person.email,
		template: "standing-order-set",
		onceKey: `standing-order-set:${set.id}`,
		props: {
			yard: facts.yard,
			sentTo: order.person.email,
			storeName: facts.storeName,
			cadence: cadenceWords(order.cadence),
			lines: set.products.flatMap((product) => {
				const line = order.lines.find((one) => one.productId === product.productId)
				if (!line) return []
				return {
					productName: product.name,
					productNote: [product.detail, `case of ${product.piecesPerCase}`].filter(Boolean).join(", "),
					cases: line.cases,
					leastCases: line.leastCases || null,
				}
			}),
			nextDates: dates.map((date) => ({
				deliveryOn: date.deliveryOn,
				changeUntil: cutoffWords(date.cutoffAt, schedule.zone),
			})),
			standingOrderUrl: `${env.BASE_URL}/buy/${facts.producerSlug}/${facts.storeSlug}/standing`,
		},
	})
}
