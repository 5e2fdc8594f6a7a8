import { breaksConstraint } from "~/db/errors.server"
import { type Tx, withProducer } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { deliveryDayOn, findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { findStorePrices } from "~/services/pricing/find-store-prices.server"
import { type AskedLine, checkAsked, type LineRefusal } from "./check-asked.server"
import { findPlacingFacts } from "./find-placing-facts.server"
import { writeOrder } from "./write-order.server"

export type PlaceOrder = {
	producerId: string
	storeId: string
	/** Who places it, and gets the acknowledgement. */
	person: { id: string; email: string }
	zone: string
	now: Date
	deliveryOn: Day
	/** Cases above zero, each product once; in any order. */
	lines: readonly AskedLine[]
	poNumber: string
	note: string
	/** Made with the form: a second send finds what the first made. */
	idempotencyKey: string
}

export type PlaceOrderAnswer = Result<
	{ number: number },
	| { ok: false; reason: "nothing-asked" }
	| { ok: false; reason: "no-delivery-that-day" }
	| { ok: false; reason: "closed"; cutoffAt: Date }
	| { ok: false; reason: "lines"; refused: LineRefusal[] }
>

/**
 * Places an order for one store and day, in one transaction: the products' rows are locked in the order of their ids, so
 * that of two buyers the first gets the last case, then each line is held against what is free to promise. Refuses the
 * whole when nothing is asked, when the van does not come that day, when its orders have closed, or naming each line that
 * asks more than is free without a choice of what to do then, or that costs something else than the buyer saw; nothing is
 * written then. Prices are those in force now. The half-filled sheet of that day is done with. Sending the same
 * form again answers the first order, also after the cut-off.
 */
export async function placeOrder(order: PlaceOrder): Promise<PlaceOrderAnswer> {
	try {
		return await withProducer(order.producerId, (tx) => placeInTransaction(tx, order))
	} catch (error) {
		// Two sends of one form with different products lock different rows and meet only here.
		if (breaksConstraint(error, "orders_sent_once")) return placeOrder(order)
		throw error
	}
}

async function placeInTransaction(tx: Tx, order: PlaceOrder): Promise<PlaceOrderAnswer> {
	const { producerId, storeId, deliveryOn, now, zone } = order
	const today = dayInZone(now, zone)
	const productIds = order.lines.map((line) => line.productId)
	const products = await findStorePrices(tx, { producerId, storeId, today, productIds, lock: true })
	const facts = await findPlacingFacts(tx, { producerId, storeId, idempotencyKey: order.idempotencyKey })
	if (facts.earlier) return { ok: true, number: facts.earlier.number }
	if (order.lines.length === 0) return { ok: false, reason: "nothing-asked" }

	const day = deliveryDayOn(await findDeliverySchedule(tx, { producerId, storeId, now, zone }), deliveryOn)
	if (!day) return { ok: false, reason: "no-delivery-that-day" }
	if (!day.isOpen) return { ok: false, reason: "closed", cutoffAt: day.cutoffAt }

	const { lines, refused } = await checkAsked(tx, { producerId, today, deliveryOn, asked: order.lines, products })
	if (refused.length > 0) return { ok: false, reason: "lines", refused }
	if (lines.length === 0) return { ok: false, reason: "nothing-asked" }

	const { number } = await writeOrder(tx, {
		producerId,
		storeId,
		facts,
		deliveryOn,
		lines,
		poNumber: order.poNumber,
		note: order.note,
		idempotencyKey: order.idempotencyKey,
		placedAt: now,
		placedBy: order.person.id,
		standing: null,
		acknowledgeTo: order.person.email,
		openUntil: day.cutoffAt,
	})
	return { ok: true, number }
}
