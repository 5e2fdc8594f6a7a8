import { sql } from "drizzle-orm"
import { expect, test } from "vitest"
import { breaksConstraint } from "~/db/errors.server"
import { payments } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { closeBooks } from "~/services/books/close-books.server"
import { findBooks } from "~/services/books/find-books.server"
import { findClosing } from "~/services/books/find-closing.server"
import { setAccounts } from "~/services/books/set-accounts.server"
import {
	credit,
	fileOf,
	giveUp,
	issue,
	linesOf,
	type MoneyYard,
	openMoneyYard,
	pay,
	payOut,
	sellAtStall,
	sendBack,
	sumOf,
} from "./money-yard"

const TODAY = "2026-09-02"
const close = (at: MoneyYard, until: string) =>
	closeBooks({ producer: at.producer, until, today: TODAY, personId: at.personId })
const isClosed = (error: unknown) => breaksConstraint(error, "books_closed")
const august = (at: MoneyYard) => fileOf(at, "2026-08-01", "2026-08-31")

test("a day that has not ended is not closed, and what is closed is not closed again", async () => {
	const at = await openMoneyYard()
	expect(await close(at, TODAY)).toEqual({ ok: false, reason: "not-over-yet" })
	expect(await close(at, "2026-07-31")).toMatchObject({ ok: true })
	expect(await close(at, "2026-07-31")).toEqual({ ok: false, reason: "closed-already", until: "2026-07-31" })
	expect(await close(at, "2026-07-01")).toEqual({ ok: false, reason: "closed-already", until: "2026-07-31" })
})

test("once closed, nothing is entered on a closed day, and the day after takes everything", async () => {
	const at = await openMoneyYard()
	const invoiceId = await issue(at, { on: "2026-08-04", sequence: 1, linesCents: 10_000 })
	const paymentId = await pay(at, { on: "2026-08-05", cents: 6_000 })
	await close(at, "2026-08-31")
	const late = [
		() => issue(at, { on: "2026-08-31", sequence: 2, linesCents: 1 }),
		() => credit(at, { on: "2026-08-31", sequence: 1, linesCents: 1, reason: "broken" }),
		() => pay(at, { on: "2026-08-31", cents: 1 }),
		() => sendBack(at, { on: "2026-08-31", paymentId, cents: 1 }),
		() => giveUp(at, { on: "2026-08-31", invoiceId, cents: 1 }),
	]
	for (const enter of late) await expect(enter()).rejects.toSatisfy(isClosed)
	await issue(at, { on: "2026-09-01", sequence: 2, linesCents: 1 })
	await credit(at, { on: "2026-09-01", sequence: 1, linesCents: 1, reason: "broken" })
	await pay(at, { on: "2026-09-01", cents: 1 })
	await sendBack(at, { on: "2026-09-01", paymentId, cents: 1 })
	await giveUp(at, { on: "2026-09-01", invoiceId, cents: 1 })
})

test("the file of a closed period is the same to the byte, whatever happens afterwards", async () => {
	const at = await openMoneyYard()
	const { id: producerId } = at.producer
	await issue(at, { on: "2026-08-04", sequence: 1, linesCents: 30_000 })
	const card = await pay(at, { on: "2026-08-05", cents: 30_000, method: "card", stripePayoutId: "po_1" })
	const refund = await sendBack(at, { on: "2026-08-06", paymentId: card, cents: 2_000, state: "asked" })
	const dispute = await sendBack(at, {
		on: "2026-08-07",
		paymentId: card,
		cents: 5_000,
		kind: "dispute",
		state: "asked",
	})
	const undone = await sendBack(at, {
		on: "2026-08-08",
		paymentId: await pay(at, { on: "2026-08-08", cents: 900, method: "card" }),
		cents: 900,
	})
	await sellAtStall(at, { on: "2026-08-15", market: "Coopers Green", cash: [10_825] })
	await payOut(at, { on: "2026-08-17", name: "po_1", grossCents: 28_000, feeCents: 900 })
	await close(at, "2026-08-31")
	const closed = await august(at)

	await setAccounts({ producerId, personId: at.personId, names: { cash: { number: "9", name: "Till" } } })
	await withProducer(producerId, async (tx) => {
		await tx.execute(sql`update stores set name = 'Renamed Store'`)
		await tx.execute(sql`update markets set name = 'Renamed Market'`)
		await tx.execute(sql`update products set is_taxable = true`)
		await tx.execute(sql`update producer_settings set sales_tax_basis_points = 825`)
		await tx.execute(sql`update payment_returns set state = 'done' where id = ${refund}`)
		await tx.execute(sql`update payment_returns set state = 'won' where id = ${dispute}`)
		await tx.execute(sql`update payment_returns set state = 'failed' where id = ${undone}`)
	})
	await payOut(at, { on: "2026-08-29", name: "po_late", grossCents: 1_000, feeCents: 40 })
	expect(await august(at)).toBe(closed)

	const september = linesOf(await fileOf(at, "2026-09-01", "2026-09-30"))
	expect(
		september.map(
			({ entry, account, debitCents, creditCents, about }) =>
				`${entry} ${account} ${debitCents - creditCents} ${about}`,
		),
	).toEqual([
		"20260901-001 1200 2000 Refund",
		"20260901-001 1050 -2000 Refund",
		"20260901-002 1050 5000 Dispute won",
		"20260901-002 1070 -5000 Dispute won",
		"20260901-003 1050 900 Refund failed",
		"20260901-003 1200 -900 Refund failed",
		"20260901-004 1010 960 Paid out by Stripe",
		"20260901-004 6100 40 Paid out by Stripe",
		"20260901-004 1050 -1000 Paid out by Stripe",
	])
	await closeBooks({ producer: at.producer, until: "2026-09-30", today: "2026-10-01", personId: at.personId })
	expect(await august(at)).toBe(closed)
	expect(linesOf(await fileOf(at, "2026-09-01", "2026-09-30"))).toEqual(september)
	const { balance } = await findBooks({
		producer: at.producer,
		from: "2026-10-01",
		to: "2026-10-31",
		today: "2026-10-01",
	})
	expect(balance.isBalanced).toBe(true)
	expect(balance.rows.find(({ account }) => account === "cash")?.beforeCents).toBe(10_825)
})

