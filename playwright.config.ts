import { readdirSync, statSync } from "node:fs"
import { defineConfig } from "@playwright/test"

/** "1/2" is the first of two lanes, which run at the same time in products of their own. */
const [lane = 1, lanes = 1] = (process.env.E2E_LANE ?? "1/1").split("/").map(Number)

/**
 * The files of this lane, always the same and in the same order: the longest first, each to the lane that has least to do.
 * The length of a file stands for the time that it takes.
 */
function specsOfLane(): string[] {
	const sizeOf = (name: string) => statSync(`tests/e2e/${name}`).size
	const specs = readdirSync("tests/e2e").filter((name) => name.endsWith(".spec.ts"))
	const loads = Array.from({ length: lanes }, () => ({ size: 0, names: [] as string[] }))
	for (const name of specs.toSorted((a, b) => sizeOf(b) - sizeOf(a) || a.localeCompare(b))) {
		const least = loads.reduce((one, other) => (other.size < one.size ? other : one))
		least.size += sizeOf(name)
		least.names.push(name)
	}
	return loads[lane - 1]?.names.toSorted() ?? []
}

export default defineConfig({
	testDir: "tests/e2e",
	outputDir: `tests/e2e/.results/${lane}`,
	globalSetup: "./tests/setup/e2e.ts",
	// One product and one database for a lane: its tests take turns, and a test that passes only now and then is a failure.
	workers: 1,
	retries: 0,
	fullyParallel: false,
	forbidOnly: true,
	timeout: 60_000,
	expect: { timeout: 10_000 },
	reporter: "list",
	// A project for each file: it begins with a browser of its own, since one that has served a hundred tests can hang.
	projects: specsOfLane().map((file) => ({ name: file.replace(".spec.ts", ""), testMatch: `**/${file}` })),
	use: {
		browserName: "chromium",
		viewport: { width: 1440, height: 900 },
		locale: "en-US",
		// Recording every test takes as long again as running it: E2E_TRACE=1 records, and keeps what failed.
		trace: process.env.E2E_TRACE ? "retain-on-failure" : "off",
		screenshot: "only-on-failure",
		launchOptions: {
			executablePath: "/usr/bin/chromium",
			args: [
				"--disable-gpu",
				"--disable-quic",
				"--no-first-run",
				"--disable-background-networking",
				"--disable-component-update",
				"--disable-sync",
			],
		},
	},
})
