import { chownSync, existsSync, lstatSync, mkdirSync, readdirSync, rmdirSync } from "node:fs"
import { dirname, join } from "node:path"
import { quietly } from "./commands.mjs"
import { isRoot } from "./debian.mjs"
import { checkoutId } from "./paths.mjs"
import { refuse } from "./say.mjs"

const SYSTEM_USER = "postgres"

/** Wraps a PostgreSQL command so that it runs as the user who may: root cannot run the server, `postgres` can. */
export function asDatabaseUser(program, args) {
	return isRoot ? ["runuser", ["-u", SYSTEM_USER, "--", program, ...args]] : [program, args]
}

/**
 * Makes `wish` a folder that only the database's user can read, and answers its path. When root works in a place that
 * the `postgres` user cannot enter (below /root, say), a folder of this checkout's own under /var/tmp takes its place.
 */
export function privateFolder(wish) {
	makePrivate(wish)
	if (!isRoot || canEnter(wish)) return wish
	if (readdirSync(wish).length > 0)
		refuse(`The ${SYSTEM_USER} user can no longer enter ${wish}: open the folders above it.`)
	rmdirSync(wish)
	const shelter = `/var/tmp/waxbill-${checkoutId}`
	mkdirSync(shelter, { recursive: true, mode: 0o755 })
	const { uid, mode } = lstatSync(shelter)
	if (uid !== 0 || (mode & 0o022) !== 0 || !lstatSync(shelter).isDirectory())
		refuse(`${shelter} belongs to somebody else, so the database cannot be kept there: remove it first.`)
	const folder = join(shelter, wish.replace(/^.*\.waxbill\//, "").replaceAll("/", "-"))
	makePrivate(folder)
	return canEnter(folder) ? folder : refuse(`The ${SYSTEM_USER} user can enter neither ${wish} nor ${folder}.`)
}

function makePrivate(folder) {
	// The folders above keep the usual mode, so that the database's user can pass through them.
	mkdirSync(dirname(folder), { recursive: true })
	if (!existsSync(folder)) mkdirSync(folder, { mode: 0o700 })
	const owner = databaseUserId()
	const { uid } = lstatSync(folder)
	if (isRoot) chownSync(folder, owner, -1)
	else if (uid !== owner)
		refuse(`${folder} belongs to another user (number ${uid}): run Waxbill as that user, or remove the folder first.`)
}

function databaseUserId() {
	if (!isRoot) return process.getuid()
	const { ok, stdout } = quietly("id", ["-u", SYSTEM_USER])
	return ok ? Number(stdout) : refuse(`The user ${SYSTEM_USER}, which comes with Debian's PostgreSQL, does not exist.`)
}

function canEnter(folder) {
	const [program, args] = asDatabaseUser("test", ["-x", folder, "-a", "-w", folder])
	return quietly(program, args, { cwd: "/" }).ok
}
