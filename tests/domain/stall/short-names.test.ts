import { expect, test } from "vitest"
import { marketHours } from "~/domain/stall/market-hours"
import { shortNames } from "~/domain/stall/short-names"

test("a product is named by its form, by its flora where two share a form, and by its number where they share that too", () => {
	const names = shortNames([
		{ id: "a", code: "11", form: "round", flora: "white clover" },
		{ id: "b", code: "12", form: "round", flora: "goldenrod" },
		{ id: "c", code: "21", form: "basswood", flora: "white clover" },
		{ id: "d", code: "51", form: "chunk", flora: "sainfoin" },
		{ id: "e", code: "52", form: "chunk", flora: "sainfoin" },
		{ id: "f", code: "61", form: "frame", flora: "" },
		{ id: "g", code: "62", form: "frame", flora: "" },
	])
	expect([...names.values()]).toEqual([
		"Round, white clover",
		"Round, goldenrod",
		"Basswood",
		"Chunk jar 51",
		"Chunk jar 52",
		"Frame 61",
		"Frame 62",
	])
})

test("hours are said as people say them", () => {
	expect(marketHours({ opensAt: "09:00:00", closesAt: "13:00:00" })).toBe("9 to 1")
	expect(marketHours({ opensAt: "08:30", closesAt: "12:15" })).toBe("8:30 to 12:15")
})
