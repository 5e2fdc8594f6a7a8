import type { Day } from "~/domain/calendar"
import { assignLots } from "./assign-lots"
import type { Outlook } from "./free-to-promise"

/**
 * How much of what is promised no supply can serve, by the day that it is promised for; days on which everything can be
 * kept are left out. Earlier days are served first, and as much in all as any assignment serves. The reserve is not held
 * back here: a promise is kept before it. In the unit of the outlook, whole and not negative.
 */
export function unkeptPromises({ supplies, promises }: Pick<Outlook, "supplies" | "promises">): Map<Day, number> {
	const assigned = assignLots({
		lots: supplies.map(({ on, until, quantity }, index) => ({
			lotId: String(index),
			availableFrom: on,
			bestBefore: until ?? "9999-12-31",
			pieces: quantity,
		})),
		orders: promises.map(({ on, quantity }) => ({ orderId: on, on, pieces: quantity })),
	})
	const unkept = new Map<Day, number>()
	if (assigned.ok) return unkept
	for (const { orderId: day, pieces } of assigned.missing) unkept.set(day, (unkept.get(day) ?? 0) + pieces)
	return unkept
}
