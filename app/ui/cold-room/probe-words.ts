import { coolingAllowance, hoursWords, PROBE_PLACES, type ProbePlace } from "~/domain/cold-room/freezing"

const WORDS: Record<ProbePlace, string> = {
	comb: "In the middle of a comb",
	"air-loose": "In the air, pieces loose on shelves",
	"air-cases": "In the air, pieces in closed cases",
}

/** Where a probe can be, with what is taken off for it. */
export const PROBE_OPTIONS = PROBE_PLACES.map((value) => {
	const allowance = coolingAllowance(value)
	const taken = allowance === 0 ? "" : ` (less ${hoursWords(allowance)})`
	return { value, label: `${WORDS[value]}${taken}` }
})
