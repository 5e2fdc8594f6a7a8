import { type Day, monthDay } from "~/domain/calendar"
import { casesWords } from "~/domain/quantity"
import { type CropRange, type SeasonWeek, shortCases } from "./season"

/** The weeks in which a product will be short, at one figure of the crop, in whole cases; the earliest first. */
function shortWeeks(
	{ weeks, piecesPerCase }: { weeks: readonly SeasonWeek[]; piecesPerCase: number },
	figure: keyof CropRange,
): { weekOn: Day; cases: number }[] {
	return weeks.flatMap(({ weekOn, short }) =>
		short[figure] > 0 ? [{ weekOn, cases: shortCases(short[figure], piecesPerCase) }] : [],
	)
}

/**
 * What will be short, as a sentence with its figure, while there is time to act: "Basswood section is short by 14 cases in
 * the week of September 7, and in 2 weeks after it, at the low figure; at the likely figure by none." Null where the low
 * figure covers all that is wanted.
 */
export function shortSeasonSentence(product: {
	name: string
	weeks: readonly SeasonWeek[]
	piecesPerCase: number
}): string | null {
	const [first, ...later] = shortWeeks(product, "low")
	if (!first) return null
	const after = later.length === 0 ? "" : `, and in ${later.length === 1 ? "1 week" : `${later.length} weeks`} after it`
	const all = later.reduce((sum, { cases }) => sum + cases, first.cases)
	const inAll = later.length === 0 ? "" : ` (${casesWords(all)} in all)`
	const likely = shortWeeks(product, "likely").reduce((sum, { cases }) => sum + cases, 0)
	const atLikely =
		likely === all
			? "the likely figure brings no more"
			: `at the likely figure by ${likely === 0 ? "none" : casesWords(likely)}`
	return `${product.name} is short by ${casesWords(first.cases)} in the week of ${monthDay(first.weekOn)}${after}${inAll}, at the low figure; ${atLikely}.`
}
