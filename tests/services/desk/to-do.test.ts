import { eq } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { exemptionCertificates, lots, stripeDifferences } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { confirmWhole, undoWhole } from "~/services/desk/confirm-whole.server"
import { findDeskFortnight } from "~/services/desk/find-desk-fortnight.server"
import { findToDo } from "~/services/desk/find-to-do.server"
import { addProduct, openStore, openYard, THURSDAY, TUESDAY_18, type Yard, ZONE } from "../orders/place-yard"
import { addInvoice } from "../payments/paying"
import { addHand, addLot, orderAt, packed, place, producerOf, standOnThursday } from "./desk-steps"

standOnThursday()

const toDoOf = (yard: Yard) => findToDo({ producerId: yard.producerId, now: THURSDAY, zone: ZONE })

describe("what is to do", () => {
	test("orders wait by delivery day, those that can be met in full marked, with their last orders", async () => {
		const yard = await openYard()
		const scarce = await addProduct(yard, { code: "11", readyCases: 5 })
		const first = await place(await openStore(yard), [scarce, 3])
		const second = await place(await openStore(yard), [scarce, 9])
		const third = await place(await openStore(yard), [scarce, 2])
		const { waiting, shortages } = await toDoOf(yard)
		expect(waiting).toHaveLength(1)
		expect(waiting[0]).toMatchObject({ deliveryOn: TUESDAY_18, cutoffAt: new Date("2026-08-14T16:00:00Z") })
		expect(waiting[0]?.orders.map(({ order, isWhole }) => [order.number, isWhole])).toEqual([
			[first, true],
			[second, false],
			[third, true],
		])
		expect(shortages).toMatchObject([{ deliveryOn: TUESDAY_18, toShareCases: 9, stores: 1, shortCases: 9 }])
	})

	test("of two orders that want the same cases shared out, only the earlier is marked as one that can be met", async () => {
		const yard = await openYard()
		const scarce = await addProduct(yard, { code: "11", readyCases: 0 })
		const first = await place(await openStore(yard), [scarce, 3])
		const second = await place(await openStore(yard), [scarce, 3])
		// Comes off the hives after both were placed.
		await addLot(yard, { productId: scarce, code: "R1", bestBeforeOn: "2027-02-01", ready: 4 * 12 })
		const { waiting } = await toDoOf(yard)
		expect(waiting[0]?.orders.map(({ order, isWhole }) => [order.number, isWhole])).toEqual([
			[first, true],
			[second, false],
		])
	})

	test("all that can be met is confirmed by one press, and the rest is left as it was", async () => {
		const yard = await openYard()
		const personId = await addHand()
		const scarce = await addProduct(yard, { code: "11", readyCases: 5 })
		const first = await place(await openStore(yard), [scarce, 3])
		const second = await place(await openStore(yard), [scarce, 9])
		const press = { producer: producerOf(yard), personId, day: TUESDAY_18 }
		expect(await confirmWhole(press)).toEqual({ confirmed: 1, left: 1, more: 0 })
		expect(await confirmWhole(press)).toEqual({ confirmed: 0, left: 1, more: 0 })
		expect(await orderAt(yard, first)).toMatchObject({ state: "confirmed" })
		expect(await orderAt(yard, second)).toMatchObject({ state: "placed" })
		expect((await toDoOf(yard)).settled.undoable).toMatchObject([{ number: first, storeName: "Pantry & Plume" }])
	})

	test("all that was just confirmed is taken back by one press, while no letter has gone", async () => {
		const yard = await openYard()
		const personId = await addHand()
		const round = await addProduct(yard, { code: "11", readyCases: 9 })
		const numbers = [await place(await openStore(yard), [round, 3]), await place(await openStore(yard), [round, 2])]
		const desk = { producer: producerOf(yard), personId }
		expect(await confirmWhole({ ...desk, day: TUESDAY_18 })).toEqual({ confirmed: 2, left: 0, more: 0 })
		expect(await undoWhole(desk)).toBe(2)
		for (const number of numbers) expect(await orderAt(yard, number)).toMatchObject({ state: "placed" })
		expect(await undoWhole(desk)).toBe(0)
	})

	test("packing, held lots and invoices past their day are there, each with its figures", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const personId = await addHand()
		const round = await addProduct(yard, { code: "11", readyCases: 20 })
		await addLot(yard, { productId: round, code: "R2", bestBeforeOn: "2027-02-01", coldRoom: 30, state: "held" })
		await packed(yard, shop, personId, [round, 2])
		await addInvoice(yard, shop, { sequence: 901, totalCents: 5_000, dueOn: "2026-08-12" })
		await addInvoice(yard, shop, { sequence: 902, totalCents: 5_000, dueOn: "2026-08-13" })
		const { packing, heldLots, overdue, waiting } = await toDoOf(yard)
		expect(waiting).toEqual([])
		expect(packing).toEqual([{ deliveryOn: TUESDAY_18, orders: 1, packedOrders: 1, cases: 2, packedCases: 2 }])
		expect(heldLots).toMatchObject([{ code: "R2", pieces: 30, cases: 2 }])
		expect(overdue).toEqual([
			{ number: "2026-0901", storeName: "Pantry & Plume", dueOn: "2026-08-12", openCents: 5_000 },
		])
	})

	test("a promise that supply no longer covers is short on its day", async () => {
		const yard = await openYard()
		const round = await addProduct(yard, { code: "11", readyCases: 0 })
		const lot = { productId: round, code: "R1", bestBeforeOn: "2027-02-01", ready: 36 }
		await addLot(yard, lot)
		await place(await openStore(yard), [round, 3])
		expect((await toDoOf(yard)).shortages).toEqual([])
		await withdraw(yard)
		expect((await toDoOf(yard)).shortages).toMatchObject([{ overPromisedCases: 3, shortCases: 3 }])
	})
})

