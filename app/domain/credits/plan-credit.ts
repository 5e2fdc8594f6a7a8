import type { Result } from "~/domain/result"
import { type CreditedMoney, creditForAmount, creditForPieces, type LineLeft } from "./credit-money"

/** A line of an invoice by its id, with what of it can still be credited. */
export type CreditableLine = LineLeft & { id: string }

/** What is to be credited of a line: pieces at their price, or an amount before tax. */
export type WantedCredit = { lineId: string; pieces: number } | { lineId: string; cents: number }

export type PlannedLine = CreditedMoney & { lineId: string; pieces: number }

export type PlannedCredit = {
	lines: PlannedLine[]
	/** An amount that belongs to no line. */
	wholeCents: number
	linesCents: number
	taxCents: number
	totalCents: number
}

export type PlanRefusal =
	| { ok: false; reason: "nothing-to-credit" }
	| { ok: false; reason: "line-exceeded"; lines: { lineId: string; leftPieces: number; leftCents: number }[] }
	| { ok: false; reason: "invoice-exceeded"; leftCents: number; askedCents: number }

/**
 * Adds up a credit from what is wanted of each line and an amount for the whole invoice. Refuses a credit of nothing, a
 * line that would be credited with more pieces or money than is left of it (or that there is not), and a whole above
 * what is left of the invoice: what was invoiced less what has been credited. This product's own rule.
 */
export function planCredit(query: {
	lines: readonly CreditableLine[]
	leftCents: number
	wanted: readonly WantedCredit[]
	wholeCents: number
}): Result<PlannedCredit, PlanRefusal> {
	const left = new Map(query.lines.map((line) => [line.id, line]))
	const exceeded = query.wanted.filter((wanted) => !isWithin(wanted, left.get(wanted.lineId)))
	if (exceeded.length > 0) {
		const lines = exceeded.map(({ lineId }) => ({
			lineId,
			leftPieces: left.get(lineId)?.pieces ?? 0,
			leftCents: left.get(lineId)?.lineCents ?? 0,
		}))
		return { ok: false, reason: "line-exceeded", lines }
	}
	const lines = query.wanted.flatMap((wanted) => {
		const line = left.get(wanted.lineId)
		if (!line) return []
		if (!("pieces" in wanted)) return [{ lineId: line.id, pieces: 0, ...creditForAmount(line, wanted.cents) }]
		return [{ lineId: line.id, pieces: wanted.pieces, ...creditForPieces(line, wanted.pieces) }]
	})
	const linesCents = lines.reduce((sum, line) => sum + line.lineCents, query.wholeCents)
	const taxCents = lines.reduce((sum, line) => sum + line.taxCents, 0)
	const totalCents = linesCents + taxCents
	if (totalCents === 0) return { ok: false, reason: "nothing-to-credit" }
	if (totalCents > query.leftCents)
		return { ok: false, reason: "invoice-exceeded", leftCents: query.leftCents, askedCents: totalCents }
	return { ok: true, lines, wholeCents: query.wholeCents, linesCents, taxCents, totalCents }
}

function isWithin(wanted: WantedCredit, line: CreditableLine | undefined): boolean {
	if (!line) return false
	return "pieces" in wanted ? wanted.pieces <= line.pieces : wanted.cents <= line.lineCents
}
