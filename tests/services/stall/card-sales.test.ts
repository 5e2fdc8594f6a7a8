import { randomUUID } from "node:crypto"
import { eq } from "drizzle-orm"
import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest"
import { sales, stripeEvents } from "~/db/schema"
import { readProducer, withPlatform } from "~/db/transaction.server"
import { stripe } from "~/platform/stripe.server"
import { applyStripeEvent } from "~/services/payments/apply-stripe-event.server"
import { checkSale } from "~/services/stall/check-sale.server"
import { findDayTotals } from "~/services/stall/find-day-totals.server"
import { findSalePage } from "~/services/stall/find-stall-page.server"
import { giveUpSale } from "~/services/stall/give-up-sale.server"
import { retryCard, takeCard } from "~/services/stall/take-card.server"
import { takeCash } from "~/services/stall/take-cash.server"
import { type StripeFake, startStripeFake } from "../../../fakes/stripe/start"
import { addProduct, lostLots, type Market, openMarket, placesOf, READER } from "./market"

const DECLINED = "4000000000000002"

let fake: StripeFake
beforeAll(async () => {
	fake = await startStripeFake()
	process.env.STRIPE_API_BASE = fake.url
})
afterAll(() => fake.close())
beforeEach(() => fake.reset())

type Sale = Market & { saleId: string; productId: string; lotId: string }

/** A market day with five pieces on the table, and a card sale of two of them that the reader asks for. */
async function openSale(): Promise<Sale> {
	const market = await openMarket()
	const { productId, lotIds } = await addProduct(market, { code: "11", ready: [8], loaded: [5] })
	const sale = { ...market, saleId: randomUUID(), productId, lotId: lotIds[0] ?? "" }
	expect(await takeCard({ ...sale, items: [{ productId, pieces: 2 }] })).toEqual({ ok: true })
	return sale
}

const present = (number?: string) =>
	stripe().testHelpers.terminal.readers.presentPaymentMethod(
		READER,
		number === undefined ? {} : { type: "card_present", card_present: { number } },
	)

async function saleRow({ producerId, saleId }: Sale) {
	const [row] = await readProducer(producerId, (tx) => tx.select().from(sales).where(eq(sales.id, saleId)))
	if (!row) throw new Error("no sale")
	return row
}

/** Applies the fake's events so far in this order, each as the webhook stores it. */
async function applyEvents(order: "as they came" | "backwards" = "as they came"): Promise<void> {
	const events = [...fake.state.events.values()]
	for (const event of order === "backwards" ? events.reverse() : events) {
		await withPlatform((tx) =>
			tx
				.insert(stripeEvents)
				.values({ id: event.id, type: event.type, isLive: false, payload: { ...event } })
				.onConflictDoNothing(),
		)
		await applyStripeEvent({ eventId: event.id })
	}
}

/** Forgets that events were applied, so that they are applied anew, as a delivery that comes twice is at worst. */
const forgetApplied = () => withPlatform((tx) => tx.update(stripeEvents).set({ appliedAt: null }))

describe("a card sale", () => {
	test.each(["as they came", "backwards"] as const)(
		"is opened, asked for by the reader, and settled once by its events, %s and again",
		async (order) => {
			const sale = await openSale()
			expect(await saleRow(sale)).toMatchObject({ state: "open", method: "card", totalCents: 2_800, paidAt: null })
			expect(await placesOf(sale.producerId, sale.lotId)).toEqual({ ready: 3, market: 3, sold: 2 })
			expect(fake.state.readers.get(READER)?.action?.status).toBe("in_progress")
			await present()
			await applyEvents(order)
			const paid = await saleRow(sale)
			expect(paid).toMatchObject({ state: "paid", declineMessage: "" })
			await forgetApplied()
			await applyEvents(order === "backwards" ? "as they came" : "backwards")
			expect(await saleRow(sale)).toEqual(paid)
			expect(fake.state.charges.size).toBe(1)
			expect(await placesOf(sale.producerId, sale.lotId)).toEqual({ ready: 3, market: 3, sold: 2 })
			expect(await lostLots(sale.producerId)).toEqual([])
		},
	)

	test("sent twice in the same moment is one sale and one payment", async () => {
		const market = await openMarket()
		const { productId, lotIds } = await addProduct(market, { code: "11", ready: [8], loaded: [5] })
		const send = () => takeCard({ ...market, saleId, items: [{ productId, pieces: 2 }] })
		const saleId = randomUUID()
		expect(await Promise.all([send(), send()])).toEqual([{ ok: true }, { ok: true }])
		expect(fake.state.intents.size).toBe(1)
		expect(await placesOf(market.producerId, lotIds[0] ?? "")).toEqual({ ready: 3, market: 3, sold: 2 })
		await present()
		await applyEvents()
		// Sent once more after it is paid, as by the Back button: the reader is not asked again.
		expect(await send()).toEqual({ ok: true })
		expect(fake.state.readers.get(READER)?.action?.status).toBe("succeeded")
	})

	test("is not taken in cash as well while the card may go through", async () => {
		const sale = await openSale()
		const items = [{ productId: sale.productId, pieces: 2 }]
		expect(await takeCash({ ...sale, items, givenCents: 2_800 })).toMatchObject({
			ok: false,
			reason: "written-before",
			earlier: { method: "card", state: "open" },
		})
	})

	test("is found paid by asking, while its event is still on its way", async () => {
		const sale = await openSale()
		expect(await checkSale(sale)).toBe("waiting")
		await present()
		expect(await checkSale(sale)).toBe("settled")
		expect((await findSalePage(sale))?.sale.state).toBe("paid")
		fake.switch({ failNext: { count: 9, status: 500 } })
		expect(await checkSale(sale)).toBe("settled")
	})

	test("says that there is no answer while the payment service is away", async () => {
		const sale = await openSale()
		fake.switch({ failNext: { count: 9, status: 500 } })
		expect(await checkSale(sale)).toBe("no-answer")
		expect(await giveUpSale(sale)).toEqual({ ok: false, reason: "no-answer" })
		expect(await saleRow(sale)).toMatchObject({ state: "open" })
	})
})

