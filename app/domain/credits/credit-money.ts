import { splitByLargestRemainder } from "~/domain/money"

/** What of an invoice line has not been credited yet: its pieces, its amount and its sales tax in cents. */
export type LineLeft = { pieces: number; lineCents: number; taxCents: number }

/** What a credit takes off one line, in cents. */
export type CreditedMoney = { lineCents: number; taxCents: number }

const NOTHING: CreditedMoney = { lineCents: 0, taxCents: 0 }

/**
 * What so many pieces of a line come to: their share of what is left of the line, rounded once by largest remainder, so
 * that pieces credited one after another always sum to the line and all of them are exactly the line; the tax of the line
 * in the same way. At the price of the line where nothing was credited before, and at the price that was put right where
 * something was. Throws RangeError for more pieces than are left. This product's own rule; how tax is given back,
 * local rules decide.
 */
export function creditForPieces(left: LineLeft, pieces: number): CreditedMoney {
	if (!Number.isSafeInteger(pieces) || pieces < 0 || pieces > left.pieces)
		throw new RangeError(`not pieces of the line: ${pieces} of ${left.pieces}`)
	if (pieces === 0) return NOTHING
	return { lineCents: share(left.lineCents, pieces, left.pieces), taxCents: share(left.taxCents, pieces, left.pieces) }
}

/**
 * What an amount off a line comes to with its tax: the tax that is left, in the proportion of the amount to what is left.
 * All that is left takes all of its tax. Throws RangeError for more than is left. This product's own rule.
 */
export function creditForAmount(left: Pick<LineLeft, "lineCents" | "taxCents">, lineCents: number): CreditedMoney {
	if (!Number.isSafeInteger(lineCents) || lineCents < 0 || lineCents > left.lineCents)
		throw new RangeError(`not an amount of the line: ${lineCents} of ${left.lineCents}`)
	if (lineCents === 0) return NOTHING
	return { lineCents, taxCents: share(left.taxCents, lineCents, left.lineCents) }
}

/** `part` of `whole` in cents: half a cent goes to the part. */
function share(cents: number, part: number, whole: number): number {
	return splitByLargestRemainder(cents, [part, whole - part])[0] ?? 0
}
