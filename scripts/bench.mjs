import "./lib/node-version.mjs"
import { existsSync, readFileSync, writeFileSync } from "node:fs"
import { cpus, loadavg } from "node:os"
import { join } from "node:path"
import { measureCrop } from "../tests/bench/crop.mjs"
import { actFor, openDatabase, signIn } from "../tests/bench/database.mjs"
import { measureInvoices } from "../tests/bench/invoices.mjs"
import { measureOrderSheet, orderSheetStatements } from "../tests/bench/order-sheet.mjs"
import { measurePlacing } from "../tests/bench/place-order.mjs"
import { measureReceivables } from "../tests/bench/receivables.mjs"
import { tableOf } from "../tests/bench/report.mjs"
import { buildReferences, startReferences, startWeb } from "../tests/bench/servers.mjs"
import { measureShopFront, mustNeverBeStale } from "../tests/bench/shop-front.mjs"
import { ensureBuilt } from "./lib/build.mjs"
import { startCluster } from "./lib/cluster.mjs"
import { supervise } from "./lib/crew.mjs"
import { ensureInstalled } from "./lib/install.mjs"
import { root, workFolder } from "./lib/paths.mjs"
import { anyPort } from "./lib/ports.mjs"
import { choosePorts, productEnv, runBuilt } from "./lib/product.mjs"
import { refuse, say } from "./lib/say.mjs"

const folder = join(workFolder, "bench")
const result = join(root, "tests/bench/last.json")

/** How long each measurement takes, and how often it is taken. */
const PACES = {
	full: { rounds: 5, seconds: 6, warmUpSeconds: 6, orders: 800, warmUpOrders: 400, invoices: 1000 },
	quick: { rounds: 3, seconds: 2, warmUpSeconds: 2, orders: 200, warmUpOrders: 80, invoices: 200 },
}
/** What one can ask for by itself, at the full pace: all that a producer with ten seasons waits for. */
const CROP = "crop"
/** The same of a producer with a million invoices. */
const RECEIVABLES = "receivables"
/** Many packed orders sent and invoiced in one go. */
const INVOICES = "invoices"
const BY_ITSELF = [CROP, RECEIVABLES, INVOICES]
const OWNER = "owner@ten-seasons.example.test"
const BUYER = { email: "rosa@pantryandplume.example.test", producer: "larkmoor", store: "pantry-and-plume" }

/**
 * Measures the built product beside the reference programs of tests/bench, in one run and on the demo data, on a cluster
 * of its own that keeps what is committed. Prints a table and writes tests/bench/last.json. No figure makes it fail; a
 * wrong answer does.
 */
await supervise(folder, async (crew) => {
	const [name = "full"] = process.argv.slice(2)
	const pace =
		PACES[BY_ITSELF.includes(name) ? "full" : name] ??
		refuse(
			`There is no bench "${name}": it is npm run bench, or npm run bench -- quick, crop, receivables or invoices.`,
		)
	await ensureInstalled()
	const cluster = await startCluster({ folder: join(folder, "pg") })
	crew.onStop(cluster.stop)
	await ensureBuilt()
	if (name !== INVOICES) await buildReferences()
	const env = productEnv({ databaseUrl: cluster.url(), ports: await choosePorts(anyPort) })
	await runBuilt("reset", "The database could not be emptied.", env)
	await runBuilt("migrate", "The database could not be brought up to date.", env)
	await runBuilt("seed", "The demo data could not be written.", env)

	const database = await openDatabase(cluster)
	crew.onStop(() => database.client.end())
	await actFor(database, BUYER.producer)
	await database.client.query("vacuum (analyze)")
	await startWeb(crew, env)
	say(`Measuring on ${cpus().length} processors, load ${loadavg()[0].toFixed(1)}`)
	const rows = BY_ITSELF.includes(name) ? [] : await measureOrders({ crew, database, env, pace })
	if (name !== CROP && name !== RECEIVABLES)
		rows.push(...(await measureInvoices({ crew, database, env, count: pace.invoices, say })))
	if (name !== "quick" && name !== INVOICES) {
		await database.client.query("insert into users (email, name) values ($1, 'Owner') on conflict do nothing", [OWNER])
		const owned = { database, web: env.BASE_URL, cookie: await signIn(database, OWNER), ownerEmail: OWNER, say }
		if (name !== RECEIVABLES) rows.push(...(await measureCrop({ ...owned, folder, env })))
		if (name !== CROP) rows.push(...(await measureReceivables(owned)))
	}

	writeFileSync(result, `${JSON.stringify([...otherRows(rows), ...rows], null, "\t")}\n`)
	say(`\n${tableOf(rows)}\n\nA ratio above 1 says that ours is better.`)
})

/** What an earlier run wrote that this one did not measure; a full run leaves nothing of an earlier one. */
function otherRows(rows) {
	if (!existsSync(result) || !BY_ITSELF.includes(process.argv[2])) return []
	const names = new Set(rows.map((row) => row.name))
	return JSON.parse(readFileSync(result, "utf8")).filter((row) => !names.has(row.name))
}

/** What buyers and the public wait for, beside the reference programs. */
async function measureOrders({ crew, database, env, pace }) {
	const sheet = await openSheet(env.BASE_URL, await signIn(database, BUYER.email))
	const statements = await orderSheetStatements({ database, sheet })
	const references = await startReferences(crew, { env, folder, statements })
	const bench = { database, sheet, references, pace, say, folder, web: env.BASE_URL, producer: BUYER.producer }
	const rows = [...(await measureOrderSheet(bench)), ...(await measureShopFront(bench))]
	say(await mustNeverBeStale({ ...bench, seconds: pace.seconds }))
	return [...rows, ...(await measurePlacing(bench))]
}

/** The order sheet of the next delivery day that takes orders. */
async function openSheet(web, cookie) {
	const address = `${web}/buy/${BUYER.producer}/${BUYER.store}/sheet`
	const response = await fetch(address, { headers: { cookie }, redirect: "manual" })
	const path = response.headers.get("location") ?? refuse(`${address} answers ${response.status} and no day.`)
	return { url: new URL(path, web).href, cookie }
}
