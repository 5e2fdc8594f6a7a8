import { randomUUID } from "node:crypto"
import { eq } from "drizzle-orm"
import { afterEach, beforeEach, describe, expect, test, vi } from "vitest"
import { expectedSupplies, marketDays, orderLines, orders, priceTiers, products, stores, users } from "~/db/schema"
import { shopStamp } from "~/db/shop-stamp.server"
import { withPlatform, withProducer } from "~/db/transaction.server"
import { findShopFront } from "~/services/shop/find-shop-front.server"
import { takeCash } from "~/services/stall/take-cash.server"
import { addProduct, type Market, openMarket, ZONE } from "../stall/market"

/** Thursday, August 13, 2026, 2:15 pm in the yard's zone; the market day is Saturday 15. */
const THURSDAY = new Date("2026-08-13T18:15:00Z")

beforeEach(() => {
	vi.useFakeTimers({ toFake: ["Date"], now: THURSDAY })
})
afterEach(() => {
	vi.useRealTimers()
})

const frontOf = (market: Market, dayId: string | null = null) =>
	findShopFront({ producer: { id: market.producerId, timeZone: ZONE }, dayId })

const itemOf = async (market: Market) => {
	const [item] = (await frontOf(market)).items
	if (!item) throw new Error("no item")
	return item
}

let lastNumber = 0

/** Promises so many cases of 12 to a store for a day. */
async function promise({ producerId, viewer }: Market, productId: string, cases: number, deliveryOn: string) {
	const [tierId, storeId, orderId] = [randomUUID(), randomUUID(), randomUUID()]
	await withProducer(producerId, async (tx) => {
		await tx.insert(priceTiers).values({ producerId, id: tierId, name: `Shops ${tierId}` })
		await tx.insert(stores).values({ producerId, id: storeId, slug: `store-${storeId}`, name: "Pantry", tierId })
		await tx.insert(orders).values({
			producerId,
			id: orderId,
			storeId,
			number: ++lastNumber,
			deliveryOn,
			placedBy: viewer.personId,
		})
		await tx
			.insert(orderLines)
			.values({ producerId, orderId, productId, askedCases: cases, caseCents: 11_400, piecesPerCase: 12 })
	})
}

describe("what the public can have", () => {
	test("is what the yard keeps for stall and shop, never more, however much is free", async () => {
		const market = await openMarket({ state: "planned" })
		await addProduct(market, { code: "11", reservePieces: 24, ready: [100] })
		expect(await itemOf(market)).toMatchObject({ kept: 24, left: 24, nextOn: null })
	})

	test("is what stores' promises leave of it, also promises for a later day", async () => {
		const market = await openMarket({ state: "planned" })
		const { productId } = await addProduct(market, { code: "11", reservePieces: 24, ready: [50] })
		await promise(market, productId, 3, "2026-08-18")
		expect(await itemOf(market)).toMatchObject({ kept: 24, left: 14 })
		await promise(market, productId, 2, "2026-08-14")
		expect(await itemOf(market)).toMatchObject({ kept: 24, left: 0 })
	})

	test("counts held lots from their release, and never what is still on the hives", async () => {
		const market = await openMarket({ state: "planned" })
		const { productId } = await addProduct(market, {
			code: "11",
			reservePieces: 24,
			ready: [10],
			state: "held",
			expectedReleaseOn: "2026-08-20",
		})
		expect(await itemOf(market)).toMatchObject({ left: 0, nextOn: "2026-08-20", nextPieces: 10 })
		await withProducer(market.producerId, (tx) =>
			tx.insert(expectedSupplies).values({
				producerId: market.producerId,
				productId,
				expectedOn: "2026-08-18",
				lowPieces: 6,
				likelyPieces: 9,
				highPieces: 12,
			}),
		)
		expect(await itemOf(market)).toMatchObject({ left: 0, nextOn: "2026-08-18", nextPieces: 6 })
		// What comes is promised to a store already: the public is told of the day when there is some over.
		await promise(market, productId, 1, "2026-08-19")
		expect(await itemOf(market)).toMatchObject({ left: 0, nextOn: "2026-08-20", nextPieces: 4 })
	})

	test("is nothing of a product that the yard keeps none of", async () => {
		const market = await openMarket({ state: "planned" })
		await addProduct(market, { code: "11", reservePieces: 0, ready: [10] })
		expect(await itemOf(market)).toMatchObject({ kept: 0, left: 0, nextOn: null, nextPieces: 0 })
	})

	test("leaves out what is not sold by the piece, or not at all any more", async () => {
		const market = await openMarket({ state: "planned" })
		await addProduct(market, { code: "22", pieceCents: null, reservePieces: 9, ready: [10] })
		const { productId } = await addProduct(market, { code: "11", reservePieces: 9, ready: [10] })
		expect((await frontOf(market)).items.map(({ code }) => code)).toEqual(["11"])
		await withProducer(market.producerId, (tx) =>
			tx.update(products).set({ isActive: false }).where(eq(products.id, productId)),
		)
		expect((await frontOf(market)).items).toEqual([])
	})

	test("is what stands on the table while the market is open, and less by each sale", async () => {
		const market = await openMarket({ on: "2026-08-13", state: "open" })
		const { productId } = await addProduct(market, { code: "11", reservePieces: 24, ready: [100], loaded: [8] })
		await addProduct(market, { code: "21", form: "basswood", reservePieces: 12, ready: [50] })
		expect((await frontOf(market)).items).toMatchObject([
			{ code: "11", kept: 8, left: 8 },
			{ code: "21", kept: 0, left: 0 },
		])
		await takeCash({ ...market, saleId: randomUUID(), items: [{ productId, pieces: 3 }], givenCents: 10_000 })
		expect(await itemOf(market)).toMatchObject({ kept: 8, left: 5 })
	})
})

