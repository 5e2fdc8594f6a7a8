import { describe, expect, test } from "vitest"
import { schemeTemplates } from "~/domain/grading/templates"
import { readScheme } from "~/routes/desk/grades-form"
import { readHarvest } from "~/routes/desk/harvest-form"
import { schemeAsTyped } from "~/ui/lots/scheme-form"

describe("the form of a scheme", () => {
	test.each(schemeTemplates)("$name is read back as it was written", ({ name, scheme }) => {
		const typed = schemeAsTyped(name, scheme)
		expect(readScheme(typed, { rows: 8, caseRule: scheme.caseRule })).toEqual({ ok: true, name, scheme })
	})

	test.each([
		["colours", "White under 35; Golden to 20; Dark", "colours"],
		["colours", "White under 35", "colours"],
		["below", "half", "below"],
		["name", "", "name"],
		["netOz-0", "12,5", "netOz-0"],
	])("%s written as %j is refused beside its field", (name, value, field) => {
		const [template] = schemeTemplates
		if (!template) throw new Error("no template")
		const typed = { ...schemeAsTyped(template.name, template.scheme), [name]: [value] }
		const read = readScheme(typed, { rows: 8, caseRule: null })
		if (read.ok) throw new Error("it was taken")
		expect(read.errors.map((error) => error.field)).toContain(field)
	})
})

describe("the form of a harvest", () => {
	const product = { productId: "p", grades: ["Fancy", "Culls"], supers: [{ id: "s" }] }
	const typed = { harvestedOn: "2026-08-13", "release-p": "2026-08-16", "best-p": "2027-06-09" }

	test("an empty field is none, and a reading has one place", () => {
		const { written, problems } = readHarvest({ ...typed, "n-s Fancy": " 36 ", "moisture-p": "17.6" }, [product])
		expect(problems).toEqual([])
		expect(written.products).toMatchObject([
			{ supers: [{ id: "s", counted: { Fancy: 36, Culls: 0 } }], moistureTenths: 176, pfundTenths: null },
		])
	})

	test.each([
		["n-s Fancy", "a few", "n-s-0"],
		["t-p Culls", "-3", "t-p-1"],
		["moisture-p", "17,6", "moisture-p"],
		["moisture-p", "45", "moisture-p"],
		["pfund-p", "201", "pfund-p"],
		["best-p", "June 9", "best-p"],
	])("%s written as %j is refused beside its field", (name, value, field) => {
		const { problems } = readHarvest({ ...typed, [name]: value }, [product])
		expect(problems.map((problem) => problem.field)).toEqual([field])
	})
})
