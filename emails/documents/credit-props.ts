import { z } from "zod"
import { creditKindWords } from "~/domain/credits/credit-words"
import { cents, day, sampleYard, sentence, words, yard } from "../props"

const creditLine = z.object({
	sheetNumber: words.nullish(),
	productName: words,
	productNote: words.nullish(),
	/** 0 where the line is about money alone. */
	pieces: z.int().nonnegative(),
	amountCents: cents.nonnegative(),
})

/**
 * Everything a credit says. The letter, its PDF and the page are drawn from this one shape, so that they cannot differ.
 * Money is cents above zero: it is what comes off. `settled` is what it has settled so far, `onAccountCents` what of it the
 * store still has. Refused when the parts do not sum.
 */
export const creditProps = z
	.object({
		yard,
		number: words,
		issuedOn: day,
		kind: z.enum(["breakage", "price", "quantity", "goodwill"]),
		reason: sentence,
		store: z.object({ name: words, address: words.nullish() }),
		invoice: z.object({ number: words, issuedOn: day }).nullable(),
		lines: z.array(creditLine).min(1).max(1000),
		taxCents: cents.nonnegative(),
		totalCents: cents.positive(),
		settled: z.array(z.object({ invoiceNumber: words, cents: cents.positive() })).max(1000),
		onAccountCents: cents.nonnegative(),
	})
	.refine(
		({ lines, taxCents, totalCents }) => lines.reduce((sum, line) => sum + line.amountCents, taxCents) === totalCents,
		{ path: ["totalCents"], message: "is not the sum of the lines and the tax" },
	)
	.refine(
		({ settled, onAccountCents, totalCents }) =>
			settled.reduce((sum, part) => sum + part.cents, onAccountCents) === totalCents,
		{ path: ["onAccountCents"], message: "is not what is left of the credit" },
	)
export type CreditProps = z.infer<typeof creditProps>

/** What the credit is for, in one line: "For comb that arrived broken, of invoice 2026-0412". */
export function creditSubject({ kind, invoice }: Pick<CreditProps, "kind" | "invoice">): string {
	return `For ${creditKindWords(kind)}${invoice ? `, of invoice ${invoice.number}` : ""}`
}

export const sampleCredit = {
	yard: sampleYard,
	number: "C2026-0003",
	issuedOn: "2026-08-20",
	kind: "breakage",
	reason: "Comb that arrived broken on Tuesday, August 18.",
	store: { name: "Pantry & Plume", address: "12 Carder Street, Teasel County" },
	invoice: { number: "2026-0412", issuedOn: "2026-08-18" },
	lines: [
		{
			sheetNumber: "11",
			productName: "Round section, clover",
			productNote: "Fancy, 8 oz, case of 12",
			pieces: 4,
			amountCents: 3610,
		},
		{
			sheetNumber: "21",
			productName: "Basswood section, clover",
			productNote: "Fancy, 13 oz, case of 12",
			pieces: 1,
			amountCents: 1188,
		},
	],
	taxCents: 0,
	totalCents: 4798,
	settled: [{ invoiceNumber: "2026-0412", cents: 4000 }],
	onAccountCents: 798,
} satisfies CreditProps
