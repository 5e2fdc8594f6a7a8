import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { freeToPromise } from "~/domain/promise/free-to-promise"
import { wholeCases } from "~/domain/quantity"
import { findOutlooks, type ProductOutlook } from "~/services/promise/find-outlooks.server"

/** A line as it stands: null is not decided yet. */
export type StandingLine = {
	id: string
	productId: string
	askedCases: number
	givenCases: number | null
	isToShare: boolean
	/** Of a line to be shared out: the cases that are sure already. */
	promisedCases: number
	piecesPerCase: number
}

/** What a line is promised as it stands: given once decided, else asked, but what is sure while it is to be shared out. */
export function promisedCases(
	line: Pick<StandingLine, "askedCases" | "givenCases" | "isToShare" | "promisedCases">,
): number {
	return line.givenCases ?? (line.isToShare ? line.promisedCases : line.askedCases)
}

/** The day a promise counts for: an overdue delivery counts as due today. */
export function promiseDay(deliveryOn: Day, today: Day): Day {
	return deliveryOn < today ? today : deliveryOn
}

/**
 * The most cases a line can get for the day: what is free with this line's own promise set aside, never more than was
 * asked and never below zero. Nothing where the product has no outlook.
 */
export function mostCases(
	outlook: ProductOutlook | undefined,
	query: { line: StandingLine; deliveryOn: Day; today: Day },
): number {
	if (!outlook) return 0
	const { line, deliveryOn, today } = query
	const on = promiseDay(deliveryOn, today)
	const own = { on, quantity: -promisedCases(line) * line.piecesPerCase }
	const [free] = freeToPromise({ ...outlook, promises: [...outlook.promises, own], days: [on] })
	return Math.min(line.askedCases, wholeCases(free?.free ?? 0, line.piecesPerCase))
}

/** The most cases that each line of one order can get, by line id. Lock the products first where it decides anything. */
export async function findMostCases(
	tx: Tx,
	query: { producerId: string; deliveryOn: Day; today: Day; lines: readonly StandingLine[] },
): Promise<Map<string, number>> {
	const { producerId, deliveryOn, today, lines } = query
	const productIds = lines.map((line) => line.productId)
	const outlooks = await findOutlooks(tx, { producerId, today, productIds })
	return new Map(lines.map((line) => [line.id, mostCases(outlooks.get(line.productId), { line, deliveryOn, today })]))
}
