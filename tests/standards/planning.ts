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

/** Makes two tests of each planning table: free to promise with and without a look at later periods. */
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
