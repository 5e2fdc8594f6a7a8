/** What each part of a record is for, in the order in which the regulation names it. */
type Field = { column: string; holds: string }

const contact = (column: string, whose: string): Field[] => [
	{ column, holds: `firm name of ${whose}` },
	{ column: `${column}: address`, holds: `address of ${whose}` },
	{ column: `${column}: telephone`, holds: `telephone of ${whose}` },
	{ column: `${column}: e-mail`, holds: `e-mail of ${whose}` },
]

const FOOD: Field[] = [
	{ column: "Food", holds: "type of food" },
	{ column: "Brand", holds: "brand" },
	{ column: "Variety", holds: "specific variety" },
]

const QUANTITY: Field[] = [
	{ column: "Lot", holds: "lot or code number" },
	{ column: "Pieces", holds: "quantity" },
	{ column: "How packaged", holds: "how packaged" },
]

/**
 * The columns of the record of food that left: to whom, what, when, which lot, how much, who carried it, and what ties
 * it to where it came from. Source: 21 CFR 1.345.
 */
export const RELEASED_FIELDS: readonly Field[] = [
	...contact("Recipient", "the next recipient"),
	...FOOD,
	{ column: "Date released", holds: "date released" },
	...QUANTITY,
	...contact("Carrier", "the carrier"),
	{ column: "Made from", holds: "ingredient source of the finished lot" },
	{ column: "Order", holds: "our number" },
]

/**
 * The columns of the record of food that came in. What comes off the producer's own hives has the producer for a source.
 * Source: 21 CFR 1.337.
 */
export const RECEIVED_FIELDS: readonly Field[] = [
	...contact("Source", "the previous source"),
	...FOOD,
	{ column: "Date received", holds: "date received" },
	...QUANTITY,
	...contact("Carrier", "the carrier"),
	{ column: "Hives", holds: "where it stood" },
]

/** To whom food can go: a firm, or a person who eats it. */
export type Recipient = "store" | "consumer"

/**
 * Whether the next recipient must be recorded by name. What a person buys to eat needs no such record.
 * Source: 21 CFR 1.327, from memory (high).
 */
export function needsRecipientRecord(recipient: Recipient): boolean {
	return recipient === "store"
}

/** Honey is not on the list of foods that need further records. Source: 21 CFR part 1 subpart S, list partly from memory. */
export const HONEY_ON_TRACEABILITY_LIST = false

/** Ways of selling that count as sales to consumers, whoever carries the food there. Source: 21 CFR 1.227. */
export const DIRECT_SALES = [
	"roadside stand",
	"farmers' market",
	"CSA",
	"door to door",
	"mail, catalogue, internet order",
	"fairs and bazaars",
] as const

/**
 * Whether a business is a retail food establishment: the money of a year's sales to consumers exceeds that of its sales
 * to all other buyers. Equal is not more. Amounts in cents. Such a one, like a farm, need not register as a food
 * facility; the authority decides. Source: 21 CFR 1.226, 1.227.
 */
export function isRetailFoodEstablishment(year: { consumerCents: number; otherCents: number }): boolean {
	return year.consumerCents > year.otherCents
}
