import "./lib/node-version.mjs"
import { build } from "./lib/build.mjs"
import { ensureInstalled } from "./lib/install.mjs"
import { explain } from "./lib/say.mjs"

try {
	await ensureInstalled()
	await build()
} catch (error) {
	explain(error)
	process.exitCode = 1
}
