import { z } from "zod"
import { cents, day, sampleYard, words, yard } from "../props"

/**
 * A letter brings the printed pages of so many lines at most: they are drawn while its row of the outbox is held, which is
 * for seconds only. A longer statement is opened by its link.
 */
export const MOST_MAILED_LINES = 1_000

/**
 * Everything a statement says; its page, letter and PDF are drawn from the same. Money is cents: `amountCents` is signed by
 * what it does to the balance. The ageing is of what was open at the end of `range.until`.
 */
export const statementProps = z.object({
	yard,
	store: z.object({ name: words, address: words.nullish() }),
	range: z.object({ from: day, until: day }),
	broughtForwardCents: cents,
	lines: z
		.array(z.object({ on: day, name: words, note: z.string().max(2000), amountCents: cents, balanceCents: cents }))
		.max(MOST_MAILED_LINES),
	closingCents: cents,
	ageing: z.array(z.object({ label: words, cents })).max(5),
	onAccountCents: cents,
})
export type StatementProps = z.infer<typeof statementProps>

export const sampleStatement = {
	yard: sampleYard,
	store: { name: "Pantry & Plume", address: "12 Carder Street, Teasel County" },
	range: { from: "2026-08-01", until: "2026-08-31" },
	broughtForwardCents: 68400,
	lines: [
		{
			on: "2026-08-04",
			name: "Paid by check",
			note: "104",
			amountCents: -68400,
			balanceCents: 0,
		},
		{
			on: "2026-08-18",
			name: "Invoice 2026-0203",
			note: "due September 1, 2026",
			amountCents: 92990,
			balanceCents: 92990,
		},
		{
			on: "2026-08-20",
			name: "Credit 2026-0007",
			note: "One basswood section arrived broken.",
			amountCents: -1188,
			balanceCents: 91802,
		},
	],
	closingCents: 91802,
	ageing: [
		{ label: "Not due yet", cents: 91802 },
		{ label: "1–30 days late", cents: 0 },
		{ label: "31–60 days late", cents: 0 },
		{ label: "61–90 days late", cents: 0 },
		{ label: "Over 90 days late", cents: 0 },
	],
	onAccountCents: 0,
} satisfies StatementProps
