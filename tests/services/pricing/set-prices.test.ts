import { eq } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { auditEntries, prices } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"
import { previewPriceList } from "~/services/pricing/preview-price-list.server"
import { setPrices } from "~/services/pricing/set-prices.server"
import { addProduct, openStore, openYard, THURSDAY } from "../orders/place-yard"

const TODAY = "2026-08-13"

async function openDesk() {
	const yard = await openYard()
	const { person } = await openStore(yard)
	const productId = await addProduct(yard, { code: "11", readyCases: 0 })
	const about = { producerId: yard.producerId, personId: person.id, now: THURSDAY, today: TODAY }
	const price = { productId, tierId: yard.tierId, minCases: 1, cents: 12_000, validFrom: TODAY, oldCents: 11_400 }
	return { ...yard, about, price }
}

const rowsOf = (producerId: string) =>
	readProducer(producerId, (tx) =>
		tx
			.select({ minCases: prices.minCases, caseCents: prices.caseCents, validFrom: prices.validFrom })
			.from(prices)
			.where(eq(prices.producerId, producerId))
			.orderBy(prices.minCases, prices.validFrom),
	)

describe("setting prices", () => {
	test("a new price stands beside the one before, is recorded, and set again on its day is replaced", async () => {
		const { producerId, about, price } = await openDesk()
		expect(await setPrices({ ...about, prices: [price] })).toEqual({ ok: true, set: 1 })
		expect(await setPrices({ ...about, prices: [{ ...price, cents: 12_100, oldCents: 12_000 }] })).toEqual({
			ok: true,
			set: 1,
		})
		expect(await rowsOf(producerId)).toEqual([
			{ minCases: 1, caseCents: 11_400, validFrom: "2026-01-01" },
			{ minCases: 1, caseCents: 12_100, validFrom: TODAY },
			{ minCases: 3, caseCents: 10_830, validFrom: "2026-01-01" },
		])
		const audit = await readProducer(producerId, (tx) => tx.select().from(auditEntries))
		expect(audit.map(({ action, subjectType }) => [action, subjectType])).toEqual(
			Array(2).fill(["set-prices", "product"]),
		)
	})

	test("nothing is set where one price is not what was seen, begins before today, or names nothing known", async () => {
		const { producerId, about, price } = await openDesk()
		const before = await rowsOf(producerId)
		const other = { ...price, minCases: 3, cents: 10_000, oldCents: 10_830 }
		const set = (bad: typeof price) => setPrices({ ...about, prices: [other, bad] })
		expect(await set({ ...price, oldCents: 11_000 })).toEqual({ ok: false, reason: "prices-changed" })
		expect(await set({ ...price, validFrom: "2026-08-12" })).toEqual({ ok: false, reason: "in-the-past" })
		expect(await set({ ...price, tierId: producerId })).toEqual({ ok: false, reason: "not-known" })
		expect(await rowsOf(producerId)).toEqual(before)
	})

	test("a list with semicolons and decimal commas is shown before it is applied, and then refuses a second time", async () => {
		const { producerId, about } = await openDesk()
		const file = new File(
			["code;tier;min cases;case price\r\n11;Shops;1;$1.118,50\r\n11;Shops;3;108,30\r\n"],
			"list.csv",
		)
		const read = await previewPriceList({ producerId, file, today: TODAY })
		if (!read.ok) throw new Error(read.reason)
		expect(read.preview.changes.map(({ kind, oldCents, cents }) => [kind, oldCents, cents])).toEqual([
			["changed", 11_400, 111_850],
			["unchanged", 10_830, 10_830],
		])
		const list = { ...about, prices: read.preview.changes }
		expect(await setPrices(list)).toEqual({ ok: true, set: 1 })
		expect(await setPrices(list)).toEqual({ ok: false, reason: "prices-changed" })
	})
})
