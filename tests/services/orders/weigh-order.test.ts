import { eq } from "drizzle-orm"
import { expect, test } from "vitest"
import { prices, products } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { lineAmount } from "~/domain/pricing/weighed-line"
import { findPacking } from "~/services/desk/find-packing.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { findOrder } from "~/services/orders/find-order.server"
import { listDeskOrders } from "~/services/orders/list-desk-orders.server"
import { listStoreOrders } from "~/services/orders/list-store-orders.server"
import { packOrder } from "~/services/orders/pack-order.server"
import { addHand, orderAt, place, producerOf, standOnThursday } from "../desk/desk-steps"
import { addProduct, openStore, openYard, type Shop, THURSDAY, type Yard, ZONE } from "./place-yard"

standOnThursday()

const POUND_CENTS = 1600

/** A product that is sold by weight: cases of 12 pieces of 226 g, 5 lb 15.7 oz, at 16.00 a lb. */
async function addFrames(yard: Yard): Promise<string> {
	const productId = await addProduct(yard, { code: "61", readyCases: 10 })
	await withProducer(yard.producerId, async (tx) => {
		await tx.update(products).set({ pricedBy: "weight" }).where(eq(products.id, productId))
		await tx.update(prices).set({ poundCents: POUND_CENTS }).where(eq(prices.productId, productId))
	})
	return productId
}

/** An order of two cases of comb by weight and one case of rounds, confirmed. */
async function confirmed() {
	const yard = await openYard()
	const shop = await openStore(yard)
	const personId = await addHand()
	const frames = await addFrames(yard)
	const rounds = await addProduct(yard, { code: "11", readyCases: 5 })
	const number = await place(shop, [frames, 2], [rounds, 1])
	await confirmOrder({ producer: producerOf(yard), number, personId, given: [] })
	const lineId = (await orderAt(yard, number)).lines.find(({ code }) => code === "61")?.id ?? ""
	return { yard, shop, number, lineId, pack: { producerId: yard.producerId, number, personId } }
}

const seen = (yard: Yard, shop: Shop, number: number) =>
	findOrder({ producerId: yard.producerId, storeId: shop.storeId, number, now: THURSDAY, zone: ZONE })

test("comb priced by weight is not packed before it is weighed, and nothing is moved", async () => {
	const { yard, number, lineId, pack } = await confirmed()
	const refused = [{ lineId, reason: "not-weighed", pieces: 24, pieceNetGrams: 226 }]
	expect(await packOrder(pack)).toEqual({ ok: false, reason: "weights", refused })
	expect(await packOrder({ ...pack, weighed: [{ lineId, grams: 0, isSure: true }] })).toMatchObject({ refused })
	expect(await orderAt(yard, number)).toMatchObject({ state: "confirmed" })
	const packing = await findPacking({ producerId: yard.producerId, day: null })
	expect(packing.orders[0]?.lines.map(({ code, byWeight }) => [code, byWeight])).toEqual([
		["11", null],
		["61", { poundCents: POUND_CENTS, usualGrams: 24 * 226, weighedGrams: null }],
	])
})

test("the price of the order follows from what was weighed, on every list that shows it", async () => {
	const { yard, shop, number, lineId, pack } = await confirmed()
	const before = await seen(yard, shop, number)
	expect(before?.lines.find(({ code }) => code === "61")).toMatchObject({ poundCents: POUND_CENTS, weighedGrams: null })
	expect(await packOrder({ ...pack, weighed: [{ lineId, grams: 5510, isSure: false }] })).toEqual({ ok: true })

	const after = await seen(yard, shop, number)
	const totals = after?.lines.map((line) => lineAmount({ ...line, cases: line.givenCases ?? 0 }).cents) ?? []
	// 5510 g at 16.00 a lb is 194.3595…; the case of rounds is 108.30 from three cases of the family on.
	expect(totals).toEqual([10_830, 19_436])
	const total = 10_830 + 19_436 + (after?.deliveryCents ?? 0)
	const { producerId } = yard
	const desk = await listDeskOrders({ producerId, state: null, day: null, after: null })
	const store = await listStoreOrders({ producerId, storeId: shop.storeId, after: null })
	expect([desk.orders[0]?.totalCents, store.orders[0]?.totalCents]).toEqual([total, total])
	const event = (await orderAt(yard, number)).events.find(({ kind }) => kind === "packed")
	expect(event?.who).toBe("Ida")
})

test("a weight far from the label is asked about, and packed when somebody says that it is right", async () => {
	const { yard, number, lineId, pack } = await confirmed()
	const weighed = { lineId, grams: 2755, isSure: false }
	expect(await packOrder({ ...pack, weighed: [weighed] })).toEqual({
		ok: false,
		reason: "weights",
		refused: [{ lineId, reason: "doubtful", pieces: 24, pieceNetGrams: 226 }],
	})
	expect(await packOrder({ ...pack, weighed: [{ ...weighed, isSure: true }] })).toEqual({ ok: true })
	expect((await orderAt(yard, number)).lines.find(({ id }) => id === lineId)).toMatchObject({ weighedGrams: 2755 })
})

test("a weight of a line that is not priced by weight is passed over", async () => {
	const { yard, number, lineId, pack } = await confirmed()
	const rounds = (await orderAt(yard, number)).lines.find(({ code }) => code === "11")?.id ?? ""
	const weighed = [lineId, rounds].map((id) => ({ lineId: id, grams: 5400, isSure: false }))
	expect(await packOrder({ ...pack, weighed })).toEqual({ ok: true })
	expect((await orderAt(yard, number)).lines.map((line) => line.weighedGrams)).toEqual([null, 5400])
})
