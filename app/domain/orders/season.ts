import { addDays, compareDays, type Day, daysBetween, weekday } from "~/domain/calendar"

/** Who wants it: a commitment made before the season, another standing order, or a single order. */
export type DemandClass = "commitment" | "standing" | "single"

/** Pieces that are there from `on`; `until` is the last day that they can serve. */
export type SeasonSupply = { on: Day; until?: Day | undefined; pieces: number }

/** Pieces wanted for a delivery day. */
export type SeasonDemand = { on: Day; class: DemandClass; pieces: number }

/** What the hives may give on a day: three figures of one product. */
export type ExpectedSupply = { on: Day; until?: Day | undefined; low: number; likely: number; high: number }

export type SeasonProduct = {
	piecesPerCase: number
	/** Kept back for stall and shop, in pieces. */
	reserve: number
	/** Stock: released lots from today, held lots from their expected release. */
	stock: readonly SeasonSupply[]
	expected: readonly ExpectedSupply[]
	demands: readonly SeasonDemand[]
}

export type CropRange = { low: number; likely: number; high: number }

/** One week of one product, in pieces. */
export type SeasonWeek = {
	/** Its Monday. */
	weekOn: Day
	wanted: Record<DemandClass, number>
	/** What can serve this week's deliveries after all earlier ones are served, the reserve kept, by figure of the crop. */
	there: CropRange
	/** What of this week cannot be met, by figure of the crop. */
	short: CropRange
}

/** The Monday of the week of `day`. */
export function weekOf(day: Day): Day {
	return addDays(day, 1 - weekday(day))
}

/** The Mondays of `count` weeks from that of `from` on. */
export function seasonWeeks(from: Day, count: number): Day[] {
	const first = weekOf(from)
	return Array.from({ length: count }, (_, index) => addDays(first, 7 * index))
}

type Batch = { on: Day; until: Day | undefined; left: number }

/**
 * What is wanted of one product week by week against what will be there: deliveries are served in order of their days,
 * each from what keeps least long, and what one week leaves serves the next. Wanted before the first week counts for its
 * first day; after the last week for none. An order that cannot be met in full takes what there is. In pieces; whole
 * cases are for whoever shows it. This product's own reading of free to promise; it decides nothing.
 */
export function planSeason(product: SeasonProduct, weeks: readonly Day[]): SeasonWeek[] {
	const first = weeks[0]
	if (!first) return []
	const runs = {
		low: serve(product, "low", weeks),
		likely: serve(product, "likely", weeks),
		high: serve(product, "high", weeks),
	}
	const wanted = weeks.map(() => ({ commitment: 0, standing: 0, single: 0 }))
	for (const demand of product.demands) {
		const week = wanted[weekIndex(demand.on, first)]
		if (week) week[demand.class] += demand.pieces
	}
	return weeks.map((weekOn, index) => ({
		weekOn,
		wanted: wanted[index] ?? { commitment: 0, standing: 0, single: 0 },
		there: rangeOf((figure) => runs[figure][index]?.there ?? 0),
		short: rangeOf((figure) => runs[figure][index]?.short ?? 0),
	}))
}

const rangeOf = (of: (figure: keyof CropRange) => number): CropRange => ({
	low: of("low"),
	likely: of("likely"),
	high: of("high"),
})

const weekIndex = (on: Day, first: Day) => Math.max(0, Math.floor(daysBetween(first, on) / 7))

function serve(
	{ stock, expected, demands, reserve }: SeasonProduct,
	figure: keyof CropRange,
	weeks: readonly Day[],
): { there: number; short: number }[] {
	const batches: Batch[] = [
		...stock.map(({ on, until, pieces }) => ({ on, until, left: pieces })),
		...expected.map((one) => ({ on: one.on, until: one.until, left: one[figure] })),
	].toSorted((a, b) => keepsTo(a).localeCompare(keepsTo(b)))
	const first = weeks[0] ?? ""
	const queue = daySums(demands)
	let at = 0
	return weeks.map((weekOn, index) => {
		const last = addDays(weekOn, 6)
		let met = 0
		let short = 0
		for (; at < queue.length; at += 1) {
			const demand = queue[at]
			if (!demand || weekIndex(demand.on, first) > index) break
			const day = compareDays(demand.on, first) < 0 ? first : demand.on
			const can = Math.max(0, sum(batches, day) - reserve)
			const taken = Math.min(demand.pieces, can)
			take(batches, day, taken)
			met += taken
			short += demand.pieces - taken
		}
		return { there: met + Math.max(0, sum(batches, last) - reserve), short }
	})
}

/** What is wanted in all on each day, by day: thousands of standing orders come to as many sums as there are days. */
function daySums(demands: readonly SeasonDemand[]): { on: Day; pieces: number }[] {
	const sums = new Map<Day, number>()
	for (const { on, pieces } of demands) sums.set(on, (sums.get(on) ?? 0) + pieces)
	return [...sums].map(([on, pieces]) => ({ on, pieces })).toSorted((a, b) => compareDays(a.on, b.on))
}

/** The last day a batch serves, for sorting; one that keeps for good comes last. */
const keepsTo = ({ until }: Batch) => until ?? "9999-12-31"

const serves = ({ on, until }: Batch, day: Day) => on <= day && (until === undefined || until >= day)

const sum = (batches: readonly Batch[], day: Day) =>
	batches.reduce((total, batch) => total + (serves(batch, day) ? batch.left : 0), 0)

function take(batches: readonly Batch[], day: Day, pieces: number): void {
	let open = pieces
	for (const batch of batches) {
		if (open === 0) return
		if (!serves(batch, day)) continue
		const taken = Math.min(batch.left, open)
		batch.left -= taken
		open -= taken
	}
}

/** Whole cases wanted that a lack of pieces leaves unmet: a case that lacks one piece is no case. */
export function shortCases(pieces: number, piecesPerCase: number): number {
	return Math.ceil(pieces / piecesPerCase)
}
