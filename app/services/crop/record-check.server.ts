import { and, eq, sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { superChecks, uploads } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import { type FieldRefusal, judgeCheck, type NotedCheck, type TypedCheck } from "~/domain/crop/check-rules"
import type { Result } from "~/domain/result"
import type { KeptPhoto } from "~/services/uploads/reencode-photo.server"
import { refreshExpected } from "./refresh-expected.server"

export type RecordCheck = {
	producerId: string
	/** Who sends it. */
	personId: string
	zone: string
	now: Date
	/** Made where the check was made; a check sent again is found by it. */
	checkId: string
	superId: string
	typed: TypedCheck
	photo: KeptPhoto | null
}

export type RecordCheckRefusal =
	| { ok: false; reason: "no-super" }
	| { ok: false; reason: "super-off"; offOn: Day }
	| { ok: false; reason: "other-check-recorded" }
	| { ok: false; reason: "fields"; refused: FieldRefusal[] }

/**
 * Records a look into a super, once: the same check sent again, by whoever made it, answers as the first did. Refuses, and
 * writes nothing, for a super that is not there or has come off, for what `judgeCheck` refuses as of today in the
 * producer's zone, and where another check was recorded under this id. What should come off the hives is worked out anew.
 */
export async function recordCheck(given: RecordCheck): Promise<Result<{ isNew: boolean }, RecordCheckRefusal>> {
	try {
		return await withProducer(given.producerId, (tx) => recordInTransaction(tx, given))
	} catch (error) {
		// Two sends of one check at once meet at its key; the second then finds what the first wrote.
		if (breaksConstraint(error, "super_checks_pk")) return recordCheck(given)
		throw error
	}
}

async function recordInTransaction(
	tx: Tx,
	given: RecordCheck,
): Promise<Result<{ isNew: boolean }, RecordCheckRefusal>> {
	const { producerId, superId, checkId, personId } = given
	const found = await lockSuper(tx, producerId, superId)
	if (!found) return { ok: false, reason: "no-super" }
	const today = dayInZone(given.now, given.zone)
	const judged = judgeCheck(given.typed, { ...found, today })
	const earlier = await findCheck(tx, producerId, checkId)
	if (earlier) {
		const isSame =
			judged.ok && earlier.superId === superId && earlier.checkedBy === personId && says(earlier, judged.check)
		return isSame ? { ok: true, isNew: false } : { ok: false, reason: "other-check-recorded" }
	}
	if (found.offOn !== null) return { ok: false, reason: "super-off", offOn: found.offOn }
	if (!judged.ok) return judged
	const photoId = given.photo && (await keepPhoto(tx, given, given.photo))
	await tx
		.insert(superChecks)
		.values({ producerId, id: checkId, superId, ...judged.check, photoId, checkedBy: personId, receivedAt: given.now })
	await refreshExpected(tx, { producerId, today, productIds: [found.productId] })
	return { ok: true, isNew: true }
}

type FoundSuper = { productId: string; capacityPieces: number; setOn: Day; offOn: Day | null }

/** The super, which cannot come off until the transaction ends. */
async function lockSuper(tx: Tx, producerId: string, superId: string): Promise<FoundSuper | undefined> {
	const { rows } = await tx.execute<FoundSuper>(sql`
		select product_id as "productId", capacity_pieces as "capacityPieces", set_on::text as "setOn",
			off_on::text as "offOn"
		from supers where producer_id = ${producerId} and id = ${superId} for share`)
	return rows[0]
}

async function findCheck(tx: Tx, producerId: string, id: string) {
	const [check] = await tx
		.select()
		.from(superChecks)
		.where(and(eq(superChecks.producerId, producerId), eq(superChecks.id, id)))
	return check
}

const says = (recorded: NotedCheck, check: NotedCheck) =>
	recorded.checkedOn === check.checkedOn &&
	recorded.filledPercent === check.filledPercent &&
	recorded.cappedPercent === check.cappedPercent &&
	recorded.sections === check.sections &&
	recorded.note === check.note

async function keepPhoto(tx: Tx, { producerId, personId }: RecordCheck, photo: KeptPhoto): Promise<string> {
	const [row] = await tx
		.insert(uploads)
		.values({ producerId, uploadedBy: personId, ...photo })
		.returning({ id: uploads.id })
	if (!row) throw new Error("a photo was not written")
	return row.id
}