test("the totals that a closing keeps are those of the file", async () => {
	const at = await openMoneyYard()
	await issue(at, { on: "2026-07-04", sequence: 1, linesCents: 10_000, taxCents: 825 })
	await close(at, "2026-07-31")
	await pay(at, { on: "2026-08-05", cents: 6_000 })
	const closed = await close(at, "2026-08-31")
	if (!closed.ok) throw new Error(closed.reason)
	const sum = sumOf(await fileOf(at, "2026-07-01", "2026-08-31"))
	const totals = Object.values(closed.totals)
	expect(totals.reduce((all, { debitCents }) => all + debitCents, 0)).toBe(sum.debitCents)
	expect(totals.reduce((all, { creditCents }) => all + creditCents, 0)).toBe(sum.creditCents)
	expect(closed.totals.receivable).toEqual({ debitCents: 10_825, creditCents: 6_000 })
})

test("a payment that is being entered while the books are closed is waited for and counted", async () => {
	const at = await openMoneyYard()
	let commit = () => {}
	const mayCommit = new Promise<void>((resolve) => {
		commit = resolve
	})
	let noteEntered = () => {}
	const isEntered = new Promise<void>((resolve) => {
		noteEntered = resolve
	})
	const entering = withProducer(at.producer.id, async (tx) => {
		await tx.insert(payments).values({
			producerId: at.producer.id,
			storeId: at.shop.storeId,
			method: "cash",
			amountCents: 700,
			receivedOn: "2026-08-31",
		})
		noteEntered()
		await mayCommit
	})
	await isEntered
	const closing = close(at, "2026-08-31")
	while (!(await isWaited())) await new Promise((resolve) => setImmediate(resolve))
	commit()
	await entering
	const closed = await closing
	expect(closed).toMatchObject({ ok: true, totals: { cash: { debitCents: 700, creditCents: 0 } } })

	async function isWaited(): Promise<boolean> {
		const { rows } = await readProducer(at.producer.id, (tx) =>
			tx.execute(sql`select from pg_locks where locktype = 'advisory' and not granted`),
		)
		return rows.length > 0
	}
})

test("of many payments that race with a closing each is in its totals or refused", async () => {
	const at = await openMoneyYard()
	const racing = Array.from({ length: 24 }, (_, n) => pay(at, { on: "2026-08-31", cents: 100 + n }).then(() => 100 + n))
	const [closed, ...entered] = await Promise.allSettled([close(at, "2026-08-31"), ...racing])
	const refused = entered.filter((one) => one.status === "rejected")
	for (const { reason } of refused) expect(reason).toSatisfy(isClosed)
	const taken = entered.reduce((sum, one) => sum + (one.status === "fulfilled" ? Number(one.value) : 0), 0)
	if (closed.status === "rejected" || !closed.value.ok) throw new Error("the books were not closed")
	expect(closed.value.totals.bank?.debitCents ?? 0).toBe(taken)
	expect(sumOf(await august(at)).debitCents).toBe(taken)
})

test("before closing, what is still open until that day is named", async () => {
	const at = await openMoneyYard()
	const page = (until: string | null) => findClosing({ producer: at.producer, until, today: TODAY })
	expect(await page(null)).toMatchObject({ until: "2026-08-31", latest: "2026-09-01", firstOpen: null, stillOpen: [] })
	await pay(at, { on: "2026-08-20", cents: 4_000, method: "bank-debit", state: "on-its-way" })
	await withProducer(at.producer.id, async (tx) => {
		await tx.execute(sql`insert into orders (producer_id, number, store_id, delivery_on, state)
			values (${at.producer.id}, 71, ${at.shop.storeId}, '2026-08-25', 'sent')`)
	})
	expect((await page("2026-08-24")).stillOpen.map(({ of }) => of)).toEqual(["on-its-way"])
	expect((await page("2026-08-31")).stillOpen).toEqual([
		{ of: "sent-not-invoiced", count: 1, examples: [{ words: "71, Pantry & Plume", on: "2026-08-25", cents: null }] },
		{ of: "on-its-way", count: 1, examples: [{ words: "Pantry & Plume", on: "2026-08-20", cents: 4_000 }] },
	])
	await close(at, "2026-07-31")
	expect(await page(null)).toMatchObject({ until: "2026-08-31", firstOpen: "2026-08-01" })
})
