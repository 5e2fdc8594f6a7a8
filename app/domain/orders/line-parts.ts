/** A line of an order, as far as it is promised. */
type PromisedLine = { cases: number; isToShare: boolean; promisedCases: number }

export type LinePart<Line> = { line: Line; cases: number; toBeSharedOut: boolean }

/**
 * A line in its parts: what is promised, and what is still to be shared out. Both count for the break; the second stays
 * out of the sure total. A line has at least one part, in this order, and the parts sum to its cases.
 */
export function lineParts<Line extends PromisedLine>(line: Line): LinePart<Line>[] {
	if (!line.isToShare) return [{ line, cases: line.cases, toBeSharedOut: false }]
	const rest = { line, cases: line.cases - line.promisedCases, toBeSharedOut: true }
	return line.promisedCases > 0 ? [{ line, cases: line.promisedCases, toBeSharedOut: false }, rest] : [rest]
}
