import fc from "fast-check"
import { expect, test } from "vitest"
import { closingBalance, type Entry, effectOf, entryKinds, runBalance } from "~/domain/receivables/statement"

const anEntry: fc.Arbitrary<Entry> = fc.record({
	on: fc.integer({ min: 1, max: 28 }).map((day) => `2026-08-${String(day).padStart(2, "0")}`),
	kind: fc.constantFrom(...entryKinds),
	cents: fc.integer({ min: -1_000_000, max: 1_000_000 }),
})

test("a store's balance is invoices − credits − payments + returns − discounts − write-offs, whatever came in which order", () => {
	fc.assert(
		fc.property(fc.array(anEntry), fc.integer({ min: -9_999, max: 9_999 }), (entries, broughtForward) => {
			const sum = (kind: Entry["kind"]) =>
				entries.filter((entry) => entry.kind === kind).reduce((cents, entry) => cents + entry.cents, 0)
			const expected =
				broughtForward +
				sum("invoice") -
				sum("credit") -
				sum("payment") +
				sum("return") -
				sum("discount") -
				sum("write-off")
			expect(runBalance(broughtForward, entries).at(-1)?.balanceCents ?? broughtForward).toBe(expected)
			const byKind = Object.fromEntries(entryKinds.map((kind) => [kind, sum(kind)]))
			expect(closingBalance(broughtForward, byKind as Record<Entry["kind"], number>)).toBe(expected)
		}),
	)
})

test("a statement that is cut anywhere goes on where it was cut", () => {
	fc.assert(
		fc.property(fc.array(anEntry), fc.nat(), (entries, at) => {
			const cut = entries.length === 0 ? 0 : at % entries.length
			const first = runBalance(0, entries.slice(0, cut))
			const rest = runBalance(first.at(-1)?.balanceCents ?? 0, entries.slice(cut))
			expect([...first, ...rest]).toEqual(runBalance(0, entries))
		}),
	)
})

test("what is taken back has the opposite effect", () => {
	for (const kind of entryKinds) expect(effectOf({ kind, cents: -500 }) + effectOf({ kind, cents: 500 })).toBe(0)
})
