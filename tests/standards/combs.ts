import type { GradeScheme, GradingFacts } from "~/domain/grading/grade-comb"
import { schemeTemplates } from "~/domain/grading/templates"

/** A published figure in hundredths. */
export const hundredths = (figure: number) => Math.round(figure * 100)

/** The scheme of the first template whose name matches. */
export function schemeOf(name: RegExp): GradeScheme {
	const found = schemeTemplates.find((template) => name.test(template.name))
	if (!found) throw new Error(`no template ${name}`)
	return found.scheme
}

/** Comb with which nothing is wrong, but for what a case says of it. */
export function comb(measured: GradingFacts["measured"], more: Partial<GradingFacts> = {}): GradingFacts {
	return {
		measured: { unsealedCells: 0, ...measured },
		isOutsideRowOpen: false,
		faults: [],
		pfundTenths: 100,
		caseWeighed: null,
		piecesSeen: 20,
		piecesBelow: 0,
		...more,
	}
}
