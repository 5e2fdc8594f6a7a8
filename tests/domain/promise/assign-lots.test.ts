import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { assignLots } from "~/domain/promise/assign-lots"
import { mostServed } from "./most-served"

const lot = (lotId: string, availableFrom: string, bestBefore: string, pieces: number) => ({
	lotId,
	availableFrom,
	bestBefore,
	pieces,
})

describe("which lot serves which order", () => {
	test("the lot with the earliest best-before goes first", () => {
		const assigned = assignLots({
			lots: [lot("B11", "2026-08-10", "2027-02-01", 24), lot("B09", "2026-08-10", "2026-12-01", 12)],
			orders: [{ orderId: "plume", on: "2026-08-18", pieces: 24 }],
		})
		expect(assigned).toEqual({
			ok: true,
			picks: [
				{ orderId: "plume", lotId: "B09", pieces: 12 },
				{ orderId: "plume", lotId: "B11", pieces: 12 },
			],
		})
	})

	test("a lot serves up to its best-before day and from the day it is available, both included", () => {
		const lots = [lot("C14", "2026-08-18", "2026-08-18", 12)]
		expect(assignLots({ lots, orders: [{ orderId: "a", on: "2026-08-18", pieces: 12 }] }).ok).toBe(true)
		for (const on of ["2026-08-17", "2026-08-19"]) {
			expect(assignLots({ lots, orders: [{ orderId: "a", on, pieces: 12 }] })).toEqual({
				ok: false,
				reason: "lots-too-few",
				picks: [],
				missing: [{ orderId: "a", pieces: 12 }],
			})
		}
	})

	test("the earlier delivery is served first, whichever order came first", () => {
		const assigned = assignLots({
			lots: [lot("K05", "2026-08-10", "2026-08-20", 8), lot("K06", "2026-08-10", "2026-09-20", 8)],
			orders: [
				{ orderId: "later", on: "2026-08-25", pieces: 8 },
				{ orderId: "sooner", on: "2026-08-18", pieces: 8 },
			],
		})
		expect(assigned.ok).toBe(true)
		expect(assigned.picks).toContainEqual({ orderId: "later", lotId: "K06", pieces: 8 })
	})

	test("lots of the same age are taken in a fixed order", () => {
		const lots = [lot("R2", "2026-08-12", "2027-01-01", 6), lot("R3", "2026-08-10", "2027-01-01", 6)]
		const orders = [{ orderId: "a", on: "2026-08-18", pieces: 8 }]
		const forward = assignLots({ lots, orders })
		expect(assignLots({ lots: lots.toReversed(), orders })).toEqual(forward)
		expect(forward.picks[0]?.lotId).toBe("R3")
	})

	test("part of a piece throws", () => {
		expect(() => assignLots({ lots: [lot("R1", "2026-08-10", "2027-01-01", 1.5)], orders: [] })).toThrow(RangeError)
	})
})

describe("any small crop", () => {
	const day = fc.integer({ min: 10, max: 16 }).map((date) => `2026-08-${date}`)
	const ends = fc.tuple(day, day).map(([a, b]): [string, string] => (a < b ? [a, b] : [b, a]))
	const lots = fc
		.array(fc.record({ ends, pieces: fc.nat(3) }), { maxLength: 4 })
		.map((list) => list.map(({ ends: [first, last], pieces }, index) => lot(`L${index}`, first, last, pieces)))
	const orders = fc
		.array(fc.record({ on: day, pieces: fc.nat(3) }), { maxLength: 4 })
		.map((list) => list.map((order, index) => ({ orderId: `O${index}`, ...order })))

	test("every order is served whenever any assignment serves them all, and otherwise as many pieces as any does", () => {
		fc.assert(
			fc.property(lots, orders, (someLots, someOrders) => {
				const assigned = assignLots({ lots: someLots, orders: someOrders })
				const served = assigned.picks.reduce((sum, pick) => sum + pick.pieces, 0)
				const wanted = someOrders.reduce((sum, order) => sum + order.pieces, 0)
				expect(served).toBe(mostServed(someLots, someOrders))
				expect(assigned.ok).toBe(served === wanted)
				if (!assigned.ok) expect(assigned.missing.reduce((sum, one) => sum + one.pieces, 0)).toBe(wanted - served)
			}),
			{ numRuns: 400 },
		)
	})

	test("no lot gives more than it has, nor outside its days, and no order gets more than it needs", () => {
		fc.assert(
			fc.property(lots, orders, (someLots, someOrders) => {
				const { picks } = assignLots({ lots: someLots, orders: someOrders })
				const taken = (key: "lotId" | "orderId", id: string) =>
					picks.filter((pick) => pick[key] === id).reduce((sum, pick) => sum + pick.pieces, 0)
				for (const one of someLots) expect(taken("lotId", one.lotId)).toBeLessThanOrEqual(one.pieces)
				for (const one of someOrders) expect(taken("orderId", one.orderId)).toBeLessThanOrEqual(one.pieces)
				for (const pick of picks) {
					const from = someLots.find((one) => one.lotId === pick.lotId)
					const on = someOrders.find((one) => one.orderId === pick.orderId)?.on ?? ""
					expect(from && from.availableFrom <= on && on <= from.bestBefore).toBe(true)
					expect(pick.pieces).toBeGreaterThan(0)
				}
			}),
		)
	})
})
