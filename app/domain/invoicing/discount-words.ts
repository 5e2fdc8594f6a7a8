import { type Day, daysBetween, monthDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { missedDiscountRates } from "./missed-discount"
import { percentWords } from "./percent-words"

/** A discount for paying early: so many basis points off, `cents` in all, until the end of a day. */
export type EarlyDiscount = { basisPoints: number; cents: number; untilOn: Day }

/** "2 % off, $18.60, if paid by August 28". */
export function discountWords({ basisPoints, cents, untilOn }: EarlyDiscount): string {
	return `${percentWords(basisPoints)} off, ${formatMoney(cents)}, if paid by ${monthDay(untilOn)}`
}

/**
 * What it costs to let a discount go until the due day, as a yearly rate: "Paying on September 17 instead costs as much as
 * borrowing at 37 % a year." Null where the due day is no later than the discount's.
 */
export function missedDiscountWords(invoice: { issuedOn: Day; dueOn: Day; discount: EarlyDiscount }): string | null {
	const { issuedOn, dueOn, discount } = invoice
	if (dueOn <= discount.untilOn) return null
	const { simple } = missedDiscountRates({
		discountBasisPoints: discount.basisPoints,
		discountDays: daysBetween(issuedOn, discount.untilOn),
		paidDay: daysBetween(issuedOn, dueOn),
		yearDays: 365,
	})
	return `Paying on ${monthDay(dueOn)} instead costs as much as borrowing at ${Math.round(simple)} % a year.`
}
