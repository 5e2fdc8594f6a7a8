import { writeFileSync } from "node:fs"
import { join } from "node:path"
import { orRefuse } from "../../scripts/lib/commands.mjs"
import { root } from "../../scripts/lib/paths.mjs"
import { anyPort } from "../../scripts/lib/ports.mjs"
import { untilItAnswers } from "../../scripts/lib/wait.mjs"

/** Builds the reference programs as the product is built: the minimal application, and the two programs of Node. */
export async function buildReferences() {
	const env = { ...process.env, NODE_ENV: "production" }
	const tool = (...path) => join(root, "node_modules", ...path)
	const app = ["build", "tests/bench/minimal-app"]
	await orRefuse("The minimal page could not be built.", process.execPath, [tool("@react-router/dev/bin.js"), ...app], {
		env,
	})
	const config = ["build", "--config", "tests/bench/vite.config.ts"]
	await orRefuse("The references could not be built.", process.execPath, [tool("vite/bin/vite.js"), ...config], { env })
}

/** Starts the product's web server: one process, and as quiet as the references. */
export async function startWeb(crew, env) {
	const quiet = { ...env, PROCESSES: "1", LOG_LEVEL: "warn" }
	const web = crew.start("web server", process.execPath, ["build/node/server.js"], { env: quiet })
	await untilItAnswers(`${env.BASE_URL}/health/ready`, web)
}

/** Starts both references beside it and answers their addresses; `statements` is what the bare one asks the database. */
export async function startReferences(crew, { env, folder, statements }) {
	const file = join(folder, "order-sheet.json")
	writeFileSync(file, JSON.stringify(statements))
	const start = async (name, program) => {
		const port = await anyPort()
		const own = { ...env, PORT: String(port), LOG_LEVEL: "warn", STATEMENTS: file }
		const member = crew.start(name, process.execPath, [join(folder, "build/node", program)], { env: own })
		const address = `http://127.0.0.1:${port}`
		await untilItAnswers(address, member, { anyAnswer: true })
		return address
	}
	return { bare: await start("bare reference", "bare.js"), minimal: await start("minimal reference", "minimal.js") }
}

/**
 * The address at which the minimal application answers with a page of about `bytes`: it grows by the row, so two sizes
 * tell how many rows that takes.
 */
export async function minimalPageOf(minimal, bytes) {
	const at = (rows) => `${minimal}/?rows=${rows}`
	const [few, many] = [await sizeOf(at(20)), await sizeOf(at(60))]
	return at(Math.round(20 + ((bytes - few) * 40) / (many - few)))
}

/** The bytes of a page without compression. */
export async function sizeOf(url, headers = {}) {
	const response = await fetch(url, { headers: { ...headers, "accept-encoding": "identity" } })
	if (response.status !== 200) throw new Error(`${url} answers ${response.status}.`)
	return (await response.arrayBuffer()).byteLength
}
