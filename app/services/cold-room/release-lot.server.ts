import { and, eq } from "drizzle-orm"
import { auditEntries, lotReleases, lots } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import type { Result } from "~/domain/result"
import { findReleaseState } from "./find-release-state.server"

export type ReleaseAnswer = Result<
	object,
	| { ok: false; reason: "no-such-lot" }
	| { ok: false; reason: "withdrawn" }
	| { ok: false; reason: "missing"; missing: ("freezing" | "weighing")[] }
	| { ok: false; reason: "reason-too-short" }
>

type ReleasedLot = { producerId: string; personId: string; code: string }

/** A reason shorter than this says nothing to whoever reads it years later. */
const SHORTEST_REASON = 10

/**
 * Releases a held lot on its proofs: enough of it was frozen long enough and its latest weighing passed. The lot's row is
 * held meanwhile, so that it is released once. Refused naming what is missing; nothing is written then. Its pieces stay
 * where they lie: what is released can be promised from the cold room as from the ready shelf.
 */
export function releaseLot(release: ReleasedLot): Promise<ReleaseAnswer> {
	const { producerId } = release
	return onHeldLot(release, async (tx, lotId) => {
		const { missing, proof, check } = await findReleaseState(tx, { producerId, lotId })
		if (missing.length > 0 || !proof || !check) return { ok: false, reason: "missing", missing }
		await write(tx, release, {
			lotId,
			kind: "proven",
			reason: "",
			freezeProofId: proof.id,
			netCheckId: check.id,
		})
		return { ok: true }
	})
}

/**
 * Releases a held lot by the owner's word, without all proofs. The reason stands on the lot for ever. The caller has made
 * sure that an owner asks. Refused when the reason has fewer than ten characters.
 */
export function releaseByHand(release: ReleasedLot & { reason: string }): Promise<ReleaseAnswer> {
	const reason = release.reason.trim()
	if (reason.length < SHORTEST_REASON) return Promise.resolve({ ok: false, reason: "reason-too-short" })
	const { producerId } = release
	return onHeldLot(release, async (tx, lotId) => {
		const { proof, check } = await findReleaseState(tx, { producerId, lotId })
		await write(tx, release, {
			lotId,
			kind: "by-hand",
			reason,
			freezeProofId: proof?.id ?? null,
			netCheckId: check?.hasPassed ? check.id : null,
		})
		return { ok: true }
	})
}

/** Locks the lot; one that is released already needs nothing more, and a withdrawn one stays withdrawn. */
function onHeldLot(
	{ producerId, code }: ReleasedLot,
	work: (tx: Tx, lotId: string) => Promise<ReleaseAnswer>,
): Promise<ReleaseAnswer> {
	return withProducer(producerId, async (tx): Promise<ReleaseAnswer> => {
		const [lot] = await tx
			.select({ id: lots.id, state: lots.state })
			.from(lots)
			.where(and(eq(lots.producerId, producerId), eq(lots.code, code)))
			.for("no key update")
		if (!lot) return { ok: false, reason: "no-such-lot" }
		if (lot.state === "withdrawn") return { ok: false, reason: "withdrawn" }
		return lot.state === "released" ? { ok: true } : work(tx, lot.id)
	})
}

async function write(
	tx: Tx,
	{ producerId, personId, code }: ReleasedLot,
	row: Omit<typeof lotReleases.$inferInsert, "producerId" | "releasedBy">,
): Promise<void> {
	await tx.insert(lotReleases).values({ producerId, releasedBy: personId, ...row })
	await tx
		.update(lots)
		.set({ state: "released" })
		.where(and(eq(lots.producerId, producerId), eq(lots.id, row.lotId)))
	await tx.insert(auditEntries).values({
		producerId,
		userId: personId,
		action: row.kind === "proven" ? "lot released" : "lot released by hand",
		subjectType: "lot",
		subjectId: row.lotId,
		detail: { code, reason: row.reason, freezeProofId: row.freezeProofId, netCheckId: row.netCheckId },
	})
}
