import { randomUUID } from "node:crypto"
import { eq, sql } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { auditEntries, bookClosings, producerSettings, stores } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { addStore } from "~/services/receivables/add-store.server"
import { chargeOverdue } from "~/services/receivables/charge-overdue.server"
import { findStatement } from "~/services/receivables/find-statement.server"
import { findStorePage } from "~/services/receivables/find-store-page.server"
import { mailStatement } from "~/services/receivables/mail-statement.server"
import { judgePromise, notePromise } from "~/services/receivables/payment-promises.server"
import { findOrderCredit } from "~/services/receivables/read-credit.server"
import { saveStore } from "~/services/receivables/save-store.server"
import { writeOff } from "~/services/receivables/write-off.server"
import { addHand, place } from "../desk/desk-steps"
import { addProduct, findOutbox, openStore, openYard, type Shop, type Yard } from "../orders/place-yard"
import { openAccount, writeLetters } from "./account"

const TODAY = "2026-08-31"

async function openShop() {
	const yard = await openYard()
	const shop = await openStore(yard)
	const personId = await addHand()
	return { yard, shop, personId, account: openAccount(shop, personId) }
}

async function pageOf(shop: Shop) {
	const page = await findStorePage({ producerId: shop.producerId, slug: shop.slug, today: TODAY })
	if (!page) throw new Error("the store is there")
	return page
}

const auditOf = async (yard: Yard, action: string) => {
	const rows = await readProducer(yard.producerId, (tx) => tx.select().from(auditEntries))
	return rows.filter((entry) => entry.action === action)
}

describe("the terms of a store", () => {
	test("are kept, and what changed is recorded", async () => {
		const { yard, shop, personId } = await openShop()
		const { terms, mark } = await pageOf(shop)
		const next = { ...terms, creditLimitCents: 500_000, terms: { ...terms.terms, days: 30 } }
		const by = { producerId: yard.producerId, storeId: shop.storeId, personId }
		expect(await saveStore({ ...by, mark, terms: next })).toEqual({ ok: true })
		expect((await pageOf(shop)).terms).toEqual(next)
		expect((await auditOf(yard, "store changed"))[0]?.detail).toMatchObject({
			creditLimitCents: { before: null, after: 500_000 },
			terms: { before: { days: 14 }, after: { days: 30 } },
		})
	})

	test("are not written over what somebody else has changed meanwhile", async () => {
		const { yard, shop, personId } = await openShop()
		const { terms, mark } = await pageOf(shop)
		const by = { producerId: yard.producerId, storeId: shop.storeId, personId }
		await saveStore({ ...by, mark, terms: { ...terms, isStopped: true } })
		const late = await saveStore({ ...by, mark, terms: { ...terms, minimumCents: 1 } })
		expect(late).toMatchObject({ ok: false, reason: "changed-meanwhile", now: { isStopped: true } })
		expect((await pageOf(shop)).terms.minimumCents).toBe(60_000)
		if (late.ok || late.reason !== "changed-meanwhile") throw new Error("it was refused")
		expect(await saveStore({ ...by, mark: late.mark, terms: { ...terms, minimumCents: 1 } })).toEqual({ ok: true })
	})
})

test("a new store is there once with its rounds, however often its form is sent, and under a name of its own", async () => {
	const { yard, shop, personId } = await openShop()
	const { terms } = await pageOf(shop)
	const storeId = randomUUID()
	const add = (slug: string, id = storeId) =>
		addStore({ producerId: yard.producerId, storeId: id, slug, personId, terms, roundIds: yard.roundIds })
	expect(await Promise.all([add("green-ladle"), add("green-ladle")])).toEqual([{ ok: true }, { ok: true }])
	expect(await add("green-ladle", randomUUID())).toEqual({ ok: false, reason: "slug-taken" })
	const page = await findStorePage({ producerId: yard.producerId, slug: "green-ladle", today: TODAY })
	expect(page).toMatchObject({ rounds: [2, 5], openInvoices: [], owed: { owedCents: 0 } })
})

