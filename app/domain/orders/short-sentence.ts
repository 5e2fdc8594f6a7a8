import { type Day, dayWords } from "~/domain/calendar"
import { casesWords } from "~/domain/quantity"

/**
 * What a buyer reads when a line is cut short: what was asked, what comes, why, and that the price stays.
 * "You asked for 4 cases of Basswood section, clover, and get 2. That is all that can be ready for Tuesday, August 18.
 * You keep the price for 4 cases." `reason`, in the producer's own words, stands in for the second sentence.
 * Throws RangeError unless `given` is below `asked`, both whole and not negative: a line in full has nothing to explain.
 */
export function shortSentence(line: {
	productName: string
	asked: number
	given: number
	deliveryOn: Day
	reason?: string
	/** Whether the price is that of a break which the given cases alone would not reach. */
	keepsPrice?: boolean
}): string {
	const { asked, given } = line
	if (!Number.isSafeInteger(asked) || !Number.isSafeInteger(given) || given < 0 || given >= asked) {
		throw new RangeError(`not a short line: ${given} of ${asked}`)
	}
	const reason = line.reason?.trim()
	const why = reason
		? /[.!?]$/.test(reason)
			? reason
			: `${reason}.`
		: given === 0
			? `None can be ready for ${dayWords(line.deliveryOn)}.`
			: `That is all that can be ready for ${dayWords(line.deliveryOn)}.`
	const sentences = [
		`You asked for ${casesWords(asked)} of ${line.productName}, and get ${given || "none this time"}.`,
		why,
	]
	if (line.keepsPrice === true && given > 0) sentences.push(`You keep the price for ${casesWords(asked)}.`)
	return sentences.join(" ")
}
