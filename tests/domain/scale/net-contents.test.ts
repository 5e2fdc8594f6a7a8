import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { decideLot } from "~/domain/scale/decide-lot"
import { decimalText, exactly, toFigures } from "~/domain/scale/fraction"
import { labelThatHolds } from "~/domain/scale/label-that-holds"
import { judgeNetContents, type NetContentsInput, type NetContentsWorksheet } from "~/domain/scale/net-contents"
import { decisionSentence, doubtWords, refusalWords, weightsRefusalWords } from "~/domain/scale/net-contents-words"
import { samplingPlan, samplingWords } from "~/domain/scale/sampling-plan"

function weighed(change: Partial<NetContentsInput> & { gross: readonly (number | string)[] }): NetContentsInput {
	const { gross, ...rest } = change
	return {
		lotPackages: 180,
		label: { inchPound: { amount: "12", unit: "oz" }, metric: null },
		unit: "g",
		division: null,
		tare: { kind: "entered", weight: "28" },
		packages: gross.map((weight) => ({ gross: `${weight}` })),
		...rest,
	}
}

function judged(input: NetContentsInput): NetContentsWorksheet {
	const answer = judgeNetContents(input)
	if (!answer.ok) throw new Error(answer.reason)
	return answer.worksheet
}

const twelve = (weight: number | string) => Array<number | string>(12).fill(weight)

describe("the label that is verified", () => {
	test("grams that are rounded up are the target, and it is said", () => {
		const label = { inchPound: { amount: "8", unit: "oz" as const }, metric: { amount: "227", unit: "g" as const } }
		const sheet = judged(weighed({ label, gross: twelve(255) }))
		expect(sheet.verified).toMatchObject({ declaration: "metric", target: "227", isRaised: true })
		expect(sheet.average).toBe("0")
	})

	test("a label in pounds is verified in pounds when the scale shows pounds, exactly", () => {
		const label = { inchPound: { amount: "12", unit: "oz" as const }, metric: null }
		const tare = { kind: "entered" as const, weight: "0.062" }
		const sheet = judged(weighed({ label, unit: "lb", tare, division: "0.002", gross: twelve("0.816") }))
		expect(sheet).toMatchObject({ variation: "0.036", unitOfMeasure: "0.001", isDivisionFine: true, average: "0.004" })
		expect(sheet.packages[0]?.units).toBe("4")
	})

	test("packages of random weight are each held to their own label and variation", () => {
		const own = (amount: string) => ({ inchPound: null, metric: { amount, unit: "g" as const } })
		const packages = [
			{ gross: "132", label: own("113") },
			{ gross: "242", label: own("227") },
			{ gross: "330", label: own("300") },
			{ gross: "330", label: own("300") },
		]
		const sheet = judged({
			...weighed({ gross: [] }),
			lotPackages: 4,
			tare: { kind: "entered", weight: "28" },
			packages,
		})
		expect(sheet.verified).toBeNull()
		expect(sheet.packages.map(({ error, isTooShort }) => [error, isTooShort])).toEqual([
			["-9", true],
			["-13", true],
			["2", false],
			["2", false],
		])
	})
})

describe("at the limits", () => {
	const errors = (...all: (number | string)[]) => all.map(exactly)

	test("a package short by exactly the variation is within it, and it is said", () => {
		const label = { inchPound: null, metric: { amount: "340", unit: "g" as const } }
		const gross = [...twelve(380).slice(1), "351.7"]
		const sheet = judged(weighed({ label, gross }))
		expect(sheet.packages[11]).toMatchObject({ error: "-16.3", isTooShort: false, isJustWithin: true })
		expect(judged(weighed({ label, gross: [...twelve(380).slice(1), "351.6999"] })).tooShort).toBe(1)
	})

	test("an average exactly at the sample error limit passes, and it is said", () => {
		const exact = decideLot({
			errors: errors(-3, -1, -3, -1, -2),
			variations: exactly(16.3),
			shortAllowed: 0,
			correctionFactor: 2,
		})
		expect(exact.variance).toEqual(exactly(1))
		expect(exact).toMatchObject({ isAverageAtLimit: true, averageMet: true, isMet: true, limit: 2 })
	})

	test("tenths that binary numbers cannot hold add up to nothing", () => {
		const decision = decideLot({
			errors: errors("0.1", "0.2", "-0.3"),
			variations: exactly(1),
			shortAllowed: 0,
			correctionFactor: "2.484",
		})
		expect(decision).toMatchObject({ total: exactly(0), limit: null, averageMet: true })
	})

	test("every package short by the same fails: no spread, no limit to hide in", () => {
		expect(judged(weighed({ gross: twelve(368) })).hasPassed).toBe(false)
	})

	test("a lot of one package is judged by the variation alone", () => {
		const sheet = judged(weighed({ lotPackages: 1, gross: [353] }))
		expect(sheet).toMatchObject({ deviation: null, limit: null, isAverageAsked: false, hasPassed: true })
		expect(judged(weighed({ lotPackages: 1, gross: [351] })).hasPassed).toBe(false)
	})

	test("of 48 packages one may be short beyond the variation, not two", () => {
		const full = Array<number>(46).fill(380)
		expect(judged(weighed({ lotPackages: 4000, gross: [...full, 380, 300] }))).toMatchObject({
			tooShort: 1,
			hasPassed: true,
		})
		expect(judged(weighed({ lotPackages: 4000, gross: [...full, 300, 300] }))).toMatchObject({
			tooShort: 2,
			hasPassed: false,
		})
	})
})

