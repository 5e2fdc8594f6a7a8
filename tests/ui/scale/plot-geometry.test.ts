import fc from "fast-check"
import { expect, test } from "vitest"
import { drawErrors, type PlotFacts } from "~/ui/scale/plot-geometry"

const words = { label: "the label", limit: "error limit", variation: "variation" }
const facts = (errors: number[], rest: Partial<PlotFacts> = {}): PlotFacts => ({
	errors: errors.map((error) => ({ error, isTooShort: error < -16.3 })),
	average: errors.reduce((sum, error) => sum + error, 0) / errors.length,
	limit: null,
	variation: 16.3,
	words,
	...rest,
})

test("the limits stand left of the label in the order of their size", () => {
	const { lines } = drawErrors(facts([-2, -1], { limit: 1.8 }), 720)
	expect(lines.map(({ kind }) => kind)).toEqual(["label", "limit", "variation"])
	const [label, limit, variation] = lines.map(({ x }) => x)
	expect(variation).toBeLessThan(limit as number)
	expect(limit).toBeLessThan(label as number)
})

test("without a limit there is no line for one", () => {
	expect(drawErrors(facts([1, 2]), 340).lines.map(({ kind }) => kind)).toEqual(["label", "variation"])
})

test("equal errors stand above one another", () => {
	const { dots } = drawErrors(facts([3, 3, 3]), 720)
	expect(new Set(dots.map(({ x }) => x)).size).toBe(1)
	expect(new Set(dots.map(({ y }) => y)).size).toBe(3)
})

test("every dot lies inside the drawing and no two overlap, on paper and phone", () => {
	const error = fc.integer({ min: -600, max: 600 }).map((tenths) => tenths / 10)
	const sample = fc.array(error, { minLength: 1, maxLength: 48 })
	fc.assert(
		fc.property(sample, fc.constantFrom(340, 720), (errors, width) => {
			const { dots, height } = drawErrors(facts(errors), width)
			expect(dots).toHaveLength(errors.length)
			for (const [place, dot] of dots.entries()) {
				expect(dot.x >= 0 && dot.x <= width && dot.y >= 0 && dot.y <= height).toBe(true)
				for (const other of dots.slice(place + 1)) {
					expect(dot.y !== other.y || Math.abs(dot.x - other.x) >= 10).toBe(true)
				}
			}
		}),
	)
})
