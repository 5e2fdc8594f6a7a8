import { and, eq } from "drizzle-orm"
import { auditEntries, withdrawalNotices } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Result } from "~/domain/result"
import { now } from "~/platform/clock.server"
import { takeFrom } from "~/platform/rate-limit.server"
import { hashToken } from "~/platform/session-cookie.server"
import { ANSWERS_PER_NETWORK } from "./notice-limits.server"

export type NoticeRefusal =
	| { ok: false; reason: "too-many"; retryAfterSeconds: number }
	| { ok: false; reason: "no-such-notice" }
	| { ok: false; reason: "more-than-had"; pieces: number }

/**
 * Writes down what a store says it still holds. It may answer again when something has changed; each answer is kept in the
 * audit trail. Answering counts as opening. Refuses more pieces than the store had.
 */
export async function answerNotice(query: {
	producerId: string
	token: string
	network: string
	heldPieces: number
	note: string
}): Promise<Result<object, NoticeRefusal>> {
	const { producerId, token, network, heldPieces, note } = query
	const taken = await takeFrom([ANSWERS_PER_NETWORK, network])
	if (!taken.ok) return taken
	return withProducer<Result<object, NoticeRefusal>>(producerId, async (tx) => {
		const isIt = and(eq(withdrawalNotices.producerId, producerId), eq(withdrawalNotices.tokenHash, hashToken(token)))
		const [notice] = await tx.select().from(withdrawalNotices).where(isIt).for("update")
		if (!notice) return { ok: false, reason: "no-such-notice" }
		if (heldPieces > notice.pieces) return { ok: false, reason: "more-than-had", pieces: notice.pieces }
		const answeredAt = now()
		await tx
			.update(withdrawalNotices)
			.set({ openedAt: notice.openedAt ?? answeredAt, answeredAt, heldPieces, answerNote: note })
			.where(isIt)
		await tx.insert(auditEntries).values({
			producerId,
			action: "withdrawal answered",
			subjectType: "withdrawal notice",
			subjectId: notice.id,
			detail: { heldPieces, note },
		})
		return { ok: true }
	})
}
