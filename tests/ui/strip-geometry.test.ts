import { describe, expect, it } from "vitest"
import { drawStrip, type StripRun, unitsPerCell } from "~/ui/stock/strip-geometry"

const runs = (...pairs: [StripRun["state"], number][]): StripRun[] => pairs.map(([state, count]) => ({ state, count }))

describe("the drawing of a fill strip", () => {
	it("sets a wider gap after each fifth cell", () => {
		expect(drawStrip(runs(["free", 6]), "sm")).toEqual({
			width: 42,
			height: 12,
			unitsPerCell: 1,
			paths: [
				{
					state: "free",
					d: "M0 0h5v12h-5zM7 0h5v12h-5zM14 0h5v12h-5zM21 0h5v12h-5zM28 0h5v12h-5zM37 0h5v12h-5z",
				},
			],
			least: null,
		})
	})

	it("draws every state in its own way, and restarts the fives for each", () => {
		const drawing = drawStrip(runs(["free", 7], ["held", 4], ["promised", 6], ["expected", 5], ["short", 3]), "md")
		expect(drawing).toMatchObject({ width: 257, height: 17 })
		expect(drawing?.paths).toEqual([
			{
				state: "free",
				d: "M0 0h7v17h-7zM9 0h7v17h-7zM18 0h7v17h-7zM27 0h7v17h-7zM36 0h7v17h-7zM48 0h7v17h-7zM57 0h7v17h-7z",
			},
			{
				state: "held",
				d: "M73.5 0.5h6v16h-6zM73.5 5L78 0.5M73.5 9.5L79.5 3.5M73.5 14L79.5 8M75.5 16.5L79.5 12.5M82.5 0.5h6v16h-6zM82.5 5L87 0.5M82.5 9.5L88.5 3.5M82.5 14L88.5 8M84.5 16.5L88.5 12.5M91.5 0.5h6v16h-6zM91.5 5L96 0.5M91.5 9.5L97.5 3.5M91.5 14L97.5 8M93.5 16.5L97.5 12.5M100.5 0.5h6v16h-6zM100.5 5L105 0.5M100.5 9.5L106.5 3.5M100.5 14L106.5 8M102.5 16.5L106.5 12.5",
			},
			{
				state: "promised",
				d: "M116.8 0.8h5.5v15.5h-5.5zM125.8 0.8h5.5v15.5h-5.5zM134.8 0.8h5.5v15.5h-5.5zM143.8 0.8h5.5v15.5h-5.5zM152.8 0.8h5.5v15.5h-5.5zM164.8 0.8h5.5v15.5h-5.5z",
			},
			{
				state: "expected",
				d: "M180.5 9.5h6v7h-6zM189.5 9.5h6v7h-6zM198.5 9.5h6v7h-6zM207.5 9.5h6v7h-6zM216.5 9.5h6v7h-6z",
			},
			{ state: "short", d: "M232 16h7M241 16h7M250 16h7" },
		])
	})

	it("keeps the order in which the runs are given", () => {
		const drawing = drawStrip(runs(["held", 6], ["free", 1]), "sm")
		expect(drawing).toMatchObject({ width: 54, paths: [{ state: "free", d: "M49 0h5v12h-5z" }, { state: "held" }] })
	})

	it("sets no gap between what one store asked and gets", () => {
		const drawing = drawStrip(runs(["free", 2], ["short", 2]), "md", { countsThrough: true })
		expect(drawing).toMatchObject({
			width: 34,
			paths: [
				{ state: "free", d: "M0 0h7v17h-7zM9 0h7v17h-7z" },
				{ state: "short", d: "M18 16h7M27 16h7" },
			],
		})
	})

	it("strikes the least that a store would take, and says when less is given", () => {
		const under = drawStrip(runs(["free", 1], ["short", 2]), "lg", { least: 2 })
		expect(under).toEqual({
			width: 36,
			height: 34,
			unitsPerCell: 1,
			paths: [
				{ state: "free", d: "M0 5h10v24h-10z" },
				{ state: "short", d: "M13 28h10M26 28h10" },
			],
			least: { d: "M24.5 0v34m-3 0h6", isUnder: true },
		})
		expect(drawStrip(runs(["free", 2], ["short", 1]), "lg", { least: 2 })?.least?.isUnder).toBe(false)
	})

	it("keeps 40 cells on one line, and breaks 41 at 20", () => {
		expect(drawStrip(runs(["free", 40]), "sm")).toMatchObject({ height: 12 })
		const broken = drawStrip(runs(["free", 30], ["held", 11]), "sm")
		// Three lines of 12 with 4 between; the widest is 10 free and 10 held: 20 cells, 16 gaps, two fives, one run.
		expect(broken).toMatchObject({ width: 20 * 5 + 16 * 2 + 2 * 4 + 7, height: 3 * 12 + 2 * 4 })
		expect(broken?.paths[1]?.d).toContain("M0.5 32.5")
	})

	it("starts the next state at the edge when a line is just full", () => {
		const drawing = drawStrip(runs(["free", 20], ["short", 21]), "sm")
		expect(drawing?.paths[1]?.d).toMatch(/^M0 27h5M7 27h5/)
	})

	it("draws nothing for nothing", () => {
		expect(drawStrip([], "md")).toBeNull()
		expect(drawStrip(runs(["free", 0], ["held", 0]), "md")).toBeNull()
	})

	it("never takes more than about 120 cells, however much there is", () => {
		expect([0, 1, 120, 121, 600, 601, 5000, 1_000_000].map(unitsPerCell)).toEqual([1, 1, 1, 5, 5, 10, 50, 10_000])
	})

	it("shows a little of what there is little of, even when a cell is five", () => {
		const drawing = drawStrip(runs(["free", 240], ["short", 1]), "sm")
		expect(drawing?.unitsPerCell).toBe(5)
		expect(drawing?.paths[1]?.d.match(/M/g)).toHaveLength(1)
	})
})
