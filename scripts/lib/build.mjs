import { createHash } from "node:crypto"
import { existsSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs"
import { join } from "node:path"
import { orRefuse } from "./commands.mjs"
import { root } from "./paths.mjs"
import { say } from "./say.mjs"

const INPUTS = [
	...["app", "drizzle", "emails", "public", "scripts/entries", "server.ts", "package-lock.json", "tsconfig.json"],
	...["react-router.config.ts", "vite.config.ts", "vite.node.config.ts"],
]
const stamp = join(root, "build", ".inputs")

/** Builds the pages and the programs of the server (build/client, build/server, build/node), if any input has changed. */
export async function ensureBuilt() {
	const inputs = hashOfInputs()
	if (existsSync(stamp) && readFileSync(stamp, "utf8") === inputs) return
	await build(inputs)
}

/** Builds everything, changed or not. */
export async function build(inputs = hashOfInputs()) {
	say("Building")
	rmSync(stamp, { force: true })
	const env = { ...process.env, NODE_ENV: "production" }
	const vite = join(root, "node_modules/vite/bin/vite.js")
	const reactRouter = join(root, "node_modules/@react-router/dev/bin.js")
	await orRefuse("The pages could not be built.", process.execPath, [reactRouter, "build"], { env })
	const config = ["build", "--config", "vite.node.config.ts"]
	await orRefuse("The server could not be built.", process.execPath, [vite, ...config], { env })
	writeFileSync(stamp, inputs)
}

function hashOfInputs() {
	const hash = createHash("sha256").update(process.versions.node)
	const add = (path) => {
		if (!existsSync(join(root, path))) return
		if (statSync(join(root, path)).isDirectory()) {
			for (const name of readdirSync(join(root, path)).toSorted()) add(`${path}/${name}`)
			return
		}
		hash.update(`\0${path}\0`).update(readFileSync(join(root, path)))
	}
	for (const path of INPUTS) add(path)
	return hash.digest("hex")
}
