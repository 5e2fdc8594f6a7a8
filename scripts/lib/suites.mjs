import { mkdirSync, rmSync } from "node:fs"
import { join } from "node:path"
import { build, ensureBuilt } from "./build.mjs"
import { visibly } from "./commands.mjs"
import { root } from "./paths.mjs"
import { explain } from "./say.mjs"
import { ofCheck, ofPlaywright, ofVitest, sum } from "./test-counts.mjs"

const bin = (...path) => join(root, "node_modules", ...path)

/** A check that package.json has a command for. */
function check(name, title, command) {
	return { name, title, run: async ({ env }) => ofCheck(await visibly("npm", ["run", "--silent", command], { env })) }
}

/** A project of vitest.config.ts. */
function vitest(name, title, more = {}) {
	const run = async ({ env, folder, filters }) => {
		const report = freshReport(folder, name)
		const reporters = ["--reporter=default", "--reporter=json", `--outputFile.json=${report}`]
		const args = [bin("vitest/vitest.mjs"), "run", "--project", name, ...reporters, ...filters]
		return ofVitest(report, await visibly(process.execPath, args, { env }))
	}
	return { name, title, run, takesFilters: true, ...more }
}

async function runBuild() {
	try {
		await build()
		return ofCheck(0)
	} catch (error) {
		explain(error)
		return ofCheck(1)
	}
}

/** In two lanes at once, each with a product and a database of its own: a journey waits more than it works. */
async function runPlaywright({ env, folder, filters }) {
	const lanes = filters.length > 0 ? ["1/1"] : ["1/2", "2/2"]
	try {
		await ensureBuilt()
	} catch (error) {
		explain(error)
		return ofCheck(1)
	}
	return sum(
		await Promise.all(
			lanes.map(async (lane) => {
				const report = freshReport(folder, `e2e-${lane.replace("/", "-of-")}`)
				const args = [bin("@playwright/test/cli.js"), "test", "--reporter=list,json", ...filters]
				const more = { E2E_LANE: lane, PLAYWRIGHT_JSON_OUTPUT_FILE: report }
				return ofPlaywright(report, await visibly(process.execPath, args, { env: { ...env, ...more } }))
			}),
		),
	)
}

function freshReport(folder, name) {
	const report = join(folder, "reports", `${name}.json`)
	mkdirSync(join(folder, "reports"), { recursive: true })
	rmSync(report, { force: true })
	return report
}

/** All suites in the order they run: quick ones first. `needs` names what must be on the machine. */
export const suites = [
	check("lint", "Format and lint (biome)", "lint"),
	check("typecheck", "Types (tsc)", "typecheck"),
	check("imports", "Direction of imports (dependency-cruiser)", "check:imports"),
	check("unused", "Unused files and exports (knip)", "check:unused"),
	vitest("unit", "Rules, parts and mails (vitest)", { covers: /^tests\/(domain|unit|ui|emails|structure)\b/ }),
	vitest("standards", "Published figures (vitest)", { covers: /^tests\/standards\b/ }),
	vitest("services", "Services and database (vitest, PostgreSQL)", {
		covers: /^tests\/(services|db)\b/,
		needs: ["database"],
	}),
	vitest("contract", "The payment fake through the stripe package (vitest)", { covers: /^tests\/contract\b/ }),
	{ name: "build", title: "Build", run: runBuild },
	{
		name: "e2e",
		title: "Journeys in the browser (playwright)",
		run: runPlaywright,
		takesFilters: true,
		covers: /^tests\/(e2e|routes)\b/,
		needs: ["database", "browser"],
	},
]
