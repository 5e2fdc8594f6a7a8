import { sql } from "drizzle-orm"
import { auditEntries } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import type { LetterKind } from "~/domain/people/letters"

type Own = { producerId: string; storeId: string; personId: string }

/** Sets for a person alone which letters about a store they do not want, in all their roles there. */
export function setLettersOff(query: Own & { off: readonly LetterKind[] }): Promise<void> {
	const { producerId, storeId, personId, off } = query
	return withProducer(producerId, async (tx) => {
		await tx.execute(sql`
			update memberships set letters_off = ${sql.param([...off])}::text[]
			where producer_id = ${producerId} and store_id = ${storeId} and user_id = ${personId} and ended_at is null`)
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: "letters chosen",
			subjectType: "store",
			subjectId: storeId,
			detail: { off },
		})
	})
}

/** Which letters about a store a person has switched off. */
export function findLettersOff({ producerId, storeId, personId }: Own): Promise<string[]> {
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<{ kind: string }>(sql`
			select kind from memberships m, unnest(m.letters_off) as kind
			where m.producer_id = ${producerId} and m.store_id = ${storeId} and m.user_id = ${personId} and m.ended_at is null
			group by kind
			having count(*) = (
				select count(*) from memberships o
				where o.producer_id = ${producerId} and o.store_id = ${storeId} and o.user_id = ${personId}
					and o.ended_at is null)
			order by kind`)
		return rows.map(({ kind }) => kind)
	})
}
