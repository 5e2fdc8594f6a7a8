import { mayGo, type Place } from "./places"

/** Where a hand may write pieces to: the shelves, as broken, or as not found. */
export const handTargets = ["cold-room", "ready", "waste", "missing"] as const satisfies readonly Place[]
export type HandTarget = (typeof handTargets)[number]

const HAND_SOURCES: readonly Place[] = ["cold-room", "ready", "market", "missing"]

/**
 * Whether pieces can be moved by hand, as a correction or a breakage. What is packed, on the van or sold belongs to an
 * order: it moves with the order's own steps, so that the invoice stays what was packed. What goes to another lot or is
 * cut up is written with the lot that comes of it. This product's own rule.
 */
export function mayMoveByHand(from: Place, to: Place): to is HandTarget {
	return HAND_SOURCES.includes(from) && handTargets.some((target) => target === to) && mayGo(from, to)
}
