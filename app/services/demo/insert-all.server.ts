import type { PgInsertValue, PgTable } from "drizzle-orm/pg-core"
import type { Tx } from "~/db/transaction.server"

/** PostgreSQL takes 65,535 values in one statement; this many rows of the widest table stay below. */
const ROWS_AT_ONCE = 1_000

/** Inserts all rows of one table, in their order, with as few statements as PostgreSQL allows. */
export async function insertAll<Table extends PgTable>(
	tx: Tx,
	table: Table,
	rows: readonly PgInsertValue<Table>[],
): Promise<void> {
	for (let from = 0; from < rows.length; from += ROWS_AT_ONCE) {
		await tx.insert(table).values(rows.slice(from, from + ROWS_AT_ONCE))
	}
}
