import { randomUUID } from "node:crypto"
import fc from "fast-check"
import { expect, test } from "vitest"
import { stockMoves } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { mayMoveByHand } from "~/domain/stock/hand-moves"
import type { Place } from "~/domain/stock/places"
import { movePieces } from "~/services/stock/move-pieces.server"
import { addHand, addLot, standOnThursday, whereIs } from "../desk/desk-steps"
import { addProduct, openYard } from "../orders/place-yard"
import { harvestedAndPlaced } from "./lot-books"

standOnThursday()

const NO_REF = "00000000-0000-0000-0000-000000000000"
const SHELVES = ["cold-room", "ready", "waste", "missing"] as const

/** The ledger as a plain model: pieces by place. A move is made when it is allowed and enough is there. */
function moveInModel(at: Map<Place, number>, move: { from: Place; to: Place; pieces: number }): boolean {
	const there = at.get(move.from) ?? 0
	if (!mayMoveByHand(move.from, move.to) || there < move.pieces) return false
	at.set(move.from, there - move.pieces)
	at.set(move.to, (at.get(move.to) ?? 0) + move.pieces)
	return true
}

const words = (at: Map<Place, number>) =>
	[...at]
		.filter(([, pieces]) => pieces > 0)
		.toSorted(([a], [b]) => (a < b ? -1 : 1))
		.map(([place, pieces]) => `${place} ${pieces}`)
		.join(", ")

async function newLot() {
	const yard = await openYard()
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	let number = 0
	return async (pieces: { ready: number; coldRoom: number }) => {
		number += 1
		const code = `R${number}`
		const lotId = await addLot(yard, { productId: round, code, bestBeforeOn: "2027-01-01", ...pieces })
		const move = (one: { from: Place; to: Place; pieces: number }) =>
			movePieces({
				producerId: yard.producerId,
				code,
				personId,
				...one,
				fromRef: NO_REF,
				reason: "random",
				key: randomUUID(),
			})
		const books = () => harvestedAndPlaced(yard, lotId)
		return { move, books, whereIs: () => whereIs(yard, lotId), yard, lotId }
	}
}

const anyMove = fc.record({
	from: fc.constantFrom(...SHELVES),
	to: fc.constantFrom(...SHELVES),
	pieces: fc.integer({ min: 1, max: 9 }),
})

test("any moves, one after the other, are made or refused as in a plain model", async () => {
	const make = await newLot()
	await fc.assert(
		fc.asyncProperty(fc.array(anyMove, { minLength: 1, maxLength: 12 }), async (moves) => {
			const lot = await make({ ready: 8, coldRoom: 6 })
			const model = new Map<Place, number>([
				["ready", 8],
				["cold-room", 6],
			])
			for (const one of moves) expect((await lot.move(one)).ok).toBe(moveInModel(model, one))
			expect(await lot.whereIs()).toBe(words(model))
			expect(await lot.books()).toEqual({ harvested: 14, placed: 14 })
		}),
		{ numRuns: 25 },
	)
})

test("any moves, all at once on several connections, end as those that were made say, and never below zero", async () => {
	const make = await newLot()
	await fc.assert(
		fc.asyncProperty(fc.array(anyMove, { minLength: 6, maxLength: 16 }), async (moves) => {
			const lot = await make({ ready: 8, coldRoom: 6 })
			const answers = await Promise.all(moves.map(lot.move))
			// Which of them found enough depends on who came first; that the sums agree does not.
			const at = new Map<Place, number>([
				["ready", 8],
				["cold-room", 6],
			])
			for (const [index, { from, to, pieces }] of moves.entries()) {
				if (!answers[index]?.ok) continue
				expect(mayMoveByHand(from, to)).toBe(true)
				at.set(from, (at.get(from) ?? 0) - pieces)
				at.set(to, (at.get(to) ?? 0) + pieces)
			}
			expect(Math.min(...at.values())).toBeGreaterThanOrEqual(0)
			expect(await lot.whereIs()).toBe(words(at))
			expect(await lot.books()).toEqual({ harvested: 14, placed: 14 })
		}),
		{ numRuns: 25 },
	)
})

test("pieces from nowhere are refused unless what was harvested grows with them", async () => {
	const lot = await (await newLot())({ ready: 8, coldRoom: 0 })
	const { producerId } = lot.yard
	const fromNowhere = withProducer(producerId, (tx) =>
		tx.insert(stockMoves).values({ producerId, lotId: lot.lotId, toPlace: "ready", pieces: 1, reason: "found" }),
	)
	await expect(fromNowhere).rejects.toThrow()
	expect(await lot.whereIs()).toBe("ready 8")
})
