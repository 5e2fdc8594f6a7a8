import { z } from "zod"
import { piecesWords } from "~/domain/quantity"
import { handTargets, mayMoveByHand } from "~/domain/stock/hand-moves"
import { places } from "~/domain/stock/places"
import { whereWords } from "~/ui/stock/where-words"

/** The fields of a move by hand. */
export const moveFields = ["from", "to", "pieces", "reason", "key"] as const

const MOST_PIECES = 1_000_000

/** Pieces as typed: a whole number above zero. Nothing is rounded or guessed. */
const pieces = z.string().transform((text, context) => {
	const typed = text.trim()
	if (/^\d{1,7}$/.test(typed) && Number(typed) > 0 && Number(typed) <= MOST_PIECES) return Number(typed)
	const message =
		typed === ""
			? "Write how many pieces to move."
			: /^0+$/.test(typed)
				? "Write at least 1 piece."
				: `Write whole pieces in figures, such as 3, at most ${MOST_PIECES}.`
	context.addIssue({ code: "custom", message })
	return z.NEVER
})

/** A place and what it is about, as one choice of a list: "market|6f0c…". */
const shelf = z.string().transform((text, context) => {
	const [place, ref] = text.split("|")
	const known = places.find((one) => one === place)
	if (known && z.guid().safeParse(ref).success) return { place: known, ref: ref as string }
	context.addIssue({ code: "custom", message: "Choose where the pieces are." })
	return z.NEVER
})

/** A move by hand as typed. */
export const moveForm = z
	.object({
		from: shelf,
		to: z.enum(handTargets, "Choose where the pieces go."),
		pieces,
		reason: z.string().trim().min(3, "Write why, in a word or two.").max(200, "Shorten the reason to 200 characters."),
		key: z.guid(),
	})
	.superRefine(({ from, to }, context) => {
		if (mayMoveByHand(from.place, to)) return
		const message =
			from.place === to
				? "That is where they are."
				: `Pieces that are ${whereWords(from.place)} do not go there by hand.`
		context.addIssue({ code: "custom", path: ["to"], message })
	})

/** What to say when fewer pieces are there than were to be moved. */
export function tooManyWords(facts: { code: string; there: number; where: string }): string {
	const { code, there, where } = facts
	if (there === 0) return `No piece of lot ${code} is ${where} any more. Nothing was moved.`
	return `Only ${piecesWords(there)} of lot ${code} ${there === 1 ? "is" : "are"} ${where}. Write ${there} or fewer; nothing was moved.`
}
