import { randomUUID } from "node:crypto"
import { expect, test } from "vitest"
import { movePieces } from "~/services/stock/move-pieces.server"
import { addHand, addLot, standOnThursday, whereIs } from "../desk/desk-steps"
import { addProduct, openYard } from "../orders/place-yard"
import { harvestedAndPlaced, movesOf } from "./lot-books"

standOnThursday()

const NO_REF = "00000000-0000-0000-0000-000000000000"

async function lotOf24() {
	const yard = await openYard()
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const lotId = await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2027-01-01", ready: 18, coldRoom: 6 })
	const move = {
		producerId: yard.producerId,
		code: "R1",
		personId,
		from: "ready" as const,
		fromRef: NO_REF,
		to: "waste" as const,
		pieces: 3,
		reason: "dropped a tray",
		key: randomUUID(),
	}
	return { yard, lotId, move }
}

test("broken pieces are waste, with who moved them and why, and every piece is still somewhere", async () => {
	const { yard, lotId, move } = await lotOf24()
	expect(await movePieces(move)).toEqual({ ok: true })
	expect(await whereIs(yard, lotId)).toBe("cold-room 6, ready 15, waste 3")
	expect(await harvestedAndPlaced(yard, lotId)).toEqual({ harvested: 24, placed: 24 })
	expect(await movesOf(yard, lotId)).toContain("ready to waste, 3, dropped a tray, Ida")
})

test("a second send of the same form moves nothing more", async () => {
	const { yard, lotId, move } = await lotOf24()
	expect(await Promise.all([movePieces(move), movePieces(move)])).toEqual([{ ok: true }, { ok: true }])
	expect(await whereIs(yard, lotId)).toBe("cold-room 6, ready 15, waste 3")
})

test("more than there is is refused, and the answer says how much there is", async () => {
	const { yard, lotId, move } = await lotOf24()
	expect(await movePieces({ ...move, pieces: 19 })).toEqual({ ok: false, reason: "more-than-there", there: 18 })
	expect(await movePieces({ ...move, from: "missing", to: "ready" })).toEqual({
		ok: false,
		reason: "more-than-there",
		there: 0,
	})
	expect(await whereIs(yard, lotId)).toBe("cold-room 6, ready 18")
})

test("what belongs to an order, or a lot that is not there, is not moved by hand", async () => {
	const { move } = await lotOf24()
	expect(await movePieces({ ...move, from: "packed" })).toEqual({ ok: false, reason: "not-by-hand" })
	expect(await movePieces({ ...move, to: "sold" })).toEqual({ ok: false, reason: "not-by-hand" })
	expect(await movePieces({ ...move, code: "none" })).toEqual({ ok: false, reason: "no-such-lot" })
	const elsewhere = await openYard()
	expect(await movePieces({ ...move, producerId: elsewhere.producerId })).toEqual({ ok: false, reason: "no-such-lot" })
})
