import { readFileSync } from "node:fs"
import { createRequire } from "node:module"
import { Font } from "@react-pdf/renderer"
import { codePointsOf, plainFontOf } from "./woff"

// Resolved from the installed packages, so that the paths hold in a bundled build as well.
const require = createRequire(import.meta.url)

/** A file of one subset holds only its own characters, so each subset is a family and the families stand in a row. */
const subsets = ["latin", "latin-ext", "vietnamese", "greek", "cyrillic"] as const
const familiesOf = (name: string) => subsets.map((subset) => `${name} ${subset}`)
export const serif = familiesOf("Paper Serif")
export const sans = familiesOf("Paper Sans")

const faces = [
	{ families: serif, pkg: "source-serif-4", weight: 400, style: "normal" },
	{ families: serif, pkg: "source-serif-4", weight: 600, style: "normal" },
	{ families: serif, pkg: "source-serif-4", weight: 400, style: "italic" },
	{ families: sans, pkg: "source-sans-3", weight: 400, style: "normal" },
] as const

let writable: ReadonlySet<number> | undefined

/**
 * Makes the paper's typefaces known to the PDF renderer, once, and answers the code points that every one of them can
 * write. Throws when a file of the packages cannot be read.
 */
export function registerFonts(): ReadonlySet<number> {
	if (writable) return writable
	const [first, ...others] = faces.map(registerFace)
	writable = new Set(Array.from(first ?? []).filter((point) => others.every((face) => face.has(point))))
	return writable
}

function registerFace({ families, pkg, weight, style }: (typeof faces)[number]): ReadonlySet<number> {
	const points = subsets.flatMap((subset, index) => {
		const file = `@fontsource/${pkg}/files/${pkg}-${subset}-${weight}-${style}.woff`
		const font = plainFontOf(readFileSync(require.resolve(file)))
		const src = `data:font/otf;base64,${font.toString("base64")}`
		Font.register({ family: families[index] as string, src, fontWeight: weight, fontStyle: style })
		return codePointsOf(font)
	})
	// Names of products and stores are not to be broken at syllables guessed for English.
	Font.registerHyphenationCallback((word) => [word])
	return new Set(points)
}
