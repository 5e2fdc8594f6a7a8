import { describe, expect, test } from "vitest"
import { changedLines, judgeLateChange, lateLineWords, lateSums } from "~/domain/orders/late-change"

const line = { lineId: "a", fromCases: 3, toCases: 3, fromCents: 11_400, toCents: 11_400 }

describe("a late change by the producer", () => {
	test("asks the store where it gives less or costs more", () => {
		expect(judgeLateChange([{ ...line, toCases: 2 }])).toBe("asks")
		expect(judgeLateChange([{ ...line, toCents: 11_500 }])).toBe("asks")
	})

	test("holds at once where it gives more or costs less", () => {
		expect(judgeLateChange([{ ...line, toCases: 4 }])).toBe("applies")
		expect(judgeLateChange([{ ...line, toCents: 11_000 }])).toBe("applies")
	})

	test("asks when one line is worse, however much better another is", () => {
		expect(
			judgeLateChange([
				{ ...line, toCases: 9 },
				{ ...line, lineId: "b", toCases: 2 },
			]),
		).toBe("asks")
		expect(judgeLateChange([{ ...line, toCases: 4, toCents: 11_401 }])).toBe("asks")
	})

	test("is nothing where nothing differs", () => {
		expect(judgeLateChange([line])).toBe("nothing")
		expect(judgeLateChange([])).toBe("nothing")
		expect(changedLines([line, { ...line, lineId: "b", toCases: 0 }]).map(({ lineId }) => lineId)).toEqual(["b"])
	})

	test("is said in words and in what the lines come to", () => {
		expect(lateLineWords({ ...line, toCases: 2 })).toBe("2 cases instead of 3")
		expect(lateLineWords({ ...line, toCases: 0 })).toBe("none instead of 3")
		expect(lateLineWords({ ...line, toCents: 12_000 })).toBe("$120.00 a case instead of $114.00")
		expect(lateLineWords({ ...line, toCases: 1, toCents: 12_000 })).toBe(
			"1 case instead of 3, at $120.00 a case instead of $114.00",
		)
		expect(lateSums([{ ...line, toCases: 2 }])).toEqual({ beforeCents: 34_200, afterCents: 22_800 })
	})
})
