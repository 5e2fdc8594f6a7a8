import { z } from "zod"
import { cases, cents, charge, day, mailAddress, sampleYard, sentence, webAddress, words, yard } from "./props"

/** What every letter about an order tells. `storeName` is the account, `orderNumber` as the desk and the store see it. */
export const orderFacts = z.object({
	yard,
	sentTo: mailAddress,
	storeName: words,
	orderNumber: words,
	deliveryOn: day,
	orderUrl: webAddress,
})

/** A line once cases have been given: `reason` is the sentence of the sharing out, where there was one. */
const givenLine = z.object({
	productName: words,
	productNote: words.nullish(),
	casesAsked: cases,
	casesGiven: cases,
	priceCents: cents,
	amountCents: cents,
	reason: sentence.nullish(),
})

/** Lines given, sums below them and the whole; the whole must be the sum of its parts. */
export const givenLines = {
	lines: z.array(givenLine).min(1).max(1000),
	charges: z.array(charge).max(20),
	totalCents: cents,
}

export const sampleOrder = {
	yard: sampleYard,
	sentTo: "rosa@pantryandplume.example.test",
	storeName: "Pantry & Plume",
	orderNumber: "318",
	deliveryOn: "2026-08-18",
	orderUrl: "https://waxbill.example.test/buy/larkmoor/deliveries/318",
} satisfies z.infer<typeof orderFacts>

export const sampleGivenLines = {
	lines: [
		{
			productName: "Round section, clover",
			productNote: "Fancy, 8 oz, case of 12",
			casesAsked: 3,
			casesGiven: 3,
			priceCents: 10830,
			amountCents: 32490,
		},
		{
			productName: "Basswood section, clover",
			productNote: "Fancy, 13 oz, case of 12",
			casesAsked: 4,
			casesGiven: 2,
			priceCents: 14250,
			amountCents: 28500,
			reason:
				"Basswood was short: nine stores asked for 31 cases and we had 18, so each got one at a time until they were gone. You had asked for four, so you keep the price for four.",
		},
		{
			productName: "Clear-box section, sainfoin",
			productNote: "Fancy, 10 oz, case of 12",
			casesAsked: 1,
			casesGiven: 1,
			priceCents: 13200,
			amountCents: 13200,
		},
		{
			productName: "Cut comb, clover",
			productNote: "12 oz, case of 8",
			casesAsked: 2,
			casesGiven: 2,
			priceCents: 9400,
			amountCents: 18800,
		},
	],
	charges: [{ label: "Delivery, over the $600 minimum", cents: 0 }],
	totalCents: 92990,
}

/** Refuses a letter whose lines and charges do not add up to the sum it names. Source: style.md (c), money. */
export function sumsUp(letter: {
	lines: readonly { amountCents: number }[]
	charges: readonly { cents: number }[]
	totalCents: number
}): boolean {
	const lines = letter.lines.reduce((sum, line) => sum + line.amountCents, 0)
	return letter.charges.reduce((sum, part) => sum + part.cents, lines) === letter.totalCents
}

/** A late change: what differs on each line in words, why, and what the changed lines come to before and after. */
export const lateChange = {
	reason: sentence,
	lines: z
		.array(z.object({ productName: words, productNote: words.nullish(), change: words }))
		.min(1)
		.max(1000),
	beforeCents: cents,
	afterCents: cents,
}

export const sampleLateChange = {
	reason: "A super was lost to a storm on Wednesday night.",
	lines: [
		{
			productName: "Basswood section, clover",
			productNote: "Fancy, 13 oz, case of 12",
			change: "2 cases instead of 4",
		},
	],
	beforeCents: 57000,
	afterCents: 28500,
}
