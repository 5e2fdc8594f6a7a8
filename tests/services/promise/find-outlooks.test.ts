import { eq } from "drizzle-orm"
import { expect, test } from "vitest"
import { expectedSupplies, lots, producerSettings, products } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { freeToPromise } from "~/domain/promise/free-to-promise"
import { findOutlooks } from "~/services/promise/find-outlooks.server"
import { addLot, place, standOnThursday } from "../desk/desk-steps"
import { addProduct, openStore, openYard, TUESDAY_18, type Yard } from "../orders/place-yard"

standOnThursday()

const TODAY = "2026-08-13"

/** Pieces free to promise for a product on each of these days. */
async function freeOn(yard: Yard, productId: string, ...days: Day[]): Promise<number[]> {
	const { producerId } = yard
	const outlooks = await readProducer(producerId, (tx) =>
		findOutlooks(tx, { producerId, today: TODAY, productIds: [productId] }),
	)
	const outlook = outlooks.get(productId)
	if (!outlook) throw new Error("every product has an outlook")
	return freeToPromise({ ...outlook, days }).map((on) => on.free)
}

async function change(yard: Yard, lotId: string, facts: Partial<typeof lots.$inferInsert>): Promise<void> {
	await withProducer(yard.producerId, (tx) => tx.update(lots).set(facts).where(eq(lots.id, lotId)))
}

test("a product of which nothing is known is there, with nothing free", async () => {
	const yard = await openYard()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	expect(await freeOn(yard, round, TUESDAY_18)).toEqual([0])
})

test("a released lot is free from today to its best-before, whether it lies ready or in the cold room", async () => {
	const yard = await openYard()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2026-08-20", ready: 12, coldRoom: 24 })
	expect(await freeOn(yard, round, TODAY, "2026-08-20", "2026-08-21")).toEqual([36, 36, 0])
})

test("a held lot counts from its expected release, and from today where that is past", async () => {
	const yard = await openYard()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const soon = await addLot(yard, {
		productId: round,
		code: "R1",
		bestBeforeOn: "2027-01-01",
		coldRoom: 24,
		state: "held",
	})
	await change(yard, soon, { expectedReleaseOn: "2026-08-20" })
	await addLot(yard, { productId: round, code: "R2", bestBeforeOn: "2027-01-01", coldRoom: 12, state: "held" })
	expect(await freeOn(yard, round, TODAY, "2026-08-19", "2026-08-20")).toEqual([12, 12, 36])
})

test("a withdrawn lot gives nothing, and culls are not sold as sections", async () => {
	const yard = await openYard()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const bad = await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2027-01-01", ready: 24 })
	await change(yard, bad, { state: "withdrawn" })
	const culls = await addLot(yard, { productId: round, code: "R2", bestBeforeOn: "2027-01-01", coldRoom: 40 })
	await change(yard, culls, { grade: "Culls" })
	expect(await freeOn(yard, round, TUESDAY_18)).toEqual([0])
})

test("the crop counts at its low figure, or at the likely one where the producer chose so, as long as its lots will keep", async () => {
	const yard = await openYard()
	const { producerId } = yard
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const crop = { lowPieces: 40, likelyPieces: 64, highPieces: 90 }
	await withProducer(producerId, (tx) =>
		tx.insert(expectedSupplies).values({ producerId, productId: round, expectedOn: "2026-08-24", ...crop }),
	)
	const settings = { bestBeforeDays: 30 }
	await withProducer(producerId, (tx) => tx.update(producerSettings).set(settings))
	// Thirty days from August 24 end on September 23.
	const days = ["2026-08-23", "2026-08-24", "2026-09-23", "2026-09-24"]
	expect(await freeOn(yard, round, ...days)).toEqual([0, 40, 40, 0])
	await withProducer(producerId, (tx) => tx.update(producerSettings).set({ cropFigure: "likely" }))
	expect(await freeOn(yard, round, ...days)).toEqual([0, 64, 64, 0])
})

test("promises are served from the lot that is over first, so that what keeps longer stays free for later days", async () => {
	const yard = await openYard()
	const shop = await openStore(yard)
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2026-08-20", ready: 36 })
	await addLot(yard, { productId: round, code: "R2", bestBeforeOn: "2027-01-01", ready: 24 })
	await place(shop, [round, 2])
	expect(await freeOn(yard, round, TUESDAY_18, "2026-08-25")).toEqual([36, 24])
	await withProducer(yard.producerId, (tx) =>
		tx.update(products).set({ reservePieces: 12 }).where(eq(products.id, round)),
	)
	expect(await freeOn(yard, round, TUESDAY_18, "2026-08-25")).toEqual([24, 12])
})

test("no other product's lots or promises are in an outlook", async () => {
	const yard = await openYard()
	const shop = await openStore(yard)
	const round = await addProduct(yard, { code: "11", readyCases: 3 })
	const comb = await addProduct(yard, { code: "41", readyCases: 5 })
	await place(shop, [comb, 4])
	expect(await freeOn(yard, round, TUESDAY_18)).toEqual([36])
	expect(await freeOn(yard, comb, TUESDAY_18)).toEqual([12])
})
