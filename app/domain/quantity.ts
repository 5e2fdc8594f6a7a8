import type { Result } from "./result"

/** The most cases one line can ask for. */
const MAX_CASES = 999

/**
 * Reads what a person typed in a field for cases. Empty or blank is none, 0; a whole number from 0 to 999 is itself.
 * Anything else is refused with `message`, one plain sentence for the side of the field; nothing is rounded or guessed.
 */
export function parseCases(text: string): Result<{ cases: number }, { ok: false; reason: string; message: string }> {
	const typed = text.trim()
	if (typed === "") return { ok: true, cases: 0 }
	const refuse = (reason: string, message: string) => ({ ok: false as const, reason, message })

	if (/^[-−–]\s*\d/.test(typed))
		return refuse("negative", "Cases cannot be less than none. Write 0 to take this line off.")
	if (/^\d{1,3}(?:[,\s]\d{3})+$/.test(typed)) {
		return refuse("separator", `Write the number without commas or spaces, at most ${MAX_CASES}.`)
	}
	if (/^\d*[.,]\d+$|^\d+[.,]$|^\d+\s*\/\s*\d+$|[¼½¾]/.test(typed)) {
		return refuse("fraction", "Only whole cases are sold. Write a whole number, such as 3.")
	}
	if (!/^\d+$/.test(typed)) return refuse("not-a-number", "Write the number of cases in figures, such as 3.")
	const cases = Number(typed)
	if (cases > MAX_CASES)
		return refuse("too-many", `One line takes at most ${MAX_CASES} cases. For more, call or write.`)
	return { ok: true, cases }
}

/** "1 case", "4 cases". */
export function casesWords(cases: number): string {
	return cases === 1 ? "1 case" : `${cases} cases`
}

/** "1 piece", "7 pieces". */
export function piecesWords(pieces: number): string {
	return pieces === 1 ? "1 piece" : `${pieces} pieces`
}

/**
 * The whole cases in `pieces`, rounded down, also below zero: one piece over-promised is a case over-promised.
 * Throws RangeError unless `piecesPerCase` is a whole number above zero.
 */
export function wholeCases(pieces: number, piecesPerCase: number): number {
	if (!Number.isSafeInteger(piecesPerCase) || piecesPerCase < 1)
		throw new RangeError(`not a case size: ${piecesPerCase}`)
	const cases = Math.floor(pieces / piecesPerCase)
	return cases === 0 ? 0 : cases
}