test("what stores wait for and what stands otherwise at Stripe is to do as well", async () => {
	const yard = await openYard()
	const { producerId } = yard
	const { storeId, person } = await openStore(yard)
	expect(await toDoOf(yard)).toMatchObject({ reports: [], toLookAt: [], differences: 0 })
	await withProducer(producerId, async (tx) => {
		await tx.insert(exemptionCertificates).values({
			producerId,
			storeId,
			number: "RC-1",
			validUntil: "2027-06-30",
			fileName: "certificate.pdf",
			mediaType: "application/pdf",
			content: Buffer.from("%PDF-"),
			handedInBy: person.id,
		})
		await tx.insert(stripeDifferences).values({ producerId, kind: "missing-here", stripeId: "pi_1", theirCents: 100 })
	})
	expect(await toDoOf(yard)).toMatchObject({
		toLookAt: [{ kind: "certificate-waits", storeName: "Pantry & Plume", on: "2027-06-30" }],
		differences: 1,
	})
})

async function withdraw(yard: Yard): Promise<void> {
	await withProducer(yard.producerId, (tx) =>
		tx.update(lots).set({ state: "withdrawn" }).where(eq(lots.producerId, yard.producerId)),
	)
}

test("the desk's fortnight counts what all stores are promised, what is free and what is short", async () => {
	const yard = await openYard()
	const round = await addProduct(yard, { code: "11", readyCases: 5 })
	await place(await openStore(yard), [round, 3])
	await place(await openStore(yard), [round, 4])
	const days = await findDeskFortnight({ producerId: yard.producerId, now: THURSDAY, zone: ZONE })
	expect(days).toHaveLength(14)
	expect(days.filter(({ delivery }) => delivery).map(({ on }) => on)).toEqual([
		"2026-08-14",
		"2026-08-18",
		"2026-08-21",
		"2026-08-25",
	])
	expect(days.find(({ on }) => on === TUESDAY_18)).toMatchObject({ promisedCases: 3, freeCases: 2, shortCases: 2 })
})
