import { randomBytes } from "node:crypto"
import { existsSync, readFileSync, writeFileSync } from "node:fs"
import { workPath } from "./paths.mjs"

/** The secrets of the demo, made once for each checkout and kept, so that sessions outlive a restart. */
export function demoSecrets() {
	const file = workPath("secrets.json")
	if (!existsSync(file)) {
		const made = { session: randomBytes(32).toString("hex"), webhook: `whsec_${randomBytes(16).toString("hex")}` }
		writeFileSync(file, JSON.stringify(made), { mode: 0o600 })
	}
	return JSON.parse(readFileSync(file, "utf8"))
}
