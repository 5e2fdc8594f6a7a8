import type { Day } from "~/domain/calendar"

/** Cases of one product for one date by the rule, in place of the usual; 0 is none of it that day. */
export type DateChange = { on: Day; productId: string; cases: number }

/**
 * What a standing order asks on one date: the usual lines with that date's changes, those at nothing left out. The least
 * is never above what is asked, so a smaller date asks for no less than itself.
 */
export function linesOnDate<Line extends { productId: string; cases: number; leastCases: number }>(
	lines: readonly Line[],
	changes: readonly DateChange[],
	ruleOn: Day,
): Line[] {
	const changed = new Map(changes.filter((one) => one.on === ruleOn).map((one) => [one.productId, one.cases]))
	return lines.flatMap((line) => {
		const cases = changed.get(line.productId) ?? line.cases
		return cases === 0 ? [] : [{ ...line, cases, leastCases: Math.min(line.leastCases, cases) }]
	})
}
