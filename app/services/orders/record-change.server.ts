import { auditEntries, orderEvents } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"

/** Notes a step of an order on its timeline and in the audit trail, in the transaction that takes it; answers the id of the event. */
export async function recordChange(
	tx: Tx,
	change: {
		producerId: string
		orderId: string
		kind: (typeof orderEvents.$inferInsert)["kind"]
		userId: string | null
		detail?: Record<string, unknown>
	},
): Promise<string> {
	const { producerId, orderId, kind, userId, detail = {} } = change
	const [event] = await tx
		.insert(orderEvents)
		.values({ producerId, orderId, kind, userId, detail })
		.returning({ id: orderEvents.id })
	await tx
		.insert(auditEntries)
		.values({ producerId, userId, action: `order ${kind}`, subjectType: "order", subjectId: orderId, detail })
	if (!event) throw new Error("an event that was written has an id")
	return event.id
}
