import type { Day } from "~/domain/calendar"
import { comparePrice, mayBeginOn, type PriceBook } from "~/domain/pricing/compare-prices"
import { readCents, readDay, readLeastCases } from "~/domain/pricing/read-figures"
import type { SeenPrice } from "~/services/pricing/set-prices.server"

type FieldError = { field: string; message: string }

/** What was typed, by name; a name that comes twice is kept once. */
export function typedIn(form: FormData): Record<string, string> {
	const typed: Record<string, string> = {}
	for (const [name, value] of form)
		if (typeof value === "string" && name !== "intent") typed[name] = value.slice(0, 200)
	return typed
}

/** Reads the form that sets one price of a tier. Every wrong field is named. */
export function readPriceForm(
	typed: Readonly<Record<string, string>>,
	book: PriceBook,
	today: Day,
): { ok: true; price: SeenPrice } | { ok: false; errors: FieldError[] } {
	const errors: FieldError[] = []
	const need = <T>(field: string, value: T | null | undefined, message: string) => {
		if (value === null || value === undefined) errors.push({ field, message })
		return value ?? null
	}
	const text = (field: string) => typed[field] ?? ""
	const product = need(
		"product",
		book.products.find(({ id }) => id === typed.product),
		"Choose a product.",
	)
	const tier = need(
		"tier",
		book.tiers.find(({ id }) => id === typed.tier),
		"Choose a price tier.",
	)
	const minCases = need("minCases", readLeastCases(text("minCases")), "Write a whole number of cases from 1 to 999.")
	const cents = need("price", readCents(text("price")), "Write an amount, such as 114.00.")
	const day = need("validFrom", readDay(text("validFrom")), "Write a day, such as 2026-08-18.")
	if (day && !mayBeginOn(day, today)) {
		errors.push({ field: "validFrom", message: "Choose today or a later day: what was in force is not changed." })
	}
	if (!product || !tier || minCases === null || cents === null || !day || errors.length > 0)
		return { ok: false, errors }
	const price = { productId: product.id, tierId: tier.id, minCases, cents, validFrom: day }
	return { ok: true, price: { ...price, oldCents: comparePrice(price, book).oldCents } }
}
