import { randomUUID } from "node:crypto"
import { expect, test } from "vitest"
import { harvests, hives, lots, supers, yards } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { sendOrder } from "~/services/orders/send-order.server"
import { findBackwardTrace, findOrderTrace } from "~/services/trace/find-backward-trace.server"
import { findForwardTrace } from "~/services/trace/find-forward-trace.server"
import { runDrill } from "~/services/trace/run-drill.server"
import { addHand, addLot, packed, producerOf, standOnThursday } from "../desk/desk-steps"
import { addProduct, openStore, openYard, TUESDAY_18, type Yard, ZONE } from "../orders/place-yard"
import { makeLotFrom } from "./trace-steps"

standOnThursday()

/** A lot of 96, of which 36 were split off and 24 cut up into 40 pieces; each went to another store. */
async function sellThroughFamily() {
	const yard = await openYard()
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const cut = await addProduct(yard, { code: "41", readyCases: 0 })
	const mother = await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2027-01-01", ready: 96 })
	await makeLotFrom(yard, { fromLotId: mother, code: "R1b", productId: round, kind: "split", pieces: 36 })
	await makeLotFrom(yard, { fromLotId: mother, code: "C1", productId: cut, kind: "cut-up", pieces: 24, piecesMade: 40 })
	const stores = [await openStore(yard), await openStore(yard)] as const
	const first = await packed(yard, stores[0], personId, [round, 5])
	const second = await packed(yard, stores[1], personId, [cut, 2])
	await sendOrder({ producer: producerOf(yard), number: first, personId })
	return { yard, personId, mother, first, second, round }
}

test("a trace forward finds every store, also through a split and through what was cut up", async () => {
	const { yard, first, second } = await sellThroughFamily()
	const trace = await findForwardTrace({ producerId: yard.producerId, code: "R1" })
	expect(trace?.lots.map(({ code }) => code)).toEqual(["R1", "C1", "R1b"])
	expect(trace?.links.map(({ from, to, kind, pieces, piecesMade }) => [from, to, kind, pieces, piecesMade])).toEqual([
		["R1", "R1b", "split", 36, 36],
		["R1", "C1", "cut-up", 24, 40],
	])
	expect(trace?.orders.map(({ number, lot, pieces, state }) => [number, lot, pieces, state])).toEqual([
		[first, "R1", 36, "sent"],
		[first, "R1b", 24, "sent"],
		[second, "C1", 24, "packed"],
	])
	expect(trace?.orders.every(({ deliveryOn }) => deliveryOn === TUESDAY_18)).toBe(true)
	const cut = trace?.lots.find(({ code }) => code === "C1")
	expect(cut?.places.toSorted((a, b) => a.pieces - b.pieces)).toEqual([
		{ place: "ready", pieces: 16 },
		{ place: "packed", pieces: 24 },
	])
	// What came from it only, not what it came from.
	expect((await findForwardTrace({ producerId: yard.producerId, code: "C1" }))?.lots.map(({ code }) => code)).toEqual([
		"C1",
	])
	expect(await findForwardTrace({ producerId: yard.producerId, code: "R9" })).toBeNull()
})

async function addHarvest(yard: Yard, lotId: string, productId: string): Promise<void> {
	const { producerId } = yard
	const [yardId, hiveId, harvestId] = [randomUUID(), randomUUID(), randomUUID()]
	await withProducer(producerId, async (tx) => {
		await tx.insert(yards).values({ producerId, id: yardId, name: "Canal Bank" })
		await tx.insert(hives).values({ producerId, id: hiveId, yardId, label: "12" })
		await tx.insert(harvests).values({ producerId, id: harvestId, harvestedOn: "2026-07-01", note: "after the flow" })
		await tx.insert(supers).values({
			producerId,
			hiveId,
			productId,
			setOn: "2026-05-20",
			state: "off",
			offOn: "2026-07-01",
			finishedPieces: 38,
			harvestId,
		})
		await tx.update(lots).set({ harvestId, yard: "Canal Bank" })
	})
	expect(lotId).toBeTruthy()
}

test("a trace backward goes from a cut piece to the hive its super stood on", async () => {
	const { yard, mother, round, second } = await sellThroughFamily()
	await addHarvest(yard, mother, round)
	const trace = await findBackwardTrace({ producerId: yard.producerId, zone: ZONE, code: "C1" })
	expect(trace?.lots.map(({ code }) => code)).toEqual(["C1", "R1"])
	expect(trace?.lots[1]).toMatchObject({
		yard: "Canal Bank",
		harvestNote: "after the flow",
		supers: [{ hive: "12", yard: "Canal Bank", setOn: "2026-05-20", offOn: "2026-07-01", finishedPieces: 38 }],
		release: null,
	})
	const order = await findOrderTrace({ producerId: yard.producerId, zone: ZONE, number: second })
	expect(order?.packed).toEqual([{ productName: "Round section 41", lot: "C1", pieces: 24 }])
	expect(order?.lots.map(({ code }) => code)).toEqual(["C1", "R1"])
	expect(await findOrderTrace({ producerId: yard.producerId, zone: ZONE, number: 999_999 })).toBeNull()
})

test("a drill by lot or by order number finds that every piece is accounted for", async () => {
	const { yard, first } = await sellThroughFamily()
	const drill = await runDrill({ producerId: yard.producerId, asked: " r1 " })
	expect(drill?.faults).toEqual([])
	expect(drill?.orderNumber).toBeNull()
	expect(
		drill?.lots.map(({ code, harvested, out, inHand, cutUp, otherLots, isBalanced }) => [
			code,
			harvested,
			out,
			inHand,
			cutUp,
			otherLots,
			isBalanced,
		]),
	).toEqual([
		["R1", 96, 36, 0, 24, 36, true],
		["C1", 40, 0, 40, 0, 0, true],
		["R1b", 36, 24, 12, 0, 0, true],
	])
	const byOrder = await runDrill({ producerId: yard.producerId, asked: String(first) })
	expect(byOrder?.orderNumber).toBe(first)
	expect(byOrder?.lots.map(({ code }) => code).toSorted()).toEqual(["C1", "R1", "R1b"])
	expect(await runDrill({ producerId: yard.producerId, asked: "nothing of the kind" })).toBeNull()
})

test("another producer's lots and orders are not found", async () => {
	const { first } = await sellThroughFamily()
	const other = await openYard()
	expect(await findForwardTrace({ producerId: other.producerId, code: "R1" })).toBeNull()
	expect(await runDrill({ producerId: other.producerId, asked: String(first) })).toBeNull()
})
