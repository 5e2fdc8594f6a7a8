import { type Day, isDay } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { layoutOf, rowFromMiddle, sharesOfSections, tapsOfRow } from "./check-sections"

/** The most that a note of a check holds, in characters. */
export const NOTE_LENGTH = 500

/** A check as it was typed, in the yard or at the desk. */
export type TypedCheck = {
	/** By rows of sections, or by shares alone; what was typed for the other is not looked at. */
	by: "rows" | "shares"
	/** The codes tapped in each row, from the middle out. */
	rows: readonly string[]
	filled: string
	capped: string
	note: string
	checkedOn: string
}

/** What a check says, fit to be recorded. `sections` is empty when only shares were noted. */
export type NotedCheck = {
	checkedOn: Day
	filledPercent: number
	cappedPercent: number
	sections: string
	note: string
}

export type CheckField = "checkedOn" | "rows" | "filled" | "capped" | "note"

export type FieldRefusal = {
	field: CheckField
	reason:
		| "no-day"
		| "in-future"
		| "before-set-on"
		| "nothing-tapped"
		| "rows-wrong"
		| "no-share"
		| "capped-over-filled"
		| "too-long"
}

/**
 * Turns a typed check into one that can be recorded. `today` is the producer's; a day in the future or before the super
 * was set on is refused, and so are shares that are no whole percent from 0 to 100, a capped share over the filled one,
 * rows with other than codes or longer than the super is wide, rows of which none was tapped, and too long a note. All
 * that is wrong is named at once.
 */
export function judgeCheck(
	typed: TypedCheck,
	facts: { capacityPieces: number; setOn: Day; today: Day },
): Result<{ check: NotedCheck }, { ok: false; reason: "fields"; refused: FieldRefusal[] }> {
	const refused: FieldRefusal[] = []
	const day = dayRefusal(typed.checkedOn, facts)
	if (day) refused.push({ field: "checkedOn", reason: day })
	const seen = typed.by === "rows" ? judgeRows(typed.rows, facts.capacityPieces) : judgeShares(typed)
	if ("refused" in seen) refused.push(...seen.refused)
	const note = typed.note.trim()
	if (note.length > NOTE_LENGTH) refused.push({ field: "note", reason: "too-long" })
	if (refused.length > 0 || "refused" in seen) return { ok: false, reason: "fields", refused }
	return { ok: true, check: { checkedOn: typed.checkedOn, note, ...seen } }
}

function dayRefusal(day: string, { setOn, today }: { setOn: Day; today: Day }): FieldRefusal["reason"] | null {
	if (!isDay(day)) return "no-day"
	if (day > today) return "in-future"
	return day < setOn ? "before-set-on" : null
}

type Seen = Pick<NotedCheck, "filledPercent" | "cappedPercent" | "sections"> | { refused: FieldRefusal[] }

function judgeRows(rows: readonly string[], capacityPieces: number): Seen {
	const layout = layoutOf(capacityPieces)
	const isWrong = (taps: string) => !/^[0-4]*$/.test(taps) || taps.length > tapsOfRow(layout?.across ?? 0)
	if (!layout || rows.length !== layout.rows || rows.some(isWrong)) {
		return { refused: [{ field: "rows", reason: "rows-wrong" }] }
	}
	if (rows.every((taps) => taps === "")) return { refused: [{ field: "rows", reason: "nothing-tapped" }] }
	const sections = rows.map((taps) => rowFromMiddle(taps, layout.across)).join("")
	return { sections, ...sharesOfSections(sections) }
}

function judgeShares({ filled, capped }: TypedCheck): Seen {
	const [filledPercent, cappedPercent] = [percentOf(filled), percentOf(capped)]
	if (filledPercent === null || cappedPercent === null) {
		const wrong = [filledPercent === null && "filled", cappedPercent === null && "capped"] as const
		return { refused: wrong.flatMap((field) => (field ? [{ field, reason: "no-share" }] : [])) }
	}
	if (cappedPercent > filledPercent) return { refused: [{ field: "capped", reason: "capped-over-filled" }] }
	return { filledPercent, cappedPercent, sections: "" }
}

/** A whole percent from 0 to 100 as people type it ("60", "60 %"), or null. */
function percentOf(typed: string): number | null {
	const [, digits] = /^\s*(\d{1,3})\s*%?\s*$/.exec(typed) ?? []
	return digits !== undefined && Number(digits) <= 100 ? Number(digits) : null
}
