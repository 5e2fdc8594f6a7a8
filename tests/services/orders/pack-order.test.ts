import { expect, test } from "vitest"
import { findPacking } from "~/services/desk/find-packing.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { packOrder } from "~/services/orders/pack-order.server"
import { addHand, addLot, orderAt, place, producerOf, standOnThursday, whereIs } from "../desk/desk-steps"
import { addProduct, openStore, openYard, TUESDAY_18 } from "./place-yard"

standOnThursday()

test("packing takes the lot with the earliest best-before first, and the ready shelf before the cold room", async () => {
	const yard = await openYard()
	const shop = await openStore(yard)
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const later = await addLot(yard, { productId: round, code: "R2", bestBeforeOn: "2027-03-01", ready: 48 })
	const sooner = await addLot(yard, {
		productId: round,
		code: "R1",
		bestBeforeOn: "2027-01-01",
		ready: 6,
		coldRoom: 12,
	})
	const tooOld = await addLot(yard, { productId: round, code: "R0", bestBeforeOn: "2026-08-17", ready: 48 })
	const number = await place(shop, [round, 2])
	await confirmOrder({ producer: producerOf(yard), number, personId, given: [] })

	const proposed = await findPacking({ producerId: yard.producerId, day: null })
	expect(proposed.day).toBe(TUESDAY_18)
	expect(proposed.picks.map(({ place, lotCode, pieces }) => [place, lotCode, pieces])).toEqual([
		["ready", "R1", 6],
		["ready", "R2", 6],
		["cold-room", "R1", 12],
	])

	expect(await packOrder({ producerId: yard.producerId, number, personId })).toEqual({ ok: true })
	expect((await orderAt(yard, number)).lines[0]?.lots).toEqual([
		{ code: "R1", pieces: 18 },
		{ code: "R2", pieces: 6 },
	])
	expect(await whereIs(yard, sooner)).toBe("packed 18")
	expect(await whereIs(yard, later)).toBe("packed 6, ready 42")
	expect(await whereIs(yard, tooOld)).toBe("ready 48")
	const packing = await findPacking({ producerId: yard.producerId, day: TUESDAY_18 })
	expect(packing.picks).toEqual([])
	expect(packing.orders[0]?.lines[0]).toMatchObject({ missingPieces: 0, lots: [{ code: "R1" }, { code: "R2" }] })
})

test("an order that the released lots cannot fill is not packed, and nothing is moved", async () => {
	const yard = await openYard()
	const shop = await openStore(yard)
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const comb = await addProduct(yard, { code: "41", readyCases: 5 })
	const released = await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2027-01-01", ready: 12 })
	// Promised on the word that it will be released in time.
	await addLot(yard, { productId: round, code: "R2", bestBeforeOn: "2027-02-01", coldRoom: 24, state: "held" })
	const number = await place(shop, [comb, 1], [round, 3])
	await confirmOrder({ producer: producerOf(yard), number, personId, given: [] })
	expect(await packOrder({ producerId: yard.producerId, number, personId })).toEqual({
		ok: false,
		reason: "lots-too-few",
		productName: "Round section 11",
		missingPieces: 24,
	})
	expect(await whereIs(yard, released)).toBe("ready 12")
	expect(await orderAt(yard, number)).toMatchObject({ state: "confirmed" })
	const packing = await findPacking({ producerId: yard.producerId, day: null })
	expect(packing.orders[0]?.lines.map((line) => line.missingPieces)).toEqual([24, 0])
})

test("an order is packed once when two hands pack it at the same moment", async () => {
	const yard = await openYard()
	const shop = await openStore(yard)
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const lot = await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2027-01-01", ready: 48 })
	const number = await place(shop, [round, 2])
	await confirmOrder({ producer: producerOf(yard), number, personId, given: [] })
	const pack = { producerId: yard.producerId, number, personId }
	const answers = await Promise.all([packOrder(pack), packOrder(pack)])
	expect(answers.filter(({ ok }) => ok)).toHaveLength(1)
	expect(await whereIs(yard, lot)).toBe("packed 24, ready 24")
})

test("two orders that want the last pieces of a lot are packed one after the other, and never below zero", async () => {
	const yard = await openYard()
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const lot = await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2027-01-01", ready: 24 })
	const held = await addLot(yard, {
		productId: round,
		code: "R2",
		bestBeforeOn: "2027-02-01",
		coldRoom: 24,
		state: "held",
	})
	const numbers = [await place(await openStore(yard), [round, 2]), await place(await openStore(yard), [round, 2])]
	for (const number of numbers) await confirmOrder({ producer: producerOf(yard), number, personId, given: [] })
	const answers = await Promise.all(
		numbers.map((number) => packOrder({ producerId: yard.producerId, number, personId })),
	)
	expect(answers.filter(({ ok }) => ok)).toHaveLength(1)
	expect(answers).toContainEqual(expect.objectContaining({ reason: "lots-too-few", missingPieces: 24 }))
	expect([await whereIs(yard, lot), await whereIs(yard, held)]).toEqual(["packed 24", "cold-room 24"])
})
