import { casesWords } from "~/domain/quantity"

const SMALL_NUMBERS = ["no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten"] as const

/** Cases inside a sentence: "no cases", "one case", "eight cases", "14 cases". */
export function casesInSentence(count: number): string {
	const small = SMALL_NUMBERS[count]
	return small ? `${small} ${count === 1 ? "case" : "cases"}` : casesWords(count)
}

/** Facts in one line, in order, leaving out those that are not known. Empty when none is. */
export function joinKnown(parts: readonly (string | null | undefined)[], separator = ", "): string {
	return parts.filter((part) => part).join(separator)
}

interface ShareOfLine {
	productName: string
	casesAsked: number
	casesGiven: number
	reason?: string | null
}

/**
 * One sentence for each line that got less than it asked, in the order of the lines: the reason given by whoever shared
 * the product out, or the bare figures when there is none. The same sentence is said once. Empty when nothing is short.
 */
export function shortSentences(lines: readonly ShareOfLine[]): string[] {
	const sentences = lines
		.filter((line) => line.casesGiven < line.casesAsked)
		.map((line) => {
			if (line.reason) return line.reason
			if (line.casesGiven === 0) {
				return `There is no ${line.productName} for this day: none of the ${casesInSentence(line.casesAsked)} you asked for.`
			}
			const verb = line.casesGiven === 1 ? "is" : "are"
			const given = line.casesGiven === 1 ? "one" : String(SMALL_NUMBERS[line.casesGiven] ?? line.casesGiven)
			return `${line.productName} is short: ${given} of the ${casesInSentence(line.casesAsked)} you asked for ${verb} yours.`
		})
	return [...new Set(sentences)]
}

/** What every letter about comb says; the invoice says it too. */
export const KEEP_COMB = "Keep comb cool and flat, out of the sun."
export const NOT_FOR_INFANTS = "Honey must not be fed to infants under one year."

/** How to reach the producer about a mistake: by answering the letter, or by telephone where there is one. */
export function mistakeWords(yard: { phone?: string | null; contactName?: string | null }): string {
	if (!yard.phone) return "A mistake? Reply to this letter."
	return `A mistake? Reply to this letter or call ${joinKnown([yard.contactName, `${yard.phone}`], " at ")}.`
}
