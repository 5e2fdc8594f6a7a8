import { and, eq, isNull } from "drizzle-orm"
import { auditEntries, freezeProofs, freezerLoads } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"

type Proof = Omit<typeof freezeProofs.$inferInsert, "id" | "createdAt"> & { id: string }

/**
 * Writes a reading of a treatment, whether or not it proves it, and marks the load as proven when it does. The load's row
 * must be locked. A second send of the same form (the same id) changes nothing.
 */
export async function writeProof(tx: Tx, proof: Proof, now: Date): Promise<void> {
	const { producerId, loadId, isAccepted } = proof
	const written = await tx
		.insert(freezeProofs)
		.values({ ...proof, createdAt: now })
		.onConflictDoNothing()
		.returning({ id: freezeProofs.id })
	if (written.length === 0) return
	if (isAccepted)
		await tx
			.update(freezerLoads)
			.set({ provenAt: now })
			.where(and(eq(freezerLoads.producerId, producerId), eq(freezerLoads.id, loadId), isNull(freezerLoads.provenAt)))
	await tx.insert(auditEntries).values({
		producerId,
		userId: proof.enteredBy ?? null,
		action: isAccepted ? "freezing proven" : "freezing not proven yet",
		subjectType: "freezer load",
		subjectId: loadId,
		detail: { proofId: proof.id, kind: proof.kind, heldMinutes: proof.heldMinutes, rowTenthsC: proof.rowTenthsC },
	})
}

/** A load whose row is held until the transaction ends; null when there is none of that number. */
export async function lockLoad(tx: Tx, query: { producerId: string; number: number }) {
	const [load] = await tx
		.select()
		.from(freezerLoads)
		.where(and(eq(freezerLoads.producerId, query.producerId), eq(freezerLoads.number, query.number)))
		.for("update")
	return load ?? null
}
