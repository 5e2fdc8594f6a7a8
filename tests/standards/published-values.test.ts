import { expect, test } from "vitest"
import { holdAllocation } from "./allocation"
import { holdBarcodes } from "./barcodes"
import { holdCalendar } from "./calendar"
import { holdFreezing } from "./freezing"
import { holdGrades } from "./grades"
import { holdKeeping } from "./keeping"
import { holdLabelling } from "./labelling"
import { holdNetContents } from "./net-contents"
import { holdPlanning } from "./planning"
import { heldTo, ownValuesPath, readValues } from "./published-values"
import { holdTerms } from "./terms"
import { holdTraceability } from "./traceability"

/** Fields that describe an entry and hold no figure to check. */
const DESCRIPTIVE = ["id", "name", "description", "labels", "source", "status", "note", "product", "half_even"]

type Sections = Record<string, unknown>

function isSections(value: unknown): value is Sections {
	return typeof value === "object" && value !== null && !Array.isArray(value)
}

/** Sections that say in words what another section's figures mean. */
const EXPLAINING = /_status$|definitions$|^remainder_rule$/

/** The sections of one topic that hold something to check; notes about them are text. */
function sectionsOf(topic: unknown): string[] {
	if (!isSections(topic)) return []
	return Object.keys(topic).filter(
		(key) => typeof topic[key] === "object" && topic[key] !== null && !EXPLAINING.test(key),
	)
}

/** The fields of a section's entries that no test reads. */
function unreadFields(section: unknown, read: readonly string[]): string[] {
	const entries = isSections(section) && Array.isArray(section.examples) ? section.examples : section
	if (read.length === 0 || !Array.isArray(entries)) return []
	const known = new Set([...read.map((field) => field.split(" ")[0]), ...DESCRIPTIVE])
	return [...new Set(entries.filter(isSections).flatMap(Object.keys))].filter((field) => !known.has(field))
}

/** One line for each topic, or part of one, that the file has values for and the product no rule yet. */
function notYetRuled(file: Sections): string[] {
	return Object.entries(file).flatMap(([topic, content]) => {
		if (topic === "meta") return []
		const sections = sectionsOf(content)
		const without = sections.filter((section) => !heldTo[`${topic}.${section}`])
		const partly = sections.flatMap((section) => {
			const unread = unreadFields((content as Sections)[section], heldTo[`${topic}.${section}`] ?? [])
			return unread.length === 0 ? [] : [`No rule yet for part of ${topic}.${section}: ${unread.join(", ")}`]
		})
		return [...(without.length === 0 ? [] : [`No rule yet for ${topic}: ${without.join(", ")}`]), ...partly]
	})
}

/** The values the rules are held to in this run: the repository's own, or the file that CHECK_VALUES names. */
const valuesPath = process.env.CHECK_VALUES ?? ownValuesPath
const values = readValues(valuesPath)
const lines = notYetRuled(values)
console.info([`Published values from ${valuesPath.split("/").at(-1)}`, ...lines].join("\n"))

for (const hold of [
	holdTerms,
	holdPlanning,
	holdCalendar,
	holdLabelling,
	holdNetContents,
	holdBarcodes,
	holdAllocation,
	holdTraceability,
	holdGrades,
	holdKeeping,
	holdFreezing,
])
	hold(values)

test("every rule held to published values has values in the repository's own file", () => {
	const own = readValues(ownValuesPath) as Record<string, Sections | undefined>
	for (const place of Object.keys(heldTo)) {
		const [topic = "", section = ""] = place.split(".")
		expect(own[topic]?.[section], place).toBeDefined()
	}
})

test("every entry of the repository's own file names its source and how sure it is", () => {
	const own = readValues(ownValuesPath) as Record<string, Sections | undefined>
	for (const place of Object.keys(heldTo)) {
		const [topic = "", section = ""] = place.split(".")
		const entries = own[topic]?.[section]
		const beside = [own[topic]?.status, own[topic]?.[`${section}_status`]].find((status) => status !== undefined)
		const each = isSections(entries) ? [entries] : Array.isArray(entries) ? entries : []
		for (const entry of each) expect(isSections(entry) ? (entry.status ?? beside) : beside, place).toBeTypeOf("string")
	}
})

test("a topic without a rule and a column that nothing reads are both told", () => {
	const told = notYetRuled({
		meta: { title: "not a topic" },
		routing: { tours: { rule: "…" }, source: "a book" },
		planning: { atp: [{ id: "X", on_hand: 1, projected_on_hand: [1] }], newsvendor: [{ id: "NV" }] },
	})
	expect(told).toEqual([
		"No rule yet for routing: tours",
		"No rule yet for planning: newsvendor",
		"No rule yet for part of planning.atp: projected_on_hand",
	])
})
