import pg from "pg"
import { env } from "~/platform/env.server"
import { log } from "~/platform/log.server"

/** The role the product runs as: it owns nothing, and row security binds it. */
const APP_ROLE = "waxbill_app"

/**
 * Makes a pool whose every connection enters `role` before anything else. The limits keep one stuck statement, or a
 * database that is away, from holding a request for ever.
 */
export function createPool(databaseUrl: string, role: string, max: number): pg.Pool {
	const pool = new pg.Pool({
		connectionString: databaseUrl,
		options: `-c role=${role}`,
		max,
		connectionTimeoutMillis: 3_000,
		idleTimeoutMillis: 30_000,
		statement_timeout: 15_000,
		idle_in_transaction_session_timeout: 15_000,
	})
	// Without listeners the error of a connection whose server went away would end the process: of an idle one on the
	// pool, of one in use (the queue listens on one all the time) on the connection itself.
	pool.on("error", (error) => log.error({ err: error }, "an idle database connection broke"))
	pool.on("connect", (connection) => {
		connection.on("error", (error) => log.error({ err: error }, "a database connection broke"))
	})
	return pool
}

// Kept across hot reloads in development, which would pile up pools otherwise.
const kept = globalThis as { waxbillPool?: pg.Pool }

/** The process's one pool, opened on first use. */
export function pool(): pg.Pool {
	kept.waxbillPool ??= createPool(env.DATABASE_URL, APP_ROLE, 10)
	return kept.waxbillPool
}

/** Closes the pool, once nothing more will be asked of it. */
export async function closePool(): Promise<void> {
	const open = kept.waxbillPool
	kept.waxbillPool = undefined
	await open?.end()
}
