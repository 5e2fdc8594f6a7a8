import { sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { type Tx, withProducer } from "~/db/transaction.server"

/** Locks the store's row, so that reports, answers and credits of one store come one after the other. */
export async function lockStoreAccount(tx: Tx, query: { producerId: string; storeId: string }): Promise<void> {
	await tx.execute(
		sql`select id from stores where producer_id = ${query.producerId} and id = ${query.storeId} for no key update`,
	)
}

const TRIES = 4

/**
 * As `withProducer`, and again when a payment settled the same invoice at the same moment: what is open is then less than
 * was read, and the database has refused the settlement. `"books-closed"` where the day lies in closed books.
 */
export async function withAccount<T>(producerId: string, work: (tx: Tx) => Promise<T>): Promise<T | "books-closed"> {
	for (let tries = 1; ; tries++) {
		try {
			return await withProducer(producerId, work)
		} catch (error) {
			if (breaksConstraint(error, "books_closed")) return "books-closed"
			if (tries === TRIES || !breaksConstraint(error, "invoices_settled_within_total")) throw error
		}
	}
}
