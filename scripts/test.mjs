import "./lib/node-version.mjs"
import { supervise } from "./lib/crew.mjs"
import { ensureChromium } from "./lib/debian.mjs"
import { ensureInstalled } from "./lib/install.mjs"
import { explain, refuse, say } from "./lib/say.mjs"
import { suites } from "./lib/suites.mjs"
import { systemEnv } from "./lib/system-env.mjs"
import { inWords, sum } from "./lib/test-counts.mjs"
import { clearDeadRuns, removeTestFolder, startTestCluster, testFolder } from "./lib/test-work.mjs"

const seconds = (since) => `${((Date.now() - since) / 1000).toFixed(1)} s`

/** What the arguments ask for: names of suites, and files or parts of names to narrow them to. All suites when none. */
function chosen(args) {
	const named = suites.filter((suite) => args.includes(suite.name))
	const filters = args.filter((arg) => !suites.some((suite) => suite.name === arg))
	if (filters.length === 0) return { picked: named.length > 0 ? named : suites, filters }
	const covering = suites.filter((suite) => filters.some((filter) => suite.covers?.test(filter.replace(/^\.\//, ""))))
	const picked = named.length > 0 ? named : covering
	if (picked.length === 0)
		refuse(`No suite holds ${filters.join(" ")}; the suites are ${suites.map((suite) => suite.name).join(", ")}.`)
	const whole = picked.find((suite) => !suite.takesFilters)
	if (whole) refuse(`The suite ${whole.name} cannot be narrowed to ${filters.join(" ")}.`)
	return { picked, filters }
}

/** Runs the suites one after the other; answers the counts of each. */
async function runSuites(crew) {
	const { picked, filters } = chosen(process.argv.slice(2))
	const needs = new Set(picked.flatMap((suite) => suite.needs ?? []))
	await clearDeadRuns()
	await ensureInstalled()
	const env = { ...systemEnv(), ...((process.env.CI || !process.stdout.isTTY) && { NO_COLOR: "1" }) }
	if (needs.has("browser")) await ensureChromium()
	if (needs.has("database")) env.TEST_DATABASE_URL = await startTestCluster(crew)

	const results = []
	for (const suite of picked) {
		const start = Date.now()
		say(`\n=== ${suite.title} ===`)
		const result = await suite.run({ env, folder: testFolder, filters })
		results.push({ suite, result })
		say(`--- ${suite.name}: ${inWords(result)} in ${seconds(start)}`)
	}
	return results
}

/** Prints the sum of all suites on the last line; see DEVELOPERS.md for running one suite or one file. */
await supervise(testFolder, async (crew) => {
	const began = Date.now()
	crew.onStop(removeTestFolder)
	let total = { passed: 0, failed: 1, skipped: 0 }
	try {
		const results = await runSuites(crew)
		total = sum(results.map(({ result }) => result))
		say(`\nIn ${seconds(began)}:`)
		for (const { suite, result } of results) say(`  ${suite.name.padEnd(10)} ${inWords(result)}`)
	} catch (error) {
		// What keeps the suites from running is a failure too, and the last line says so.
		explain(error)
	}
	say(`\n${inWords(total)}`)
	return total.failed > 0 ? 1 : 0
})
