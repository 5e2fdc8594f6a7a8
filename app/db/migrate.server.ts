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

/** The queue's tables, and the two functions by which the application reaches them. */
async function migrateQueue(databaseUrl: string): Promise<void> {
	const pool = new pg.Pool({ connectionString: databaseUrl, options: "-c role=waxbill_queue", max: 2 })
	// Reported by the query that was under way; without listeners it would end the process as well.
	pool.on("error", () => {})
	pool.on("connect", (connection) => connection.on("error", () => {}))
	try {
		await runMigrations({ pgPool: pool })
		await pool.query(queueFunctions)
	} finally {
		await pool.end()
	}
}

// They run with the rights of the queue's role: the application needs none on the queue's tables. A job is handed over
// inside the transaction that it belongs to; jobs of a killed worker are given back.
const queueFunctions = `
create or replace function jobs.enqueue(task text, payload json, run_at timestamptz default null, job_key text default null)
returns void language sql security definer set search_path = graphile_worker, pg_temp
as $$
	select graphile_worker.add_job(task, payload, run_at => run_at, job_key => job_key, max_attempts => 25);
$$;
revoke all on function jobs.enqueue(text, json, timestamptz, text) from public;
grant execute on function jobs.enqueue(text, json, timestamptz, text) to waxbill_app;

create or replace function jobs.enqueue_all(task text, payloads json[])
returns void language sql security definer set search_path = graphile_worker, pg_temp
as $$
	select graphile_worker.add_jobs(array_agg(
		row(task, p.payload, null, now(), 25, null, null, null)::graphile_worker.job_spec
	)) from unnest(payloads) as p (payload) having count(*) > 0;
$$;
revoke all on function jobs.enqueue_all(text, json[]) from public;
grant execute on function jobs.enqueue_all(text, json[]) to waxbill_app;

create or replace function jobs.free_stuck(held_for interval) returns void
language sql security definer set search_path = graphile_worker, pg_temp
as $$
	select graphile_worker.force_unlock_workers(array_agg(distinct locked_by))
	from graphile_worker.jobs where locked_at < now() - held_for;
$$;
revoke all on function jobs.free_stuck(interval) from public;
grant execute on function jobs.free_stuck(interval) to waxbill_app;
`
