import type { RequestHandler } from "express"
import { pool } from "~/db/client.server"
import journal from "../../drizzle/meta/_journal.json"

const TIMEOUT_MS = 2_000

/** The moment (milliseconds) that names the newest migration this code was built with. */
export const expectedVersion = Math.max(...journal.entries.map((entry) => entry.when))

/** Why the process cannot serve pages yet, or that it can. */
export type Readiness = { ready: true } | { ready: false; reason: "database-away" | "schema-behind" }

/**
 * Whether the database answers `readVersion` within `timeoutMs` and its schema is at least at `expected`. A newer schema
 * is fine: during a deploy the old processes go on while the new ones have migrated already. Never throws.
 */
export async function readiness(
	readVersion: () => Promise<number | undefined>,
	expected: number,
	timeoutMs = TIMEOUT_MS,
): Promise<Readiness> {
	let timer: NodeJS.Timeout | undefined
	const late = new Promise<never>((_, reject) => {
		timer = setTimeout(() => reject(new Error("The database did not answer in time")), timeoutMs)
	})
	try {
		const version = await Promise.race([readVersion(), late])
		return version !== undefined && version >= expected ? { ready: true } : { ready: false, reason: "schema-behind" }
	} catch {
		return { ready: false, reason: "database-away" }
	} finally {
		clearTimeout(timer)
	}
}

/** Reads the newest migration that the database has; undefined when it has none. Throws when the database is away. */
async function schemaVersion(): Promise<number | undefined> {
	try {
		const found = await pool().query<{ version: string | null }>(
			"select max(created_at) as version from drizzle.__drizzle_migrations",
		)
		return found.rows[0]?.version ? Number(found.rows[0].version) : undefined
	} catch (error) {
		// No such schema, table, role or right: the server is there and the migrations have not been run.
		const code = error instanceof Error && "code" in error ? error.code : undefined
		if (typeof code === "string" && ["3F000", "42P01", "42501", "22023"].includes(code)) return undefined
		throw error
	}
}

/** GET /health/live: the process runs. Touches nothing else. */
export const live: RequestHandler = (_request, response) => {
	response.set("Cache-Control", "no-store").json({ status: "live" })
}

/** GET /health/ready: 200 once database and schema are there, else 503; `{ status, reason? }` either way. */
export const ready: RequestHandler = async (_request, response) => {
	const answer = await readiness(schemaVersion, expectedVersion)
	response
		.set("Cache-Control", "no-store")
		.status(answer.ready ? 200 : 503)
		.json(answer.ready ? { status: "ready" } : { status: "waiting", reason: answer.reason })
}
