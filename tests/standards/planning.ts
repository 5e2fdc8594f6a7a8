import { describe, expect, test } from "vitest"
import { addDays } from "~/domain/calendar"
import { freeToPromise } from "~/domain/promise/free-to-promise"
import type { PublishedValues } from "./published-values"

type Example = NonNullable<NonNullable<PublishedValues["planning"]>["atp"]>[number]

const dayOf = (period: number) => addDays("2026-01-01", period)

/** A planning table as an outlook, a period to a day; stock on hand is there from the first. */
function outlookOf(example: Example, periods = example.orders.length) {
	const receipts = example.mps
		.slice(0, periods)
		.map((quantity, period) => ({ on: dayOf(period), quantity, kind: "expected" as const }))
	const promises = example.orders.slice(0, periods).map((quantity, period) => ({ on: dayOf(period), quantity }))
	return {
		supplies: [{ on: dayOf(0), quantity: example.on_hand, kind: "free" as const }, ...receipts],
		promises,
		reserve: 0,
	}
}

/** The periods that begin with a receipt; the first begins with what is on hand. */
const receiptsOf = ({ mps }: Example) =>
	mps.flatMap((quantity, period) => (quantity > 0 || period === 0 ? [period] : []))

/** What each receipt leaves over once the promises until the next receipt are kept, by the product's own rule. */
function discreteFigures(example: Example): (number | null)[] {
	const receipts = receiptsOf(example)
	return example.orders.map((_, period) => {
		if (!receipts.includes(period)) return null
		const next = receipts.find((one) => one > period) ?? example.orders.length
		const received = (example.mps[period] ?? 0) + (period === 0 ? example.on_hand : 0)
		const promises = example.orders.flatMap((quantity, on) =>
			on >= period && on < next ? [{ on: dayOf(on), quantity }] : [],
		)
		const supplies = [{ on: dayOf(period), quantity: received, kind: "free" as const }]
		return freeToPromise({ supplies, promises, reserve: 0, days: [dayOf(period)] })[0]?.raw ?? null
	})
}

/** What each receipt adds to what is safe to promise: a receipt that is promised beyond itself takes from those before. */
function carriedBackFigures(example: Example): (number | null)[] {
	const days = example.orders.map((_, period) => dayOf(period))
	const safe = freeToPromise({ ...outlookOf(example), days }).map(({ raw }) => raw)
	const receipts = receiptsOf(example)
	return safe.map((figure, period) => {
		if (!receipts.includes(period)) return null
		const before = receipts.findLast((one) => one < period)
		return figure - (before === undefined ? 0 : (safe[before] ?? 0))
	})
}

/** Makes the tests of each planning table: free to promise with and without a look at later periods, and by receipt. */
export function holdPlanning({ planning }: PublishedValues): void {
	const examples = planning?.atp ?? []
	const withoutLookAhead = examples.filter((example) => example.cumulative_without_lookahead)
	const withLookAhead = examples.filter((example) => example.cumulative_with_lookahead)

	if (withoutLookAhead.length > 0) {
		describe("available to promise without look-ahead", () => {
			test.each(withoutLookAhead)("$id: each period knows nothing of later ones", (example) => {
				const figures = example.orders.map((_, period) => {
					const [there] = freeToPromise({ ...outlookOf(example, period + 1), days: [dayOf(period)] })
					return there?.raw
				})
				expect(figures).toEqual(example.cumulative_without_lookahead)
			})
		})
	}

	const byReceipt = examples.flatMap(({ discrete_raw, ...example }) =>
		discrete_raw ? [{ ...example, discrete_raw }] : [],
	)
	if (byReceipt.length > 0) {
		describe("available to promise by receipt", () => {
			test.each(byReceipt)("$id: what each receipt leaves over until the next", (example) => {
				expect(discreteFigures(example)).toEqual(example.discrete_raw)
			})
		})
	}

	const carriedBack = examples.filter((example) => example.discrete_after_carry_back)
	if (carriedBack.length > 0) {
		describe("available to promise by receipt, carried back", () => {
			test.each(carriedBack)("$id: what each receipt adds to what is safe to promise", (example) => {
				expect(carriedBackFigures(example)).toEqual(example.discrete_after_carry_back)
			})
		})
	}

	if (withLookAhead.length > 0) {
		describe("available to promise with look-ahead", () => {
			test.each(withLookAhead)("$id: what is safe to promise breaks no later promise", (example) => {
				const days = example.orders.map((_, period) => dayOf(period))
				const figures = freeToPromise({ ...outlookOf(example), days }).map((there) => there.raw)
				expect(figures).toEqual(example.cumulative_with_lookahead)
			})
		})
	}
}
