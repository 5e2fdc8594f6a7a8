import { describe, expect, test } from "vitest"
import { ageingBucket } from "~/domain/invoicing/ageing"
import { missedDiscountRates } from "~/domain/invoicing/missed-discount"
import { dueDates, type Terms } from "~/domain/invoicing/terms"
import type { PublishedValues } from "./published-values"

const none = { discountBasisPoints: 0, discountDays: 0 }

/** What a column of the table asks for: "net_30", "net_10_eom", "discount_last_day_2_10"; null for a column unknown. */
function columnOf(key: string): { terms: Terms; asks: "dueOn" | "discountUntil" } | null {
	const [, netDays] = /^net_(\d+)$/.exec(key) ?? []
	if (netDays) return { terms: { kind: "net", days: Number(netDays), ...none }, asks: "dueOn" }
	const [, monthDays] = /^net_(\d+)_eom$/.exec(key) ?? []
	if (monthDays) return { terms: { kind: "end-of-month", days: Number(monthDays), ...none }, asks: "dueOn" }
	const [, percent, discountDays] = /^discount_last_day_(\d+)_(\d+)$/.exec(key) ?? []
	if (!percent || !discountDays) return null
	const discount = { discountBasisPoints: Number(percent) * 100, discountDays: Number(discountDays) }
	return { terms: { kind: "net", days: 365, ...discount }, asks: "discountUntil" }
}

type TradeCredit = NonNullable<NonNullable<PublishedValues["terms"]>["trade_credit"]>

/** The yearly cost of a discount that was let go, in percent to the places that the file gives. */
function holdTradeCredit(examples: TradeCredit): void {
	if (examples.length === 0) return
	test.each(examples)("$discount_pct % off within $discount_days days, let go and paid on day $paid_day", (example) => {
		const rates = (yearDays: 360 | 365) =>
			missedDiscountRates({
				discountBasisPoints: Math.round(example.discount_pct * 100),
				discountDays: example.discount_days,
				paidDay: example.paid_day,
				yearDays,
			})
		const given = [
			[example.nominal_365, rates(365).simple],
			[example.nominal_360, rates(360).simple],
			[example.effective_365, rates(365).effective],
		].filter((pair): pair is [number, number] => pair[0] !== undefined)
		expect(given.length).toBeGreaterThan(0)
		for (const [published, ours] of given) expect(Number(ours.toFixed(2))).toBe(published)
	})
}

/** Makes one test of each due date and each ageing column. Columns without a rule are printed. */
export function holdTerms({ terms }: PublishedValues): void {
	const cells = (terms?.due_dates ?? []).flatMap(({ invoice, ...columns }) =>
		Object.entries(columns).map(([key, expected]) => ({
			invoice: invoice ?? "",
			key,
			expected,
			column: columnOf(key),
		})),
	)
	const dates = cells.flatMap(({ column, ...cell }) => (column ? [{ ...cell, ...column }] : []))
	const unruled = new Set(cells.flatMap(({ column, key }) => (column ? [] : [key])))
	if (unruled.size > 0) console.info(`No rule yet for part of terms.due_dates: ${[...unruled].join(", ")}`)

	if (dates.length > 0) {
		describe("due dates", () => {
			test.each(dates)("an invoice of $invoice, $key: $expected", ({ invoice, terms: given, asks, expected }) => {
				expect(dueDates(given, invoice)[asks]).toBe(expected)
			})
		})
	}

	holdTradeCredit(terms?.trade_credit ?? [])

	const buckets = terms?.ageing ?? []

	if (buckets.length > 0) {
		test.each(buckets)("ageing column: %s", (words) => {
			const [, first, last] = /^(\d+)\D(\d+)/.exec(words) ?? []
			const [, over] = /^over (\d+)/.exec(words) ?? []
			if (first && last) {
				const column = `${first}–${last}`
				expect([ageingBucket(Number(first)), ageingBucket(Number(last))]).toEqual([column, column])
				expect([ageingBucket(Number(first) - 1), ageingBucket(Number(last) + 1)]).not.toContain(column)
			} else if (over) {
				expect(ageingBucket(Number(over) + 1)).toBe(`over ${over}`)
				expect(ageingBucket(Number(over))).not.toBe(`over ${over}`)
			} else {
				expect(words).toMatch(/^current/)
				expect([ageingBucket(-1), ageingBucket(0)]).toEqual(["current", "current"])
			}
		})
	}
}
