import { splitByLargestRemainder } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import type { Result } from "~/domain/result"

/** The name under which culls are kept: pieces that are not sold as sections. */
export const CULLS = "Culls"

/** Pieces by grade; "Culls" among them. */
export type CountedGrades = Record<string, number>

export type CountedSuper = { id: string; label: string; capacityPieces: number; counted: CountedGrades }

/** What came off for one product: by super, or for all its supers in one row. */
export type ProductCount = { supers: readonly CountedSuper[]; total: CountedGrades }

export type HarvestCount = {
	/** Pieces by grade over all supers, none of them zero. */
	grades: CountedGrades
	/** Pieces fit to sell as sections by super, whatever their grade: culls are not. */
	finished: { superId: string; pieces: number }[]
}

const sum = (grades: CountedGrades) => Object.values(grades).reduce((all, pieces) => all + pieces, 0)

function merge(counts: readonly CountedGrades[]): CountedGrades {
	const merged: CountedGrades = {}
	for (const [grade, pieces] of counts.flatMap((count) => Object.entries(count))) {
		if (pieces > 0) merged[grade] = (merged[grade] ?? 0) + pieces
	}
	return merged
}

type CountRefusal = { ok: false; reason: "both-ways" | "over-capacity"; superId: string | null; message: string }

/**
 * Adds up what came off the supers of one product. Refuses, in a sentence, a count given both by super and in total, and
 * more pieces than a super, or all together, hold. A total is spread over the supers by what they hold, so that each has
 * a finished share for later forecasts. Harvested pieces are those counted, no more and no less.
 */
export function countHarvest({ supers, total }: ProductCount): Result<{ count: HarvestCount }, CountRefusal> {
	const bySuper = supers.reduce((all, { counted }) => all + sum(counted), 0)
	if (bySuper > 0 && sum(total) > 0) {
		const message = "Write the pieces by super or in the row for all of them, not both."
		return { ok: false, reason: "both-ways", superId: null, message }
	}
	const over = supers.find(({ counted, capacityPieces }) => sum(counted) > capacityPieces)
	if (over) {
		const message = `${over.label} holds ${piecesWords(over.capacityPieces)}, and ${sum(over.counted)} are written down.`
		return { ok: false, reason: "over-capacity", superId: over.id, message }
	}
	const capacity = supers.reduce((all, { capacityPieces }) => all + capacityPieces, 0)
	if (sum(total) > capacity) {
		const message = `These supers hold ${piecesWords(capacity)} together, and ${sum(total)} are written down.`
		return { ok: false, reason: "over-capacity", superId: null, message }
	}
	if (bySuper > 0) {
		const finished = supers.map(({ id, counted }) => ({ superId: id, pieces: sum(counted) - (counted[CULLS] ?? 0) }))
		return { ok: true, count: { grades: merge(supers.map(({ counted }) => counted)), finished } }
	}
	const fit = sum(total) - (total[CULLS] ?? 0)
	const parts = spread(fit, supers)
	return { ok: true, count: { grades: merge([total]), finished: parts } }
}

function spread(pieces: number, supers: readonly CountedSuper[]): HarvestCount["finished"] {
	const parts = splitByLargestRemainder(
		pieces,
		supers.map(({ capacityPieces }) => capacityPieces),
	)
	return supers.map(({ id }, index) => ({ superId: id, pieces: parts[index] ?? 0 }))
}
