import { type Day, monthDay } from "~/domain/calendar"
import { formatMoney, plainMoney } from "~/domain/money"

/** A discount for paying early: so many basis points off, `cents` in all, until the end of a day. */
export type EarlyDiscount = { basisPoints: number; cents: number; untilOn: Day }

/** "2 % off, $18.60, if paid by August 28". */
export function discountWords({ basisPoints, cents, untilOn }: EarlyDiscount): string {
	return `${percentWords(basisPoints)} off, ${formatMoney(cents)}, if paid by ${monthDay(untilOn)}`
}

/** Basis points as a percentage without needless digits: 200 is "2 %", 725 "7.25 %". */
export function percentWords(basisPoints: number): string {
	return `${plainMoney(basisPoints).replace(/\.?0+$/, "")} %`
}
