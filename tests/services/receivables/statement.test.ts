import fc from "fast-check"
import { expect, test } from "vitest"
import { closingBalance, entryKinds } from "~/domain/receivables/statement"
import { findStatement } from "~/services/receivables/find-statement.server"
import { listReceivables } from "~/services/receivables/list-receivables.server"
import { addHand } from "../desk/desk-steps"
import { openStore, openYard, type Shop } from "../orders/place-yard"
import { openAccount } from "./account"

const TODAY = "2026-08-31"

async function openBooks() {
	const yard = await openYard()
	const shop = await openStore(yard)
	return { yard, shop, account: openAccount(shop, await addHand()) }
}

const statementOf = (shop: Shop, range = { from: "2026-08-01", until: TODAY }, after: string | null = null) =>
	findStatement({ producerId: shop.producerId, storeId: shop.storeId, range, today: TODAY, after })

test("a statement runs from what was brought forward through all papers in order to what is owed", async () => {
	const { shop, account } = await openBooks()
	const old = await account.invoice(10_000, { issuedOn: "2026-07-20", dueOn: "2026-07-30" })
	const later = await account.invoice(50_000, { issuedOn: "2026-08-03", dueOn: "2026-09-02" })
	const check = await account.payment(9_000, "2026-08-03")
	await account.settle(old, 9_000, { kind: "payment", paymentId: check }, "2026-08-03")
	await account.settle(old, 200, { kind: "discount", paymentId: check }, "2026-08-03")
	const credit = await account.credit(1_500, "2026-08-10")
	await account.settle(later, 1_500, { kind: "credit", creditId: credit }, "2026-08-10")
	await account.settle(old, 800, { kind: "write-off" }, "2026-08-20")
	await account.payment(7_000, "2026-08-21", "on-its-way")
	const statement = await statementOf(shop)
	expect(statement.broughtForwardCents).toBe(10_000)
	expect(
		statement.lines.map(({ on, kind, number, cents, balanceCents }) => [on, kind, number, cents, balanceCents]),
	).toEqual([
		["2026-08-03", "invoice", "2026-0002", 50_000, 60_000],
		["2026-08-03", "payment", null, 9_000, 51_000],
		["2026-08-03", "discount", "2026-0001", 200, 50_800],
		["2026-08-10", "credit", "2026-0003", 1_500, 49_300],
		["2026-08-20", "write-off", "2026-0001", 800, 48_500],
	])
	expect(statement).toMatchObject({ closingCents: 48_500, owedCents: 48_500, onAccountCents: 0 })
	expect(statement.ageing.current).toBe(48_500)
})

test("what is owed on an earlier day is what was open on that day, whatever came after", async () => {
	const { shop, account } = await openBooks()
	const invoice = await account.invoice(10_000, { issuedOn: "2026-06-01", dueOn: "2026-06-11" })
	const check = await account.payment(10_000, "2026-08-03")
	await account.settle(invoice, 10_000, { kind: "payment", paymentId: check }, "2026-08-03")
	const then = await statementOf(shop, { from: "2026-07-01", until: "2026-07-31" })
	expect(then).toMatchObject({
		broughtForwardCents: 10_000,
		closingCents: 10_000,
		owedCents: 10_000,
		onAccountCents: 0,
	})
	expect(then.ageing["31–60"]).toBe(10_000)
	expect(await statementOf(shop)).toMatchObject({ closingCents: 0, owedCents: 0 })
})

test("another store's papers are on no statement of this one", async () => {
	const { yard, shop, account } = await openBooks()
	await account.invoice(1_000)
	await openAccount(await openStore(yard), await addHand())
	expect((await statementOf(await openStore(yard))).lines).toEqual([])
	expect((await statementOf(shop)).lines).toHaveLength(1)
})

test("a long statement goes on from page to page without a gap, and ends at the balance", async () => {
	const { shop, account } = await openBooks()
	for (let count = 0; count < 103; count += 1) await account.invoice(100 + count)
	const first = await statementOf(shop)
	const second = await statementOf(shop, undefined, first.next)
	expect([first.lines.length, second.lines.length, second.next]).toEqual([100, 3, null])
	expect(second.lines.at(-1)?.balanceCents).toBe(first.closingCents)
	expect(new Set([...first.lines, ...second.lines].map(({ id }) => id)).size).toBe(103)
})

const aStep = fc.record({
	what: fc.constantFrom(
		"invoice",
		"credit",
		"payment",
		"settle-payment",
		"settle-credit",
		"discount",
		"write-off",
		"return",
	),
	cents: fc.integer({ min: 1, max: 50_000 }),
	pick: fc.nat(9),
	day: fc.integer({ min: 1, max: 28 }),
})

test("whatever is invoiced, paid, credited, returned and given up, statement, receivables and ledger agree to the cent", async () => {
	await fc.assert(
		fc.asyncProperty(fc.array(aStep, { minLength: 4, maxLength: 14 }), async (steps) => {
			const { yard, shop, account } = await openBooks()
			const invoices: string[] = [await account.invoice(40_000, { issuedOn: "2026-07-15", dueOn: "2026-07-15" })]
			const money: string[] = [await account.payment(20_000)]
			const credits: string[] = [await account.credit(5_000)]
			const of = (ids: string[], pick: number) => ids[pick % ids.length] as string
			for (const { what, cents, pick, day } of steps) {
				const on = `2026-08-${String(day).padStart(2, "0")}`
				const invoice = of(invoices, pick)
				// What the database refuses as too much is refused to everyone: the account is as it was.
				const tried = {
					invoice: async () => invoices.push(await account.invoice(cents, { issuedOn: on, dueOn: on })),
					credit: async () => credits.push(await account.credit(cents, on)),
					payment: async () => money.push(await account.payment(cents, on)),
					"settle-payment": () => account.settle(invoice, cents, { kind: "payment", paymentId: of(money, pick) }, on),
					"settle-credit": () => account.settle(invoice, cents, { kind: "credit", creditId: of(credits, pick) }, on),
					discount: () => account.settle(invoice, cents, { kind: "discount", paymentId: of(money, pick) }, on),
					"write-off": () => account.settle(invoice, cents, { kind: "write-off" }, on),
					return: () => account.giveBack(of(money, pick), cents, on),
				}[what]
				await tried().catch(() => undefined)
			}
			const whole = await statementOf(shop, { from: "2026-01-01", until: TODAY })
			expect(whole.lines.at(-1)?.balanceCents).toBe(whole.closingCents)
			expect(whole.closingCents).toBe(whole.owedCents - whole.onAccountCents)
			const summed = Object.fromEntries(
				entryKinds.map((kind) => [
					kind,
					whole.lines.filter((line) => line.kind === kind).reduce((sum, { cents }) => sum + cents, 0),
				]),
			) as typeof whole.byKind
			expect(closingBalance(0, summed)).toBe(whole.closingCents)
			const half = await statementOf(shop, { from: "2026-08-15", until: TODAY })
			expect(half.closingCents).toBe(whole.closingCents)
			const { totals } = await listReceivables({ producerId: yard.producerId, today: TODAY, by: "owed", after: null })
			expect(totals.balanceCents).toBe(whole.closingCents)
			expect(totals.owedCents).toBe(whole.owedCents)
			expect(totals.ageing).toEqual(whole.ageing)
		}),
		{ numRuns: 12 },
	)
}, 60_000)
