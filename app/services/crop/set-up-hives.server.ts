import { sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { auditEntries, hives } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { rowOfLabels } from "~/domain/crop/hive-labels"
import type { Result } from "~/domain/result"

type SetUpHivesRefusal =
	| { ok: false; reason: "no-such-yard" }
	| { ok: false; reason: "no-number" }
	/** These labels are painted on other hives already, in use or not. */
	| { ok: false; reason: "labels-taken"; labels: string[] }

/** Enters one hive or a row of them in a yard, all or none: `firstLabel` and on, counting up. Labels are one of a kind. */
export async function setUpHives(given: {
	producerId: string
	personId: string
	yardId: string
	firstLabel: string
	count: number
}): Promise<Result<{ count: number }, SetUpHivesRefusal>> {
	const { producerId, personId, yardId, firstLabel, count } = given
	const labels = rowOfLabels(firstLabel, count)
	if (!labels) return { ok: false, reason: "no-number" }
	try {
		return await withProducer(producerId, async (tx) => {
			const yard = await tx.execute(sql`
				select id from yards where producer_id = ${producerId} and id = ${yardId} and is_active`)
			if (yard.rows.length === 0) return { ok: false, reason: "no-such-yard" }
			const taken = await tx.execute<{ label: string }>(sql`
				select label from hives where producer_id = ${producerId} and label = any(${sql.param(labels)}::text[])`)
			if (taken.rows.length > 0) {
				return { ok: false, reason: "labels-taken", labels: taken.rows.map(({ label }) => label) }
			}
			await tx.insert(hives).values(labels.map((label) => ({ producerId, yardId, label })))
			await tx.insert(auditEntries).values({
				producerId,
				userId: personId,
				action: "hives entered",
				subjectType: "yard",
				subjectId: yardId,
				detail: { labels },
			})
			return { ok: true, count: labels.length }
		})
	} catch (error) {
		if (breaksConstraint(error, "hives_label_once")) return { ok: false, reason: "labels-taken", labels: [firstLabel] }
		throw error
	}
}
