import { randomUUID } from "node:crypto"
import { and, eq } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { auditEntries, orderEvents, orderLines, orders, prices } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { cancelOrder } from "~/services/orders/cancel-order.server"
import { findOrder } from "~/services/orders/find-order.server"
import { listStoreOrders } from "~/services/orders/list-store-orders.server"
import { type PlaceOrder, placeOrder } from "~/services/orders/place-order.server"
import { renderMail } from "~emails/render"
import { addProduct, findOutbox, openStore, openYard, type Shop, THURSDAY, TUESDAY_18, ZONE } from "./place-yard"

const FRIDAY_NOON = new Date("2026-08-14T16:00:00Z")

function orderOf(shop: Shop, lines: PlaceOrder["lines"], more: Partial<PlaceOrder> = {}): PlaceOrder {
	return {
		producerId: shop.producerId,
		storeId: shop.storeId,
		person: shop.person,
		zone: ZONE,
		now: THURSDAY,
		deliveryOn: TUESDAY_18,
		lines,
		poNumber: "",
		note: "",
		idempotencyKey: randomUUID(),
		...more,
	}
}

const ask = (productId: string, cases: number, keep = false) => ({ productId, cases, keep })

const ordersOf = (producerId: string) =>
	readProducer(producerId, (tx) => tx.select().from(orders).where(eq(orders.producerId, producerId)))

