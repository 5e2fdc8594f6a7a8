import { describe, expect, test } from "vitest"
import { type ExpectedDay, type HiveFacts, lackingCases, layBoard, weeksOf } from "~/domain/crop/board"

const day = (productId: string, on: string, low: number, piecesPerCase = 12): ExpectedDay => ({
	productId,
	on,
	low,
	likely: low + 6,
	high: low + 12,
	piecesPerCase,
})

describe("cases expected, by week", () => {
	test("pieces of a product are gathered over the week before they make cases", () => {
		expect(weeksOf([day("a", "2026-08-18", 6), day("a", "2026-08-20", 6), day("b", "2026-08-20", 11)], "low")).toEqual([
			{ on: "2026-08-17", low: 1, likely: 3, high: 4, days: [{ on: "2026-08-20", cases: 1 }] },
		])
	})

	test("days are told at the figure that counts", () => {
		const expected = [day("a", "2026-08-17", 18), day("a", "2026-08-19", 30), day("a", "2026-08-24", 12)]
		expect(weeksOf(expected, "likely").map(({ on, days }) => [on, days])).toEqual([
			[
				"2026-08-17",
				[
					{ on: "2026-08-17", cases: 2 },
					{ on: "2026-08-19", cases: 3 },
				],
			],
			["2026-08-24", [{ on: "2026-08-24", cases: 1 }]],
		])
	})
})

describe("what is asked for and not in stock", () => {
	const asked = (productId: string, askedPieces: number, stockPieces: number) => ({
		productId,
		piecesPerCase: 12,
		askedPieces,
		stockPieces,
	})

	test("is counted product by product: more of one does not serve for another", () => {
		expect(lackingCases([asked("a", 24, 60), asked("b", 30, 5)], [], "low")).toEqual({ cases: 3, coveredIn: null })
		expect(lackingCases([asked("a", 24, 60)], [], "low")).toEqual({ cases: 0, coveredIn: null })
	})

	test("is covered in the week in which the last product is, at the figure that counts", () => {
		const expected = [day("a", "2026-08-25", 12), day("a", "2026-08-18", 12), day("b", "2026-08-18", 18)]
		expect(lackingCases([asked("a", 24, 0), asked("b", 12, 0)], expected, "low").coveredIn).toBe("2026-08-24")
		expect(lackingCases([asked("a", 18, 0), asked("b", 12, 0)], expected, "likely").coveredIn).toBe("2026-08-17")
		expect(lackingCases([asked("a", 25, 0), asked("b", 12, 0)], expected, "low").coveredIn).toBeNull()
	})
})

describe("the board", () => {
	const oneSuper = (id: string, level: number, setOn: string): HiveFacts["supers"][number] => ({
		id,
		level,
		setOn,
		productName: "Round section",
		capacityPieces: 40,
		state: "on",
		clearingOn: null,
		checks: [{ checkedOn: "2026-08-12", filledPercent: 70, cappedPercent: 5, sections: "" }],
	})
	const hive = (yard: string, label: string, supers: HiveFacts["supers"]): HiveFacts => ({
		id: `${yard} ${label}`,
		label,
		yard: { id: yard, name: yard, flora: "" },
		supers,
	})

	test("stacks supers from the top down and gathers hives by yard in the order given", () => {
		const board = layBoard(
			[
				hive("Canal", "9", [oneSuper("below", 1, "2026-07-01"), oneSuper("above", 2, "2026-07-20")]),
				hive("Canal", "10", []),
				hive("Weld", "1", []),
			],
			{ today: "2026-08-13", readyCappedPercent: 90 },
		)
		expect(board.map(({ name, hives }) => [name, hives.map(({ label }) => label)])).toEqual([
			["Canal", ["9", "10"]],
			["Weld", ["1"]],
		])
		expect(board[0]?.hives[0]?.supers.map(({ id }) => id)).toEqual(["above", "below"])
	})

	test("gives the next super beside the one set on last, wherever it stands in the stack", () => {
		const [yard] = layBoard(
			[hive("Canal", "9", [oneSuper("new one below", 1, "2026-07-20"), oneSuper("above", 2, "2026-07-01")])],
			{ today: "2026-08-13", readyCappedPercent: 90 },
		)
		expect(yard?.hives[0]?.supers.map(({ id, advice }) => [id, advice.map(({ kind }) => kind)])).toEqual([
			["above", []],
			["new one below", ["next-super"]],
		])
	})
})
