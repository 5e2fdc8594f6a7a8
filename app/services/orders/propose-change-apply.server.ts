import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import type { LateLine } from "~/domain/orders/late-change"
import { now } from "~/platform/clock.server"
import { findMostCases } from "./find-most-cases.server"
import type { LockedOrder } from "./lock-order.server"
import { lockProducts } from "./lock-products.server"

/** A line that cannot be what was wanted, and the most that it can get. */
export type RefusedChange = { lineId: string; reason: "more-than-asked" | "more-than-free"; mostCases: number }

/**
 * Writes changed lines of a confirmed order under the locks of their products. Answers the lines that would get more than
 * is free, and then has written nothing.
 */
export async function applyLines(
	tx: Tx,
	query: { producer: { id: string; timeZone: string }; order: LockedOrder; lines: readonly LateLine[] },
): Promise<RefusedChange[]> {
	const { producer, order, lines } = query
	const touched = order.lines.filter((line) => lines.some(({ lineId }) => lineId === line.id))
	await lockProducts(tx, { producerId: producer.id, productIds: touched.map((line) => line.productId) })
	const most = await findMostCases(tx, {
		producerId: producer.id,
		deliveryOn: order.deliveryOn,
		today: dayInZone(now(), producer.timeZone),
		lines: touched,
	})
	// Fewer cases than are promised can always be given, also where supply no longer covers what was promised.
	const refused = lines.flatMap(({ lineId, fromCases, toCases }): RefusedChange[] => {
		const mostCases = most.get(lineId) ?? 0
		return toCases > fromCases && toCases > mostCases ? [{ lineId, reason: "more-than-free", mostCases }] : []
	})
	if (refused.length > 0) return refused
	await tx.execute(sql`
		update order_lines set given_cases = changed.cases, case_cents = changed.cents
		from unnest(${sql.param(lines.map(({ lineId }) => lineId))}::uuid[],
			${sql.param(lines.map(({ toCases }) => toCases))}::int[],
			${sql.param(lines.map(({ toCents }) => toCents))}::int[]) as changed(id, cases, cents)
		where order_lines.producer_id = ${producer.id} and order_lines.id = changed.id`)
	return []
}
