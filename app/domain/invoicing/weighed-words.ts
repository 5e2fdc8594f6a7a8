import { plainMoney } from "~/domain/money"

const GRAMS_PER_POUND = 453.59237

/**
 * The weight that a price by the pound was worked out from: "9.751 lb (4,423 g)". Grams are what was weighed and what
 * counts; pounds beside them to the thousandth, so that anybody can check the amount to the cent.
 */
export function weighedWords(grams: number): string {
	const pounds = (grams / GRAMS_PER_POUND).toFixed(3)
	return `${pounds} lb (${String(grams).replace(/\B(?=(\d{3})+$)/g, ",")} g)`
}

/** "14.50 a lb". */
export function poundPriceWords(poundCents: number): string {
	return `${plainMoney(poundCents)} a lb`
}
