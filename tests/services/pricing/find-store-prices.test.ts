import { randomUUID } from "node:crypto"
import { describe, expect, test } from "vitest"
import { prices, priceTiers, promotions, storePrices } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { findStorePrices } from "~/services/pricing/find-store-prices.server"
import { addProduct, openStore, openYard, type Shop } from "../orders/place-yard"

const TODAY = "2026-08-13"

const casesOf = async (shop: Shop, today = TODAY) => {
	const found = await readProducer(shop.producerId, (tx) => findStorePrices(tx, { ...shop, today }))
	return found.map(({ code, breaks }) => [code, ...breaks.map((step) => `${step.minCases}: ${step.caseCents}`)])
}

describe("the prices of a store", () => {
	test("its own price stands for its tier's through its last day, and only for this store", async () => {
		const yard = await openYard()
		const [shop, neighbour] = [await openStore(yard), await openStore(yard)]
		const productId = await addProduct(yard, { code: "11", readyCases: 0 })
		const { producerId } = yard
		await withProducer(producerId, (tx) =>
			tx.insert(storePrices).values({
				producerId,
				storeId: shop.storeId,
				productId,
				caseCents: 9900,
				validFrom: "2026-08-01",
				validUntil: TODAY,
			}),
		)
		expect(await casesOf(shop)).toEqual([["11", "1: 9900"]])
		expect(await casesOf(neighbour)).toEqual([["11", "1: 11400", "3: 10830"]])
		expect(await casesOf(shop, "2026-08-14")).toEqual([["11", "1: 11400", "3: 10830"]])
		expect(await casesOf(shop, "2026-07-31")).toEqual([["11", "1: 11400", "3: 10830"]])
	})

	test("the largest promotion of the day comes off its tier's price; another tier's does not", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const productId = await addProduct(yard, { code: "11", readyCases: 0 })
		const { producerId } = yard
		const otherTier = randomUUID()
		await withProducer(producerId, async (tx) => {
			await tx.insert(priceTiers).values({ producerId, id: otherTier, name: "Restaurants" })
			const around = { producerId, name: "Late comb", productId, startsOn: "2026-08-10", endsOn: TODAY }
			await tx.insert(promotions).values([
				{ ...around, basisPoints: 500 },
				{ ...around, tierId: yard.tierId, basisPoints: 1000 },
				{ ...around, tierId: otherTier, basisPoints: 5000 },
			])
		})
		expect(await casesOf(shop)).toEqual([["11", "1: 10260", "3: 9747"]])
		expect(await casesOf(shop, "2026-08-14")).toEqual([["11", "1: 11400", "3: 10830"]])
	})

	test("a new price does not hold before its day", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const productId = await addProduct(yard, { code: "11", readyCases: 0 })
		const { producerId, tierId } = yard
		await withProducer(producerId, (tx) =>
			tx
				.insert(prices)
				.values({ producerId, tierId, productId, minCases: 1, caseCents: 12_000, validFrom: "2026-08-14" }),
		)
		expect(await casesOf(shop)).toEqual([["11", "1: 11400", "3: 10830"]])
		expect(await casesOf(shop, "2026-08-14")).toEqual([["11", "1: 12000", "3: 10830"]])
	})
})
