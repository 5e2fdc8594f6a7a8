import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { type LetterKind, whoIsTold } from "~/domain/people/letters"

/** Someone who is told of what happens at a store. */
export type StorePerson = { id: string; name: string; email: string }

/** Who at a store is told of its orders and invoices by letters of a kind: name and address, by name. */
export async function findStorePeople(
	tx: Tx,
	query: { producerId: string; storeId: string; kind: LetterKind },
): Promise<StorePerson[]> {
	const { producerId, storeId, kind } = query
	return (await findPeopleOfStores(tx, { producerId, storeIds: [storeId], kind })).get(storeId) ?? []
}

/**
 * The same for many stores in one statement, by store. A person with several roles at a store has switched a kind off when
 * they have done so in all of them.
 */
export async function findPeopleOfStores(
	tx: Tx,
	query: { producerId: string; storeIds: readonly string[]; kind: LetterKind },
): Promise<Map<string, StorePerson[]>> {
	const { rows } = await tx.execute<StorePerson & { storeId: string; isOff: boolean }>(sql`
		select m.store_id as "storeId", u.id, u.name, u.email, bool_and(${query.kind} = any(m.letters_off)) as "isOff"
		from memberships m join users u on u.id = m.user_id
		where m.producer_id = ${query.producerId} and m.ended_at is null
			and m.store_id = any(${sql.param([...query.storeIds])}::uuid[])
		group by m.store_id, u.id, u.name, u.email
		order by m.store_id, u.name, u.id`)
	const stores = new Map<string, (StorePerson & { lettersOff: string[] })[]>()
	for (const { storeId, isOff, ...person } of rows) {
		const people = stores.get(storeId) ?? []
		people.push({ ...person, lettersOff: isOff ? [query.kind] : [] })
		stores.set(storeId, people)
	}
	return new Map(
		[...stores].map(([storeId, people]) => [
			storeId,
			whoIsTold(people, query.kind).map(({ id, name, email }) => ({ id, name, email })),
		]),
	)
}

/** Who at the producer's desk is told of what a store does: owners and desk hands, each once, by name. */
export async function findDeskPeople(tx: Tx, query: { producerId: string }): Promise<StorePerson[]> {
	const { rows } = await tx.execute<StorePerson>(sql`
		select distinct u.id, u.name, u.email
		from memberships m join users u on u.id = m.user_id
		where m.producer_id = ${query.producerId} and m.ended_at is null and m.role in ('owner', 'desk')
		order by u.name, u.id`)
	return rows
}