describe("a bad debt", () => {
	const giveUp = (shop: Shop, personId: string, invoiceId: string, amountCents: number, writeOffId = randomUUID()) =>
		writeOff({
			producerId: shop.producerId,
			storeId: shop.storeId,
			invoiceId,
			amountCents,
			reason: "The shop has closed.",
			writeOffId,
			personId,
			today: TODAY,
		})

	test("is given up once with its reason, lowers what is owed and stands on the statement", async () => {
		const { yard, shop, personId, account } = await openShop()
		const invoice = await account.invoice(10_000)
		const id = randomUUID()
		expect(await Promise.all([1, 2].map(() => giveUp(shop, personId, invoice, 4_000, id)))).toEqual([
			{ ok: true },
			{ ok: true },
		])
		expect(await pageOf(shop)).toMatchObject({
			owed: { owedCents: 6_000 },
			givenUp: [{ number: "2026-0001", cents: 4_000 }],
		})
		const range = { from: "2026-08-01", until: TODAY }
		expect(await findStatement({ ...shop, range, today: TODAY })).toMatchObject({
			closingCents: 6_000,
			byKind: { "write-off": 4_000 },
		})
		expect((await auditOf(yard, "bad debt given up"))[0]?.detail).toMatchObject({ reason: "The shop has closed." })
	})

	test("is never more than is open, nor on another store's invoice, nor in closed books", async () => {
		const { yard, shop, personId, account } = await openShop()
		const invoice = await account.invoice(10_000)
		expect(await giveUp(shop, personId, invoice, 10_001)).toEqual({ ok: false, reason: "more-than-open" })
		const other = await openStore(yard)
		expect(await giveUp(other, personId, invoice, 1)).toEqual({ ok: false, reason: "no-such-invoice" })
		await withProducer(yard.producerId, (tx) =>
			tx
				.insert(bookClosings)
				.values({ producerId: yard.producerId, closedUntil: TODAY, totals: {}, closedBy: personId }),
		)
		expect(await giveUp(shop, personId, invoice, 1)).toEqual({ ok: false, reason: "books-closed" })
		expect((await pageOf(shop)).owed.owedCents).toBe(10_000)
	})
})

test("a promise to pay is noted once and judged by a person", async () => {
	const { shop, personId } = await openShop()
	const by = { producerId: shop.producerId, storeId: shop.storeId, personId, promiseId: randomUUID() }
	const promise = { amountCents: 10_000, promisedOn: "2026-08-20", note: "Tobias on the telephone." }
	await Promise.all([notePromise({ ...by, ...promise }), notePromise({ ...by, ...promise })])
	expect((await pageOf(shop)).promises).toMatchObject([{ ...promise, state: "open" }])
	await judgePromise({ ...by, state: "broken" })
	expect((await pageOf(shop)).promises).toMatchObject([{ state: "broken" }])
})

test("a statement is mailed once for a press of the button, whole, to the store's people", async () => {
	const { yard, shop, personId, account } = await openShop()
	for (let count = 0; count < 105; count += 1) await account.invoice(100)
	const query = { ...shop, range: { from: "2026-08-01", until: TODAY }, today: TODAY, personId, mailKey: randomUUID() }
	expect(await mailStatement(query)).toEqual({ ok: true, told: ["Rosa Quill"] })
	await mailStatement(query)
	const letters = await findOutbox(yard.producerId)
	expect(letters).toMatchObject([{ props: { statement: { lines: { length: 105 }, closingCents: 10_500 } } }])
})

