/**
 * Where pieces of a lot can be. A market is one market day; sold, waste, cut up and gone to another lot are left for good
 * but still counted; missing is what a count did not find.
 */
export const places = [
	"cold-room",
	"ready",
	"packed",
	"van",
	"market",
	"sold",
	"waste",
	"cut-up",
	"other-lot",
	"missing",
] as const
export type Place = (typeof places)[number]

/** Where a piece begins: null stands for the hive it comes off. */
export type Origin = Place | null

/**
 * Moves that make sense. Pieces come off the hives into the cold room and are released to ready; they are packed, loaded
 * and sold, or go to a market day and are sold there; what does not sell comes back to ready; an undone sale at the stall
 * goes back to its market day; broken pieces are waste or are cut up from wherever they are. What lies on the shelves can
 * be regrouped into another lot; what a count does not find there or on a market's table is missing, and can be found.
 */
const MOVES: Record<Place | "hive", readonly Place[]> = {
	hive: ["cold-room"],
	"cold-room": ["ready", "waste", "cut-up", "other-lot", "missing"],
	ready: ["cold-room", "packed", "market", "sold", "waste", "cut-up", "other-lot", "missing"],
	packed: ["ready", "van", "sold", "waste", "cut-up"],
	van: ["packed", "ready", "sold", "waste"],
	market: ["ready", "sold", "waste", "cut-up", "missing"],
	sold: ["market", "ready", "waste"],
	waste: [],
	"cut-up": [],
	"other-lot": [],
	missing: ["cold-room", "ready", "market", "waste"],
}

/** Whether pieces may go from one place to another. This product's own rule. */
export function mayGo(from: Origin, to: Place): boolean {
	return MOVES[from ?? "hive"].includes(to)
}

/** Whether every harvested piece of a lot is somewhere: harvested = sum over places, none below zero. */
export function harvestedEqualsPlaces(harvestedPieces: number, balances: readonly { pieces: number }[]): boolean {
	if (balances.some((balance) => balance.pieces < 0)) return false
	return balances.reduce((sum, balance) => sum + balance.pieces, 0) === harvestedPieces
}
