import { defineConfig } from "@playwright/test"

export default defineConfig({
	testDir: "tests/e2e",
	outputDir: "tests/e2e/.results",
	globalSetup: "./tests/setup/e2e.ts",
	// One product and one database for all: the tests take turns, and a test that passes only now and then is a failure.
	workers: 1,
	retries: 0,
	fullyParallel: false,
	forbidOnly: true,
	// For a machine that has other work to do; a page that hangs fails by the limit on what is expected of it.
	timeout: 120_000,
	expect: { timeout: 10_000 },
	reporter: "list",
	use: {
		browserName: "chromium",
		viewport: { width: 1440, height: 900 },
		locale: "en-US",
		// Recording doubles the time of a run: E2E_TRACE=1 turns it on to look into a failure.
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
