import { formatMoney } from "~/domain/money"
import { casesWords } from "~/domain/quantity"

/** A line of a confirmed order as it stands and as it would be; cents are those of a case. */
export type LateLine = { lineId: string; fromCases: number; toCases: number; fromCents: number; toCents: number }

/**
 * What a late change by the producer needs: `asks` where any line gives the store less or costs it more a case, so that it
 * stands only when the store accepts; `applies` where every line gives more or costs less; `nothing` where no line differs.
 * More cases at the same price are more given, since never more is given than was asked. This product's own rule.
 */
export function judgeLateChange(lines: readonly LateLine[]): "nothing" | "asks" | "applies" {
	const changed = changedLines(lines)
	if (changed.length === 0) return "nothing"
	return changed.some((line) => line.toCases < line.fromCases || line.toCents > line.fromCents) ? "asks" : "applies"
}

/** The lines that differ from how they stand. */
export function changedLines<Line extends LateLine>(lines: readonly Line[]): Line[] {
	return lines.filter((line) => line.toCases !== line.fromCases || line.toCents !== line.fromCents)
}

/** One line in words: "2 cases instead of 4, at $120.00 a case instead of $114.00". */
export function lateLineWords({ fromCases, toCases, fromCents, toCents }: LateLine): string {
	const cases = toCases === 0 ? "none" : casesWords(toCases)
	const price = `${formatMoney(toCents)} a case instead of ${formatMoney(fromCents)}`
	if (fromCents === toCents) return `${cases} instead of ${fromCases}`
	return fromCases === toCases ? price : `${cases} instead of ${fromCases}, at ${price}`
}

/** What the lines come to before and after, in cents. */
export function lateSums(lines: readonly LateLine[]): { beforeCents: number; afterCents: number } {
	return {
		beforeCents: lines.reduce((sum, line) => sum + line.fromCases * line.fromCents, 0),
		afterCents: lines.reduce((sum, line) => sum + line.toCases * line.toCents, 0),
	}
}
