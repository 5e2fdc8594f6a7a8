import { execFile } from "node:child_process"
import { cp, mkdtemp, readdir, readFile, rm } from "node:fs/promises"
import { tmpdir } from "node:os"
import { join, relative } from "node:path"
import { promisify } from "node:util"
import pg from "pg"
import { afterAll, beforeEach, expect, test } from "vitest"
import { migrateDatabase } from "~/db/migrate.server"
import { administer, testDatabaseUrl, withDatabase } from "../setup/test-database"

const name = `empty_${process.env.VITEST_POOL_ID}`
const url = withDatabase(testDatabaseUrl(), name)
const run = promisify(execFile)

beforeEach(() => administer(url, [`drop database if exists ${name} with (force)`, `create database ${name}`]))
afterAll(() => administer(url, [`drop database if exists ${name} with (force)`]))

type Journal = { entries: { idx: number; when: number; tag: string }[] }

async function journal(): Promise<Journal> {
	return JSON.parse(await readFile("drizzle/meta/_journal.json", "utf8"))
}

async function applied(): Promise<number> {
	const client = new pg.Client({ connectionString: url })
	await client.connect()
	try {
		const { rows } = await client.query<{ n: number }>("select count(*)::int as n from drizzle.__drizzle_migrations")
		return rows[0]?.n ?? 0
	} finally {
		await client.end()
	}
}

test("a migrated database is migrated again without a change", async () => {
	await migrateDatabase(url)
	await migrateDatabase(url)
	expect(await applied()).toBe((await journal()).entries.length)
})

test("three processes that migrate at once take turns, and each migration runs once", async () => {
	await Promise.all([migrateDatabase(url), migrateDatabase(url), migrateDatabase(url)])
	expect(await applied()).toBe((await journal()).entries.length)
})

test("migrations rise in time and number, as one with an older time would be passed over in silence", async () => {
	const { entries } = await journal()
	expect(entries.map(({ idx }) => idx)).toEqual(entries.map((_, index) => index))
	expect(entries.map(({ when }) => when)).toEqual(entries.map(({ when }) => when).toSorted((a, b) => a - b))
	expect(new Set(entries.map(({ when }) => when)).size).toBe(entries.length)
	const files = (await readdir("drizzle")).filter((file) => file.endsWith(".sql")).toSorted()
	expect(files).toEqual(entries.map(({ tag }) => `${tag}.sql`))
})

test("the migrations make the tables that the schema names: there is nothing to generate", async () => {
	const folder = await mkdtemp(join(tmpdir(), "waxbill-drizzle-"))
	try {
		await cp("drizzle", folder, { recursive: true })
		const before = await readdir(folder, { recursive: true })
		const { stdout } = await run(process.execPath, [
			"node_modules/drizzle-kit/bin.cjs",
			"generate",
			"--dialect=postgresql",
			"--schema=./app/db/schema/index.ts",
			// The program takes only a path below the folder it runs in.
			`--out=${relative(process.cwd(), folder)}`,
		])
		expect(stdout).toContain("No schema changes")
		expect(await readdir(folder, { recursive: true })).toEqual(before)
	} finally {
		await rm(folder, { recursive: true })
	}
}, 60_000)