test("what cannot be judged is refused with what to do", () => {
	const refusals = [
		[weighed({ gross: [368] }), "The plan asks for 12 weights and there are 1. Weigh 11 more."],
		[
			weighed({ gross: [...twelve(368), 368] }),
			"The plan asks for 12 weights and there are 13. Weigh those drawn first only.",
		],
		[
			weighed({ gross: twelve(368), tare: { kind: "weighed", weights: ["28"] } }),
			"Weigh at least 2 empty packages; there is one.",
		],
		[
			weighed({ gross: [20, ...twelve(368).slice(1)] }),
			"Package 1 weighs no more than the empty package. Look at the tare and at the unit.",
		],
		[weighed({ gross: [...twelve(368).slice(1), 0] }), "Package 12 weighs nothing. Write the full weight."],
		[
			weighed({ gross: twelve(368), label: { inchPound: null, metric: null } }),
			"Write what the label declares, in ounces, in grams or in both.",
		],
		[weighed({ gross: twelve(368), lotPackages: 0 }), "Write how many packages are in the lot, 1 or more."],
		[
			weighed({ gross: twelve(3000), label: { inchPound: { amount: "6", unit: "lb" }, metric: null } }),
			"The table of variations at hand ends at 5.80 lb (2,630 g). Ask your weights-and-measures office for heavier packages.",
		],
	] as const
	for (const [input, words] of refusals) {
		const answer = judgeNetContents(input)
		expect(answer.ok ? null : refusalWords(answer)).toBe(words)
	}
})

test("the decision is one sentence that a packer understands", () => {
	expect(decisionSentence(judged(weighed({ gross: twelve(372) })))).toBe(
		"The lot passes: on average its packages hold 3.806 g more than the label says, and no package is short by more than the maximum allowable variation of 16.3 g.",
	)
	expect(decisionSentence(judged(weighed({ gross: twelve(367) })))).toBe(
		"The lot fails: on average its packages are 1.194 g short, more than the sample error limit of 0 g.",
	)
	expect(decisionSentence(judged(weighed({ gross: [340, ...twelve(380).slice(1)] })))).toBe(
		"The lot fails: one package is short by more than the maximum allowable variation of 16.3 g; none may be.",
	)
})

test("doubts and unreadable weights are told in words that say what to do", () => {
	expect(doubtWords({ kind: "unit", times: 30.7, likely: "g" }, "oz")).toBe(
		"All weights are about 31 times more than the label says. Were they weighed in grams? Change the unit, or say below that they are in ounces.",
	)
	expect(doubtWords({ kind: "packages", places: [1, 3] }, "g")).toContain("Packages 2, 4 are far")
	expect(weightsRefusalWords({ ok: false, reason: "not-a-weight", cells: ["lost", "x"] })).toBe(
		"“lost” is no weight, nor is another. Write figures, such as 368 or 12.5 oz.",
	)
})

test("a failed lot is told the next quarter ounce that its sample holds", () => {
	expect(labelThatHolds(judged(weighed({ gross: twelve(367) })))).toBe("11.75 oz")
	const grams = { inchPound: null, metric: { amount: "340", unit: "g" as const } }
	expect(labelThatHolds(judged(weighed({ label: grams, gross: twelve(360) })))).toBe("11.5 oz")
})

test("each plan says why it asks for so many", () => {
	expect([1, 5, 90, 251, 4000].map((lot) => samplingWords(samplingPlan(lot)))).toEqual([
		"A lot of one package is judged by that one.",
		"In a lot of 5 every package is weighed.",
		"Lots of 12 to 250 packages are judged by 12.",
		"Lots of 251 to 3,200 packages are judged by 24.",
		"Lots of more than 3,200 packages are judged by 48.",
	])
	expect(() => samplingPlan(0)).toThrow(RangeError)
	expect(() => samplingPlan(1.5)).toThrow(RangeError)
})

test("figures are rounded half away from zero and never show a zero with a minus", () => {
	expect([
		decimalText(exactly("0.005"), 2),
		decimalText(exactly("-0.005"), 2),
		decimalText(exactly("-0.0004"), 2),
	]).toEqual(["0.01", "-0.01", "0.00"])
	expect(decimalText(toFigures(exactly("340.1942775"), 6), 4)).toBe("340.1940")
	expect(decimalText(toFigures(exactly("99999.96"), 6), 1)).toBe("100000.0")
})

test("heavier packages never turn a pass into a fail", () => {
	const sample = fc.array(fc.integer({ min: 340, max: 400 }), { minLength: 12, maxLength: 12 })
	fc.assert(
		fc.property(sample, fc.integer({ min: 1, max: 20 }), (gross, more) => {
			const before = judged(weighed({ gross }))
			const after = judged(weighed({ gross: gross.map((weight) => weight + more) }))
			expect(before.hasPassed && !after.hasPassed).toBe(false)
		}),
	)
})
