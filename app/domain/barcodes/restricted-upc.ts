import { checkDigit, hasRightCheckDigit } from "./check-digit"
import { priceCheckDigit } from "./price-check-digit"

/**
 * The code for a weighed piece with its price: 2, item (5), price check digit, price in cents (4), check digit. It holds
 * inside one shop only, which gives out the item digits. Throws RangeError on an item that is not five digits or a price
 * over $99.99. Source: GS1 General Specifications, restricted circulation numbers (read as coded in the library biip).
 */
export function restrictedUpc(item: string, priceCents: number): string {
	if (!/^\d{5}$/.test(item)) throw new RangeError(`not five digits: ${item}`)
	if (!Number.isSafeInteger(priceCents) || priceCents < 0 || priceCents > 9999) {
		throw new RangeError(`not a price of four digits: ${priceCents}`)
	}
	const price = `${priceCents}`.padStart(4, "0")
	const body = `2${item}${priceCheckDigit(price)}${price}`
	return `${body}${checkDigit(body)}`
}

/** Item and price of such a code; null when it is none or one of its two check digits is wrong. */
export function readRestrictedUpc(code: string): { item: string; priceCents: number } | null {
	const [, item = "", guard = "", price = ""] = /^2(\d{5})(\d)(\d{4})\d$/.exec(code) ?? []
	if (item === "" || !hasRightCheckDigit(code) || priceCheckDigit(price) !== Number(guard)) return null
	return { item, priceCents: Number(price) }
}
