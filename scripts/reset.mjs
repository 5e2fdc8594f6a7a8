import "./lib/node-version.mjs"
import { rmSync } from "node:fs"
import { join } from "node:path"
import { ensureBuilt } from "./lib/build.mjs"
import { supervise } from "./lib/crew.mjs"
import { chosenDatabase, readDotenv } from "./lib/database.mjs"
import { ensureInstalled } from "./lib/install.mjs"
import { workFolder } from "./lib/paths.mjs"
import { productEnv, runBuilt } from "./lib/product.mjs"
import { refuse, say } from "./lib/say.mjs"

const NO_PORTS = { web: 3000, mail: 3001, smtp: 3002, stripe: 3003 }

/** Drops everything in the demo's database, and the stand-ins' mail and payments, and writes the demo anew. */
await supervise(workFolder, async (crew) => {
	readDotenv()
	if (process.env.DATABASE_URL && !process.argv.includes("--yes-drop"))
		refuse("DATABASE_URL is set: to drop everything in that database, say npm run reset -- --yes-drop")
	await ensureInstalled()
	const database = await chosenDatabase(crew)
	await ensureBuilt()
	const env = productEnv({ databaseUrl: database.url, ports: NO_PORTS })
	await runBuilt("reset", "The database could not be emptied.", env)
	for (const name of ["mail", "stripe.json"]) rmSync(join(workFolder, name), { recursive: true, force: true })
	await runBuilt("migrate", "The database could not be brought up to date.", env)
	await runBuilt("seed", "The demo data could not be written.", env)
	say("The demo is as on its first day.")
})
