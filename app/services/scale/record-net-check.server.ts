import { and, eq } from "drizzle-orm"
import { auditEntries, lots, netChecks } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { judgeNetContents, type NetContentsInput, type NetContentsRefusal } from "~/domain/scale/net-contents"

export type NetCheckRefusal =
	| NetContentsRefusal
	| { ok: false; reason: "no-such-lot" }
	| { ok: false; reason: "more-than-harvested"; pieces: number }

/**
 * Judges what was weighed of a lot and keeps it, weights and worksheet, for good. `checkId` is made with the form: a second
 * send of the same form finds the first check and changes nothing. Refused for a lot that is none, for more packages than
 * were harvested, and for whatever the method refuses; then nothing is kept.
 */
export async function recordNetCheck(query: {
	producerId: string
	lotCode: string
	checkId: string
	personId: string
	checkedOn: Day
	input: NetContentsInput
	note: string
}): Promise<Result<{ checkId: string; hasPassed: boolean }, NetCheckRefusal>> {
	const { producerId, lotCode, checkId, personId, checkedOn, input, note } = query
	return withProducer<Result<{ checkId: string; hasPassed: boolean }, NetCheckRefusal>>(producerId, async (tx) => {
		const [lot] = await tx
			.select({ id: lots.id, pieces: lots.piecesHarvested })
			.from(lots)
			.where(and(eq(lots.producerId, producerId), eq(lots.code, lotCode)))
		if (!lot) return { ok: false, reason: "no-such-lot" }
		if (input.lotPackages > lot.pieces) return { ok: false, reason: "more-than-harvested", pieces: lot.pieces }
		const judged = judgeNetContents(input)
		if (!judged.ok) return judged
		const { worksheet } = judged
		const [written] = await tx
			.insert(netChecks)
			.values({
				producerId,
				id: checkId,
				lotId: lot.id,
				checkedOn,
				input,
				worksheet,
				hasPassed: worksheet.hasPassed,
				note,
				checkedBy: personId,
			})
			.onConflictDoNothing()
			.returning({ id: netChecks.id })
		if (!written) return readFirst(tx, { producerId, checkId, lotId: lot.id })
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: "check net contents",
			subjectType: "lot",
			subjectId: lot.id,
			detail: { checkId, hasPassed: worksheet.hasPassed, average: worksheet.average, unit: worksheet.unit },
		})
		return { ok: true, checkId, hasPassed: worksheet.hasPassed }
	})
}

/** What the first send of the same form came to. */
async function readFirst(
	tx: Tx,
	{ producerId, checkId, lotId }: { producerId: string; checkId: string; lotId: string },
): Promise<Result<{ checkId: string; hasPassed: boolean }, NetCheckRefusal>> {
	const [first] = await tx
		.select({ hasPassed: netChecks.hasPassed })
		.from(netChecks)
		.where(and(eq(netChecks.producerId, producerId), eq(netChecks.id, checkId), eq(netChecks.lotId, lotId)))
	return first ? { ok: true, checkId, hasPassed: first.hasPassed } : { ok: false, reason: "no-such-lot" }
}
