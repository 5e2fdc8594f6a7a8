import { latestCheck, type SuperFacts } from "./super-facts"

/** Shares of a super's pieces that will be fit to sell as sections, 0 to 1, low <= likely <= high. */
export type FinishShares = { low: number; likely: number; high: number }

/** What became of the producer's own supers that once stood at a stage: their number and the spread of their shares. */
export type FinishRecord = FinishShares & { stage: number; supers: number }

/**
 * Where one stage ends and the next begins, in percent of the way: the mean of the filled and the capped share. Below the
 * first bound nothing much is drawn; above the last the super is all but capped.
 */
export const STAGE_BOUNDS: readonly number[] = [10, 35, 60, 85]

/** Which of the producer's own shares are low, likely and high: two supers in ten end below the low one, five, eight. */
export const FINISH_QUANTILES: readonly number[] = [0.2, 0.5, 0.8]

/** What a super at each stage comes to where the producer has no record: common practice, no source. */
const USUAL: readonly FinishShares[] = [
	{ low: 0.25, likely: 0.5, high: 0.75 },
	{ low: 0.4, likely: 0.6, high: 0.8 },
	{ low: 0.55, likely: 0.72, high: 0.86 },
	{ low: 0.72, likely: 0.84, high: 0.93 },
	{ low: 0.85, likely: 0.92, high: 0.98 },
]

/** Common practice counts as much as so many supers of one's own. */
const USUAL_COUNTS_AS = 10

/** The stage of a super, 0 to 4, by its latest check; a super that nobody has looked into is at the first. */
export function stageOf(facts: Pick<SuperFacts, "checks">): number {
	const check = latestCheck(facts)
	if (!check) return 0
	const way = (check.filledPercent + check.cappedPercent) / 2
	return STAGE_BOUNDS.filter((bound) => way >= bound).length
}

/**
 * What a super comes to, by stage. Each figure is the producer's own quantile at that stage, drawn towards common practice
 * the more, the fewer supers stand behind it: own x n / (n + 10) + usual x 10 / (n + 10). An earlier stage is never worth more
 * than a later one, so that a super which has filled further never lowers what is expected. Records with shares out
 * of order or outside 0 to 1 throw RangeError.
 */
export function finishSharesByStage(records: readonly FinishRecord[]): FinishShares[] {
	const worth = USUAL.map((usual, stage) => {
		const own = records.find((record) => record.stage === stage)
		if (!own) return usual
		if (!(0 <= own.low && own.low <= own.likely && own.likely <= own.high && own.high <= 1)) {
			throw new RangeError(`shares of stage ${stage} are out of order`)
		}
		const trust = own.supers / (own.supers + USUAL_COUNTS_AS)
		const drawn = (mine: number, common: number) => mine * trust + common * (1 - trust)
		return {
			low: drawn(own.low, usual.low),
			likely: drawn(own.likely, usual.likely),
			high: drawn(own.high, usual.high),
		}
	})
	const least = { low: 1, likely: 1, high: 1 }
	return worth
		.toReversed()
		.map((shares) => {
			least.low = Math.min(least.low, shares.low)
			least.likely = Math.min(least.likely, shares.likely)
			least.high = Math.min(least.high, shares.high)
			return { ...least }
		})
		.reverse()
}
