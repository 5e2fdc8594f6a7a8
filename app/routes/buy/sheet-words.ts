import { type Day, dayInZone, monthDay, weekday, weekdayName } from "~/domain/calendar"
import { cutoffSoonWords } from "~/domain/delivery/last-orders"
import { formatMoney } from "~/domain/money"
import type { ChangeOrderAnswer } from "~/services/orders/change-order.server"
import type { LineRefusal } from "~/services/orders/check-asked.server"
import type { PlaceOrderAnswer } from "~/services/orders/place-order.server"
import type { PostedSheet } from "./sheet-form"

/** A refusal as the page shows it: by the name of the field, "" for what concerns the whole sheet. */
export type SheetErrors = Record<string, string>

type Refusal = Extract<PlaceOrderAnswer | ChangeOrderAnswer, { ok: false }>

/** Words for what was refused, by field. */
export function refusalWords(refusal: Refusal, facts: { posted: PostedSheet; zone: string; today: Day }): SheetErrors {
	switch (refusal.reason) {
		case "nothing-asked":
			return { "": "Nothing is asked for yet. Write cases beside a product." }
		case "no-delivery-that-day":
			return { "": "The van does not come to you on this day any more. Nothing was ordered; choose another day above." }
		case "closed": {
			const closed = cutoffSoonWords(refusal.cutoffAt, facts.zone, facts.today)
			return { "": `Last orders for this day were ${closed}. Nothing was ordered; what you wrote is kept below.` }
		}
		case "unknown":
			return { "": "There is no such order of yours. Nothing was changed." }
		case "too-late":
			return {
				"":
					refusal.state === "placed"
						? "Last orders for this delivery have passed. The order stays as it was."
						: `The order is ${refusal.state} already. It stays as it was.`,
			}
		case "shared-out":
			return {
				"": "A line of this order has been shared out already. The order stays as it was; call or write to change it.",
			}
		case "lines":
			return Object.fromEntries(refusal.refused.map((line) => lineWords(line, facts.posted)))
	}
}

function lineWords(line: LineRefusal, posted: PostedSheet): [string, string] {
	const field = `cases-${line.productId}`
	switch (line.reason) {
		case "not-sold": {
			const name = posted.values[`label-${field}`]?.replace(/, cases$/, "") ?? "Something you asked for"
			return ["", `${name} is no longer sold to you. It is off the sheet; look through the rest, then send again.`]
		}
		case "price-changed":
			return [
				field,
				`A case is now ${formatMoney(line.caseCents)}; it was ${formatMoney(line.seenCents)} when you opened this sheet. Send again to take it at that.`,
			]
		case "case-changed":
			return [
				field,
				`A case now holds ${line.piecesPerCase}; it held ${line.seenPieces} when you opened this sheet. Send again to take it so.`,
			]
		case "more-than-free": {
			const asked = posted.lines.find((one) => one.productId === line.productId)?.cases ?? 0
			const { freeCases: free } = line
			if (free <= 0) return [field, `None is free. Leave it off, wait on the list for ${asked}, or take another day.`]
			return [
				field,
				`${free} ${free === 1 ? "is" : "are"} free. Take ${free}, wait on the list for the other ${asked - free}, or take another day.`,
			]
		}
	}
}

/** "on Tuesday", "today", or "on August 4" for what was begun longer ago. */
export function begunWords(at: Date, zone: string, today: Day): string {
	const on = dayInZone(at, zone)
	if (on === today) return "today"
	const days = (Date.parse(today) - Date.parse(on)) / 86_400_000
	return days < 7 ? `on ${weekdayName(weekday(on))}` : `on ${monthDay(on)}`
}
