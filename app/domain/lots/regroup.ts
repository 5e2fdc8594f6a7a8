import { compareDays, type Day } from "~/domain/calendar"
import { CULLS } from "./count-harvest"

/** Forms that comb can be cut up into. */
export const CUT_FORMS = ["cut-comb", "half-piece", "chunk"] as const

/** The least share of comb in chunk honey, in percent of its net weight. Source: Wis. Admin. Code ATCP 87.05. */
const CHUNK_COMB_PERCENT = 50

/** The comb in one piece of a product that is cut: chunk honey is filled up with liquid. Grams, rounded up. */
export function combGrams({ form, pieceNetGrams }: { form: string; pieceNetGrams: number }): number {
	return form === "chunk" ? Math.ceil((pieceNetGrams * CHUNK_COMB_PERCENT) / 100) : pieceNetGrams
}

/**
 * What is lost in cutting up, in grams: what went in less the comb in what was made; drained honey and trimmings. Null
 * when more would come out than went in, which cannot be.
 */
export function cutUpLoss(cut: { gramsIn: number; piecesMade: number; combGramsEach: number }): number | null {
	const loss = cut.gramsIn - cut.piecesMade * cut.combGramsEach
	return loss < 0 ? null : loss
}

/** What a lot hands on to the lot it goes into. */
export type LotFacts = {
	productId: string
	state: "held" | "released" | "withdrawn"
	harvestedOn: Day
	expectedReleaseOn: Day
	bestBeforeOn: Day
	yard: string
	grade: string
	flora: string
	moistureTenths: number | null
	pfundTenths: number | null
}

/** Why lots cannot become one; null when they can. */
export function mergeRefusal(lots: readonly LotFacts[]): string | null {
	if (lots.length < 2) return "Choose at least one other lot to merge with."
	if (lots.some(({ state }) => state === "withdrawn")) return "A withdrawn lot stays as it is."
	if (new Set(lots.map(({ productId }) => productId)).size > 1) return "Only lots of one product can become one."
	if (new Set(lots.map(({ state }) => state)).size > 1) {
		return "Merge lots that are all held, or all released: a held lot would borrow the proof of another."
	}
	if (lots.some(({ grade }) => grade === CULLS) && lots.some(({ grade }) => grade !== CULLS)) {
		return "Culls are not mixed with graded pieces."
	}
	return null
}

const same = (values: readonly string[]) => (new Set(values).size === 1 ? (values[0] ?? "") : "")
const highest = (values: readonly (number | null)[]) => {
	const known = values.filter((value) => value !== null)
	return known.length === 0 ? null : Math.max(...known)
}

/**
 * The facts of a lot made of several: the earliest best before and harvest, the latest release expected (never after best
 * before), the wettest and darkest reading. Grade, flora and yard stand where all agree; a grade that differs is left
 * open, to be graded anew. Throws RangeError on none.
 */
export function mergedFacts(lots: readonly LotFacts[]): LotFacts {
	const [first] = lots
	if (!first) throw new RangeError("no lots to merge")
	const days = (key: "harvestedOn" | "expectedReleaseOn" | "bestBeforeOn") =>
		lots.map((lot) => lot[key]).sort(compareDays) as [Day, ...Day[]]
	const bestBeforeOn = days("bestBeforeOn")[0]
	const [expectedReleaseOn] = [bestBeforeOn, days("expectedReleaseOn").at(-1) as Day].sort(compareDays) as [Day, Day]
	return {
		productId: first.productId,
		state: first.state,
		harvestedOn: days("harvestedOn")[0],
		bestBeforeOn,
		expectedReleaseOn,
		yard: same(lots.map(({ yard }) => yard)),
		grade: same(lots.map(({ grade }) => grade)),
		flora: same(lots.map(({ flora }) => flora)),
		moistureTenths: highest(lots.map(({ moistureTenths }) => moistureTenths)),
		pfundTenths: highest(lots.map(({ pfundTenths }) => pfundTenths)),
	}
}
