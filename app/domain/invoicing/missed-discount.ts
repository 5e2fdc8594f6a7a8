/**
 * What a store pays for letting the discount go, as a yearly rate in percent: it keeps the money from the last day of the
 * discount to `paidDay`, both counted from the invoice, and pays the discount for that. `simple` takes the cost as many
 * times as the span goes into the year; `effective` lets it grow each time. `yearDays` is 365, or 360 as bankers count.
 * Throws RangeError when nothing can be let go. Source: published values "terms" (trade_credit).
 */
export function missedDiscountRates(terms: {
	discountBasisPoints: number
	discountDays: number
	paidDay: number
	yearDays: 360 | 365
}): { simple: number; effective: number } {
	const { discountBasisPoints, discountDays, paidDay, yearDays } = terms
	const daysKept = paidDay - discountDays
	if (discountBasisPoints <= 0 || discountBasisPoints >= 10_000 || daysKept <= 0)
		throw new RangeError("no discount is let go")
	const costOfSpan = discountBasisPoints / (10_000 - discountBasisPoints)
	const spans = yearDays / daysKept
	return { simple: costOfSpan * spans * 100, effective: ((1 + costOfSpan) ** spans - 1) * 100 }
}