test("a statement that is too long for a letter is mailed without its lines, with all of its sums and a link", async () => {
	const { yard, shop, personId, account } = await openShop()
	await account.invoice(500)
	await account.payment(300)
	await withProducer(yard.producerId, (tx) =>
		tx.execute(sql`
			insert into invoices (producer_id, year, sequence, store_id, issued_on, due_on, lines_cents, delivery_cents, tax_cents,
				total_cents)
			select ${yard.producerId}, 2025, n, ${shop.storeId}, '2026-08-02', '2026-08-16', 100, 0, 0, 100
			from generate_series(1, 1000) n`),
	)
	const range = { from: "2026-08-01", until: TODAY }
	await mailStatement({ ...shop, range, today: TODAY, personId, mailKey: randomUUID() })
	expect(await findOutbox(yard.producerId)).toMatchObject([
		{
			props: {
				isTooLong: true,
				raisedCents: 100_500,
				loweredCents: -300,
				statement: { lines: [], closingCents: 100_200 },
			},
		},
	])
	expect(await writeLetters(yard.producerId)).toEqual([expect.stringContaining("$1,002.00 owed")])
})

test("an order is to be looked at when its store is stopped, or owes more with it than its limit", async () => {
	const { yard, shop, account } = await openShop()
	const number = await place(shop, [await addProduct(yard, { code: "11", readyCases: 9 }), 2])
	const credit = () => findOrderCredit({ producerId: yard.producerId, number })
	const set = (facts: Partial<typeof stores.$inferInsert>) =>
		withProducer(yard.producerId, (tx) => tx.update(stores).set(facts).where(eq(stores.id, shop.storeId)))
	await account.invoice(100_000)
	expect(await credit()).toBeNull()
	// Two cases at $114.00 and $18.00 for the way.
	await set({ creditLimitCents: 124_600 })
	expect(await credit()).toBeNull()
	await set({ creditLimitCents: 124_599 })
	expect(await credit()).toMatchObject({ warning: { kind: "over-limit", owedCents: 100_000 }, storeSlug: shop.slug })
	await account.payment(100_000)
	expect(await credit()).toBeNull()
	await set({ isStopped: true })
	expect(await credit()).toMatchObject({ warning: { kind: "stopped" } })
})

describe("the charge for paying late", () => {
	const FIRST = new Date("2026-10-01T12:00:00Z")
	async function openLate(basisPoints = 150) {
		const facts = await openShop()
		const { producerId } = facts.yard
		await withProducer(producerId, (tx) => tx.update(producerSettings).set({ financeChargeBasisPoints: basisPoints }))
		await facts.account.invoice(100_000, { dueOn: "2026-08-15" })
		await facts.account.invoice(50_000, { dueOn: "2026-09-15" })
		// Numbers of the year go on behind what the account has written.
		await withProducer(producerId, (tx) =>
			tx.execute(`insert into counters (producer_id, series, year, last) values ('${producerId}', 'invoice', 2026, 2)`),
		)
		return { ...facts, charge: (now = FIRST) => chargeOverdue({ producerId, now }) }
	}

	test("is one invoice for a store and month, however often and by how many the job is run", async () => {
		const { yard, shop, charge } = await openLate()
		const runs = await Promise.all([charge(), charge(), charge(new Date("2026-10-03T12:00:00Z"))])
		expect(runs.flatMap(({ charged }) => charged)).toEqual(["2026-0003"])
		const { openInvoices } = await pageOf(shop)
		expect(openInvoices.map(({ number, openCents }) => [number, openCents])).toContainEqual(["2026-0003", 1_500])
		expect(await writeLetters(yard.producerId)).toEqual([expect.stringContaining("invoice 2026-0003, $15.00 by")])
		expect(await charge(new Date("2026-11-01T13:00:00Z"))).toEqual({ charged: ["2026-0004"] })
		const after = await pageOf(shop)
		// In November both invoices are late by more than 30 days; the charge of October is not charged on.
		expect(after.openInvoices.find(({ number }) => number === "2026-0004")?.openCents).toBe(2_250)
	})

	test("is not made in the middle of a month, nor by a producer that charges nothing", async () => {
		expect(await (await openLate()).charge(new Date("2026-10-04T12:00:00Z"))).toEqual({ charged: [] })
		expect(await (await openLate(0)).charge()).toEqual({ charged: [] })
	})
})
