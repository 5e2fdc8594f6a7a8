import { eq, sql } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { cropForecasts, expectedSupplies, supers } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { addDays, type Day } from "~/domain/calendar"
import { refreshExpected } from "~/services/crop/refresh-expected.server"
import { addProduct, openYard, type Yard } from "../orders/place-yard"
import { addHives, addSuper } from "./crop-rows"

const TODAY = "2026-08-13"

const refresh = (yard: Yard, today: Day = TODAY, productIds?: string[]) =>
	withProducer(yard.producerId, (tx) =>
		refreshExpected(tx, { producerId: yard.producerId, today, ...(productIds ? { productIds } : {}) }),
	)

const expectedOf = (yard: Yard) =>
	withProducer(yard.producerId, (tx) =>
		tx
			.select({
				on: expectedSupplies.expectedOn,
				low: expectedSupplies.lowPieces,
				likely: expectedSupplies.likelyPieces,
				high: expectedSupplies.highPieces,
			})
			.from(expectedSupplies)
			.orderBy(expectedSupplies.expectedOn),
	)

const forecastsOf = (yard: Yard) =>
	withProducer(yard.producerId, (tx) =>
		tx
			.select({
				week: cropForecasts.weekOn,
				made: cropForecasts.madeOn,
				likely: cropForecasts.likelyPieces,
			})
			.from(cropForecasts)
			.orderBy(cropForecasts.madeOn, cropForecasts.weekOn),
	)

async function yardWithProduct(hiveCount = 2) {
	const yard = await openYard()
	const productId = await addProduct(yard, { code: "11", readyCases: 0 })
	const { hiveIds } = await addHives(yard, { count: hiveCount })
	return { yard, productId, hiveIds: hiveIds as [string, ...string[]] }
}

describe("what should come off the hives", () => {
	test("is one row for a product and day, from the checks and common practice where there is no record", async () => {
		const { yard, productId, hiveIds } = await yardWithProduct()
		const looks = [
			{ on: "2026-08-03", filled: 80, capped: 20 },
			{ on: "2026-08-13", filled: 100, capped: 70 },
		]
		for (const hiveId of hiveIds) await addSuper(yard, { hiveId, productId, looks })
		await refresh(yard)
		// 5 % a day brings 70 % to 90 % in four days. Two supers of 40 at 0.85, 0.92 and 0.98.
		expect(await expectedOf(yard)).toEqual([{ on: "2026-08-17", low: 68, likely: 74, high: 79 }])
		expect(await forecastsOf(yard)).toEqual([{ week: "2026-08-17", made: TODAY, likely: 74 }])
	})

	test("leans on the producer's own supers as far as there are enough of them", async () => {
		const { yard, productId, hiveIds } = await yardWithProduct()
		const [hiveId] = hiveIds
		const looks = [{ on: "2026-08-12", filled: 100, capped: 95 }]
		for (let k = 0; k < 10; k++) {
			await addSuper(yard, {
				hiveId,
				productId,
				setOn: "2025-06-01",
				looks: [{ on: "2025-07-01", filled: 100, capped: 90 }],
				off: { on: "2025-07-02", finished: 20 },
			})
		}
		await addSuper(yard, { hiveId, productId, looks })
		await refresh(yard)
		// Half own (20 of 40), half common practice: 0.5 x 0.5 + 0.5 x 0.92 = 0.71 of 40.
		expect(await expectedOf(yard)).toEqual([{ on: "2026-08-14", low: 27, likely: 28, high: 30 }])
	})

	test("is worked out anew each time, and another product's rows are left alone", async () => {
		const { yard, productId, hiveIds } = await yardWithProduct()
		const other = await addProduct(yard, { code: "21", readyCases: 0 })
		const superId = await addSuper(yard, { hiveId: hiveIds[0], productId, setOn: TODAY })
		await addSuper(yard, { hiveId: hiveIds[0], productId: other, setOn: TODAY, level: 2 })
		await refresh(yard)
		expect(await expectedOf(yard)).toHaveLength(2)
		await withProducer(yard.producerId, (tx) =>
			tx.update(supers).set({ state: "off", offOn: TODAY, finishedPieces: 0 }).where(eq(supers.id, superId)),
		)
		await refresh(yard, TODAY, [productId])
		expect(await expectedOf(yard)).toHaveLength(1)
		const left = await withProducer(yard.producerId, (tx) =>
			tx.execute(sql`select product_id from expected_supplies where producer_id = ${yard.producerId}`),
		)
		expect(left.rows).toEqual([{ product_id: other }])
	})

	test("keeps each day's forecast, and writes over an earlier one of the same day", async () => {
		const { yard, productId, hiveIds } = await yardWithProduct()
		const superId = await addSuper(yard, { hiveId: hiveIds[0], productId, setOn: TODAY })
		await refresh(yard)
		await refresh(yard)
		expect(await forecastsOf(yard)).toEqual([{ week: "2026-08-31", made: TODAY, likely: 20 }])
		await withProducer(yard.producerId, (tx) =>
			tx.update(supers).set({ state: "clearing", clearingOn: TODAY }).where(eq(supers.id, superId)),
		)
		await refresh(yard)
		expect(await forecastsOf(yard)).toEqual([
			{ week: "2026-08-10", made: TODAY, likely: 20 },
			{ week: "2026-08-31", made: TODAY, likely: 0 },
		])
		await refresh(yard, addDays(TODAY, 7))
		expect((await forecastsOf(yard)).at(-1)).toEqual({ week: "2026-08-17", made: "2026-08-20", likely: 20 })
	})

	test("is nothing for a yard without supers", async () => {
		const yard = await openYard()
		await refresh(yard)
		expect(await expectedOf(yard)).toEqual([])
	})
})
