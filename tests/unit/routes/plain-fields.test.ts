import { expect, test } from "vitest"
import { plainFields } from "~/routes/auth/plain-fields"

const id = "6f9619ff-8b86-4d01-b42d-00cf4fc964ff"

test("what was typed is shown under the label that its form gave", () => {
	const shown = plainFields([
		[`label-cases-${id}`, "11 Round section, clover, cases"],
		[`cases-${id}`, "4"],
		["poNumber", "PO 88"],
	])
	expect(shown).toEqual([
		{ label: "11 Round section, clover, cases", value: "4" },
		{ label: "Po number", value: "PO 88" },
	])
})

test("ids, keys and empty fields are not shown", () => {
	expect(
		plainFields([
			["idempotencyKey", id],
			["storeId", id],
			["note", "  "],
			["intent", "place"],
		]),
	).toEqual([])
})
