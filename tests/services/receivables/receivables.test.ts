import { expect, test } from "vitest"
import { listReceivables } from "~/services/receivables/list-receivables.server"
import { addHand } from "../desk/desk-steps"
import { openStore, openYard } from "../orders/place-yard"
import { openAccount } from "./account"

const TODAY = "2026-08-31"

test("every store stands with what it owes by days past due, the most owing first, and the sums are below", async () => {
	const yard = await openYard()
	const hand = await addHand()
	const [small, large, quiet] = [
		await openStore(yard, "small"),
		await openStore(yard, "large"),
		await openStore(yard, "quiet"),
	]
	await openAccount(small, hand).invoice(100, { dueOn: "2026-08-31" })
	const account = openAccount(large, hand, 10)
	await account.invoice(2_000, { issuedOn: "2026-08-01", dueOn: "2026-08-30" })
	await account.invoice(300, { issuedOn: "2026-07-01", dueOn: "2026-08-01" })
	await account.invoice(40, { issuedOn: "2026-07-01", dueOn: "2026-07-02" })
	await account.invoice(5, { issuedOn: "2026-05-01", dueOn: "2026-06-01" })
	const page = await listReceivables({ producerId: yard.producerId, today: TODAY, by: "owed", after: null })
	expect(page.stores.map(({ slug, owedCents }) => [slug, owedCents])).toEqual([
		["large", 2_345],
		["small", 100],
	])
	expect(page.stores[0]?.ageing).toEqual({ current: 0, "1–30": 2_300, "31–60": 40, "61–90": 0, "over 90": 5 })
	expect(page.totals).toMatchObject({ stores: 2, owedCents: 2_445, onAccountCents: 0 })
	expect(page.stores.some(({ slug }) => slug === quiet.slug)).toBe(false)
})

test("money on account stands beside what is owed, also where nothing is owed", async () => {
	const yard = await openYard()
	const shop = await openStore(yard)
	const account = openAccount(shop, await addHand())
	await account.payment(7_000)
	await account.credit(500)
	const { stores, totals } = await listReceivables({
		producerId: yard.producerId,
		today: TODAY,
		by: "name",
		after: null,
	})
	expect(stores).toMatchObject([{ owedCents: 0, onAccountCents: 7_500, balanceCents: -7_500, oldestDueOn: null }])
	expect(totals.balanceCents).toBe(-7_500)
})

test("the list goes on from page to page, by what is owed and by name, each store once", async () => {
	const yard = await openYard()
	const hand = await addHand()
	let sequence = 0
	for (let count = 0; count < 28; count += 1) {
		const account = openAccount(await openStore(yard), hand, sequence)
		await account.invoice(1_000 * (1 + (count % 5)))
		sequence += 1
	}
	for (const by of ["owed", "name"] as const) {
		const first = await listReceivables({ producerId: yard.producerId, today: TODAY, by, after: null })
		const second = await listReceivables({ producerId: yard.producerId, today: TODAY, by, after: first.next })
		expect([first.stores.length, second.stores.length, second.next]).toEqual([25, 3, null])
		expect(new Set([...first.stores, ...second.stores].map(({ slug }) => slug)).size).toBe(28)
		expect(second.totals).toEqual(first.totals)
	}
	const whole = await listReceivables({
		producerId: yard.producerId,
		today: TODAY,
		by: "owed",
		after: null,
		isWhole: true,
	})
	expect(whole.stores).toHaveLength(28)
	expect(
		await listReceivables({ producerId: yard.producerId, today: TODAY, by: "owed", after: "'; drop" }),
	).toMatchObject({
		totals: whole.totals,
	})
})
