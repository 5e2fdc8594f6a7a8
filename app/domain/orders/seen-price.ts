import { type CaseBreak, priceOrder } from "../pricing/price-order"

/** A case as a buyer saw it on the order sheet: how many pieces, and what it costs from how many cases on. */
export type SeenPrice = { piecesPerCase: number; breaks: readonly CaseBreak[] }

type Product = SeenPrice & { productId: string; breakFamily: string }

type PriceChange =
	| { productId: string; reason: "price-changed"; seenCents: number; caseCents: number }
	| { productId: string; reason: "case-changed"; seenPieces: number; piecesPerCase: number }

const FREE_DELIVERY = { minimumCents: 0, deliveryChargeCents: 0, freeAboveCents: null }
const SEEN = /^\d{1,4}(;\d{1,4}:\d{1,8}){1,20}$/

/** Writes a seen price for a field of a form: "12;1:11400;3:10830". */
export function writeSeenPrice({ piecesPerCase, breaks }: SeenPrice): string {
	return [piecesPerCase, ...breaks.map(({ minCases, caseCents }) => `${minCases}:${caseCents}`)].join(";")
}

/** Reads what `writeSeenPrice` wrote; null when it is anything else. */
export function readSeenPrice(text: string): SeenPrice | null {
	if (!SEEN.test(text)) return null
	const [pieces = "", ...steps] = text.split(";")
	const breaks = steps.map((step) => {
		const [minCases = 0, caseCents = 0] = step.split(":").map(Number)
		return { minCases, caseCents }
	})
	return { piecesPerCase: Number(pieces), breaks }
}

/**
 * Which lines of an order have another case, or another price at the cases asked, than the buyer saw. The break of each
 * line is found twice by the rule that prices the order: with the prices seen, and with those in force. A break that the
 * order does not reach may change unasked. This product's own rule.
 */
export function casePriceChanges(
	lines: readonly { product: Product; cases: number; seen: SeenPrice }[],
): PriceChange[] {
	const price = (priceOf: (line: (typeof lines)[number]) => SeenPrice) =>
		priceOrder({
			lines: lines.map((line) => ({ ...line.product, ...priceOf(line), cases: line.cases })),
			terms: FREE_DELIVERY,
		}).lines
	const [before, now] = [price((line) => line.seen), price((line) => line.product)]
	return lines.flatMap(({ product, seen }, index): PriceChange[] => {
		const { productId, piecesPerCase } = product
		if (seen.piecesPerCase !== piecesPerCase) {
			return [{ productId, reason: "case-changed", seenPieces: seen.piecesPerCase, piecesPerCase }]
		}
		const [seenCents, caseCents] = [before[index]?.caseCents ?? 0, now[index]?.caseCents ?? 0]
		return seenCents === caseCents ? [] : [{ productId, reason: "price-changed", seenCents, caseCents }]
	})
}
