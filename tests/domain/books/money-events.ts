import fc from "fast-check"
import type { BookEvent, ReturnState, ReturnWay } from "~/domain/books/entries"

const cents = fc.integer({ min: 0, max: 5_000_000 })
const some = fc.integer({ min: 1, max: 5_000_000 })
const either = fc.integer({ min: -50_000, max: 50_000 })

/** How a payment that goes back may move on. */
const MOVES: readonly [from: ReturnState | null, to: ReturnState][] = [
	[null, "asked"],
	[null, "done"],
	["asked", "done"],
	["asked", "failed"],
	["asked", "won"],
	["done", "won"],
	["done", "failed"],
]

/** Any event of money. */
export const anyEvent: fc.Arbitrary<BookEvent> = fc.oneof(
	fc.record({
		kind: fc.constant("invoice" as const),
		of: fc.constantFrom("goods" as const, "finance-charge" as const),
		linesCents: cents,
		deliveryCents: cents,
		taxCents: cents,
	}),
	fc.record({ kind: fc.constant("credit" as const), linesCents: cents, taxCents: cents }),
	fc.record({
		kind: fc.constant("payment" as const),
		method: fc.constantFrom(
			"card" as const,
			"bank-debit" as const,
			"cheque" as const,
			"cash" as const,
			"transfer" as const,
		),
		amountCents: some,
	}),
	fc.record({ kind: fc.constantFrom("discount" as const, "write-off" as const), amountCents: either }),
	fc
		.record({
			way: fc.constantFrom<ReturnWay[]>("refund", "bank-return", "dispute", "bounced"),
			method: fc.constantFrom("card" as const, "bank-debit" as const, "cheque" as const, "cash" as const),
			move: fc.constantFrom(...MOVES),
			amountCents: some,
		})
		.map(({ move: [from, to], ...rest }) => ({ kind: "return" as const, from, to, ...rest })),
	fc.record({
		kind: fc.constant("payout" as const),
		grossCents: fc.integer({ min: -9_000, max: 900_000 }),
		feeCents: cents,
	}),
	fc
		.record({ method: fc.constantFrom("card" as const, "cash" as const), totalCents: cents, share: fc.nat(100) })
		.map(({ method, totalCents, share }) => ({
			kind: "stall-sales" as const,
			method,
			totalCents,
			taxCents: Math.floor((totalCents * share) / 1000),
		})),
)
