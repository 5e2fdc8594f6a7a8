import { z } from "zod"
import { compareDays, type Day } from "~/domain/calendar"
import { mayBeginOn } from "~/domain/pricing/compare-prices"
import { readBasisPoints, readCents, readDay, readLeastCases } from "~/domain/pricing/read-figures"

export type FieldError = { field?: string; message: string }
type Typed = Readonly<Record<string, string>>

/** Gathers what is wrong with the fields of a form while it is read. */
function reading(typed: Typed, today: Day) {
	const errors: FieldError[] = []
	const need = <T>(field: string, value: T | null, message: string): T | null => {
		if (value === null) errors.push({ field, message })
		return value
	}
	const text = (field: string) => typed[field] ?? ""
	const chosen = (field: string, words: string) => {
		const id = z.guid().safeParse(typed[field])
		return need(field, id.success ? id.data : null, words)
	}
	const firstDay = (field: string) => {
		const day = need(field, readDay(text(field)), "Write a day, such as 2026-08-18.")
		if (day && !mayBeginOn(day, today)) errors.push({ field, message: "Choose today or a later day." })
		return day
	}
	const lastDay = (field: string, from: Day | null) => {
		const day = need(field, readDay(text(field)), "Write a day, such as 2026-08-18.")
		if (day && from && compareDays(day, from) < 0) errors.push({ field, message: "The last day is before the first." })
		return day
	}
	return { errors, need, text, chosen, firstDay, lastDay }
}

/** Reads the form of a price for one store alone. The last day may be left empty. */
export function readStorePrice(typed: Typed, today: Day) {
	const { errors, need, text, chosen, firstDay, lastDay } = reading(typed, today)
	const storeId = chosen("own-store", "Choose a store.")
	const productId = chosen("own-product", "Choose a product.")
	const minCases = need("own-min", readLeastCases(text("own-min")), "Write a whole number of cases from 1 to 999.")
	const cents = need("own-price", readCents(text("own-price")), "Write an amount, such as 114.00.")
	const validFrom = firstDay("own-from")
	const validUntil = text("own-until").trim() === "" ? null : lastDay("own-until", validFrom)
	if (!storeId || !productId || minCases === null || cents === null || !validFrom || errors.length > 0) {
		return { ok: false, errors } as const
	}
	return { ok: true, price: { storeId, productId, minCases, cents, validFrom, validUntil } } as const
}

/** Reads the form of a promotion; no tier is every tier. */
export function readPromotion(typed: Typed, today: Day) {
	const { errors, need, text, chosen, firstDay, lastDay } = reading(typed, today)
	const name = need("off-name", text("off-name").trim().slice(0, 80) || null, "Give it a name.")
	const productId = chosen("off-product", "Choose a product.")
	const tierId = text("off-tier") === "" ? null : chosen("off-tier", "Choose a tier.")
	const basisPoints = need("off-share", readBasisPoints(text("off-share")), "Write a percentage, such as 10 or 12.5.")
	const startsOn = firstDay("off-from")
	const endsOn = lastDay("off-until", startsOn)
	if (!name || !productId || basisPoints === null || !startsOn || !endsOn || errors.length > 0) {
		return { ok: false, errors } as const
	}
	return { ok: true, promotion: { name, productId, tierId, basisPoints, startsOn, endsOn } } as const
}

/** Reads the form that gives a store another tier. */
export function readStoreTier(typed: Typed, today: Day) {
	const { errors, chosen } = reading(typed, today)
	const storeId = chosen("tier-store", "Choose a store.")
	const tierId = chosen("tier-tier", "Choose a tier.")
	return storeId && tierId ? ({ ok: true, storeId, tierId } as const) : ({ ok: false, errors } as const)
}
