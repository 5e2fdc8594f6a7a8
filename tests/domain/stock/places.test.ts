import fc from "fast-check"
import { expect, test } from "vitest"
import { harvestedEqualsPlaces, mayGo, type Place, places } from "~/domain/stock/places"

test("pieces come off the hives into the cold room and nowhere else", () => {
	expect(places.filter((to) => mayGo(null, to))).toEqual(["cold-room"])
})

test("pieces leave the cold room for the ready shelf, as waste or cut comb, for another lot, or unfound at a count", () => {
	expect(places.filter((to) => mayGo("cold-room", to))).toEqual(["ready", "waste", "cut-up", "other-lot", "missing"])
})

test("what a count did not find can be found again where counts are made, and is never sold from there", () => {
	expect(places.filter((to) => mayGo("missing", to))).toEqual(["cold-room", "ready", "market", "waste"])
	expect(places.filter((from) => mayGo(from, "missing"))).toEqual(["cold-room", "ready", "market"])
})

test("what a market day does not sell comes back, and an undone sale goes back to its market day", () => {
	expect(mayGo("market", "ready")).toBe(true)
	expect(mayGo("market", "sold")).toBe(true)
	expect(mayGo("sold", "market")).toBe(true)
})

test("what is waste, cut up or another lot's never becomes comb to sell again, and nothing moves to where it is", () => {
	for (const place of places) {
		expect(mayGo("other-lot", place)).toBe(false)
		expect(mayGo("waste", place)).toBe(false)
		expect(mayGo("cut-up", place)).toBe(false)
		expect(mayGo(place, place)).toBe(false)
	}
})

test("every place can be reached from the hives", () => {
	const reached = new Set<Place>(["cold-room"])
	for (const from of reached) for (const to of places) if (mayGo(from, to)) reached.add(to)
	expect([...reached].toSorted()).toEqual([...places].toSorted())
})

test("every piece that was harvested is somewhere", () => {
	expect(harvestedEqualsPlaces(40, [{ pieces: 28 }, { pieces: 10 }, { pieces: 2 }])).toBe(true)
	expect(harvestedEqualsPlaces(40, [{ pieces: 28 }, { pieces: 10 }])).toBe(false)
	expect(harvestedEqualsPlaces(40, [{ pieces: 42 }, { pieces: -2 }])).toBe(false)
	expect(harvestedEqualsPlaces(0, [])).toBe(true)
})

test("moving pieces about keeps the sum, whatever moves are made", () => {
	const move = fc.record({ from: fc.nat(4), to: fc.nat(4), pieces: fc.nat(20) })
	fc.assert(
		fc.property(fc.nat(200), fc.array(move), (harvested, moves) => {
			const balances = [{ pieces: harvested }, ...Array.from({ length: 4 }, () => ({ pieces: 0 }))]
			for (const { from, to, pieces } of moves) {
				const [source, target] = [balances[from], balances[to]]
				if (!source || !target || source.pieces < pieces) continue
				source.pieces -= pieces
				target.pieces += pieces
			}
			expect(harvestedEqualsPlaces(harvested, balances)).toBe(true)
		}),
	)
})
