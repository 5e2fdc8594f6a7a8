import { fileURLToPath } from "node:url"
import { defineConfig } from "vite"

const here = (file: string) => fileURLToPath(new URL(file, import.meta.url))

/** Builds the reference programs as the product's own programs are built. */
export default defineConfig({
	resolve: { tsconfigPaths: true },
	publicDir: false,
	ssr: { external: true },
	build: {
		ssr: true,
		target: "node20",
		outDir: ".waxbill/bench/build/node",
		emptyOutDir: true,
		sourcemap: true,
		rollupOptions: {
			input: { bare: here("reference-bare.tsx"), minimal: here("reference-minimal.ts"), services: here("services.ts") },
		},
	},
})
