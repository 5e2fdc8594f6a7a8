import { pool } from "./client.server"

/** The answer of the database's `identify`: nulls where nobody is signed in or nothing has that name. */
export type Identified = {
	session_id: string | null
	last_seen_at: Date
	user_id: string
	user_name: string
	user_email: string
	producer_id: string | null
	producer_name: string
	county: string
	time_zone: string
	roles: string[]
	store_id: string | null
	store_name: string
	store_roles: string[]
}

/**
 * Asks who holds the session with this token hash and what they are at the named producer and store. One statement on
 * its own, so that a guarded page costs one round trip; the function itself sets and clears whom it reads for.
 */
export async function identify(
	tokenHash: string | null,
	producerSlug: string | null,
	storeSlug: string | null,
): Promise<Identified> {
	const { rows } = await pool().query<Identified>({
		name: "identify",
		text: "select * from identify($1, $2, $3)",
		values: [tokenHash, producerSlug, storeSlug],
	})
	const [row] = rows
	if (!row) throw new Error("identify() always answers one row")
	return row
}
