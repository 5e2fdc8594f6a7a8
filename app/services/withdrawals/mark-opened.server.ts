import { and, eq, isNull } from "drizzle-orm"
import { withdrawalNotices } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { now } from "~/platform/clock.server"
import { takeFrom } from "~/platform/rate-limit.server"
import { hashToken } from "~/platform/session-cookie.server"
import { ANSWERS_PER_NETWORK } from "./notice-limits.server"

/** Notes when a notice was first opened by a person; later openings change nothing, nor does an unknown link. */
export async function markOpened(query: { producerId: string; token: string; network: string }): Promise<void> {
	const { producerId, token, network } = query
	if (!(await takeFrom([ANSWERS_PER_NETWORK, network])).ok) return
	await withProducer(producerId, (tx) =>
		tx
			.update(withdrawalNotices)
			.set({ openedAt: now() })
			.where(
				and(
					eq(withdrawalNotices.producerId, producerId),
					eq(withdrawalNotices.tokenHash, hashToken(token)),
					isNull(withdrawalNotices.openedAt),
				),
			),
	)
}
