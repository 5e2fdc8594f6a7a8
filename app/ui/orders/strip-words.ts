import { type Day, daysBetween, monthDay, weekday, weekdayName } from "~/domain/calendar"
import type { SheetProduct } from "./price-sheet"

/** A day near by its weekday, a later one by its date: "Friday", "August 24". */
function nearDay(on: Day, today: Day): string {
	const ahead = daysBetween(today, on)
	if (ahead <= 0) return "tonight"
	return ahead < 7 ? weekdayName(weekday(on)) : monthDay(on)
}

/**
 * The words under the strip of a product: "16 free, 6 held until Friday", "18 for all stores, 31 asked". Held or expected
 * stock that comes after the day backs later promises, and so frees released stock for this one: it has no date then.
 */
export function stripWords({ strip, toShareCases }: Pick<SheetProduct, "strip" | "toShareCases">, today: Day): string {
	if (toShareCases > 0) return `${strip.freeCases} for all stores, ${toShareCases} asked`
	const parts = [
		strip.free > 0 && `${strip.free} free`,
		strip.held > 0 && `${strip.held} held${strip.heldUntil ? ` until ${nearDay(strip.heldUntil, today)}` : ""}`,
		strip.expected > 0 && `${strip.expected} expected${strip.expectedOn ? ` ${nearDay(strip.expectedOn, today)}` : ""}`,
	].filter(Boolean)
	if (parts.length > 0) return parts.join(", ")
	return strip.next ? `${strip.next.quantity} expected ${nearDay(strip.next.on, today)}` : "none left"
}
