import { compareDays, type Day } from "../calendar"
import { type DatedPrice, estimateCaseCents, pricesInForce } from "./price-in-force"

/** What a price list is about: products, tiers and every price with its day. */
export type PriceBook = {
	products: readonly BookProduct[]
	tiers: readonly { id: string; name: string }[]
	prices: readonly (DatedPrice & { tierId: string; productId: string })[]
}

export type BookProduct = {
	id: string
	code: string
	name: string
	pieceNetGrams: number
	piecesPerCase: number
	pricedBy: "case" | "weight"
}

/** One price to set: `cents` is for a case, or for a pound where the product is priced by weight. */
export type NewPrice = { tierId: string; productId: string; minCases: number; cents: number; validFrom: Day }

/** What would become of one price; `oldCents` is what holds on its first day without it, null where nothing does. */
export type PriceChange = NewPrice & { oldCents: number | null; kind: "new" | "changed" | "unchanged" }

/** The figure that a price is named by: a pound's where it is by weight, else a case's. */
function namedCents(price: { caseCents: number; poundCents: number | null }): number {
	return price.poundCents ?? price.caseCents
}

/** What a price says in the table of prices: by weight the case is an estimate. */
export function storedCents(product: BookProduct, cents: number): { caseCents: number; poundCents: number | null } {
	return product.pricedBy === "weight"
		? { caseCents: estimateCaseCents(product, cents), poundCents: cents }
		: { caseCents: cents, poundCents: null }
}

/** Compares a new price with the one that holds on its first day, of the same break. */
export function comparePrice(price: NewPrice, book: Pick<PriceBook, "prices">): PriceChange {
	const same = book.prices.filter(
		({ tierId, productId, minCases }) =>
			tierId === price.tierId && productId === price.productId && minCases === price.minCases,
	)
	const [held] = pricesInForce(same, price.validFrom)
	const oldCents = held ? namedCents(held) : null
	if (oldCents === null) return { ...price, oldCents, kind: "new" }
	return { ...price, oldCents, kind: oldCents === price.cents ? "unchanged" : "changed" }
}

/** Whether a price may begin then: today or later. What was in force stays as it was. */
export function mayBeginOn(validFrom: Day, today: Day): boolean {
	return compareDays(validFrom, today) >= 0
}
