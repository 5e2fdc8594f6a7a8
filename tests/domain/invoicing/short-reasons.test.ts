import { describe, expect, test } from "vitest"
import { joinShortNotes, shortReasons } from "~/domain/invoicing/short-reasons"

const full = { askedCases: 3, sentCases: 3 }
const short = { askedCases: 4, sentCases: 2 }

describe("why lines are short", () => {
	test("one sentence to a short line, in their order", () => {
		expect(shortReasons("First.\nSecond.", [short, full, short])).toEqual(["First.", null, "Second."])
	})

	test("a note that was written as a whole stands for each of them", () => {
		expect(shortReasons("A wet June.", [short, full, short])).toEqual(["A wet June.", null, "A wet June."])
	})

	test("nothing is said where nobody said why", () => {
		expect(shortReasons("", [short, full])).toEqual([null, null])
	})

	test("the notes of several orders stay with their own lines", () => {
		const note = joinShortNotes([
			{ note: "", lines: [short] },
			{ note: "A wet June.", lines: [full, short] },
			{ note: "First.\nSecond.", lines: [short, short] },
		])
		expect(shortReasons(note, [short, full, short, short, short])).toEqual([
			null,
			null,
			"A wet June.",
			"First.",
			"Second.",
		])
		expect(joinShortNotes([{ note: "", lines: [short] }])).toBe("")
	})
})
