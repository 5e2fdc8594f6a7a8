import { defineConfig } from "vitest/config"

/** Left out of every project: React Router's plugin, which fails under Vitest. */
export default defineConfig({
	resolve: { tsconfigPaths: true },
	test: {
		environment: "node",
		pool: "forks",
		maxWorkers: 2,
		testTimeout: 20_000,
		hookTimeout: 30_000,
		projects: [
			{
				extends: true,
				test: {
					name: "unit",
					include: ["tests/{domain,unit,ui,emails,structure}/**/*.test.{ts,tsx}"],
					setupFiles: ["tests/setup/strict.ts"],
				},
			},
			{
				extends: true,
				test: {
					name: "standards",
					include: ["tests/standards/**/*.test.ts"],
					setupFiles: ["tests/setup/strict.ts"],
				},
			},
			{
				extends: true,
				test: {
					name: "services",
					include: ["tests/{services,db}/**/*.test.{ts,tsx}"],
					globalSetup: ["tests/setup/template-database.ts"],
					setupFiles: ["tests/setup/worker-database.ts", "tests/setup/strict.ts"],
				},
			},
			{
				extends: true,
				test: {
					name: "contract",
					include: ["tests/contract/**/*.test.ts"],
					setupFiles: ["tests/setup/strict.ts"],
				},
			},
		],
	},
})
