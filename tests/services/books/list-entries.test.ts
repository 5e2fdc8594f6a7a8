import { sql } from "drizzle-orm"
import { expect, test } from "vitest"
import { producerSettings, products } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { findBooks } from "~/services/books/find-books.server"
import { setAccounts } from "~/services/books/set-accounts.server"
import {
	credit,
	fileOf,
	giveUp,
	issue,
	linesOf,
	openMoneyYard,
	pay,
	payOut,
	sellAtStall,
	sendBack,
	sumOf,
} from "./money-yard"

const AUGUST = { from: "2026-08-01", to: "2026-08-31", today: "2026-09-02" }

/** A month in which money moves in every way. */
async function livelyAugust() {
	const at = await openMoneyYard()
	const first = await issue(at, {
		on: "2026-08-04",
		sequence: 1,
		linesCents: 10_000,
		deliveryCents: 1_800,
		taxCents: 825,
	})
	const second = await issue(at, { on: "2026-08-05", sequence: 2, linesCents: 20_000 })
	const third = await issue(at, { on: "2026-08-06", sequence: 3, linesCents: 5_000 })
	await credit(at, { on: "2026-08-07", sequence: 1, linesCents: 900, reason: "=Two combs broken", invoiceId: second })
	await pay(at, { on: "2026-08-10", cents: 12_625, reference: "1207", invoiceId: first })
	const card = await pay(at, {
		on: "2026-08-11",
		cents: 18_718,
		method: "card",
		invoiceId: second,
		discountCents: 382,
		stripePayoutId: "po_1",
		feeCents: 573,
	})
	await pay(at, { on: "2026-08-12", cents: 4_000, method: "bank-debit", state: "on-its-way" })
	await giveUp(at, { on: "2026-08-13", invoiceId: third, cents: 5_000 })
	await sendBack(at, {
		on: "2026-08-14",
		paymentId: await pay(at, { on: "2026-08-13", cents: 3_000, method: "cash" }),
		cents: 1_000,
	})
	await sellAtStall(at, { on: "2026-08-15", market: "Coopers Green", cash: [1_400, 1_700], card: [2_200] })
	await payOut(at, { on: "2026-08-17", name: "po_1", grossCents: 18_718, feeCents: 573 })
	return { at, card }
}

test("every event of a month is entered in order, each entry balances, and a debit on its way is no entry", async () => {
	const { at } = await livelyAugust()
	const file = await fileOf(at, AUGUST.from, AUGUST.to)
	const shown = linesOf(file).map(
		({ entry, account, debitCents, creditCents, about }) => `${entry} ${account} ${debitCents - creditCents} ${about}`,
	)
	expect(shown).toEqual([
		"20260804-001 1200 12625 Invoice",
		"20260804-001 4000 -10000 Invoice",
		"20260804-001 4100 -1800 Invoice",
		"20260804-001 2200 -825 Invoice",
		"20260805-001 1200 20000 Invoice",
		"20260805-001 4000 -20000 Invoice",
		"20260806-001 1200 5000 Invoice",
		"20260806-001 4000 -5000 Invoice",
		"20260807-001 4800 900 Credit, =Two combs broken",
		"20260807-001 1200 -900 Credit, =Two combs broken",
		"20260810-001 1010 12625 Payment by check",
		"20260810-001 1200 -12625 Payment by check",
		"20260811-001 1050 18718 Payment by card",
		"20260811-001 1200 -18718 Payment by card",
		"20260811-002 4810 382 Discount for paying early",
		"20260811-002 1200 -382 Discount for paying early",
		"20260813-001 1000 3000 Payment by cash",
		"20260813-001 1200 -3000 Payment by cash",
		"20260813-002 6200 5000 Bad debt",
		"20260813-002 1200 -5000 Bad debt",
		"20260814-001 1200 1000 Refund",
		"20260814-001 1000 -1000 Refund",
		"20260815-001 1050 2200 Stall sales by card",
		"20260815-001 4000 -2200 Stall sales by card",
		"20260815-002 1000 3100 Stall sales for cash",
		"20260815-002 4000 -3100 Stall sales for cash",
		"20260817-001 1010 18145 Paid out by Stripe",
		"20260817-001 6100 573 Paid out by Stripe",
		"20260817-001 1050 -18718 Paid out by Stripe",
	])
	expect(sumOf(file).debitCents).toBe(sumOf(file).creditCents)
})

