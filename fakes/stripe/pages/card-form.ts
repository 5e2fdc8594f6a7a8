import { outcomeOf } from "../cards"
import type { FormTree } from "../form"
import type { GivenCard } from "../payment-flow"

export type CardField = "email" | "number" | "expiry" | "cvc" | "name"
export type CardErrors = Partial<Record<CardField, string>>
export type TypedCard = Record<CardField, string>

function text(form: FormTree, field: CardField): string {
	const value = form[field]
	return typeof value === "string" ? value.trim() : ""
}

/** The month and year in "12/34", "12 / 2034" or "1234"; undefined when there is no such month. */
function readExpiry(written: string): { month: number; year: number } | undefined {
	const match = /^(\d{1,2})\s*[/ -]?\s*(\d{4}|\d{2})$/.exec(written)
	const month = Number(match?.[1])
	const year = Number(match?.[2])
	if (!match || month < 1 || month > 12) return undefined
	return { month, year: year < 100 ? 2000 + year : year }
}

/**
 * Reads the card form at the moment `now` (seconds). Answers the card, or one sentence per wrong field. A number that is
 * no test card is refused here, before anything is made of it.
 */
export function readCardForm(
	form: FormTree,
	askedForEmail: boolean,
	now: number,
): { typed: TypedCard; errors: CardErrors; card?: Omit<GivenCard, "email"> } {
	const typed: TypedCard = {
		email: text(form, "email"),
		number: text(form, "number").replace(/[\s-]/g, ""),
		expiry: text(form, "expiry"),
		cvc: text(form, "cvc"),
		name: text(form, "name"),
	}
	const errors: CardErrors = {}
	if (askedForEmail && !/^\S+@\S+\.\S+$/.test(typed.email)) errors.email = "Enter an e-mail address."
	if (!typed.number) errors.number = "Enter a card number."
	else if (!outcomeOf(typed.number)) errors.number = "This is not one of the test cards. Never type a real card here."
	const expiry = readExpiry(typed.expiry)
	const date = new Date(now * 1000)
	const thisMonth = date.getUTCFullYear() * 12 + date.getUTCMonth() + 1
	if (!expiry) errors.expiry = "Enter the expiry as month and year, for example 12/34."
	else if (expiry.year * 12 + expiry.month < thisMonth) errors.expiry = "This expiry date is in the past."
	if (!/^\d{3,4}$/.test(typed.cvc)) errors.cvc = "Enter the three or four digits of the security code."
	if (!typed.name) errors.name = "Enter the name on the card."
	if (Object.keys(errors).length > 0 || !expiry) return { typed, errors }
	const card = { number: typed.number, expMonth: expiry.month, expYear: expiry.year, name: typed.name }
	return { typed, errors, card }
}
