import type { Fault } from "./faults"
import { UNGRADED } from "./grade-comb"

type Caution = { title: string; words: string; source: string }

/** Pieces of a lot of extracted honey that may be below its grade in California, in percent by count; a figure to start from. */
export const CALIFORNIA_BELOW_PERCENT = 5

/** Granulated comb must be marked as such. Source: Cal. Food & Agric. Code 29587. */
const CRYSTALLISED: Caution = {
	title: "Crystallized comb is marked",
	words: "Comb that has crystallized is sold with a placard beside it that says “crystallized”.",
	source: "Cal. Food & Agric. Code 29587",
}

const UNGRADED_MARK: Caution = {
	title: "Mark it “Ungraded”",
	words:
		"Where honey is sold to grade, honey that is not must be marked “Ungraded” on each container or section and on each case.",
	source: "Wis. Admin. Code ATCP 87.07",
}

const WHOLE_CROP: Caution = {
	title: "Grading binds the crop",
	words: "Whoever grades part of an annual crop sells the whole crop graded, or marked “Ungraded”.",
	source: "Wis. Admin. Code ATCP 87.07",
}

/** What a grade, and what was seen, ask of the seller, each with its source. Other places have other rules. */
export function gradeCautions(grading: { grade: string; faults: readonly Fault[] }): Caution[] {
	return [
		...(grading.grade === UNGRADED ? [UNGRADED_MARK] : [WHOLE_CROP]),
		...(grading.faults.includes("granulation") ? [CRYSTALLISED] : []),
	]
}
