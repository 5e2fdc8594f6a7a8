import { expect, test } from "vitest"
import { unkeptPromises } from "~/domain/promise/unkept-promises"

test("nothing is unkept while every promise has pieces that are there in time", () => {
	const supplies = [{ on: "2026-08-13", quantity: 20, kind: "free" as const }]
	expect(unkeptPromises({ supplies, promises: [{ on: "2026-08-18", quantity: 20 }] })).toEqual(new Map())
})

test("what is promised beyond the supply is unkept on its own day, and counted once", () => {
	const supplies = [
		{ on: "2026-08-13", quantity: 20, kind: "free" as const },
		{ on: "2026-08-24", quantity: 10, kind: "expected" as const },
	]
	const promises = [
		{ on: "2026-08-18", quantity: 15 },
		{ on: "2026-08-18", quantity: 10 },
		{ on: "2026-08-25", quantity: 12 },
	]
	expect(unkeptPromises({ supplies, promises })).toEqual(
		new Map([
			["2026-08-18", 5],
			["2026-08-25", 2],
		]),
	)
})

test("a lot past its best-before keeps no promise", () => {
	const supplies = [{ on: "2026-08-13", until: "2026-08-20", quantity: 20, kind: "free" as const }]
	const promises = [
		{ on: "2026-08-18", quantity: 4 },
		{ on: "2026-08-25", quantity: 6 },
	]
	expect(unkeptPromises({ supplies, promises })).toEqual(new Map([["2026-08-25", 6]]))
})
