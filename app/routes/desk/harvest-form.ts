import { isDay } from "~/domain/calendar"
import type { CountedGrades } from "~/domain/lots/count-harvest"
import type { HarvestProblem, WrittenHarvest, WrittenProduct } from "~/domain/lots/plan-harvest"
import { cellId, cellName } from "~/ui/lots/count-product"

/** What is wrong with a field; `field` is the id of its element. */
export type FieldProblem = { field?: string; message: string }

type AskedProduct = { productId: string; grades: readonly string[]; supers: readonly { id: string }[] }

/** What was typed, by name; a name that comes twice is kept once. */
export function typedIn(form: FormData): Record<string, string> {
	const typed: Record<string, string> = {}
	for (const [name, value] of form) if (typeof value === "string" && name !== "intent") typed[name] = value
	return typed
}

/** Tenths of what is written with at most one place: "17.6" is 176. Null for empty, undefined for anything else. */
function tenths(text: string): number | null | undefined {
	const typed = text.trim()
	if (typed === "") return null
	const [, whole, part = "0"] = /^(\d{1,3})(?:\.(\d))?$/.exec(typed) ?? []
	return whole === undefined ? undefined : Number(whole) * 10 + Number(part)
}

/** Reads the form of a harvest for the products that are being counted. Every wrong field is named. */
export function readHarvest(
	typed: Readonly<Record<string, string>>,
	products: readonly AskedProduct[],
): { written: WrittenHarvest; problems: FieldProblem[] } {
	const problems: FieldProblem[] = []
	const dayIn = (field: string) => {
		const day = typed[field] ?? ""
		if (!isDay(day)) problems.push({ field, message: "Write a day, such as 2026-08-18." })
		return day
	}
	const readingIn = (field: string, { least, most, words }: { least: number; most: number; words: string }) => {
		const value = tenths(typed[field] ?? "")
		if (value === undefined || (value !== null && (value < least || value > most))) {
			problems.push({ field, message: words })
			return null
		}
		return value
	}
	const countIn = (row: string, grades: readonly string[]): CountedGrades =>
		Object.fromEntries(
			grades.map((grade, index) => {
				const text = (typed[cellName(row, grade)] ?? "").trim()
				if (!/^\d{0,4}$/.test(text)) {
					problems.push({ field: cellId(row, index), message: `${grade}: write whole pieces in figures, such as 36.` })
					return [grade, 0]
				}
				return [grade, Number(text)]
			}),
		)
	const written: WrittenHarvest = {
		harvestedOn: dayIn("harvestedOn"),
		products: products.map(({ productId, grades, supers }): WrittenProduct => {
			const ofProduct = (name: string) => `${name}-${productId}`
			return {
				productId,
				supers: supers.map(({ id }) => ({ id, counted: countIn(`n-${id}`, grades) })),
				total: countIn(`t-${productId}`, grades),
				moistureTenths: readingIn(ofProduct("moisture"), {
					least: 100,
					most: 400,
					words: "Write the water in percent with one place, from 10.0 to 40.0, or leave it empty.",
				}),
				pfundTenths: readingIn(ofProduct("pfund"), {
					least: 0,
					most: 2000,
					words: "Write the Pfund reading in millimetres with one place, from 0 to 200, or leave it empty.",
				}),
				flora: (typed[ofProduct("flora")] ?? "").trim().slice(0, 80),
				expectedReleaseOn: dayIn(ofProduct("release")),
				bestBeforeOn: dayIn(ofProduct("best")),
				codes: Object.fromEntries(grades.map((grade) => [grade, typed[`code-${productId}-${grade}`] ?? ""])),
			}
		}),
	}
	return { written, problems }
}

const PARTS: Record<string, string> = { total: "t", release: "release", "best-before": "best" }

/** Where on the page a problem of the harvest stands. */
export function placeOf({ at, message }: HarvestProblem): FieldProblem {
	if (at === null) return { message }
	if ("harvestedOn" in at) return { field: "harvestedOn", message }
	if ("superId" in at) return { field: cellId(`n-${at.superId}`, 0), message }
	const { productId, part } = at
	if (part.startsWith("code-")) return { field: `code-${productId}-${part.slice(5)}`, message }
	const name = `${PARTS[part]}-${productId}`
	return { field: part === "total" ? cellId(name, 0) : name, message }
}
