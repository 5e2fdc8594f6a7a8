import { expect, test } from "vitest"
import { readTyped, readWeighing } from "~/routes/desk/scale-form"

const TWELVE = ["368", "370", "371", "369", "368", "372", "370", "367", "370", "369", "371", "368"]

function form(fields: Record<string, string>, weights: readonly string[] = [], file?: File): FormData {
	const data = new FormData()
	const typed = { packages: "90", inchPound: "12 oz", metric: "340", unit: "g", tareEntered: "28", ...fields }
	for (const [name, value] of Object.entries(typed)) data.set(name, value)
	for (const weight of weights) data.append("weight", weight)
	if (file) data.set("file", file)
	return data
}

async function read(...given: Parameters<typeof form>) {
	const { typed, faults } = await readTyped(form(...given))
	const weighing = readWeighing(typed)
	return { typed, faults: [...faults, ...(weighing.ok ? [] : weighing.faults)], weighing }
}

test("weights are taken from the fields, from the box and from a file alike", async () => {
	const file = new File([`no;gross\n${TWELVE.map((weight, place) => `${place + 1};${weight}`).join("\n")}`], "a.csv")
	for (const given of [await read({}, TWELVE), await read({ pasted: TWELVE.join("\n") }), await read({}, [], file)]) {
		expect(given.faults).toEqual([])
		expect(given.weighing.ok && given.weighing.input.packages.map(({ gross }) => gross)).toEqual(TWELVE)
	}
})

test("a label in pounds and ounces is read as such", async () => {
	const { weighing } = await read({ inchPound: "1 lb 8 oz", metric: "" }, ["710", ...TWELVE.slice(1).map(() => "712")])
	expect(weighing.ok && weighing.input.label).toEqual({ inchPound: { amount: "1.5", unit: "lb" }, metric: null })
})

test("each wrong field has its own message, and all that was typed is kept", async () => {
	const { typed, faults } = await read(
		{ packages: "many", metric: "12 oz", division: "fine", tareEntered: "", unit: "stone" },
		["368", "x"],
	)
	expect(faults.map(({ field }) => field)).toEqual([
		"packages",
		"unit",
		"metric",
		"division",
		"tareWeighed",
		"weight-1",
	])
	expect(typed).toMatchObject({ packages: "many", metric: "12 oz", division: "fine", weights: ["368", "x"] })
})

test("a weight left out among others is missed by its number", async () => {
	const { faults } = await read({}, ["368", "", "371"])
	expect(faults).toEqual([{ field: "weight-1", message: "Package 2: its weight is missing." }])
})

test("two places for the same thing are asked about", async () => {
	const both = await read({ pasted: "368" }, ["368"])
	expect(both.faults.map(({ field }) => field)).toEqual(["pasted"])
	const tares = await read({ tareWeighed: "27 29" }, TWELVE)
	expect(tares.faults.map(({ field }) => field)).toEqual(["tareEntered"])
})

test("a unit that cannot be right is asked about once, and taken when the person is sure", async () => {
	const asked = await read({ unit: "oz", tareEntered: "28" }, TWELVE)
	expect(asked.weighing).toMatchObject({ ok: false, asks: true, faults: [{ field: "unit" }] })
	const sure = await read({ unit: "oz", tareEntered: "28", isSure: "yes" }, TWELVE)
	expect(sure.weighing.ok).toBe(true)
})

test("a file that is no text or too large is refused whatever its name says", async () => {
	const binary = await read({}, [], new File([new Uint8Array([0x50, 0x4b, 3, 4, 0, 0, 255, 254])], "weights.csv"))
	expect(binary.faults[0]).toMatchObject({ field: "file", message: expect.stringContaining("not text") })
	const large = await read({}, [], new File(["368\n".repeat(70_000)], "weights.csv"))
	expect(large.faults[0]).toMatchObject({ field: "file", message: expect.stringContaining("256 KB") })
})
