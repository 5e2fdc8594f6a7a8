import { readdirSync } from "node:fs"
import { defineConfig } from "@playwright/test"

const specs = readdirSync("tests/e2e").filter((name) => name.endsWith(".spec.ts"))

export default defineConfig({
	testDir: "tests/e2e",
	outputDir: "tests/e2e/.results",
	globalSetup: "./tests/setup/e2e.ts",
	// One product and one database for all: the tests take turns, and a test that passes only now and then is a failure.
	workers: 1,
	retries: 0,
	fullyParallel: false,
	forbidOnly: true,
	timeout: 60_000,
	expect: { timeout: 10_000 },
	reporter: "list",
	// A project for each file: it begins with a browser of its own, since one that has served a hundred tests can hang.
	projects: specs.map((file) => ({ name: file.replace(".spec.ts", ""), testMatch: `**/${file}` })),
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
