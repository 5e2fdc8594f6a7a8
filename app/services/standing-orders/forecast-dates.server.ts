import type { Day } from "~/domain/calendar"
import { caseStrips } from "~/services/orders/cases-on-day.server"
import type { ProductOutlook } from "~/services/promise/find-outlooks.server"
import type { StandingLine } from "./read-standing-orders.server"

/** How what is asked of one product on one date can be met, in cases; the four sum to what is asked. */
export type LineForecast = { productId: string; free: number; held: number; expected: number; short: number }

/**
 * Says for each date, the earliest first, how its lines can likely be met as things stand: from what is free, held
 * or expected, less what the earlier of these dates have taken. Changes nothing in `outlooks`.
 */
export function forecastDates(
	dates: readonly { on: Day; lines: readonly Pick<StandingLine, "productId" | "cases">[] }[],
	outlooks: ReadonlyMap<string, ProductOutlook>,
): LineForecast[][] {
	const taken = new Map<string, { on: Day; quantity: number }[]>()
	return dates.map(({ on, lines }) =>
		lines.map(({ productId, cases }) => {
			const outlook = outlooks.get(productId)
			const earlier = taken.get(productId) ?? []
			const [strip] = outlook ? caseStrips({ ...outlook, promises: [...outlook.promises, ...earlier] }, [on]) : []
			const free = Math.min(cases, strip?.free ?? 0)
			const held = Math.min(cases - free, strip?.held ?? 0)
			const expected = Math.min(cases - free - held, strip?.expected ?? 0)
			const met = free + held + expected
			if (outlook) taken.set(productId, [...earlier, { on, quantity: met * outlook.piecesPerCase }])
			return { productId, free, held, expected, short: cases - met }
		}),
	)
}