test("the same entries stand in the trial balance, and all that must agree agrees", async () => {
	const { at } = await livelyAugust()
	const { balance, checks, weeks } = await findBooks({ producer: at.producer, ...AUGUST, to: "2026-09-02" })
	expect(balance.isBalanced).toBe(true)
	expect(balance.sum).toEqual(sumOf(await fileOf(at, AUGUST.from, "2026-09-02")))
	expect(checks.map(({ of }) => of)).toEqual([
		"invoices",
		"invoice-lines",
		"credit-lines",
		"stall-lines",
		"payouts",
		"fees",
		"owed",
	])
	for (const { of, papersCents, booksCents } of checks) expect(booksCents, of).toBe(papersCents)
	// $20.00 of the cash lie on the store's account: all invoices are settled.
	expect(balance.rows.find(({ account }) => account === "receivable")?.afterCents).toBe(-2_000)
	expect(weeks.slice(1, 4)).toEqual([
		{ weekOn: "2026-08-03", inCents: 0, outCents: 0 },
		{ weekOn: "2026-08-10", inCents: 12_625 + 18_718 + 3_000 + 2_200 + 3_100, outCents: 1_000 },
		{ weekOn: "2026-08-17", inCents: 0, outCents: 573 },
	])
})

test("what stood before a period is carried into it", async () => {
	const { at } = await livelyAugust()
	const { balance } = await findBooks({
		producer: at.producer,
		from: "2026-09-01",
		to: "2026-09-30",
		today: "2026-09-02",
	})
	expect(balance.isBalanced).toBe(true)
	expect(balance.rows.find(({ account }) => account === "stripe")).toEqual({
		account: "stripe",
		beforeCents: 2_200,
		debitCents: 0,
		creditCents: 0,
		afterCents: 2_200,
	})
})

test("a name that a spreadsheet would run is written as text, and accounts bear the bookkeeper's names", async () => {
	const { at } = await livelyAugust()
	await setAccounts({
		producerId: at.producer.id,
		personId: at.personId,
		names: { receivable: { number: "=1+1", name: "@Debtors" }, cash: { number: "", name: "" } },
	})
	await withProducer(at.producer.id, (tx) =>
		tx.execute(sql`update stores set name = '-2+3"' where id = ${at.shop.storeId}`),
	)
	const file = await fileOf(at, "2026-08-04", "2026-08-04")
	expect(file.split("\r\n")[1]).toBe(`20260804-001,2026-08-04,"'=1+1","'@Debtors",126.25,,Invoice,"'-2+3""",2026-0001`)
})

test("the stall's price contains the tax of what is taxed", async () => {
	const at = await openMoneyYard()
	await withProducer(at.producer.id, async (tx) => {
		await tx.update(producerSettings).set({ salesTaxBasisPoints: 825 })
		await tx.update(products).set({ isTaxable: true })
	})
	await sellAtStall(at, { on: "2026-08-15", market: "Coopers Green", cash: [10_825] })
	const lines = linesOf(await fileOf(at, AUGUST.from, AUGUST.to))
	expect(lines.map(({ account, debitCents, creditCents }) => `${account} ${debitCents - creditCents}`)).toEqual([
		"1000 10825",
		"4000 -10000",
		"2200 -825",
	])
})

test("of thousands of events on few days none is left out or entered twice", async () => {
	const at = await openMoneyYard()
	await withProducer(at.producer.id, (tx) =>
		tx.execute(sql`
			insert into invoices (producer_id, year, sequence, store_id, issued_on, due_on, lines_cents, delivery_cents, tax_cents, total_cents)
			select ${at.producer.id}, 2026, n, ${at.shop.storeId}, d, d, n, 0, 0, n
			from generate_series(1, 2345) n, lateral (select date '2026-08-01' + n % 3 as d) as days`),
	)
	await withProducer(at.producer.id, (tx) =>
		tx.execute(sql`
			insert into payments (producer_id, store_id, method, amount_cents, received_on)
			select ${at.producer.id}, ${at.shop.storeId}, 'cheque', n, date '2026-08-01' + n % 3 from generate_series(1, 1500) n`),
	)
	await payOut(at, { on: "2026-08-02", name: "po_2", grossCents: 100, feeCents: 0 })
	const file = await fileOf(at, AUGUST.from, AUGUST.to)
	const lines = linesOf(file)
	expect(new Set(lines.map(({ entry }) => entry)).size).toBe(2345 + 1500 + 1)
	expect(lines).toHaveLength(2 * (2345 + 1500 + 1))
	expect(sumOf(file).debitCents).toBe((2345 * 2346) / 2 + (1500 * 1501) / 2 + 100)
	expect(lines.map(({ entry }) => entry)).toEqual(lines.map(({ entry }) => entry).toSorted(byDayAndOrdinal))
})

function byDayAndOrdinal(a: string, b: string): number {
	return a.localeCompare(b, "en", { numeric: true })
}

test("an empty month is a file with its head alone, and books that balance at nothing", async () => {
	const at = await openMoneyYard()
	expect(linesOf(await fileOf(at, AUGUST.from, AUGUST.to))).toEqual([])
	const { balance } = await findBooks({ producer: at.producer, ...AUGUST })
	expect(balance).toEqual({ rows: [], sum: { debitCents: 0, creditCents: 0 }, isBalanced: true })
})
