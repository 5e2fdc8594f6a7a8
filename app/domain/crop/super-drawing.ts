import { latestCheck, type SuperFacts } from "./super-facts"

/** One section of a super: bare foundation to fully capped. */
export type SectionState = "bare" | "begun" | "filling" | "full" | "capped"

/** In the order of the digits that a check keeps: 0 bare to 4 capped. */
export const SECTION_STATES: readonly SectionState[] = ["bare", "begun", "filling", "full", "capped"]

const USUAL_ROWS = 4

/** How the sections of a super stand, seen from above: four rows as in the usual box of four times ten, more in a large one. */
export function superGrid(capacityPieces: number): { rows: number; across: number } {
	if (capacityPieces <= 10) return { rows: 1, across: Math.max(1, capacityPieces) }
	const rows = capacityPieces <= 48 ? USUAL_ROWS : Math.round(Math.sqrt(capacityPieces / 2.5))
	return { rows, across: Math.ceil(capacityPieces / rows) }
}

/**
 * The sections of a super as last seen, row by row. A check's own digits are drawn as they are (too few are filled up with
 * bare ones). Where only shares were noted they are laid from the middle outwards, as bees work: capped, full, then
 * sections being filled, each counted as half a full one, and a rim that has been begun. Nobody has looked: all bare.
 */
export function sectionsOf(facts: Pick<SuperFacts, "capacityPieces" | "checks">): SectionState[] {
	const { capacityPieces } = facts
	const check = latestCheck(facts)
	if (check?.sections) {
		return Array.from({ length: capacityPieces }, (_, at) => SECTION_STATES[Number(check.sections[at] ?? 0)] ?? "bare")
	}
	const sections: SectionState[] = Array.from({ length: capacityPieces }, () => "bare")
	if (!check) return sections
	const states = statesOfShares(capacityPieces, check.filledPercent, check.cappedPercent)
	for (const [rank, at] of fromTheMiddle(capacityPieces).entries()) sections[at] = states[rank] ?? "bare"
	return sections
}

/** The states that shares come to, the furthest first; what is left over is bare. */
function statesOfShares(capacity: number, filledPercent: number, cappedPercent: number): SectionState[] {
	const capped = Math.round((capacity * cappedPercent) / 100)
	const open = Math.max(0, Math.round((capacity * filledPercent) / 100) - capped)
	const bare = capacity - capped - open
	const halved = Math.min(Math.floor(open / 3), bare)
	const begun = Math.min(bare - halved, filledPercent > 0 ? Math.max(1, halved) : 0)
	const counts: [SectionState, number][] = [
		["capped", capped],
		["full", open - halved],
		["filling", halved * 2],
		["begun", begun],
	]
	return counts.flatMap(([state, count]) => Array.from({ length: count }, () => state))
}

/** The places of the sections, the nearest to the middle first. */
function fromTheMiddle(capacity: number): number[] {
	const { rows, across } = superGrid(capacity)
	// A section is taller than it is wide in the box: along a row counts less than across rows.
	const away = (at: number) =>
		(((at % across) - (across - 1) / 2) * 0.55) ** 2 + (Math.floor(at / across) - (rows - 1) / 2) ** 2
	return Array.from({ length: capacity }, (_, at) => at).sort((a, b) => away(a) - away(b) || a - b)
}
