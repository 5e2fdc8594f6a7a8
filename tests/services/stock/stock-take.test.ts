import { randomUUID } from "node:crypto"
import { expect, test } from "vitest"
import { findCountSheet, listPlacesToCount } from "~/services/stock/find-count-sheet.server"
import { findStockTake, listStockTakes } from "~/services/stock/find-stock-take.server"
import { movePieces } from "~/services/stock/move-pieces.server"
import { postStockTake } from "~/services/stock/post-stock-take.server"
import { addHand, addLot, standOnThursday, whereIs } from "../desk/desk-steps"
import { addProduct, openYard } from "../orders/place-yard"
import { harvestedAndPlaced } from "./lot-books"

standOnThursday()

const NO_REF = "00000000-0000-0000-0000-000000000000"

async function twoLots() {
	const yard = await openYard()
	const { producerId } = yard
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const first = await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2027-01-01", ready: 24 })
	const second = await addLot(yard, {
		productId: round,
		code: "R2",
		bestBeforeOn: "2027-02-01",
		ready: 12,
		coldRoom: 40,
	})
	const take = {
		producerId,
		personId,
		place: "ready" as const,
		ref: NO_REF,
		takenOn: "2026-08-13",
		placeWords: "the ready shelf",
		idempotencyKey: randomUUID(),
	}
	const count = (counts: Record<string, [counted: number, shown: number]>) =>
		postStockTake({
			...take,
			lines: Object.entries(counts).map(([lotId, [counted, shown]]) => ({ lotId, counted, shown, reason: "" })),
		})
	return { yard, producerId, personId, first, second, take, count }
}

test("a place is counted by the lots that the ledger has there, the earliest best-before first", async () => {
	const { producerId, first, second } = await twoLots()
	expect(await listPlacesToCount(producerId)).toEqual([
		{ place: "cold-room", ref: NO_REF, of: null, lots: 1, pieces: 40 },
		{ place: "ready", ref: NO_REF, of: null, lots: 2, pieces: 36 },
	])
	const sheet = await findCountSheet({ producerId, place: "ready", ref: NO_REF })
	expect(sheet?.lots.map(({ lotId, ledger }) => [lotId, ledger])).toEqual([
		[first, 24],
		[second, 12],
	])
	const withNamed = await findCountSheet({ producerId, place: "cold-room", ref: NO_REF, codes: ["R1"] })
	expect(withNamed?.lots.map(({ code, ledger }) => [code, ledger])).toEqual([
		["R1", 0],
		["R2", 40],
	])
	expect(await findCountSheet({ producerId, place: "market", ref: randomUUID() })).toBeNull()
})

test("what was not found is missing; what was not counted stays as it is", async () => {
	const { yard, producerId, first, second, take } = await twoLots()
	const posted = await postStockTake({
		...take,
		lines: [{ lotId: first, counted: 22, shown: 24, reason: "a tray was dropped" }],
	})
	expect(await whereIs(yard, first)).toBe("missing 2, ready 22")
	expect(await whereIs(yard, second)).toBe("cold-room 40, ready 12")
	const shown = await findStockTake({ producerId, takeId: posted.ok ? posted.takeId : "" })
	expect(shown).toMatchObject({
		place: "ready",
		who: "Ida",
		lines: [
			{
				code: "R1",
				counted: 22,
				ledger: 24,
				found: 0,
				unwritten: 0,
				reason: "count of the ready shelf: a tray was dropped",
			},
		],
	})
})

test("more than the ledger has is found again, and the rest raises what was harvested with its move", async () => {
	const { yard, producerId, first, second, take, count } = await twoLots()
	await count({ [first]: [22, 24] })
	const posted = await postStockTake({
		...take,
		idempotencyKey: randomUUID(),
		lines: [
			{ lotId: first, counted: 27, shown: 22, reason: "behind the door" },
			{ lotId: second, counted: 12, shown: 12, reason: "" },
		],
	})
	expect(await whereIs(yard, first)).toBe("ready 27")
	expect(await harvestedAndPlaced(yard, first)).toEqual({ harvested: 27, placed: 27 })
	const shown = await findStockTake({ producerId, takeId: posted.ok ? posted.takeId : "" })
	expect(shown?.lines).toMatchObject([
		{ code: "R1", found: 2, unwritten: 3, reason: "count of the ready shelf: behind the door" },
		{ code: "R2", found: 0, unwritten: 0, reason: "" },
	])
})

test("a count is posted once, however often the form is sent", async () => {
	const { yard, producerId, first, count } = await twoLots()
	const answers = await Promise.all([1, 2, 3].map(() => count({ [first]: [20, 24] })))
	expect(new Set(answers.map((answer) => answer.ok && answer.takeId)).size).toBe(1)
	expect(await whereIs(yard, first)).toBe("missing 4, ready 20")
	expect((await listStockTakes({ producerId, after: null })).takes).toMatchObject([{ lots: 1, differing: 1, net: -4 }])
})

test("when the ledger has changed since it was shown, nothing is posted", async () => {
	const { yard, producerId, personId, first, second, count } = await twoLots()
	await movePieces({
		producerId,
		code: "R1",
		personId,
		from: "ready",
		fromRef: NO_REF,
		to: "waste",
		pieces: 4,
		reason: "broken",
		key: randomUUID(),
	})
	expect(await count({ [first]: [20, 24], [second]: [11, 12] })).toEqual({ ok: false, reason: "ledger-changed" })
	expect(await whereIs(yard, first)).toBe("ready 20, waste 4")
	expect(await whereIs(yard, second)).toBe("cold-room 40, ready 12")
	expect((await listStockTakes({ producerId, after: null })).takes).toEqual([])
})

test("nothing counted, or a lot of another producer, is refused", async () => {
	const { count } = await twoLots()
	const other = await twoLots()
	expect(await count({})).toEqual({ ok: false, reason: "nothing-counted" })
	expect(await count({ [other.first]: [1, 0] })).toEqual({ ok: false, reason: "no-such-lot" })
})

test("counts come the latest first, thirty at a time, each once", async () => {
	const { producerId, first, take } = await twoLots()
	for (let number = 0; number < 33; number += 1) {
		const lines = [{ lotId: first, counted: 24, shown: 24, reason: "" }]
		await postStockTake({ ...take, idempotencyKey: randomUUID(), lines })
	}
	const one = await listStockTakes({ producerId, after: null })
	const two = await listStockTakes({ producerId, after: one.next })
	expect([one.takes.length, two.takes.length, two.next]).toEqual([30, 3, null])
	expect(new Set([...one.takes, ...two.takes].map(({ id }) => id)).size).toBe(33)
	expect((await listStockTakes({ producerId, after: "nonsense" })).takes).toHaveLength(30)
})
