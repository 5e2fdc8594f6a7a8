import { chmodSync, mkdtempSync, readFileSync, rmSync } from "node:fs"
import { join } from "node:path"
import pg from "pg"
import { afterAll, beforeAll, expect, it } from "vitest"
import { startModule } from "../../setup/run-script"

let folder: string
beforeAll(() => {
	folder = mkdtempSync(join("/var/tmp", "waxbill-cluster-"))
	// As the folders of a checkout usually are: the database's user may pass through.
	chmodSync(folder, 0o755)
})
afterAll(async () => {
	await cluster("(await start()).remove()")
	rmSync(folder, { recursive: true, force: true })
})

/** Runs `code` with `start()`, which starts the cluster of this test; answers what it printed. */
async function cluster(code: string): Promise<string> {
	const script = startModule(`
		import { startCluster } from "./scripts/lib/cluster.mjs"
		import { explain } from "./scripts/lib/say.mjs"
		const start = () => startCluster({ folder: ${JSON.stringify(join(folder, "pg"))}, throwaway: true })
		try { ${code} } catch (error) { explain(error); process.exitCode = 1 }
	`)
	const status = await script.ended
	if (status !== 0) throw new Error(`It ended with ${status}:\n${script.output()}`)
	return script.output().trim()
}

async function ask(url: string, sql: string): Promise<unknown[]> {
	const client = new pg.Client({ connectionString: url })
	client.on("error", () => {})
	await client.connect()
	try {
		return (await client.query({ text: sql, rowMode: "array" })).rows.flat()
	} finally {
		await client.end()
	}
}

const printUrl = "console.log((await start()).url())"
const pidFile = () => join(folder, "pg", "data", "postmaster.pid")

it("a cluster outlives the script that made it, a kill and a restart, and keeps its data", async () => {
	const url = await cluster(printUrl)
	await ask(url, "create table kept (note text)")
	await ask(url, "insert into kept values ('comb')")

	expect(await cluster(printUrl), "the running one is taken over").toBe(url)

	process.kill(Number(readFileSync(pidFile(), "utf8").split("\n")[0]), "SIGKILL")
	expect(await ask(await cluster(printUrl), "select note from kept")).toEqual(["comb"])

	await cluster("(await start()).stop()")
	expect(await ask(await cluster(printUrl), "select note from kept")).toEqual(["comb"])
}, 60_000)

it("its login is no superuser, and nobody gets in without the password or from elsewhere", async () => {
	const url = await cluster(printUrl)
	expect(await ask(url, "select rolsuper, rolbypassrls from pg_roles where rolname = current_user")).toEqual([
		false,
		false,
	])
	const [, , , , socketFolder, address] = readFileSync(pidFile(), "utf8").split("\n")
	expect({ socketFolder, address }).toEqual({ socketFolder: "", address: "127.0.0.1" })
	const wrong = new URL(url)
	wrong.password = "guess"
	await expect(ask(wrong.href, "select 1")).rejects.toThrow(/password authentication failed/)
}, 30_000)
