import { harvestedEqualsPlaces, type Place } from "../stock/places"

/** Where the pieces of a lot are, by what that means for a trace. In pieces. */
export type LotBalance = {
	harvested: number
	/** Sold: with a store, or with the public. */
	out: number
	/** Where the producer can still put a hand on it: shelves, packed cases, the van, the market table. */
	inHand: number
	waste: number
	cutUp: number
	otherLots: number
	missing: number
	/** harvested = out + in hand + waste + cut up + other lots + missing, none below zero. */
	isBalanced: boolean
}

type Column = Exclude<keyof LotBalance, "harvested" | "isBalanced">

const COLUMN_OF: Record<Place, Column> = {
	"cold-room": "inHand",
	ready: "inHand",
	packed: "inHand",
	van: "inHand",
	market: "inHand",
	sold: "out",
	waste: "waste",
	"cut-up": "cutUp",
	"other-lot": "otherLots",
	missing: "missing",
}

/** Adds up a lot's places for a trace, and says whether every harvested piece is accounted for. This product's own rule. */
export function balanceOf(harvested: number, places: readonly { place: Place; pieces: number }[]): LotBalance {
	const sums: Record<Column, number> = { out: 0, inHand: 0, waste: 0, cutUp: 0, otherLots: 0, missing: 0 }
	for (const { place, pieces } of places) sums[COLUMN_OF[place]] += pieces
	return { harvested, ...sums, isBalanced: harvestedEqualsPlaces(harvested, places) }
}

/**
 * What a drill finds of one lot: its balance, how many of the sold pieces have a name to them (a store's order or a
 * market day), and how many that went into other lots are known to have arrived there.
 */
export type DrilledLot = LotBalance & { namedPieces: number; linkedPieces: number }

/** What does not add up about a drilled lot, as sentences; none when all does. */
export function drillFaults(code: string, lot: DrilledLot): string[] {
	const placed = lot.out + lot.inHand + lot.waste + lot.cutUp + lot.otherLots + lot.missing
	return [
		!lot.isBalanced && `Lot ${code}: ${lot.harvested} pieces were harvested and ${placed} are accounted for.`,
		// Pieces that came back from a store keep their name, so more names than sold pieces is no fault.
		lot.namedPieces < lot.out &&
			`Lot ${code}: ${lot.out - lot.namedPieces} sold pieces have no order and no market day.`,
		lot.linkedPieces < lot.otherLots &&
			`Lot ${code}: of ${lot.otherLots} pieces that went into other lots, ${lot.linkedPieces} are found there.`,
	].filter((sentence) => sentence !== false)
}
