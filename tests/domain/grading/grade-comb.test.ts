import { describe, expect, test } from "vitest"
import { type GradingFacts, gradeComb } from "~/domain/grading/grade-comb"
import { parseHundredths } from "~/domain/grading/hundredths"
import { schemeTemplates } from "~/domain/grading/templates"

const [wisconsin] = schemeTemplates

const facts: GradingFacts = {
	measured: { netOz: 1240, grossOz: 1350, attachedPercent: 9000, unsealedCells: 0 },
	isOutsideRowOpen: true,
	faults: [],
	pfundTenths: 350,
	caseWeighed: null,
	piecesSeen: 20,
	piecesBelow: 0,
}

describe("a grading", () => {
	test("gives every reason that kept the lot from a better grade", () => {
		if (!wisconsin) throw new Error("no template")
		expect(gradeComb(wisconsin.scheme, { ...facts, faults: ["travel-stain"] })).toEqual({
			grade: "Wisconsin No. 1",
			reasons: [
				"Wisconsin Fancy White: net weight of the lightest piece must be at least 12.5 oz, and is 12.4 oz.",
				"Wisconsin Fancy White: travel stain was seen.",
				"Wisconsin Fancy White: the colour must be White, and is Golden.",
			],
			colour: "Golden",
		})
	})

	test("what was not measured meets no limit", () => {
		if (!wisconsin) throw new Error("no template")
		const grading = gradeComb(wisconsin.scheme, { ...facts, measured: { ...facts.measured, netOz: undefined } })
		expect(grading.grade).toBe("Ungraded")
		expect(grading.reasons).toContain(
			"Wisconsin No. 1: net weight of the lightest piece must be at least 11 oz, and was not measured.",
		)
	})

	test("pieces below the grade are sorted out first", () => {
		if (!wisconsin) throw new Error("no template")
		const { grade, reasons } = gradeComb(wisconsin.scheme, { ...facts, piecesBelow: 1 })
		expect(grade).toBe("Ungraded")
		expect(reasons).toContain("Wisconsin No. 1: 1 of 20 pieces are below it, and none may be. Sort them out.")
	})

	test.each([
		["12.5", 1250],
		["85", 8500],
		[" 0.05 ", 5],
		["12,5", null],
		["-1", null],
		["", null],
		["1.234", null],
	])("a figure written %j is %s hundredths", (text, hundredths) => {
		expect(parseHundredths(text)).toBe(hundredths)
	})
})
