import { randomUUID } from "node:crypto"
import { type Day, dayInZone, isDay, timeLeftWords } from "~/domain/calendar"
import { cutoffSoonWords } from "~/domain/delivery/last-orders"
import { now as askClock } from "~/platform/clock.server"
import type { LineRefusal } from "~/services/orders/check-asked.server"
import { findNextOpenDay, findOrderSheet } from "~/services/orders/find-order-sheet.server"
import type { PlaceOrderAnswer } from "~/services/orders/place-order.server"
import type { StoreScope } from "../guard.server"
import { findBuyFrame } from "./frame.server"
import type { PostedSheet } from "./sheet-form"

/** What the order sheet of `day` shows. Throws 404 when that is no day, or the van does not come to the store on it. */
export async function loadSheet(scope: StoreScope, day: Day) {
	const { producer, store } = scope
	const now = askClock()
	const zone = producer.timeZone
	const query = { producerId: producer.id, storeId: store.id, now, zone }
	const sheet = isDay(day) ? await findOrderSheet({ ...query, day }) : null
	if (!sheet) throw new Response(null, { status: 404 })
	const { isOpen, cutoffAt } = sheet.day
	const today = dayInZone(now, zone)
	return {
		frame: await findBuyFrame(scope, { part: "sheet", day, now, fortnight: sheet.fortnight }),
		day,
		today,
		isOpen,
		closes: { words: cutoffSoonWords(cutoffAt, zone, today), left: isOpen ? timeLeftWords(now, cutoffAt) : null },
		/** Where what was typed for a closed day can go instead. */
		nextOpenDay: isOpen ? null : await findNextOpenDay(query),
		store: sheet.store,
		producerName: producer.name,
		products: sheet.rows,
		orders: sheet.orders,
		idempotencyKey: randomUUID(),
	}
}

/** A refusal as the page shows it: by the name of the field, "" for what concerns the whole sheet. */
export type SheetErrors = Record<string, string>

/** Words for what was refused, by field. */
export function refusalWords(
	refusal: Extract<PlaceOrderAnswer, { ok: false }>,
	facts: { posted: PostedSheet; zone: string; today: Day },
): SheetErrors {
	switch (refusal.reason) {
		case "nothing-asked":
			return { "": "Nothing is asked for yet. Write cases beside a product." }
		case "no-delivery-that-day":
			return { "": "The van does not come to you on this day any more. Nothing was ordered; choose another day above." }
		case "closed": {
			const closed = cutoffSoonWords(refusal.cutoffAt, facts.zone, facts.today)
			return { "": `Last orders for this day were ${closed}. Nothing was ordered; what you wrote is kept below.` }
		}
		case "lines":
			return Object.fromEntries(refusal.refused.map((line) => lineWords(line, facts.posted)))
	}
}

function lineWords(line: LineRefusal, posted: PostedSheet): [string, string] {
	if (line.reason === "not-sold") {
		return ["", "Something you asked for is no longer sold here. Look through the lines, then send again."]
	}
	const asked = posted.lines.find((one) => one.productId === line.productId)?.cases ?? 0
	const { freeCases: free } = line
	const words =
		free === 0
			? `None is free. Take it off, or keep ${asked} and it is shared out.`
			: `${free} ${free === 1 ? "is" : "are"} free. Ask for ${free}, or keep ${asked} and it is shared out.`
	return [`cases-${line.productId}`, words]
}