describe("placing an order", () => {
	test("writes lines at the prices of their breaks, an event, an audit entry and one mail that can be written", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const round = await addProduct(yard, { code: "11", readyCases: 10 })
		const comb = await addProduct(yard, { code: "41", readyCases: 10, family: "cut" })
		const answer = await placeOrder(
			orderOf(shop, [ask(comb, 1), ask(round, 3)], { poNumber: "PO-9", note: "Ring first" }),
		)
		expect(answer).toEqual({ ok: true, number: 1 })

		const { producerId } = yard
		const [order] = await ordersOf(producerId)
		// 3 × 108.30 + 114.00 is below the $600 from which delivery is free.
		expect(order).toMatchObject({
			number: 1,
			state: "placed",
			deliveryOn: TUESDAY_18,
			deliveryCents: 1_800,
			poNumber: "PO-9",
			note: "Ring first",
			placedBy: shop.person.id,
		})
		const [lines, events, audit] = await readProducer(producerId, async (tx) => [
			await tx.select().from(orderLines).where(eq(orderLines.producerId, producerId)),
			await tx.select().from(orderEvents).where(eq(orderEvents.producerId, producerId)),
			await tx.select().from(auditEntries).where(eq(auditEntries.producerId, producerId)),
		])
		expect(lines.map((line) => [line.productId, line.askedCases, line.caseCents, line.isToShare]).sort()).toEqual(
			[
				[comb, 1, 11_400, false],
				[round, 3, 10_830, false],
			].sort(),
		)
		expect(events.map((event) => [event.kind, event.userId])).toEqual([["placed", shop.person.id]])
		expect(audit.map((entry) => [entry.action, entry.subjectId, entry.userId])).toEqual([
			["place-order", order?.id, shop.person.id],
		])
		const [mail, ...others] = await findOutbox(producerId)
		expect(others).toEqual([])
		expect(mail?.recipient).toBe(shop.person.email)
		const letter = await renderMail(mail?.template ?? "", mail?.props)
		expect(letter.subject).toBe("We have your order 1 for Tuesday, August 18")
		expect(letter.text).toContain("noon on Friday, August 14")
		expect(letter.text).toContain("$456.90")
	})

	test("refuses a line that asks more than is free, says how many are, and writes nothing of the others", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const scarce = await addProduct(yard, { code: "11", readyCases: 16 })
		const plenty = await addProduct(yard, { code: "21", readyCases: 99 })
		const answer = await placeOrder(orderOf(shop, [ask(scarce, 40), ask(plenty, 2)]))
		expect(answer).toEqual({
			ok: false,
			reason: "lines",
			refused: [{ productId: scarce, reason: "more-than-free", freeCases: 16 }],
		})
		expect(await ordersOf(yard.producerId)).toEqual([])
		expect(await findOutbox(yard.producerId)).toEqual([])
	})

	test("keeps a line that is to be shared out, promises it nothing, and tells the buyer so", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const scarce = await addProduct(yard, { code: "11", readyCases: 16 })
		expect(await placeOrder(orderOf(shop, [ask(scarce, 40, true)]))).toMatchObject({ ok: true })
		// Nothing was promised by it: all 16 are free to another.
		expect(await placeOrder(orderOf(shop, [ask(scarce, 16)]))).toMatchObject({ ok: true })
		const [mail] = await findOutbox(yard.producerId)
		expect((await renderMail(mail?.template ?? "", mail?.props)).text).toContain("to be shared out")
	})

	test("answers the first order when the same form is sent again, also at once and after the cut-off", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const round = await addProduct(yard, { code: "11", readyCases: 10 })
		const order = orderOf(shop, [ask(round, 2)])
		const answers = await Promise.all([placeOrder(order), placeOrder(order), placeOrder(order)])
		const late = await placeOrder({ ...order, now: FRIDAY_NOON })
		expect([...answers, late]).toEqual(Array(4).fill({ ok: true, number: 1 }))
		expect(await ordersOf(yard.producerId)).toHaveLength(1)
		expect(await findOutbox(yard.producerId)).toHaveLength(1)
	})

	test("makes one order of two sends of one form with different products at the same moment", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const round = await addProduct(yard, { code: "11", readyCases: 10 })
		const comb = await addProduct(yard, { code: "41", readyCases: 10 })
		const idempotencyKey = randomUUID()
		const answers = await Promise.all([
			placeOrder(orderOf(shop, [ask(round, 2)], { idempotencyKey })),
			placeOrder(orderOf(shop, [ask(comb, 2)], { idempotencyKey })),
		])
		expect(answers[0]).toEqual(answers[1])
		expect(await ordersOf(yard.producerId)).toHaveLength(1)
	})

	test("promises the last cases to as many of twenty buyers as there are cases, and to no more", async () => {
		const yard = await openYard()
		const round = await addProduct(yard, { code: "11", readyCases: 7 })
		const other = await addProduct(yard, { code: "21", readyCases: 100 })
		const shops = await Promise.all(Array.from({ length: 20 }, () => openStore(yard)))
		// Half of them name the products the other way round: locks are taken in one order all the same.
		const answers = await Promise.all(
			shops.map((shop, index) =>
				placeOrder(orderOf(shop, index % 2 ? [ask(round, 1), ask(other, 1)] : [ask(other, 1), ask(round, 1)])),
			),
		)
		expect(answers.filter((answer) => answer.ok)).toHaveLength(7)
		const refusals = answers.filter((answer) => !answer.ok)
		expect(refusals).toEqual(
			Array(13).fill({
				ok: false,
				reason: "lines",
				refused: [{ productId: round, reason: "more-than-free", freeCases: 0 }],
			}),
		)
		const numbers = (await ordersOf(yard.producerId)).map((order) => order.number).sort((a, b) => a - b)
		expect(numbers).toEqual([1, 2, 3, 4, 5, 6, 7])
	})

	test("refuses from the cut-off on, and a day on which the van does not come", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const round = await addProduct(yard, { code: "11", readyCases: 10 })
		expect(await placeOrder(orderOf(shop, [ask(round, 1)], { now: FRIDAY_NOON }))).toEqual({
			ok: false,
			reason: "closed",
			cutoffAt: FRIDAY_NOON,
		})
		expect(await placeOrder(orderOf(shop, [ask(round, 1)], { deliveryOn: "2026-08-19" }))).toEqual({
			ok: false,
			reason: "no-delivery-that-day",
		})
		expect(await placeOrder(orderOf(shop, []))).toEqual({ ok: false, reason: "nothing-asked" })
		const justInTime = new Date(FRIDAY_NOON.getTime() - 1)
		expect(await placeOrder(orderOf(shop, [ask(round, 1)], { now: justInTime }))).toMatchObject({ ok: true })
	})

	test("keeps the price of a placed order when prices change", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const round = await addProduct(yard, { code: "11", readyCases: 10 })
		await placeOrder(orderOf(shop, [ask(round, 2)]))
		const { producerId, tierId } = yard
		await withProducer(producerId, async (tx) => {
			await tx
				.insert(prices)
				.values({ producerId, tierId, productId: round, minCases: 1, caseCents: 12_000, validFrom: "2026-08-13" })
			await tx
				.update(prices)
				.set({ caseCents: 99_900 })
				.where(and(eq(prices.producerId, producerId), eq(prices.productId, round), eq(prices.minCases, 3)))
		})
		const find = (number: number) => findOrder({ producerId, storeId: shop.storeId, number, now: THURSDAY, zone: ZONE })
		expect((await find(1))?.lines.map((line) => line.caseCents)).toEqual([11_400])
		await placeOrder(orderOf(shop, [ask(round, 2)]))
		expect((await find(2))?.lines.map((line) => line.caseCents)).toEqual([12_000])
	})

	test("knows nothing of another producer's products and another store's orders", async () => {
		const [yard, stranger] = [await openYard(), await openYard()]
		const shop = await openStore(yard)
		const neighbour = await openStore(yard)
		const foreign = await addProduct(stranger, { code: "11", readyCases: 10 })
		const own = await addProduct(yard, { code: "11", readyCases: 10 })
		expect(await placeOrder(orderOf(shop, [ask(foreign, 1)]))).toEqual({
			ok: false,
			reason: "lines",
			refused: [{ productId: foreign, reason: "not-sold" }],
		})
		await placeOrder(orderOf(shop, [ask(own, 1)]))
		const { producerId } = yard
		const asNeighbour = { producerId, storeId: neighbour.storeId, number: 1, now: THURSDAY, zone: ZONE }
		expect(await findOrder(asNeighbour)).toBeNull()
		expect(await cancelOrder({ ...asNeighbour, personId: neighbour.person.id })).toEqual({
			ok: false,
			reason: "unknown",
		})
		expect(await listStoreOrders({ producerId, storeId: neighbour.storeId, after: null })).toEqual({
			orders: [],
			next: null,
		})
		expect((await ordersOf(producerId))[0]?.state).toBe("placed")
	})
})

