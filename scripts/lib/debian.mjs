import { existsSync, readdirSync } from "node:fs"
import { join } from "node:path"
import { orRefuse, quietly } from "./commands.mjs"
import { refuse, say } from "./say.mjs"

const POSTGRES_FOLDER = "/usr/lib/postgresql"
const CHROMIUM = "/usr/bin/chromium"

export const isRoot = process.getuid?.() === 0

/** The folder with PostgreSQL's programs: that of `major`, or of the newest version found; undefined if there is none. */
export function findPostgres(major) {
	const versions = existsSync(POSTGRES_FOLDER) ? readdirSync(POSTGRES_FOLDER) : []
	return versions
		.filter((version) => major === undefined || version === major)
		.toSorted((a, b) => Number(b) - Number(a))
		.map((version) => join(POSTGRES_FOLDER, version, "bin"))
		.find((folder) => existsSync(join(folder, "initdb")))
}

/** The folder with the newest PostgreSQL's programs, installing Debian's package when there is none. */
export async function ensurePostgres() {
	const there = findPostgres()
	if (there) return there
	await installPackage("postgresql", "PostgreSQL")
	return findPostgres() ?? refuse(`PostgreSQL was installed, but no server was found under ${POSTGRES_FOLDER}.`)
}

/** The path of Chromium, installing Debian's package when there is none. */
export async function ensureChromium() {
	if (existsSync(CHROMIUM)) return CHROMIUM
	await installPackage("chromium", "Chromium")
	return existsSync(CHROMIUM) ? CHROMIUM : refuse(`Chromium was installed, but ${CHROMIUM} is not there.`)
}

async function installPackage(name, title) {
	const byHand = `install it with: sudo apt-get install ${name}`
	if (!existsSync("/usr/bin/apt-get"))
		refuse(`${title} is missing, and this is no Debian system: install ${title} first.`)
	const prefix = isRoot ? [] : ["sudo", "-n"]
	if (!isRoot && !quietly("sudo", ["-n", "true"]).ok)
		refuse(`${title} is missing and this user may not install it without a password; ${byHand}`)
	say(`Installing ${title} from Debian's packages`)
	const aptGet = (...args) => {
		const [program, ...rest] = [...prefix, "env", "DEBIAN_FRONTEND=noninteractive", "apt-get", "-q", ...args]
		return orRefuse(`${title} could not be installed; ${byHand}`, program, rest)
	}
	await aptGet("update")
	await aptGet("install", "-y", "--no-install-recommends", name)
}
