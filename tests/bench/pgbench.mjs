import { mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs"
import { join } from "node:path"
import { quietly } from "../../scripts/lib/commands.mjs"
import { findPostgres } from "../../scripts/lib/debian.mjs"
import { CONNECTIONS, figuresOf } from "./load.mjs"

/** These are an id of the transaction's own; pgbench cannot make one, so each takes that of the letter written before. */
const OWN_ID = new Set(["order_id", "idempotency_key", "once_key"])
const LITERALS = new Map([
	[null, "null"],
	["", "''"],
])
const FIRST_ID = "\\if :has_id\n\\else\nselect gen_random_uuid() as id \\gset\n\\set has_id 1\n\\endif\n"

/**
 * Runs `amount` transactions of the kept statements, evenly over `kinds` (the value of each name, as the product used it
 * for one order), each statement prepared once per connection. Answers figures as `load` does.
 */
export async function runPgbench({ database, folder, kept, kinds, amount }) {
	const place = join(folder, "pgbench")
	rmSync(place, { recursive: true, force: true })
	mkdirSync(place)
	const files = kinds.map((values, kind) => {
		const file = join(place, `kind-${kind}.sql`)
		writeFileSync(file, scriptOf(kept, values, kind))
		return file
	})
	const { url } = database
	const perClient = Math.floor(amount / CONNECTIONS)
	const args = [
		...["-h", url.hostname, "-p", url.port, "-U", "waxbill", "-d", "waxbill", "--no-vacuum", "--protocol=prepared"],
		...["-c", String(CONNECTIONS), "-j", "1", "-t", String(perClient), "--log", `--log-prefix=${join(place, "times")}`],
		...definitions(kinds),
		...files.flatMap((file) => ["-f", file]),
	]
	const env = { PATH: process.env.PATH, PGPASSWORD: url.password, PGOPTIONS: "-c role=waxbill_app", LANG: "C.UTF-8" }
	const done = quietly(join(findPostgres(), "pgbench"), args, { env, cwd: place, maxBuffer: 1e8 })
	const rate = /tps = ([\d.]+) \(without initial connection time\)/.exec(done.stdout)?.[1]
	if (!done.ok || !rate) throw new Error(`pgbench failed:\n${done.output}`)
	return { ...figuresOf(timesIn(place)), perSecond: Number(rate) }
}

/** A time stands third in each line of the log, in microseconds. */
function timesIn(place) {
	const logs = readdirSync(place).filter((name) => name.startsWith("times"))
	const lines = logs.flatMap((name) => readFileSync(join(place, name), "utf8").trim().split("\n"))
	return lines.map((line) => Number(line.split(" ")[2]) / 1000)
}

/**
 * One transaction as a script of pgbench. `begin` and the setting go in one round trip, as in the product. A name that
 * had nothing as its value is written out, since pgbench can bind neither null nor an empty text.
 */
function scriptOf(kept, values, kind) {
	const variable = (name) => {
		if (OWN_ID.has(name)) return ":id"
		if (name === "number") return ":last"
		return LITERALS.get(values[name]) ?? `:${name}_${kind}`
	}
	return FIRST_ID + kept.map(({ text, names }) => lineOf(text, names, variable, values)).join("\n")
}

function lineOf(text, names, variable, values) {
	if (text.includes("; set local ")) {
		const parts = text.replace("$1", `'${values[names[0]]}'`).split("; ")
		return `\\startpipeline\n${parts.map((part) => `${part};`).join("\n")}\n\\endpipeline`
	}
	const sql = text.replaceAll(/\$(\d+)/g, (_, position) => variable(names[position - 1]))
	// The number and the letter's id are read back for what follows.
	return / returning (last|"id")$/.test(text) ? `${sql} \\gset` : `${sql};`
}

function definitions(kinds) {
	const named = kinds.flatMap((values, kind) =>
		Object.entries(values)
			.filter(([name, value]) => !LITERALS.has(value) && !OWN_ID.has(name) && name !== "number")
			.flatMap(([name, value]) => ["-D", `${name}_${kind}=${value}`]),
	)
	return ["-D", "has_id=0", ...named]
}
