import { eq } from "drizzle-orm"
import { afterAll, afterEach, expect, test, vi } from "vitest"
import { onlinePayments, stores } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"
import { chargeDue } from "~/services/payments/charge-due.server"
import { findWayToPay } from "~/services/payments/find-way-to-pay.server"
import { keepMethod } from "~/services/payments/keep-method.server"
import { removeMethod, setAutomatic } from "~/services/payments/set-method.server"
import { producerOf } from "../desk/desk-steps"
import { findOutbox, openStore, openYard, type Shop, type Yard } from "../orders/place-yard"
import { addInvoice, applyAll, GOOD_CARD, readAccount, startPaymentService, typeCard } from "./paying"

const service = await startPaymentService()
afterAll(service.close)
afterEach(() => {
	vi.useRealTimers()
	service.fake.reset()
	service.taken.length = 0
})

const REFUSED_LATER = "4000000000000341"
const daysOn = (days: number) => new Date(Date.now() + days * 86_400_000).toISOString().slice(0, 10)

async function keeping(card: string) {
	const yard = await openYard()
	const shop = await openStore(yard)
	const started = await keepMethod({
		producer: producerOf(yard),
		store: { id: shop.storeId, slug: shop.slug, name: "Pantry & Plume" },
		person: shop.person,
		method: "card",
	})
	if (!started.ok) throw new Error("no page")
	expect(await typeCard(started.url, card)).toBe(303)
	await applyAll(service, "reverse")
	return { yard, shop, of: { producerId: yard.producerId, storeId: shop.storeId, personId: shop.person.id } }
}

const tries = (yard: Yard) =>
	readProducer(yard.producerId, async (tx) => {
		const rows = await tx.select().from(onlinePayments).where(eq(onlinePayments.producerId, yard.producerId))
		return rows.filter(({ kind }) => kind === "automatic").map(({ state, amountCents }) => `${state} ${amountCents}`)
	})

const storeOf = (yard: Yard, shop: Shop) =>
	readProducer(yard.producerId, async (tx) => {
		const rows = await tx.select().from(stores).where(eq(stores.producerId, yard.producerId))
		return rows.find(({ id }) => id === shop.storeId)
	})

test("a card is kept by its last four digits, and forgotten when the store says so", async () => {
	const { yard, shop, of } = await keeping(GOOD_CARD)
	expect(await findWayToPay(of)).toMatchObject({ keptWords: "card ending in 4242", isAutomatic: false })
	expect(JSON.stringify(await storeOf(yard, shop))).not.toContain(GOOD_CARD)
	await setAutomatic({ ...of, isOn: true })
	await removeMethod(of)
	expect(await findWayToPay(of)).toEqual({ keptWords: "", isAutomatic: false, agreedBy: null, agreedAt: null })
	expect([...service.fake.state.methods.values()].map(({ customer }) => customer)).toEqual([null])
	expect(await setAutomatic({ ...of, isOn: true })).toEqual({ ok: false, reason: "nothing-kept" })
})

test("what falls due is taken once, also when the job runs twice, and nothing of a store that has not agreed", async () => {
	const { yard, shop, of } = await keeping(GOOD_CARD)
	await addInvoice(yard, shop, { sequence: 1, totalCents: 40_000, dueOn: daysOn(1) })
	await addInvoice(yard, shop, { sequence: 2, totalCents: 9_000, dueOn: daysOn(30) })
	await chargeDue(of)
	expect(await tries(yard)).toEqual([])
	await setAutomatic({ ...of, isOn: true })
	vi.useFakeTimers({ toFake: ["Date"], now: Date.now() + 2 * 86_400_000 })
	await Promise.all([chargeDue(of), chargeDue(of)])
	await chargeDue(of)
	vi.useRealTimers()
	await applyAll(service)
	expect(await tries(yard)).toEqual(["paid 40000"])
	expect(await readAccount(yard)).toMatchObject({
		open: [0, 9_000],
		payments: ["card 40000 settled settled 40000 returned 0"],
	})
	const receipts = (await findOutbox(yard.producerId)).filter(({ template }) => template === "payment-received")
	expect(receipts.map(({ recipient }) => recipient)).toEqual([shop.person.email])
	expect(receipts[0]?.props).toMatchObject({ isAutomatic: true })
})

test("a refusal is told by one letter and not tried again by itself", async () => {
	const { yard, shop, of } = await keeping(REFUSED_LATER)
	await addInvoice(yard, shop, { sequence: 1, totalCents: 40_000, dueOn: daysOn(1) })
	await setAutomatic({ ...of, isOn: true })
	for (const days of [2, 3, 4]) {
		vi.useFakeTimers({ toFake: ["Date"], now: Date.now() + days * 86_400_000 })
		await chargeDue(of)
		vi.useRealTimers()
	}
	await applyAll(service)
	expect(await tries(yard)).toEqual(["declined 40000"])
	expect(service.fake.state.charges.size).toBe(1)
	expect(await readAccount(yard)).toMatchObject({ open: [40_000], payments: [] })
	const letters = (await findOutbox(yard.producerId)).filter(({ template }) => template === "payment-failed")
	expect(letters).toHaveLength(1)
	expect(letters[0]?.props).toMatchObject({ why: "automatic-refused", reason: "Your card was declined." })
})

test("while Stripe does not answer nothing is taken, and the job that comes again takes it once", async () => {
	const { yard, shop, of } = await keeping(GOOD_CARD)
	await addInvoice(yard, shop, { sequence: 1, totalCents: 40_000, dueOn: daysOn(1) })
	await setAutomatic({ ...of, isOn: true })
	vi.useFakeTimers({ toFake: ["Date"], now: Date.now() + 2 * 86_400_000 })
	service.fake.switch({ failNext: { count: 3, status: 500, path: "/v1/payment_intents" } })
	await expect(chargeDue(of)).rejects.toThrow()
	service.fake.switch({ dropNext: { count: 3, when: "after", path: "/v1/payment_intents" } })
	await expect(chargeDue(of)).rejects.toThrow()
	await chargeDue(of)
	vi.useRealTimers()
	await applyAll(service)
	expect(service.fake.state.charges.size).toBe(1)
	expect(await readAccount(yard)).toMatchObject({
		open: [0],
		payments: ["card 40000 settled settled 40000 returned 0"],
	})
})

test("a card that Stripe knows no more is told like a refusal, and not tried again", async () => {
	const { yard, shop, of } = await keeping(GOOD_CARD)
	await addInvoice(yard, shop, { sequence: 1, totalCents: 40_000, dueOn: daysOn(1) })
	await setAutomatic({ ...of, isOn: true })
	for (const method of service.fake.state.methods.values()) method.customer = null
	for (const days of [2, 3]) {
		vi.useFakeTimers({ toFake: ["Date"], now: Date.now() + days * 86_400_000 })
		await chargeDue(of)
		vi.useRealTimers()
	}
	expect(await tries(yard)).toEqual(["declined 40000"])
	const letters = (await findOutbox(yard.producerId)).filter(({ template }) => template === "payment-failed")
	expect(letters.map(({ recipient }) => recipient)).toEqual([shop.person.email])
})

test("what was due before the store agreed is left to the store", async () => {
	const { yard, shop, of } = await keeping(GOOD_CARD)
	await addInvoice(yard, shop, { sequence: 1, totalCents: 40_000, dueOn: daysOn(-5) })
	await setAutomatic({ ...of, isOn: true })
	await chargeDue(of)
	expect(await tries(yard)).toEqual([])
})