describe("cancelling an order", () => {
	test("frees what it was promised, once, until the cut-off", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const round = await addProduct(yard, { code: "11", readyCases: 4 })
		await placeOrder(orderOf(shop, [ask(round, 4)]))
		expect(await placeOrder(orderOf(shop, [ask(round, 1)]))).toMatchObject({ ok: false, reason: "lines" })
		const query = {
			producerId: yard.producerId,
			storeId: shop.storeId,
			number: 1,
			personId: shop.person.id,
			now: THURSDAY,
			zone: ZONE,
		}
		expect(await cancelOrder({ ...query, now: FRIDAY_NOON })).toEqual({
			ok: false,
			reason: "too-late",
			state: "placed",
		})
		expect(await Promise.all([cancelOrder(query), cancelOrder(query)])).toEqual([{ ok: true }, { ok: true }])
		const order = await findOrder(query)
		expect(order?.events.map((event) => event.kind)).toEqual(["placed", "cancelled"])
		expect(order?.mayCancel).toBe(false)
		expect(await placeOrder(orderOf(shop, [ask(round, 4)]))).toMatchObject({ ok: true })
	})
})

test("a store's deliveries come by day, the latest first, thirty at a time, each order once", async () => {
	const yard = await openYard()
	const shop = await openStore(yard)
	const round = await addProduct(yard, { code: "11", readyCases: 100 })
	for (let index = 0; index < 35; index += 1) {
		await placeOrder(orderOf(shop, [ask(round, 1)], { deliveryOn: index % 2 ? TUESDAY_18 : "2026-08-21" }))
	}
	const scope = { producerId: yard.producerId, storeId: shop.storeId }
	const first = await listStoreOrders({ ...scope, after: null })
	const second = await listStoreOrders({ ...scope, after: first.next })
	expect([first.orders.length, second.orders.length, second.next]).toEqual([30, 5, null])
	const all = [...first.orders, ...second.orders]
	expect(new Set(all.map((order) => order.number)).size).toBe(35)
	expect(all.map((order) => order.deliveryOn)).toEqual(
		all
			.map((order) => order.deliveryOn)
			.toSorted()
			.reverse(),
	)
	expect(all[0]).toMatchObject({ askedCases: 1, cases: 1, toShareCases: 0, totalCents: 13_200 })
})
