import { auditEntries, orderEvents } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"

/** Notes a step of an order on its timeline and in the audit trail, in the transaction that takes it. */
export async function recordChange(
	tx: Tx,
	change: {
		producerId: string
		orderId: string
		kind: (typeof orderEvents.$inferInsert)["kind"]
		userId: string | null
		detail?: Record<string, unknown>
	},
): Promise<void> {
	const { producerId, orderId, kind, userId, detail = {} } = change
	await tx.insert(orderEvents).values({ producerId, orderId, kind, userId, detail })
	await tx
		.insert(auditEntries)
		.values({ producerId, userId, action: `order ${kind}`, subjectType: "order", subjectId: orderId, detail })
}
