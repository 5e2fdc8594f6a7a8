import { eq } from "drizzle-orm"
import { afterAll, afterEach, expect, test } from "vitest"
import { onlinePayments, payments, payouts, stripeEvents } from "~/db/schema"
import { readProducer, withPlatform, withProducer } from "~/db/transaction.server"
import { listDifferences } from "~/services/payments/list-differences.server"
import { reconcileStripe } from "~/services/payments/reconcile-stripe.server"
import { settleDifference } from "~/services/payments/settle-difference.server"
import { openStore, openYard, type Shop, type Yard } from "../orders/place-yard"
import { addInvoice, applyAll, GOOD_CARD, openCardPage, readAccount, startPaymentService, typeCard } from "./paying"

const service = await startPaymentService()
afterAll(service.close)
afterEach(() => {
	service.fake.reset()
	service.taken.length = 0
})

async function invoiced(): Promise<{ yard: Yard; shop: Shop; number: string }> {
	const yard = await openYard()
	const shop = await openStore(yard)
	return { yard, shop, number: await addInvoice(yard, shop, { sequence: 1, totalCents: 40_000 }) }
}

const ofYard = (yard: Yard) => ({ producerId: yard.producerId })

test("a payment whose events were all lost is found at night, with its receipt, and its events are stored", async () => {
	const { yard, shop, number } = await invoiced()
	service.fake.switch({ muteEvents: true })
	await typeCard(await openCardPage(yard, shop, number), GOOD_CARD)
	await applyAll(service)
	expect(await readAccount(yard)).toMatchObject({ open: [40_000], payments: [] })
	await reconcileStripe()
	expect(await readAccount(yard)).toMatchObject({
		open: [0],
		payments: ["card 40000 settled settled 40000 returned 0"],
	})
	expect(await listDifferences(ofYard(yard))).toEqual([])
	const stored = await withPlatform((tx) => tx.select({ id: stripeEvents.id }).from(stripeEvents))
	for (const eventId of service.fake.state.events.keys()) expect(stored.map(({ id }) => id)).toContain(eventId)
})

test("fees and payouts are filled in, and agree with what Stripe paid out", async () => {
	const { yard, shop, number } = await invoiced()
	await typeCard(await openCardPage(yard, shop, number), GOOD_CARD)
	await applyAll(service)
	service.fake.switch({ muteEvents: true })
	service.fake.bank({ step: "pay-out" })
	await reconcileStripe()
	await reconcileStripe()
	const [payout] = service.fake.state.payouts.values()
	const rows = await readProducer(yard.producerId, (tx) =>
		tx.select().from(payouts).where(eq(payouts.producerId, yard.producerId)),
	)
	expect(rows).toMatchObject([
		{ stripePayoutId: payout?.id, grossCents: 40_000, feeCents: 1_190, netCents: payout?.amount },
	])
	const [payment] = await readProducer(yard.producerId, (tx) =>
		tx.select().from(payments).where(eq(payments.producerId, yard.producerId)),
	)
	expect(payment).toMatchObject({ feeCents: 1_190, stripePayoutId: payout?.id })
})

test("what Stripe has and nothing here can take is written down in words, and settled when it is gone", async () => {
	const { yard, shop, number } = await invoiced()
	service.fake.switch({ muteEvents: true })
	await typeCard(await openCardPage(yard, shop, number), GOOD_CARD)
	const [visit] = await readProducer(yard.producerId, (tx) =>
		tx.select().from(onlinePayments).where(eq(onlinePayments.producerId, yard.producerId)),
	)
	const [intent] = service.fake.state.intents.values()
	if (!intent || !visit) throw new Error("nothing was paid")
	// As if it had been made by another program under our name.
	intent.metadata.online_payment_id = "6f0c5a52-3a2c-4f0e-9f6b-2f4f5f1d9a11"
	await reconcileStripe()
	await reconcileStripe()
	expect(await listDifferences(ofYard(yard))).toMatchObject([
		{ kind: "missing-here", stripeId: intent.id, ourCents: null, theirCents: 40_000, detail: "At Stripe it is paid." },
	])
	intent.metadata.online_payment_id = visit.id
	await reconcileStripe()
	expect(await listDifferences(ofYard(yard))).toEqual([])
	expect(await readAccount(yard)).toMatchObject({ open: [0] })
})

test("what is noted here and unknown there stays in the list until a person has looked at it", async () => {
	const { yard, shop } = await invoiced()
	await withProducer(yard.producerId, (tx) =>
		tx.insert(payments).values({
			...{ producerId: yard.producerId, storeId: shop.storeId, method: "card", amountCents: 700 },
			receivedOn: "2026-08-13",
			stripePaymentIntentId: `pi_nobody_knows_${yard.slug}`,
		}),
	)
	await reconcileStripe()
	const [difference] = await listDifferences(ofYard(yard))
	expect(difference).toMatchObject({ kind: "missing-there", ourCents: 700, detail: "Stripe knows no such payment." })
	const personId = shop.person.id
	expect(await settleDifference({ ...ofYard(yard), differenceId: difference?.id ?? "", personId })).toEqual({
		ok: true,
	})
	expect(await listDifferences(ofYard(yard))).toEqual([])
})

test("while Stripe is away the night changes nothing, and the next one catches up", async () => {
	const { yard, shop, number } = await invoiced()
	service.fake.switch({ muteEvents: true })
	await typeCard(await openCardPage(yard, shop, number), GOOD_CARD)
	service.fake.switch({ failNext: { count: 3, status: 500 } })
	await expect(reconcileStripe()).rejects.toThrow()
	expect(await readAccount(yard)).toMatchObject({ open: [40_000] })
	service.fake.switch({ failNext: null, dropNext: { count: 2, when: "after" } })
	await reconcileStripe()
	expect(await readAccount(yard)).toMatchObject({ open: [0] })
})
