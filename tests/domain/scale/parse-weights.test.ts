import { expect, test } from "vitest"
import { exactly, plainDecimal } from "~/domain/scale/fraction"
import { parseWeights } from "~/domain/scale/parse-weights"
import { weightDoubt } from "~/domain/scale/unit-doubt"
import { parseWeight, type WeightUnit } from "~/domain/scale/weight-units"

const read = (text: string, unit: WeightUnit = "g") => {
	const answer = parseWeights(text, unit)
	return answer.ok ? answer.weights : answer
}

test.each([
	["368", "g", "368 g"],
	["0,812", "lb", "0.812 lb"],
	["12½ oz", "g", "12.5 oz"],
	["7/16 oz", "g", "0.4375 oz"],
	["1 1/8 oz", "g", "1.125 oz"],
	["1 lb 2.5 oz", "g", "1.15625 lb"],
	["0.34 kg", "lb", "340 g"],
	[".5", "lb", "0.5 lb"],
	["-3", "g", "-3 g"],
] as const)("a person writes %s and the scale shows %s: %s", (typed, unit, weight) => {
	const answer = parseWeight(typed, unit)
	expect(answer.ok && `${plainDecimal(answer.weight.amount)} ${answer.weight.unit}`).toBe(weight)
})

test.each(["", "abc", "12 stone", "1/0", "3 4", "12 oz 1 lb", "1e5", "1 g 2 g", "..", "12 3 oz"])(
	"%j is no weight",
	(typed) => expect(parseWeight(typed, "g").ok).toBe(false),
)

test("weights come one on a line, or apart by blanks, tabs, semicolons or commas", () => {
	const weights = ["368", "365", "371"]
	for (const text of [
		"368\n365\r\n371\n",
		"368 365  371",
		"368\t365\t371",
		"368;365;371",
		"368, 365, 371",
		"368,365,371",
	])
		expect(read(text)).toEqual(weights)
})

test("a decimal comma is read where it can be nothing else", () => {
	expect(read("368,5\n365,2\n371,0")).toEqual(["368.5", "365.2", "371"])
	expect(read("368,5;365,2;371")).toEqual(["368.5", "365.2", "371"])
	expect(read("0,812 0,809", "lb")).toEqual(["0.812", "0.809"])
	expect(read("368,365")).toEqual(["368", "365"])
})

test("a comma that may be either is asked about, never guessed", () => {
	expect(read("12,11\n12,10\n11,12", "oz")).toEqual({ ok: false, reason: "comma-in-doubt" })
})

test("a table gives its column of full weights; heading and running numbers are passed over", () => {
	expect(read("no;gross g;tare\n1;368;28\n2;365;27")).toEqual(["368", "365"])
	expect(read("package,weight\n1,368\n2,365")).toEqual(["368", "365"])
	expect(read("1\t368\n2\t365\n3\t371")).toEqual(["368", "365", "371"])
	expect(read("1,368\n2,365\n3,371")).toEqual(["368", "365", "371"])
	expect(read("Weight of package\n368 g\n365 g")).toEqual(["368", "365"])
	expect(read("368 365\n371 366")).toEqual(["368", "365", "371", "366"])
})

test("several columns that may be the weights are asked about", () => {
	expect(read("340;28\n339;27")).toEqual({ ok: false, reason: "several-columns", columns: 2 })
})

test("a weight with a unit of its own is turned into the unit of the check", () => {
	expect(read("12 oz\n340 g")).toEqual(["340.194", "340"])
	expect(read("12.5 oz; 1 lb", "oz")).toEqual(["12.5", "16"])
})

test("what is no weight is named, and nothing at all is said to be nothing", () => {
	expect(read("368\nlost\n371")).toEqual({ ok: false, reason: "not-a-weight", cells: ["lost"] })
	expect(read("  \n ")).toEqual({ ok: false, reason: "empty" })
	expect(read("1 ".repeat(1001))).toEqual({ ok: false, reason: "too-many" })
})

test("weights that are all 28.35 or 453.6 times off are noticed with the unit they are likely in", () => {
	const label = { amount: exactly(12), unit: "oz" as const }
	expect(weightDoubt(["368", "365", "371"], "oz", label)).toMatchObject({ kind: "unit", likely: "g" })
	expect(weightDoubt(["13", "12.9", "13.1"], "g", label)).toMatchObject({ kind: "unit", likely: "oz" })
	expect(weightDoubt(["0.81", "0.80", "0.82"], "g", label)).toMatchObject({ kind: "unit", likely: "lb" })
	expect(weightDoubt(["368", "365"], "lb", label)).toMatchObject({ kind: "unit", likely: "g" })
	expect(weightDoubt(["13", "12.9"], "lb", label)).toMatchObject({ kind: "unit", likely: "oz" })
	expect(weightDoubt(["368", "365", "371"], "g", label)).toBeNull()
})

test("one weight far from its label is noticed by its place", () => {
	const label = { amount: exactly(340), unit: "g" as const }
	expect(weightDoubt(["368", "36.5", "371"], "g", label)).toEqual({ kind: "packages", places: [1] })
})
