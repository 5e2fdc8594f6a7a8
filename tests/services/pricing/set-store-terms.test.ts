import { randomUUID } from "node:crypto"
import { describe, expect, test } from "vitest"
import { auditEntries, priceTiers } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { findOwnPrices } from "~/services/pricing/find-own-prices.server"
import { findStorePrices } from "~/services/pricing/find-store-prices.server"
import { addPromotion, setStorePrice, setStoreTier } from "~/services/pricing/set-store-terms.server"
import { addProduct, openStore, openYard, THURSDAY } from "../orders/place-yard"

const TODAY = "2026-08-13"

async function openDesk() {
	const yard = await openYard()
	const shop = await openStore(yard)
	const productId = await addProduct(yard, { code: "11", readyCases: 0 })
	const { producerId } = yard
	const by = { producerId, personId: shop.person.id, now: THURSDAY, today: TODAY }
	const paid = async (today: string) => {
		const [product] = await readProducer(producerId, (tx) => findStorePrices(tx, { ...shop, today }))
		return product?.breaks.map(({ caseCents }) => caseCents) ?? []
	}
	return { ...yard, shop, productId, by, paid }
}

describe("what departs from the tiers", () => {
	test("a store's own price and a promotion are charged on their days, listed, and recorded", async () => {
		const { producerId, shop, productId, by, paid } = await openDesk()
		const own = { ...by, storeId: shop.storeId, productId, minCases: 1, cents: 10_000, validFrom: "2026-08-20" }
		expect(await setStorePrice({ ...own, validUntil: "2026-08-31" })).toEqual({ ok: true })
		const off = { ...by, name: "Last comb", productId, tierId: null, basisPoints: 1000 }
		expect(await addPromotion({ ...off, startsOn: "2026-08-31", endsOn: "2026-09-01" })).toEqual({ ok: true })
		expect(await paid(TODAY)).toEqual([11_400, 10_830])
		expect(await paid("2026-08-20")).toEqual([10_000])
		expect(await paid("2026-08-31")).toEqual([9000])
		expect(await paid("2026-09-01")).toEqual([10_260, 9747])
		const listed = await findOwnPrices({ producerId, today: TODAY })
		expect([listed.own.length, listed.promotions.length]).toEqual([1, 1])
		const audit = await readProducer(producerId, (tx) => tx.select().from(auditEntries))
		expect(audit.map(({ action }) => action).toSorted()).toEqual(["add-promotion", "set-store-price"])
	})

	test("days before today and days out of order are refused, and change nothing", async () => {
		const { shop, productId, by, paid } = await openDesk()
		const own = { ...by, storeId: shop.storeId, productId, minCases: 1, cents: 1 }
		expect(await setStorePrice({ ...own, validFrom: "2026-08-12", validUntil: null })).toMatchObject({
			reason: "in-the-past",
		})
		expect(await setStorePrice({ ...own, validFrom: TODAY, validUntil: "2026-08-12" })).toMatchObject({
			reason: "days-out-of-order",
		})
		const off = { ...by, name: "None", productId, tierId: randomUUID(), basisPoints: 1000 }
		expect(await addPromotion({ ...off, startsOn: TODAY, endsOn: TODAY })).toMatchObject({ reason: "not-known" })
		expect(await paid(TODAY)).toEqual([11_400, 10_830])
	})

	test("a store with another tier pays that tier's prices from its next order on", async () => {
		const { producerId, shop, by, paid } = await openDesk()
		const tierId = randomUUID()
		await withProducer(producerId, (tx) => tx.insert(priceTiers).values({ producerId, id: tierId, name: "Kitchens" }))
		expect(await setStoreTier({ ...by, storeId: shop.storeId, tierId })).toEqual({ ok: true })
		expect(await paid(TODAY)).toEqual([])
		expect(await setStoreTier({ ...by, storeId: shop.storeId, tierId: shop.storeId })).toMatchObject({
			reason: "not-known",
		})
	})
})
