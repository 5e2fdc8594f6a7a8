import { eq } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { prices, products, storePrices } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { drawPriceList } from "~/services/pricing/draw-price-list.server"
import { findStoreList, findTierList } from "~/services/pricing/find-priced-list.server"
import { writePriceCsv } from "~/services/pricing/write-price-csv.server"
import { addProduct, openStore, openYard } from "../orders/place-yard"

const DAY = "2026-08-13"

describe("a price list that is handed out", () => {
	test("as a file has one line for each break, and no cell that a spreadsheet would take for a formula", async () => {
		const yard = await openYard()
		const { producerId, tierId } = yard
		const odd = await addProduct(yard, { code: "11", readyCases: 0 })
		const frame = await addProduct(yard, { code: "61", readyCases: 0 })
		await withProducer(producerId, async (tx) => {
			await tx.update(products).set({ name: "=HYPERLINK(1)" }).where(eq(products.id, odd))
			await tx.update(products).set({ pricedBy: "weight" }).where(eq(products.id, frame))
			await tx.update(prices).set({ poundCents: 125_000 }).where(eq(prices.productId, frame))
		})
		const list = await findTierList({ producerId, tierId, day: DAY })
		if (!list) throw new Error("no list")
		expect(writePriceCsv(list).split("\r\n")).toEqual([
			"\uFEFFcode,product,detail,pieces per case,tier,min cases,case price,price per lb",
			`11,"'=HYPERLINK(1)","Fancy, 8 oz",12,Shops,1,114.00,`,
			`11,"'=HYPERLINK(1)","Fancy, 8 oz",12,Shops,3,108.30,`,
			`61,Round section 61,"Fancy, 8 oz",12,Shops,1,,1250.00`,
			`61,Round section 61,"Fancy, 8 oz",12,Shops,3,,1250.00`,
			"",
		])
		expect(await findTierList({ producerId, tierId: producerId, day: DAY })).toBe(null)
	})

	test("of a store shows its own price, and is drawn for paper", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const { producerId } = yard
		const productId = await addProduct(yard, { code: "11", readyCases: 0 })
		await withProducer(producerId, (tx) =>
			tx
				.insert(storePrices)
				.values({ producerId, storeId: shop.storeId, productId, caseCents: 9900, validFrom: "2026-08-01" }),
		)
		const store = { id: shop.storeId, name: "Pantry & Plume" }
		const list = await findStoreList({ producerId, store, day: DAY })
		expect(list?.products.map(({ code, breaks }) => [code, breaks])).toEqual([
			["11", [{ minCases: 1, caseCents: 9900, poundCents: null }]],
		])
		if (!list) throw new Error("no list")
		const pdf = await drawPriceList(list)
		expect(new TextDecoder().decode(pdf.slice(0, 5))).toBe("%PDF-")
	})
})
