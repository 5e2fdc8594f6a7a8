import { z } from "zod"
import { faultNames } from "~/domain/grading/faults"
import type { GradeScheme, GradingFacts, Separators } from "~/domain/grading/grade-comb"
import { parseHundredths } from "~/domain/grading/hundredths"
import { measures } from "~/domain/grading/measures"
import type { FaultChoice } from "~/ui/lots/fault-boxes"
import { measuresAsked } from "~/ui/lots/grading-form"

type FieldError = { field: string; message: string }

const SEPARATORS: readonly Separators[] = ["separators", "half", "none"]

/** What was typed in the grading form, to be shown again. */
export function typedGrading(form: FormData): FaultChoice {
	const values = Object.fromEntries([...form].filter(([, value]) => typeof value === "string")) as Record<
		string,
		string
	>
	return { values, faults: form.getAll("fault").map(String) }
}

/** Reads the grading form for a scheme. A measure left empty was not measured. */
export function readGrading(
	{ values, faults }: FaultChoice,
	scheme: GradeScheme,
): { ok: true; facts: GradingFacts } | { ok: false; errors: FieldError[] } {
	const errors: FieldError[] = []
	const figureIn = (field: string, message: string): number | null => {
		const text = values[field]?.trim() ?? ""
		if (text === "") return null
		const read = parseHundredths(text)
		if (read === null) errors.push({ field, message })
		return read
	}
	const countIn = (field: string) => {
		const text = values[field]?.trim() ?? ""
		if (!/^\d{0,5}$/.test(text)) errors.push({ field, message: "Write whole pieces in figures." })
		return Number(text) || 0
	}
	const measured: GradingFacts["measured"] = {}
	for (const measure of measuresAsked(scheme)) {
		const { unit } = measures[measure]
		const read = figureIn(measure, `Write ${unit} in figures with a point, such as ${unit === "oz" ? "12.5" : "85"}.`)
		if (read === null) continue
		if (unit === "%" && read > 10_000) errors.push({ field: measure, message: "A share is 100 % at most." })
		measured[measure] = read
	}
	const pfund = figureIn("pfund", "Write the Pfund reading in millimetres, such as 34.")
	if (pfund !== null && pfund > 20_000) errors.push({ field: "pfund", message: "A Pfund reading is 200 mm at most." })
	const caseLb = scheme.caseRule ? figureIn("caseLb", "Write the pounds of a case, such as 21.5.") : null
	const [piecesSeen, piecesBelow] = [countIn("seen"), countIn("below")]
	if (piecesSeen === 0) errors.push({ field: "seen", message: "Write how many pieces were looked at." })
	else if (piecesBelow > piecesSeen) errors.push({ field: "below", message: "That is more than were looked at." })
	if (errors.length > 0) return { ok: false, errors }
	const separators = z.enum(SEPARATORS).catch("separators").parse(values.separators)
	return {
		ok: true,
		facts: {
			measured,
			isOutsideRowOpen: values.outsideRow === "on",
			faults: faultNames.filter((fault) => faults.includes(fault)),
			pfundTenths: pfund === null ? null : Math.round(pfund / 10),
			caseWeighed: caseLb === null ? null : { hundredthsLb: caseLb, separators },
			piecesSeen,
			piecesBelow,
		},
	}
}
