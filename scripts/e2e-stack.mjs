import "./lib/node-version.mjs"
import { rmSync } from "node:fs"
import { join } from "node:path"
import pg from "pg"
import { ensureBuilt } from "./lib/build.mjs"
import { supervise } from "./lib/crew.mjs"
import { anyPort } from "./lib/ports.mjs"
import { choosePorts, productEnv, runBuilt, startBuilt, startStandIns } from "./lib/product.mjs"
import { clearDeadRuns, startTestCluster, testFolder } from "./lib/test-work.mjs"

/** The database of a lane on the server at `serverUrl`, made if it is not there. */
async function laneDatabase(serverUrl, lane) {
	const name = `e2e_${lane.replace("/", "_of_")}`
	const client = new pg.Client({ connectionString: serverUrl })
	await client.connect()
	const { rowCount } = await client.query("select from pg_database where datname = $1", [name])
	if (rowCount === 0) await client.query(`create database ${client.escapeIdentifier(name)}`)
	await client.end()
	return Object.assign(new URL(serverUrl), { pathname: `/${name}` }).href
}

/**
 * Runs the built product with fresh demo data on stand-ins, for browser tests: on the server of TEST_DATABASE_URL, or
 * on a cluster of its own. Writes one line of JSON when all is ready, `{ web, mail, stripe, databaseUrl, env }`, and ends
 * along with the process that started it.
 */
await supervise(
	testFolder,
	async (crew) => {
		await clearDeadRuns()
		const serverUrl = process.env.TEST_DATABASE_URL ?? (await startTestCluster(crew))
		const databaseUrl = await laneDatabase(serverUrl, process.env.E2E_LANE ?? "1/1")
		await ensureBuilt()
		const ports = await choosePorts(anyPort)
		const env = { ...productEnv({ databaseUrl, ports }), TEST_CLOCK_FILE: join(testFolder, "clock") }
		rmSync(env.TEST_CLOCK_FILE, { force: true })
		await runBuilt("reset", "The database could not be emptied.", env)
		await runBuilt("migrate", "The database could not be brought up to date.", env)
		await runBuilt("seed", "The demo data could not be written.", env)
		await startStandIns(crew, { ports, env })
		await startBuilt(crew, { env })
		const local = (port) => `http://127.0.0.1:${port}`
		const addresses = { web: env.BASE_URL, mail: local(ports.mail), stripe: local(ports.stripe), databaseUrl, env }
		console.log(JSON.stringify(addresses))
		await crew.ended
	},
	{ signalCode: 0, withParent: true },
)
