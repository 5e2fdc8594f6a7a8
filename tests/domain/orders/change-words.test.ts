import { expect, test } from "vitest"
import { changeWords } from "~/domain/orders/change-words"

test("a changed order says which lines were changed, added and taken off", () => {
	expect(
		changeWords([
			{ code: "11", name: "Round section, clover", from: 3, to: 1 },
			{ code: "41", name: "Cut comb, clover", from: 0, to: 2 },
			{ code: "51", name: "Chunk honey, sainfoin", from: 2, to: 0 },
		]),
	).toBe(
		"11 Round section, clover from 3 to 1 case; 41 Cut comb, clover added, 2 cases; 51 Chunk honey, sainfoin taken off.",
	)
	expect(changeWords([])).toBe("Its order number or note.")
})
