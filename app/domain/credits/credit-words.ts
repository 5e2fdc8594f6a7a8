/** What a credit is for. */
export type CreditKind = "breakage" | "price" | "quantity" | "goodwill"

const KIND_WORDS: Record<CreditKind, string> = {
	breakage: "comb that arrived broken",
	price: "a price put right",
	quantity: "a quantity put right",
	goodwill: "goodwill",
}

/** What a credit is for, inside a sentence: "comb that arrived broken". */
export function creditKindWords(kind: CreditKind): string {
	return KIND_WORDS[kind]
}