describe("a declined card", () => {
	test("is told in words, leaves the sale open, and is tried again until it is paid", async () => {
		const sale = await openSale()
		await present(DECLINED)
		await applyEvents()
		expect(await saleRow(sale)).toMatchObject({ state: "open", declineMessage: "Your card was declined.", attempt: 1 })
		expect(await placesOf(sale.producerId, sale.lotId)).toEqual({ ready: 3, market: 3, sold: 2 })

		// Pressed twice, it is one more try.
		const again = () => retryCard({ ...sale, after: 1 })
		expect(await Promise.all([again(), again()])).toEqual([{ ok: true }, { ok: true }])
		expect(await saleRow(sale)).toMatchObject({ state: "open", declineMessage: "", attempt: 2 })
		// News of the first try that comes late does not say that the second is refused.
		await forgetApplied()
		await applyEvents("backwards")
		expect(await checkSale(sale)).toBe("waiting")
		expect(await saleRow(sale)).toMatchObject({ state: "open", declineMessage: "" })

		await present()
		await applyEvents()
		expect(await saleRow(sale)).toMatchObject({ state: "paid", declineMessage: "", attempt: 2 })
		const taken = [...fake.state.charges.values()].filter(({ paid }) => paid)
		expect(taken.map(({ amount }) => amount)).toEqual([2_800])
	})

	test("tried again after the sale was paid changes nothing", async () => {
		const paid = await openSale()
		await present()
		await applyEvents()
		expect(await retryCard({ ...paid, after: 1 })).toEqual({ ok: true })
		expect(await saleRow(paid)).toMatchObject({ state: "paid", attempt: 1 })
		expect(await retryCard({ ...paid, saleId: randomUUID(), after: 1 })).toEqual({ ok: false, reason: "no-such-sale" })
	})
})

describe("giving up a card sale", () => {
	test("puts the pieces back on the table, clears the reader and closes the payment; twice is once", async () => {
		const sale = await openSale()
		const given = { ok: true, items: [{ productId: sale.productId, pieces: 2 }] }
		expect(await Promise.all([giveUpSale(sale), giveUpSale(sale)])).toEqual([given, given])
		expect(await saleRow(sale)).toMatchObject({ state: "given-up" })
		expect(await placesOf(sale.producerId, sale.lotId)).toEqual({ ready: 3, market: 5 })
		expect(fake.state.readers.get(READER)?.action).toBeNull()
		expect([...fake.state.intents.values()].map(({ status }) => status)).toEqual(["canceled"])
		await applyEvents()
		expect(await saleRow(sale)).toMatchObject({ state: "given-up" })
		expect(await takeCard({ ...sale, items: given.items })).toMatchObject({ ok: false, reason: "written-before" })
		expect(await lostLots(sale.producerId)).toEqual([])
	})

	test("while the card goes through makes it paid, and the pieces stay sold", async () => {
		const sale = await openSale()
		await present()
		expect(await giveUpSale(sale)).toEqual({ ok: false, reason: "already-paid" })
		expect(await saleRow(sale)).toMatchObject({ state: "paid" })
		expect(await placesOf(sale.producerId, sale.lotId)).toEqual({ ready: 3, market: 3, sold: 2 })
		expect(await giveUpSale(sale)).toEqual({ ok: false, reason: "already-paid" })
	})

	test("goes through when the payment was closed but the pieces had not been put back", async () => {
		const sale = await openSale()
		await stripe().paymentIntents.cancel((await saleRow(sale)).stripePaymentIntentId ?? "")
		expect(await giveUpSale(sale)).toMatchObject({ ok: true })
		expect(await placesOf(sale.producerId, sale.lotId)).toEqual({ ready: 3, market: 5 })
	})

	test("leaves the reader alone when it asks for another sale by then", async () => {
		const sale = await openSale()
		await stripe().terminal.readers.cancelAction(READER)
		const other = await openSale()
		expect(await giveUpSale(sale)).toMatchObject({ ok: true })
		await present()
		await applyEvents()
		expect(await saleRow(other)).toMatchObject({ state: "paid" })
	})
})