describe("the days of the shop", () => {
	test("are the next three that are not over; another yard's day or an unknown one is answered with the next", async () => {
		const market = await openMarket({ on: "2026-08-13", state: "closed" })
		const { producerId, marketId } = market
		const ahead = ["2026-08-15", "2026-08-22", "2026-08-24", "2026-08-26", "2026-09-05"]
		await withProducer(producerId, (tx) =>
			tx.insert(marketDays).values(ahead.map((marketOn) => ({ producerId, marketId, marketOn }))),
		)
		const front = await frontOf(market)
		expect(front.days.map(({ on }) => on)).toEqual(["2026-08-15", "2026-08-22", "2026-08-24"])
		expect(front.chosen?.on).toBe("2026-08-15")
		expect((await frontOf(market, front.days[1]?.id)).chosen?.on).toBe("2026-08-22")
		for (const unknown of [randomUUID(), "tomorrow", (await openMarket({ state: "planned" })).dayId])
			expect((await frontOf(market, unknown)).chosen?.on).toBe("2026-08-15")
	})

	test("may be none: the figures are of today", async () => {
		const market = await openMarket({ on: "2026-08-01", state: "closed" })
		await addProduct(market, { code: "11", reservePieces: 24, ready: [9] })
		expect(await frontOf(market)).toMatchObject({ chosen: null, days: [], items: [{ left: 9 }] })
	})
})

describe("what a rendered copy goes by", () => {
	test("rises with every sale, order and price, and not with anything at another yard", async () => {
		const market = await openMarket()
		const { productId } = await addProduct(market, { code: "11", reservePieces: 24, ready: [100], loaded: [8] })
		const seen = [await shopStamp(market.slug)]
		await takeCash({ ...market, saleId: randomUUID(), items: [{ productId, pieces: 1 }], givenCents: 10_000 })
		seen.push(await shopStamp(market.slug))
		await promise(market, productId, 1, "2026-08-18")
		seen.push(await shopStamp(market.slug))
		await withProducer(market.producerId, (tx) =>
			tx.update(products).set({ pieceCents: 1_500 }).where(eq(products.id, productId)),
		)
		seen.push(await shopStamp(market.slug))
		expect(new Set(seen).size).toBe(4)
		const other = await openMarket()
		await addProduct(other, { code: "11", ready: [4] })
		// A person who signs up changes no shop.
		await withPlatform((tx) => tx.insert(users).values({ name: "Ada", email: `${randomUUID()}@quay.example.test` }))
		expect(await shopStamp(market.slug)).toBe(seen.at(-1))
	})

	test("names the day, so that nothing of yesterday is shown; and there is none for an unknown yard", async () => {
		const market = await openMarket()
		expect(await shopStamp(market.slug)).toMatch(/^\d+ \d{4}-\d\d-\d\d$/)
		expect(await shopStamp("nobody-here")).toBeNull()
	})
})
