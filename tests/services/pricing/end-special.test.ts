import { randomUUID } from "node:crypto"
import { eq } from "drizzle-orm"
import { expect, test } from "vitest"
import { auditEntries } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"
import { endPromotion, endStorePrice } from "~/services/pricing/end-special.server"
import { findOwnPrices } from "~/services/pricing/find-own-prices.server"
import { findStorePrices } from "~/services/pricing/find-store-prices.server"
import { addPromotion, setStorePrice } from "~/services/pricing/set-store-terms.server"
import { addHand } from "../desk/desk-steps"
import { addProduct, openStore, openYard, THURSDAY } from "../orders/place-yard"

const MONDAY = "2026-08-10"
const TODAY = "2026-08-13"

async function yardWithSpecials() {
	const yard = await openYard()
	const shop = await openStore(yard)
	const productId = await addProduct(yard, { code: "11", readyCases: 0 })
	const by = { producerId: yard.producerId, personId: await addHand(), now: THURSDAY }
	const priceOn = (today: string) =>
		readProducer(yard.producerId, async (tx) => {
			const [product] = await findStorePrices(tx, { ...by, storeId: shop.storeId, today })
			return product?.breaks[0]?.caseCents
		})
	const listed = () => findOwnPrices({ producerId: yard.producerId, today: TODAY })
	return { shop, productId, by, priceOn, listed }
}

test("a store's own price that has begun ends yesterday, and its tier's price holds again from today", async () => {
	const { shop, productId, by, priceOn, listed } = await yardWithSpecials()
	const own = { storeId: shop.storeId, productId, minCases: 1, cents: 9900, validUntil: null }
	expect(await setStorePrice({ ...by, ...own, today: MONDAY, validFrom: MONDAY })).toEqual({ ok: true })
	const id = (await listed()).own[0]?.id ?? ""
	expect(await priceOn(TODAY)).toBe(9900)
	expect(await endStorePrice({ ...by, today: TODAY, id })).toEqual({ ok: true })
	expect([await priceOn("2026-08-12"), await priceOn(TODAY)]).toEqual([9900, 11_400])
	expect((await listed()).own).toEqual([])
	expect(await endStorePrice({ ...by, today: TODAY, id })).toEqual({ ok: false, reason: "not-known" })
	const trail = await readProducer(by.producerId, (tx) =>
		tx.select({ detail: auditEntries.detail }).from(auditEntries).where(eq(auditEntries.action, "end-store-price")),
	)
	expect(trail).toMatchObject([{ detail: { id, case_cents: 9900, valid_from: MONDAY } }])
})

test("one that has not begun is taken off, and the one before it stays", async () => {
	const { shop, productId, by, priceOn, listed } = await yardWithSpecials()
	const own = { storeId: shop.storeId, productId, minCases: 1, validUntil: null, today: MONDAY }
	await setStorePrice({ ...by, ...own, cents: 9900, validFrom: MONDAY })
	await setStorePrice({ ...by, ...own, cents: 9000, validFrom: "2026-09-01" })
	const coming = (await listed()).own.find(({ validFrom }) => validFrom === "2026-09-01")
	expect(await endStorePrice({ ...by, today: TODAY, id: coming?.id ?? "" })).toEqual({ ok: true })
	expect(await priceOn("2026-09-01")).toBe(9900)
})

test("a promotion ends, and no other producer's does", async () => {
	const { productId, by, priceOn, listed } = await yardWithSpecials()
	const days = { startsOn: MONDAY, endsOn: "2026-08-31" }
	await addPromotion({
		...by,
		today: MONDAY,
		name: "First harvest",
		productId,
		tierId: null,
		basisPoints: 1000,
		...days,
	})
	expect(await priceOn(TODAY)).toBe(10_260)
	const id = (await listed()).promotions[0]?.id ?? ""
	const other = await openYard()
	const refused = { ok: false, reason: "not-known" }
	expect(await endPromotion({ ...by, producerId: other.producerId, today: TODAY, id })).toEqual(refused)
	expect(await endPromotion({ ...by, today: TODAY, id: randomUUID() })).toEqual(refused)
	expect(await endPromotion({ ...by, today: TODAY, id })).toEqual({ ok: true })
	expect([await priceOn("2026-08-12"), await priceOn(TODAY)]).toEqual([10_260, 11_400])
})
