import pg from "pg"
import { inject } from "vitest"

declare module "vitest" {
	interface ProvidedContext {
		/** The address of the migrated database that each test file's own is a copy of. */
		templateUrl: string
	}
}

/** `url` with another database's name in it. */
export function withDatabase(url: string, name: string): string {
	const changed = new URL(url)
	changed.pathname = `/${name}`
	return changed.href
}

/** Runs statements about whole databases, which no connection to the database in question may be open for. */
export async function administer(url: string, statements: readonly string[]): Promise<void> {
	const client = new pg.Client({ connectionString: withDatabase(url, "postgres") })
	await client.connect()
	try {
		await client.query("set client_min_messages = warning")
		for (const statement of statements) await client.query(statement)
	} finally {
		await client.end()
	}
}

/** The address of this worker's own database, as the login that owns the schema. */
export function testDatabaseUrl(): string {
	return withDatabase(inject("templateUrl"), `worker_${process.env.VITEST_POOL_ID}`)
}
