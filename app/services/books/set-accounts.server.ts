import { and, eq, inArray, sql } from "drizzle-orm"
import { auditEntries, bookAccounts } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { type AccountName, type BookAccountKey, bookAccountKeys, type Chart, OWN_CHART } from "~/domain/books/accounts"
import { readChart } from "./read-views.server"

/** How the accounts are called now. */
export function findAccounts(query: { producerId: string }): Promise<Chart> {
	return readProducer(query.producerId, (tx) => readChart(tx, query.producerId))
}

/**
 * Gives accounts the numbers and names that the bookkeeper uses; an account without a name goes back to its own. Closed
 * days keep the names that they were closed with. Noted in the audit trail where something changed.
 */
export async function setAccounts(query: {
	producerId: string
	personId: string
	names: Partial<Record<BookAccountKey, AccountName>>
}): Promise<void> {
	const { producerId, personId, names } = query
	await withProducer(producerId, async (tx) => {
		const before = await readChart(tx, producerId)
		const wanted = bookAccountKeys.flatMap((account) => {
			const given = names[account]
			if (!given) return []
			return [{ account, ...(given.name === "" ? OWN_CHART[account] : given) }]
		})
		const changed = wanted.filter(
			({ account, number, name }) => before[account].number !== number || before[account].name !== name,
		)
		if (changed.length === 0) return
		const own = changed.filter(({ account, number, name }) => !isOwn(account, { number, name }))
		const back = changed.filter((one) => !own.includes(one)).map(({ account }) => account)
		if (back.length > 0)
			await tx
				.delete(bookAccounts)
				.where(and(eq(bookAccounts.producerId, producerId), inArray(bookAccounts.account, back)))
		if (own.length > 0)
			await tx
				.insert(bookAccounts)
				.values(own.map((one) => ({ producerId, ...one })))
				.onConflictDoUpdate({
					target: [bookAccounts.producerId, bookAccounts.account],
					set: { number: sql`excluded.number`, name: sql`excluded.name` },
				})
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: "name book accounts",
			subjectType: "producer",
			subjectId: producerId,
			detail: { accounts: changed },
		})
	})
}

function isOwn(account: BookAccountKey, { number, name }: AccountName): boolean {
	return OWN_CHART[account].number === number && OWN_CHART[account].name === name
}
