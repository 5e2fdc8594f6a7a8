import { describe, expect, test } from "vitest"
import { plainMoney, weighedPriceCents } from "~/domain/money"
import { labelledGrams } from "~/domain/weight"
import type { PublishedValues } from "./published-values"

/** A decimal text as a whole number of the given places: "1.125" to three places is 1125. */
function whole(decimal: string, places: number): number {
	const [units = "", part = ""] = decimal.split(".")
	if (part.replace(/0+$/, "").length > places) throw new Error(`${decimal} has more than ${places} places`)
	return Number(units + part.slice(0, places).padEnd(places, "0"))
}

/** Makes one test of each weighed price and of the grams of each label. */
export function holdLabelling({ labelling }: PublishedValues): void {
	const prices = labelling?.computed_price?.examples ?? []

	if (prices.length > 0) {
		describe("weight times price", () => {
			test.each(prices)("$weight lb at $unit_price a pound is $half_up", ({ weight, unit_price, half_up }) => {
				expect(plainMoney(weighedPriceCents(whole(weight, 3), "lb/1000", whole(unit_price, 2)))).toBe(half_up)
			})
		})
	}

	const declarations = labelling?.declarations ?? []

	if (declarations.length > 0) {
		describe("the grams of a label", () => {
			test.each(declarations)("$net_oz oz: $text", ({ net_oz, text }) => {
				expect(labelledGrams(net_oz)).toBe(Number(/(\d+) g\b/.exec(text)?.[1]))
			})
		})
	}
}
