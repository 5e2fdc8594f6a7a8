import { drizzle } from "drizzle-orm/node-postgres"
import { migrate } from "drizzle-orm/node-postgres/migrator"
import { runMigrations } from "graphile-worker"
import pg from "pg"

/** Any fixed number: two processes that migrate at once wait for one another on it. */
const MIGRATION_LOCK = 7_290_461

/**
 * Brings the database at `databaseUrl` (a login that owns the schema) to the version of this code: the tables in
 * `migrationsFolder`, then the job queue's own. Safe to run by several processes at once, and again.
 */
export async function migrateDatabase(databaseUrl: string, migrationsFolder = "drizzle"): Promise<void> {
	const client = new pg.Client({ connectionString: databaseUrl })
	await client.connect()
	try {
		await client.query("set client_min_messages = warning")
		await client.query("select pg_advisory_lock($1)", [MIGRATION_LOCK])
		await migrate(drizzle({ client }), { migrationsFolder })
		await migrateQueue(databaseUrl)
	} finally {
		await client.end()
	}
}

/** The queue's tables, and the one function by which the application hands it a job inside its own transaction. */
async function migrateQueue(databaseUrl: string): Promise<void> {
	const pool = new pg.Pool({ connectionString: databaseUrl, options: "-c role=waxbill_queue", max: 2 })
	pool.on("error", () => {})
	try {
		await runMigrations({ pgPool: pool })
		await pool.query(enqueueFunction)
	} finally {
		await pool.end()
	}
}

// Runs with the rights of the queue's role: the application needs none on the queue's tables.
const enqueueFunction = `
create or replace function jobs.enqueue(task text, payload json, run_at timestamptz default null, job_key text default null)
returns void language sql security definer set search_path = graphile_worker, pg_temp
as $$
	select graphile_worker.add_job(task, payload, run_at => run_at, job_key => job_key, max_attempts => 25);
$$;
revoke all on function jobs.enqueue(text, json, timestamptz, text) from public;
grant execute on function jobs.enqueue(text, json, timestamptz, text) to waxbill_app;
`
