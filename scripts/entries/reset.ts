import pg from "pg"
import { run } from "./run"

/** Empties the database at DATABASE_URL: drops every schema in it, whatever it holds, and leaves an empty `public`. */
await run(async () => {
	const client = new pg.Client({ connectionString: process.env.DATABASE_URL })
	await client.connect()
	await client.query("set client_min_messages = warning")
	const { rows } = await client.query<{ name: string }>(
		"select nspname as name from pg_namespace where nspname !~ '^pg_' and nspname <> 'information_schema'",
	)
	await client.query("begin")
	for (const { name } of rows) await client.query(`drop schema ${client.escapeIdentifier(name)} cascade`)
	await client.query("create schema public")
	await client.query("grant usage on schema public to public")
	await client.query("commit")
	await client.end()
})
