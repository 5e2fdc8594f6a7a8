import { dayWords } from "~/domain/calendar"
import { shortCases } from "~/domain/orders/season"
import { shortSeasonSentence } from "~/domain/orders/season-words"
import { wholeCases } from "~/domain/quantity"
import type { Season, SeasonRow } from "~/services/desk/find-season.server"
import type { ShownWeek } from "~/ui/season/season-picture"

/** A product of the season in whole cases, with what will be short in words. */
export type ShownProduct = { code: string; name: string; sentence: string | null; weeks: ShownWeek[] }

/** The season in whole cases, the products that will be short first. */
export function seasonView({ products }: Season): ShownProduct[] {
	const shown = products.map((product) => ({
		code: product.code,
		name: product.name,
		sentence: shortSeasonSentence(product),
		weeks: shownWeeks(product),
	}))
	return shown.toSorted((a, b) => Number(a.sentence === null) - Number(b.sentence === null))
}

function shownWeeks({ weeks, piecesPerCase }: SeasonRow): ShownWeek[] {
	const cases = (pieces: number) => wholeCases(pieces, piecesPerCase)
	return weeks.map(({ weekOn, wanted, there, short }) => ({
		weekOn,
		commitment: cases(wanted.commitment),
		standing: cases(wanted.standing),
		single: cases(wanted.single),
		low: cases(there.low),
		likely: cases(there.likely),
		high: cases(there.high),
		short: shortCases(short.low, piecesPerCase),
		shortLikely: shortCases(short.likely, piecesPerCase),
	}))
}

const HEADS = [
	"Product",
	"Name",
	"Week of",
	"Commitments, cases",
	"Standing orders, cases",
	"Single orders, cases",
	"There at the low figure, cases",
	"There at the likely figure, cases",
	"There at the high figure, cases",
	"Short at the low figure, cases",
	"Short at the likely figure, cases",
]

/** The rows of the file, heads first. */
export function seasonRows(products: readonly ShownProduct[]): (string | number)[][] {
	return [
		HEADS,
		...products.flatMap(({ code, name, weeks }) =>
			weeks.map((week) => [
				code,
				name,
				week.weekOn,
				week.commitment,
				week.standing,
				week.single,
				week.low,
				week.likely,
				week.high,
				week.short,
				week.shortLikely,
			]),
		),
	]
}

/** "Monday, August 10", for the head of the page. */
export const fromWords = ({ weeks }: Season) => dayWords(weeks[0] ?? "")
