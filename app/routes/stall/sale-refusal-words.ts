import { formatMoney } from "~/domain/money"

type Refusal =
	| { reason: "nothing-sold" | "day-not-open" | "no-reader" | "reader-away" | "no-such-day" | "no-such-sale" }
	| { reason: "not-so-many"; productName: string; left: number }
	| { reason: "too-little-given"; totalCents: number }

/** Why a sale was not taken, in words for a volunteer with a customer waiting; null where there is nothing to see at all. */
export function saleRefusalWords(refusal: Refusal): string | null {
	switch (refusal.reason) {
		case "nothing-sold":
			return "Tap what is sold first."
		case "day-not-open":
			return "This market day is not open, so nothing can be sold."
		case "reader-away":
			return "The card reader does not answer. Nothing was charged."
		case "no-reader":
			return "This market has no card reader. Take cash."
		case "not-so-many":
			return `Only ${refusal.left} of ${refusal.productName} left: someone sold the rest just now.`
		case "too-little-given":
			return `The sale comes to ${formatMoney(refusal.totalCents)}: that is more than was given.`
		case "no-such-day":
		case "no-such-sale":
			return null
	}
}