describe("the card reader", () => {
	test.each(["offline", "busy", "timeout"] as const)(
		"that is %s charges nothing; the sale stays open and is tried again",
		async (trouble) => {
			const market = await openMarket()
			const { productId } = await addProduct(market, { code: "11", ready: [8], loaded: [5] })
			const sale = { ...market, saleId: randomUUID(), productId, lotId: "" }
			fake.switch({ readerTrouble: { [READER]: trouble } })
			expect(await takeCard({ ...sale, items: [{ productId, pieces: 2 }] })).toEqual({
				ok: false,
				reason: "reader-away",
			})
			expect(await saleRow(sale)).toMatchObject({ state: "open", attempt: 1 })
			expect(await retryCard({ ...sale, after: 1 })).toEqual({ ok: false, reason: "reader-away" })
			expect(await checkSale(sale)).toBe("off-reader")
			fake.switch({ readerTrouble: {} })
			expect(await retryCard({ ...sale, after: 2 })).toEqual({ ok: true })
			await present()
			await applyEvents()
			expect(await saleRow(sale)).toMatchObject({ state: "paid", attempt: 3 })
			expect(fake.state.charges.size).toBe(1)
			expect(fake.state.intents.size).toBe(1)
		},
	)

	test("that took the sale, though its answer was lost, pays it all the same", async () => {
		const market = await openMarket()
		const { productId } = await addProduct(market, { code: "11", ready: [8], loaded: [5] })
		const sale = { ...market, saleId: randomUUID(), productId, lotId: "" }
		fake.switch({ dropNext: { count: 9, when: "after", path: `/v1/terminal/readers/${READER}/process` } })
		expect(await takeCard({ ...sale, items: [{ productId, pieces: 2 }] })).toMatchObject({ reason: "reader-away" })
		await present()
		expect(await giveUpSale(sale)).toEqual({ ok: false, reason: "already-paid" })
		expect(await saleRow(sale)).toMatchObject({ state: "paid" })
	})

	test("is not taken from a sale that it asks for", async () => {
		const first = await openSale()
		const market = await openMarket()
		const { productId } = await addProduct(market, { code: "11", ready: [8], loaded: [5] })
		const saleId = randomUUID()
		expect(await takeCard({ ...market, saleId, items: [{ productId, pieces: 1 }] })).toEqual({
			ok: false,
			reason: "reader-busy",
		})
		await present()
		await applyEvents()
		expect(await saleRow(first)).toMatchObject({ state: "paid" })
		expect(await retryCard({ ...market, saleId, after: 1 })).toEqual({ ok: true })
	})

	test("is missing at a market that has none", async () => {
		const market = await openMarket({ readerId: "" })
		const { productId, lotIds } = await addProduct(market, { code: "11", ready: [8], loaded: [5] })
		expect(await takeCard({ ...market, saleId: randomUUID(), items: [{ productId, pieces: 2 }] })).toEqual({
			ok: false,
			reason: "no-reader",
		})
		expect(await placesOf(market.producerId, lotIds[0] ?? "")).toEqual({ ready: 3, market: 5 })
	})
})

test("who is not named on the day neither takes, sees, retries nor gives up its card sales", async () => {
	const sale = await openSale()
	const stranger = { ...sale, viewer: (await openMarket()).viewer }
	const items = [{ productId: sale.productId, pieces: 1 }]
	expect(await takeCard({ ...stranger, saleId: randomUUID(), items })).toEqual({ ok: false, reason: "no-such-day" })
	expect(await findSalePage(stranger)).toBeNull()
	expect(await retryCard({ ...stranger, after: 1 })).toEqual({ ok: false, reason: "no-such-sale" })
	expect(await giveUpSale(stranger)).toEqual({ ok: false, reason: "no-such-sale" })
	expect(await saleRow(sale)).toMatchObject({ state: "open", attempt: 1 })
})

test("the day's totals agree with the stock after sales by card and in cash, one open and one given up", async () => {
	const sale = await openSale()
	await present()
	await applyEvents()
	const items = [{ productId: sale.productId, pieces: 1 }]
	await takeCash({ ...sale, saleId: randomUUID(), items, givenCents: 2_000 })
	const givenUp = { ...sale, saleId: randomUUID() }
	await takeCard({ ...givenUp, items })
	await giveUpSale(givenUp)
	const open = randomUUID()
	await takeCard({ ...sale, saleId: open, items })
	const found = await findDayTotals(sale)
	expect(found?.totals).toMatchObject({ salesCount: 2, pieces: 3, cardCents: 2_800, cashCents: 1_400 })
	expect(found?.totals.expectedCashCents).toBe(9_400)
	expect(found?.openSales).toEqual([{ id: open, totalCents: 1_400, pieces: 1 }])
	expect(found?.pieces).toMatchObject([{ brought: 5, returned: 0, sold: 3, atCard: 1, left: 1, agrees: true }])
	expect(await placesOf(sale.producerId, sale.lotId)).toEqual({ ready: 3, market: 1, sold: 4 })
	expect(await lostLots(sale.producerId)).toEqual([])
})
