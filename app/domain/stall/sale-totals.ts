/** A product in a sale at the stall, by the piece. */
export type SaleLine = { productId: string; pieces: number; pieceCents: number }

function requireWhole(value: number): void {
	if (!Number.isSafeInteger(value) || value < 0) throw new RangeError(`not a whole number: ${value}`)
}

/** The pieces and the price of one sale; the price on the sign is what is paid. Throws RangeError on parts of a piece. */
export function saleTotals(lines: readonly SaleLine[]): { pieces: number; totalCents: number } {
	let pieces = 0
	let totalCents = 0
	for (const line of lines) {
		requireWhole(line.pieces)
		requireWhole(line.pieceCents)
		pieces += line.pieces
		totalCents += line.pieces * line.pieceCents
	}
	return { pieces, totalCents }
}

/** What a market day took, in cents. */
export type DayTotals = {
	salesCount: number
	pieces: number
	cardCents: number
	cashCents: number
	totalCents: number
	/** What should lie in the cash box: float and cash sales, less what was paid out of it. */
	expectedCashCents: number
}

/**
 * Adds up the paid sales of a market day. `cashCents` is what stayed in the box: the price of the sale, whatever was
 * handed over. Throws RangeError on negative or fractional numbers.
 */
export function dayTotals(day: {
	sales: readonly { method: "card" | "cash"; pieces: number; totalCents: number }[]
	floatCents: number
	paidOutCents: number
}): DayTotals {
	for (const value of [day.floatCents, day.paidOutCents]) requireWhole(value)
	const totals = { salesCount: 0, pieces: 0, cardCents: 0, cashCents: 0 }
	for (const sale of day.sales) {
		requireWhole(sale.pieces)
		requireWhole(sale.totalCents)
		totals.salesCount += 1
		totals.pieces += sale.pieces
		totals[sale.method === "card" ? "cardCents" : "cashCents"] += sale.totalCents
	}
	return {
		...totals,
		totalCents: totals.cardCents + totals.cashCents,
		expectedCashCents: day.floatCents + totals.cashCents - day.paidOutCents,
	}
}
