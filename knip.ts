import type { KnipConfig } from "knip"

/** Names of the packages and files that a stylesheet imports, written as imports that the tool can read. */
const importsOf = (css: string) => [...css.matchAll(/@import\s+"[^"]+"/g)].map(([line]) => line.slice(1)).join("\n")

/** What `npm run check:unused` starts from. Files that tools load by their own conventions are found by its plugins. */
export default {
	entry: [
		"server.ts",
		"app/jobs/worker.server.ts",
		"scripts/*.mjs",
		"scripts/entries/{migrate,seed,reset,draw-invoices,draw-statements}.ts",
		"fakes/*/server.ts",
		// Started by name from scripts: a preview in tsx, a build by Vite.
		"scripts/email-preview.tsx",
		"vite.node.config.ts",
		// The bench builds these by their path.
		"tests/bench/vite.config.ts",
		"tests/bench/reference-*.{ts,tsx}",
		"tests/bench/services.ts",
		"tests/bench/minimal-app/{*,app/*}.{ts,tsx}",
		// Types of the scripts, for the tests that import them.
		"scripts/lib/*.d.mts",
	],
	project: ["*.{ts,mjs}", "{app,emails,fakes,scripts,tests}/**/*.{ts,tsx,mjs,mts,js,css}"],
	compilers: { css: importsOf },
	// The type of an answer is exported along with the function that gives it, whether or not a caller names it.
	ignoreExportsUsedInFile: { interface: true, type: true },
	ignoreDependencies: [
		// The printed invoice loads its typefaces by a path that is put together at run time.
		"@fontsource/source-sans-3",
		"@fontsource/source-serif-4",
		// The mail catcher is started as a program, by its path.
		"maildev",
		// Under @react-router/express and the build, which look for it by name.
		"@react-router/node",
	],
} satisfies KnipConfig
