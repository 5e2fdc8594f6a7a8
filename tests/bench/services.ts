import { measureLogger, measureSeasons } from "./services/seasons"
import { measureSharing } from "./services/sharing"
import { measureDesk, measureStanding, workAtCutOff } from "./services/standing"

/** Measures the product's own services without HTTP: `services.js <what> <facts as JSON>` prints what it found as JSON. */
const [what, text = "{}"] = process.argv.slice(2)
const facts = JSON.parse(text)
const measures: Record<string, () => Promise<unknown>> = {
	sharing: measureSharing,
	seasons: () => measureSeasons(facts),
	logger: () => measureLogger(facts),
	standing: measureStanding,
	desk: measureDesk,
	"cut-off": () => workAtCutOff(facts),
}
const measure = measures[what ?? ""]
if (!measure) throw new Error(`nothing is called ${what}`)
console.log(JSON.stringify(await measure()))
process.exit(0)
