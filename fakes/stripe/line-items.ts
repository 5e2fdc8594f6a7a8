import type Stripe from "stripe"
import { z } from "zod"
import { checkAmount } from "./amounts"
import { invalidRequest } from "./errors"
import type { Fake } from "./fake"
import { newId } from "./ids"
import { currency, integer, list, mergeMetadata, metadata } from "./params"

/** One line as `checkout.sessions.create` takes it: an ad-hoc price and how many. */
export const lineItemSchema = z.strictObject({
	price_data: z.strictObject({
		currency,
		unit_amount: integer,
		product_data: z.strictObject({
			name: z.string().min(1, "Invalid string"),
			description: z.string().optional(),
			images: list(z.string()).optional(),
			metadata: metadata.optional(),
		}),
	}),
	quantity: integer,
})
type GivenLine = z.infer<typeof lineItemSchema>

function makeLine(fake: Fake, given: GivenLine): Stripe.LineItem {
	const { unit_amount: unit, product_data: product } = given.price_data
	const total = unit * given.quantity
	const price: Stripe.Price = {
		id: newId("price"),
		object: "price",
		active: false,
		billing_scheme: "per_unit",
		created: fake.seconds(),
		currency: given.price_data.currency,
		custom_unit_amount: null,
		livemode: false,
		lookup_key: null,
		metadata: {},
		nickname: null,
		product: newId("prod", 14),
		recurring: null,
		tax_behavior: "unspecified",
		tiers_mode: null,
		transform_quantity: null,
		type: "one_time",
		unit_amount: unit,
		unit_amount_decimal: null,
	}
	return {
		id: newId("li"),
		object: "item",
		adjustable_quantity: null,
		amount_discount: 0,
		amount_subtotal: total,
		amount_tax: 0,
		amount_total: total,
		currency: given.price_data.currency,
		description: product.name,
		metadata: mergeMetadata({}, product.metadata),
		price,
		quantity: given.quantity,
	}
}

/**
 * The lines of a session and their sum in cents. Refuses no lines, lines of several currencies, quantities below one,
 * negative prices, and a sum that Stripe would not charge.
 */
export function makeLines(
	fake: Fake,
	given: GivenLine[],
): { lines: Stripe.LineItem[]; total: number; currency: string } {
	const first = given[0]
	if (!first) {
		throw invalidRequest("Missing required param: line_items.", { code: "parameter_missing", param: "line_items" })
	}
	for (const [index, line] of given.entries()) {
		const at = `line_items[${index}]`
		if (line.quantity < 1) {
			throw invalidRequest("This value must be greater than or equal to 1.", { param: `${at}[quantity]` })
		}
		if (line.price_data.unit_amount < 0) {
			throw invalidRequest("This value must be greater than or equal to 0.", {
				param: `${at}[price_data][unit_amount]`,
			})
		}
		if (line.price_data.currency !== first.price_data.currency) {
			throw invalidRequest("All prices on a Checkout Session must use the same currency.", { param: at })
		}
	}
	const lines = given.map((line) => makeLine(fake, line))
	const total = lines.reduce((sum, line) => sum + line.amount_total, 0)
	checkAmount(total, first.price_data.currency, "line_items")
	return { lines, total, currency: first.price_data.currency }
}
