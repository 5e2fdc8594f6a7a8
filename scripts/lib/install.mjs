import { createHash } from "node:crypto"
import { existsSync, readFileSync, writeFileSync } from "node:fs"
import { join } from "node:path"
import { orRefuse } from "./commands.mjs"
import { root } from "./paths.mjs"
import { say } from "./say.mjs"

const stamp = join(root, "node_modules", ".waxbill-lock")

/** Installs exactly the locked packages, unless that has been done for this very lock before. */
export async function ensureInstalled() {
	const lock = readFileSync(join(root, "package-lock.json"), "utf8")
	const hash = createHash("sha256").update(lock).digest("hex")
	if (existsSync(stamp) && readFileSync(stamp, "utf8") === hash) return
	if (!holdsWhatIsLocked(JSON.parse(lock))) {
		say("Installing the locked packages (about a minute)")
		const args = ["ci", "--include=dev", "--no-audit", "--no-fund"]
		await orRefuse("The packages could not be installed: npm ci failed.", "npm", args)
	}
	writeFileSync(stamp, hash)
}

/**
 * Whether node_modules already holds the lock's packages, by the list that npm leaves there at the end of an install;
 * so a package added by hand does not cause a second install. Packages for other platforms may be absent.
 */
function holdsWhatIsLocked(lock) {
	const list = join(root, "node_modules", ".package-lock.json")
	if (!existsSync(list)) return false
	const present = JSON.parse(readFileSync(list, "utf8")).packages
	const locked = Object.entries(lock.packages).filter(([place]) => place !== "")
	return (
		locked.every(([place, { version, optional }]) =>
			present[place] ? present[place].version === version : optional,
		) && Object.keys(present).every((place) => place in lock.packages)
	)
}
