import "./lib/node-version.mjs"
import { existsSync } from "node:fs"
import { readDotenv } from "./lib/database.mjs"
import { explain, refuse } from "./lib/say.mjs"

const PARTS = { web: "server", worker: "worker", migrate: "migrate" }

/**
 * Runs one part of the product for real, in this very process: `web` (unless told), `worker`, or `migrate`, which ends.
 * The environment says which database, mail server and payment service; see .env.example.
 */
try {
	const [part = "web"] = process.argv.slice(2)
	const name = PARTS[part] ?? refuse(`There is no part "${part}" to serve: it is ${Object.keys(PARTS).join(", ")}.`)
	readDotenv()
	process.env.NODE_ENV = "production"
	const program = new URL(`../build/node/${name}.js`, import.meta.url)
	if (!existsSync(program)) refuse("Nothing is built yet: run npm run build first.")
	await import(program.href)
} catch (error) {
	explain(error)
	process.exit(1)
}
