import { createHash } from "node:crypto"
import { mkdirSync } from "node:fs"
import { join } from "node:path"
import { fileURLToPath } from "node:url"

/** The checkout: every script works on it, wherever it was called from. */
export const root = fileURLToPath(new URL("../..", import.meta.url)).replace(/\/$/, "")

/** Everything that running leaves behind: the cluster, logs, secrets of the demo. Ignored by git. */
export const workFolder = join(root, ".waxbill")

/** Names this checkout among others of the same machine. */
export const checkoutId = createHash("sha256").update(root).digest("hex").slice(0, 12)

/** The path of something in the work folder, whose parent folder exists afterwards. */
export function workPath(...names) {
	const path = join(workFolder, ...names)
	mkdirSync(join(path, ".."), { recursive: true })
	return path
}
