import { describe, expect, test } from "vitest"
import {
	coolingAllowance,
	enteredRuns,
	FREEZE_TABLE,
	hoursWords,
	judgeFreezing,
	meetsPlainAdvice,
	missingWords,
	rowReached,
	rowWords,
} from "~/domain/cold-room/freezing"
import { frozenPieces } from "~/domain/cold-room/frozen-pieces"

const judgedAt = (temperature: number, minutes: number, unit: "C" | "F" = "C") =>
	judgeFreezing(enteredRuns({ temperature, unit, minutes }))

describe("the freezing table", () => {
	test.each(FREEZE_TABLE.map((row) => [rowWords(row), row] as const))(
		"%s is reached at the figure itself",
		(_, row) => {
			expect(rowReached(row.tenthsC / 10, "C")).toBe(row)
			expect(rowReached(row.tenthsF / 10, "F")).toBe(row)
			expect(rowReached(row.tenthsC / 10 + 0.01, "C")).not.toBe(row)
			expect(judgedAt(row.tenthsC / 10, row.minutes)).toMatchObject({ isProven: true, row, missingMinutes: 0 })
			expect(judgedAt(row.tenthsF / 10, row.minutes, "F")).toMatchObject({ isProven: true, row })
			expect(judgedAt(row.tenthsC / 10, row.minutes - 1)).toMatchObject({ isProven: false, missingMinutes: 1 })
		},
	)

	test("between two rows the warmer one decides", () => {
		expect(judgedAt(-11.9, 269)).toMatchObject({ isProven: false, row: { tenthsC: -70 }, missingMinutes: 1 })
		expect(judgedAt(-11.9, 270)).toMatchObject({ isProven: true, row: { tenthsC: -70 } })
		expect(judgedAt(-14.9, 180)).toMatchObject({ isProven: true, row: { tenthsC: -120 } })
		expect(judgedAt(-30, 120)).toMatchObject({ isProven: true, row: { tenthsC: -150 } })
	})

	test("above its warmest row nothing counts, however long", () => {
		expect(rowReached(-6.9, "C")).toBeNull()
		expect(judgedAt(-6.9, 10_000)).toMatchObject({ isProven: false, countedMinutes: 0, missingMinutes: 120 })
	})

	test("what is missing is named at the row that asks the least more", () => {
		const verdict = judgeFreezing([200, 80, 0])
		expect(missingWords(verdict)).toBe("1 h 10 min more at −7 °C (20 °F) or colder, in one unbroken stretch.")
		expect(missingWords(judgeFreezing([90, 80, 0]))).toBe(
			"1 h 40 min more at −12 °C (10 °F) or colder, in one unbroken stretch.",
		)
		expect(missingWords(judgeFreezing([270, 0, 0]))).toBe("")
	})

	test("a part of a minute never counts", () => {
		expect(judgeFreezing([269.99, 0, 0])).toMatchObject({ isProven: false, missingMinutes: 1 })
	})

	test("a probe in the air is given a day or two for the comb to follow", () => {
		const allowance = coolingAllowance("air-loose")
		expect(allowance).toBe(1440)
		expect(judgeFreezing([1440, 1440, 1440], allowance)).toMatchObject({
			isProven: false,
			countedMinutes: 0,
			missingMinutes: 120,
		})
		expect(judgeFreezing([1560, 1560, 1560], allowance)).toMatchObject({ isProven: true, countedMinutes: 120 })
		expect(judgeFreezing([60, 60, 60], allowance)).toMatchObject({ missingMinutes: 1500 })
		expect(coolingAllowance("air-cases")).toBe(2880)
		expect(coolingAllowance("comb")).toBe(0)
	})

	test("the plain advice is more than 24 hours and decides nothing", () => {
		expect(meetsPlainAdvice(1440)).toBe(false)
		expect(meetsPlainAdvice(1441)).toBe(true)
		expect(judgedAt(0, 3000).isProven).toBe(false)
	})

	test("runs that are not one for each row are a fault of the program", () => {
		expect(() => judgeFreezing([1, 2])).toThrow(RangeError)
		expect(() => judgeFreezing([1, 2, -3])).toThrow(RangeError)
	})

	test("hours are said as hours and minutes", () => {
		expect([0, 40, 60, 270].map(hoursWords)).toEqual(["0 min", "40 min", "1 h", "4 h 30 min"])
	})
})

describe("pieces that were frozen", () => {
	const at = (hour: number) => new Date(Date.UTC(2026, 7, 13, hour))
	const parent = { lotId: "parent", piecesHarvested: 40, releasedAt: null }
	const link = { fromLotId: "parent", toLotId: "child", piecesMade: 12, at: at(12) }

	test("are those of the lot's own proven loads", () => {
		const proven = [
			{ lotId: "child", pieces: 20, provenBy: at(3) },
			{ lotId: "child", pieces: 4, provenBy: at(4) },
			{ lotId: "parent", pieces: 40, provenBy: at(4) },
		]
		expect(frozenPieces("child", { lots: [parent], proven, links: [] })).toBe(24)
	})

	test("go on into a lot that is split off afterwards, and not into one that was split off before", () => {
		const proven = [{ lotId: "parent", pieces: 40, provenBy: at(11) }]
		expect(frozenPieces("child", { lots: [parent], proven, links: [link] })).toBe(12)
		expect(frozenPieces("child", { lots: [parent], proven, links: [{ ...link, at: at(10) }] })).toBe(0)
	})

	test("do not go on from a lot of which only a part was frozen", () => {
		const proven = [{ lotId: "parent", pieces: 39, provenBy: at(11) }]
		expect(frozenPieces("child", { lots: [parent], proven, links: [link] })).toBe(0)
	})

	test("count from a lot that had been released by hand", () => {
		const lots = [{ ...parent, releasedAt: at(11) }]
		expect(frozenPieces("child", { lots, proven: [], links: [link] })).toBe(12)
	})

	test("are followed through every lot between", () => {
		const lots = [parent, { lotId: "child", piecesHarvested: 12, releasedAt: null }]
		const proven = [{ lotId: "parent", pieces: 40, provenBy: at(11) }]
		const links = [link, { fromLotId: "child", toLotId: "grandchild", piecesMade: 5, at: at(13) }]
		expect(frozenPieces("grandchild", { lots, proven, links })).toBe(5)
	})
})
