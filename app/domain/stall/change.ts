import { plainMoney } from "~/domain/money"
import type { Result } from "~/domain/result"

/** A bill or coin of a stall's float: no fifties or hundreds, which are taken but not given back. */
type Denomination = { cents: number; one: string; many: string }

const DENOMINATIONS: readonly Denomination[] = [
	{ cents: 2000, one: "$20 bill", many: "$20 bills" },
	{ cents: 1000, one: "$10 bill", many: "$10 bills" },
	{ cents: 500, one: "$5 bill", many: "$5 bills" },
	{ cents: 100, one: "$1 bill", many: "$1 bills" },
	{ cents: 25, one: "quarter", many: "quarters" },
	{ cents: 10, one: "dime", many: "dimes" },
	{ cents: 5, one: "nickel", many: "nickels" },
	{ cents: 1, one: "penny", many: "pennies" },
]

const NUMBER_WORDS = ["no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten"]

/** So many of one bill or coin to give back, and what they come to. */
export type ChangePart = { cents: number; count: number; sumCents: number; words: string }

function requireCents(cents: number): void {
	if (!Number.isSafeInteger(cents) || cents < 0) throw new RangeError(`not whole cents: ${cents}`)
}

function giveBack(changeCents: number): ChangePart[] {
	let left = changeCents
	return DENOMINATIONS.flatMap(({ cents, one, many }) => {
		const count = Math.floor(left / cents)
		left -= count * cents
		if (count === 0) return []
		return [
			{ cents, count, sumCents: count * cents, words: `${NUMBER_WORDS[count] ?? count} ${count === 1 ? one : many}` },
		]
	})
}

/**
 * What to give back for `givenCents` on a sale of `dueCents`: the change and its bills and coins, largest first, which is
 * also the fewest pieces. Too little given is refused with what is missing and its words, "2.50 more".
 * Throws RangeError on negative or fractional cents.
 */
export function changeFor(sale: {
	dueCents: number
	givenCents: number
}): Result<
	{ changeCents: number; parts: ChangePart[] },
	{ ok: false; reason: "too-little"; shortCents: number; words: string }
> {
	requireCents(sale.dueCents)
	requireCents(sale.givenCents)
	const changeCents = sale.givenCents - sale.dueCents
	if (changeCents < 0) {
		return { ok: false, reason: "too-little", shortCents: -changeCents, words: `${plainMoney(-changeCents)} more` }
	}
	return { ok: true, changeCents, parts: giveBack(changeCents) }
}

const LIKELY_COUNT = 5
const ROUND_STEPS = [500, 2000, 5000, 10_000]

/**
 * Amounts a customer is likely to hand over for `dueCents`, least first, at most five: the exact amount, then the next
 * whole five, twenty, fifty and hundred dollars, and, where some of these are the same, the tens between until there are
 * five. For 49.50: 49.50, 50, 60, 70, 100. Nothing due has no likely amount. Throws RangeError on negative or fractional
 * cents. Common practice at a stall, no source.
 */
export function likelyAmounts(dueCents: number): number[] {
	requireCents(dueCents)
	if (dueCents === 0) return []
	const amounts = new Set([dueCents, ...ROUND_STEPS.map((step) => Math.ceil(dueCents / step) * step)])
	for (let tens = Math.ceil(dueCents / 1000) * 1000; amounts.size < LIKELY_COUNT; tens += 1000) amounts.add(tens)
	return [...amounts].toSorted((a, b) => a - b)
}
