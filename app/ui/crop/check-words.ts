import { type Day, dayWords, fullDay, monthDay } from "~/domain/calendar"
import { type FieldRefusal, NOTE_LENGTH } from "~/domain/crop/check-rules"
import { tapsOfRow } from "~/domain/crop/check-sections"

/** What is wrong with a form, field by field, as a summary takes it. */
export type CheckErrors = { field?: string; message: string }[]

/** What a form of a check posts, as it was typed. The photo goes beside it. */
export const CHECK_FIELDS = ["by", "row1", "row2", "row3", "row4", "filled", "capped", "note", "checkedOn"] as const

export type CheckFields = Partial<Record<(typeof CHECK_FIELDS)[number], string>>

/** The rules' view of what was typed. */
export function typedCheckOf(fields: CheckFields) {
	const { by, filled = "", capped = "", note = "", checkedOn = "" } = fields
	const rows = [fields.row1, fields.row2, fields.row3, fields.row4].map((taps) => (taps ?? "").trim())
	return { by: by === "rows" ? ("rows" as const) : ("shares" as const), rows, filled, capped, note, checkedOn }
}

/** What is wrong with one field of a check, and what to do. */
export function fieldWords({ reason }: FieldRefusal, facts: { setOn: Day; today: Day; across: number | null }): string {
	switch (reason) {
		case "no-day":
			return "Choose the day on which you looked into the super."
		case "in-future":
			return `That day is still to come. Today is ${dayWords(facts.today)}.`
		case "before-set-on":
			return `The super was set on ${fullDay(facts.setOn)}; choose that day or a later one.`
		case "nothing-tapped":
			return "Tap what you see in at least one row, or note the shares instead."
		case "rows-wrong":
			return facts.across === null
				? "The sections of this super lie in no four even rows; note the shares instead."
				: `A row takes at most ${tapsOfRow(facts.across)} digits from 0 to 4, the middle first.`
		case "no-share":
			return "Give a whole percent from 0 to 100."
		case "capped-over-filled":
			return "More is capped than filled. Capped sections are filled too, so the filled share is at least as large."
		case "too-long":
			return `Keep the note under ${NOTE_LENGTH} characters.`
	}
}

/** What is wrong with a photo, and what to do. */
export const PHOTO_WORDS = {
	"photo-too-heavy": "The photo is larger than 10 MB. Take it smaller, or leave it out.",
	"photo-of-other-type":
		"This file is no JPEG, PNG or WebP photo, whatever its name says. Choose another, or leave it out.",
	"photo-too-many-pixels": "The photo has more than 64 million pixels. Take it smaller, or leave it out.",
	"photo-not-readable": "The photo is damaged and cannot be read. Take it again, or leave it out.",
} as const

/** Why a check as a whole was not taken. */
export const CHECK_WORDS = {
	"no-super": "This super is not in the book any more.",
	"super-off": (offOn: Day) => `The super came off the hive on ${monthDay(offOn)}; it takes no more checks.`,
	"other-check-recorded":
		"A check was recorded already from this form, with other figures. Press again to record this as a second check.",
	"other-account": "This check was made under another account. It can be sent only from that one.",
	unreadable: "The form came in pieces. Try again.",
} as const

/** "45% filled, 35% capped". */
export function sharesWords({
	filledPercent,
	cappedPercent,
}: {
	filledPercent: number
	cappedPercent: number
}): string {
	return `${filledPercent}% filled, ${cappedPercent}% capped`
}
