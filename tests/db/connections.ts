import pg from "pg"
import { afterAll } from "vitest"
import { testDatabaseUrl } from "../setup/test-database"

/** Opens a connection that is closed after the file's last test: as the login that owns the schema, or as `role`. */
export async function connect(role?: "waxbill_app"): Promise<pg.Client> {
	const client = new pg.Client({
		connectionString: testDatabaseUrl(),
		...(role && { options: `-c role=${role}` }),
	})
	await client.connect()
	afterAll(() => client.end())
	return client
}

/** Runs `work` in a transaction that is undone at its end, whatever came of it. */
export async function undone<T>(client: pg.Client, work: () => Promise<T>): Promise<T> {
	await client.query("begin")
	try {
		return await work()
	} finally {
		await client.query("rollback")
	}
}

/** The database's refusal of `query`: its code, its message and the constraint. Fails when the query is not refused. */
export async function refusalOf(
	query: Promise<unknown>,
): Promise<{ code?: string; constraint?: string; message: string }> {
	try {
		await query
	} catch (error) {
		for (let cause = error; cause instanceof Error; cause = cause.cause) {
			if (cause instanceof pg.DatabaseError) return cause
		}
		throw error
	}
	throw new Error("the database did not refuse")
}

export const INSUFFICIENT_PRIVILEGE = "42501"

/** Every table of the product as the database's own catalogue has it. */
export async function tablesOf(client: pg.Client): Promise<{ name: string; hasProducer: boolean }[]> {
	const { rows } = await client.query<{ name: string; hasProducer: boolean }>(`
		select c.relname as name, exists (
			select from pg_attribute a where a.attrelid = c.oid and a.attname = 'producer_id' and not a.attisdropped
		) as "hasProducer"
		from pg_class c
		where c.relnamespace = 'public'::regnamespace and c.relkind in ('r', 'p', 'm', 'v', 'f')
		order by 1`)
	return rows
}

/** The tables whose rows belong to a producer. */
export async function producerTables(client: pg.Client): Promise<string[]> {
	return (await tablesOf(client)).flatMap(({ name, hasProducer }) => (hasProducer ? name : []))
}
