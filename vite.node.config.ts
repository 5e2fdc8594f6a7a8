import { defineConfig } from "vite"

/**
 * Builds what Node runs beside the pages: the web server, the worker, and the programs that migrate, seed and reset.
 * Packages stay outside and are loaded from node_modules.
 */
export default defineConfig({
	resolve: { tsconfigPaths: true },
	publicDir: false,
	ssr: { external: true },
	build: {
		ssr: true,
		target: "node20",
		outDir: "build/node",
		emptyOutDir: true,
		sourcemap: true,
		rollupOptions: {
			input: {
				server: "server.ts",
				worker: "app/jobs/worker.server.ts",
				migrate: "scripts/entries/migrate.ts",
				seed: "scripts/entries/seed.ts",
				reset: "scripts/entries/reset.ts",
				"draw-invoices": "scripts/entries/draw-invoices.ts",
				"draw-statements": "scripts/entries/draw-statements.ts",
			},
		},
	},
})
