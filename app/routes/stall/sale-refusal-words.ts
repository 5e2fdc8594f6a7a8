import { formatMoney } from "~/domain/money"

type Refusal =
	| { reason: "nothing-sold" | "day-not-open" | "no-reader" }
	| { reason: "not-so-many"; productName: string; left: number }
	| { reason: "too-little-given"; totalCents: number }

/** Why a sale was not taken, in words for a volunteer with a customer waiting. */
export function saleRefusalWords(refusal: Refusal): string {
	switch (refusal.reason) {
		case "nothing-sold":
			return "Tap what is sold first."
		case "day-not-open":
			return "This market day is not open, so nothing can be sold."
		case "no-reader":
			return "This market has no card reader. Take cash."
		case "not-so-many":
			if (refusal.left === 0) return `No ${refusal.productName} left: someone sold the rest just now.`
			return `Only ${refusal.left} of ${refusal.productName} left: someone sold the rest just now.`
		case "too-little-given":
			return `The sale comes to ${formatMoney(refusal.totalCents)}: that is more than was given.`
	}
}

/** That a sale is over already, for who went back to it or sent it again in another form. */
export function writtenBeforeWords(earlier: { method: "card" | "cash"; state: string; totalCents: number }): string {
	const sum = formatMoney(earlier.totalCents)
	return earlier.state === "given-up"
		? `That sale of ${sum} was given up. This is a new sale.`
		: `That sale of ${sum} is taken already, ${earlier.method === "card" ? "by card" : "in cash"}. This is a new sale.`
}
