import { faultNames } from "~/domain/grading/faults"
import {
	type CaseRule,
	combForms,
	type GradeRule,
	type GradeScheme,
	type SchemeColour,
} from "~/domain/grading/grade-comb"
import { parseHundredths } from "~/domain/grading/hundredths"
import { measureNames, measures } from "~/domain/grading/measures"
import type { TypedScheme } from "~/ui/lots/scheme-form"

type FieldError = { field: string; message: string }

/** What was typed, names that come more than once with all their values. */
export function typedScheme(form: FormData): TypedScheme {
	return Object.fromEntries([...new Set(form.keys())].map((name) => [name, form.getAll(name).map(String)]))
}

const listIn = (text: string) =>
	text
		.split(";")
		.map((part) => part.trim())
		.filter((part) => part !== "")

/** Reads the form of a scheme. `caseRule` is kept as it was: the form does not change it. */
export function readScheme(
	typed: TypedScheme,
	{ rows, caseRule }: { rows: number; caseRule: CaseRule | null },
): { ok: true; name: string; scheme: GradeScheme } | { ok: false; errors: FieldError[] } {
	const errors: FieldError[] = []
	const first = (name: string) => typed[name]?.[0]?.trim() ?? ""
	const name = first("name").slice(0, 80)
	if (name === "") errors.push({ field: "name", message: "Give the scheme a name." })
	const forms = combForms.filter((form) => typed.form?.includes(form))
	if (forms.length === 0) errors.push({ field: "name", message: "Choose for which comb the scheme is." })
	const below = first("below") || "0"
	if (!/^\d{1,2}$/.test(below)) errors.push({ field: "below", message: "Write a whole percent from 0 to 99." })
	const colours = coloursIn(first("colours"), errors)
	const grades = Array.from({ length: rows }, (_, index) => gradeIn(typed, { index, colours, errors })).filter(
		(grade) => grade !== null,
	)
	if (grades.length === 0) errors.push({ field: "grade-0", message: "Write at least one grade, the best first." })
	if (new Set(grades.map((grade) => grade.name)).size < grades.length) {
		errors.push({ field: "grade-0", message: "Two grades have the same name." })
	}
	if (errors.length > 0) return { ok: false, errors }
	const source = first("source").slice(0, 400)
	return { ok: true, name, scheme: { source, forms, grades, colours, caseRule, belowPercent: Number(below) } }
}

function coloursIn(text: string, errors: FieldError[]): SchemeColour[] {
	const refuse = () => {
		const message = "Write colours as: White under 35; Golden to 85; Dark. The last one has no end."
		if (!errors.some(({ field }) => field === "colours")) errors.push({ field: "colours", message })
	}
	const bands = listIn(text).map((part): SchemeColour => {
		const [, name, word, to] = /^(.+?)(?: (under|to) (\d{1,3}(?:\.\d)?))?$/.exec(part) ?? []
		return {
			name: name ?? part,
			toPfundTenths: to === undefined ? null : Math.round(Number(to) * 10),
			isUnder: word === "under",
		}
	})
	const ends = bands.map(({ toPfundTenths }) => toPfundTenths)
	const isRising = ends.every((end, index) => {
		const before = ends[index - 1]
		return index === 0 || (before !== null && before !== undefined && (end === null || end > before))
	})
	if (bands.length > 0 && (!isRising || ends.at(-1) !== null)) refuse()
	return bands
}

type GradeReading = { index: number; colours: readonly SchemeColour[]; errors: FieldError[] }

function gradeIn(typed: TypedScheme, { index, colours, errors }: GradeReading): GradeRule | null {
	const first = (name: string) => typed[`${name}-${index}`]?.[0]?.trim() ?? ""
	const limits: GradeRule["limits"] = {}
	for (const measure of measureNames) {
		const text = first(measure)
		if (text === "") continue
		const read = parseHundredths(text)
		const field = `${measure}-${index}`
		if (read === null) errors.push({ field, message: "Write a figure with a point, such as 12.5." })
		else if (measures[measure].unit === "%" && read > 10_000)
			errors.push({ field, message: "A share is 100 % at most." })
		else limits[measure] = read
	}
	const name = first("grade").slice(0, 60)
	const taken = listIn(first("colours"))
	const odd = taken.find((one) => !colours.some((colour) => colour.name === one))
	if (odd) errors.push({ field: `colours-${index}`, message: `“${odd}” is not a colour name of this scheme.` })
	if (name === "") {
		if (Object.keys(limits).length > 0) errors.push({ field: `grade-${index}`, message: "Name this grade." })
		return null
	}
	return {
		name,
		limits,
		outsideRowMayBeOpen: first("outside") === "on",
		excludes: faultNames.filter((fault) => typed[`excludes-${index}`]?.includes(fault)),
		colours: taken,
	}
}
