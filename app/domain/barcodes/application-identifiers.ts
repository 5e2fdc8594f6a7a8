/** What may stand after an identifier: so many digits, or characters, as many or fewer; a date; places before the point. */
export type Identifier = {
	ai: string
	data: string
	title: string
	/** A separator follows unless it is the last: its length is not told beforehand. */
	isOpenEnded: boolean
	/** It says nothing without this one. */
	needs?: string
}

const TABLE: readonly [ai: string, data: string, title: string, needs?: string][] = [
	["00", "N18", "SSCC"],
	["01", "N14", "GTIN"],
	["02", "N14", "CONTENT", "37"],
	["10", "X..20", "BATCH/LOT"],
	["11", "N6 yymmdd", "PROD DATE"],
	["12", "N6 yymmdd", "DUE DATE"],
	["13", "N6 yymmdd", "PACK DATE"],
	["15", "N6 yymmdd", "BEST BEFORE"],
	["16", "N6 yymmdd", "SELL BY"],
	["17", "N6 yymmdd", "USE BY"],
	["20", "N2", "VARIANT"],
	["21", "X..20", "SERIAL"],
	["30", "N..8", "VAR. COUNT"],
	["37", "N..8", "COUNT"],
	["240", "X..30", "ADDITIONAL ID"],
	["241", "X..30", "CUST. PART No."],
	["310n", "N6", "NET WEIGHT (kg), n decimals 0-5"],
	["320n", "N6", "NET WEIGHT (lb), n decimals 0-5"],
	["330n", "N6", "GROSS WEIGHT (kg), n decimals 0-5"],
	["340n", "N6", "GROSS WEIGHT (lb), n decimals 0-5"],
	["356n", "N6", "NET WEIGHT (troy oz), n decimals 0-5"],
	["357n", "N6", "NET WEIGHT (oz), n decimals 0-5"],
	["390n", "N..15", "AMOUNT"],
	["392n", "N..15", "PRICE"],
	["400", "X..30", "ORDER NUMBER"],
	["410", "N13", "SHIP TO LOC"],
]

/** Beginnings of identifiers whose length is told beforehand, so that no separator follows. */
const FIXED = /^(?:0[0-4]|1[1-9]|20|3[1-6]|41)/

/**
 * The identifiers that labels of food use. Source: GS1 Barcode Syntax Dictionary (2026); 12, 16, 20, 21, 240, 241, gross weights,
 * 356n, 357n, 390n, 400 and 410 from memory (high).
 */
export const identifiers: readonly Identifier[] = TABLE.map(([ai, data, title, needs]) => ({
	ai,
	data,
	title,
	isOpenEnded: !FIXED.test(ai),
	...(needs ? { needs } : {}),
}))

/** The identifier of "01" or "3202", or null; the fourth digit of a weight or price is its number of decimals. */
export function identifierOf(ai: string): Identifier | null {
	const found = identifiers.find(
		(each) => each.ai === ai || (each.ai.endsWith("n") && ai.length === 4 && each.ai.slice(0, 3) === ai.slice(0, 3)),
	)
	return found && (!found.ai.endsWith("n") || /[0-5]$/.test(ai) || found.data.includes("..")) ? found : null
}

/** Whether `value` is what the identifier's data may be, but for check digit and day. */
export function isOfForm({ data }: Identifier, value: string): boolean {
	const [, kind, isUpTo, size = "0"] = /^([NX])(\.\.)?(\d+)/.exec(data) ?? []
	// The 82 characters that GS1 allows, in its invariant set.
	const characters = kind === "N" ? "\\d" : '[!-"%-?A-Z_a-z]'
	return new RegExp(`^${characters}{${isUpTo ? `1,${size}` : size}}$`).test(value)
}

/** The number of characters that data of this form has, where it is told beforehand. */
export function fixedLength({ data, isOpenEnded }: Identifier): number | null {
	return isOpenEnded ? null : Number(/\d+/.exec(data)?.[0])
}
