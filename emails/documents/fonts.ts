import { readFileSync } from "node:fs"
import { createRequire } from "node:module"
import { Font } from "@react-pdf/renderer"
import { plainFontOf } from "./woff"

// Resolved from the installed packages when drawn, so that the paths hold in a bundled build as well.
const require = createRequire(import.meta.url)

/** Latin first, then the letters of Latin Extended: a file of one subset holds only its own characters. */
export const serif = ["Paper Serif", "Paper Serif Extended"]
export const sans = ["Paper Sans", "Paper Sans Extended"]

const faces = [
	{ families: serif, pkg: "source-serif-4", weight: 400, style: "normal" },
	{ families: serif, pkg: "source-serif-4", weight: 600, style: "normal" },
	{ families: serif, pkg: "source-serif-4", weight: 400, style: "italic" },
	{ families: sans, pkg: "source-sans-3", weight: 400, style: "normal" },
] as const

let registered = false

/** Makes the paper's typefaces known to the PDF renderer, once; the files are read when a document first uses them. */
export function registerFonts(): void {
	if (registered) return
	for (const { families, pkg, weight, style } of faces) {
		for (const [index, subset] of ["latin", "latin-ext"].entries()) {
			const file = `@fontsource/${pkg}/files/${pkg}-${subset}-${weight}-${style}.woff`
			const font = plainFontOf(readFileSync(require.resolve(file)))
			const src = `data:font/otf;base64,${font.toString("base64")}`
			Font.register({ family: families[index] as string, src, fontWeight: weight, fontStyle: style })
		}
	}
	// Names of products and stores are not to be broken at syllables guessed for English.
	Font.registerHyphenationCallback((word) => [word])
	registered = true
}
