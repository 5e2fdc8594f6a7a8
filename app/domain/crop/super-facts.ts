import { type Day, daysBetween } from "~/domain/calendar"

/** On the hive; on it with the bee escape in; taken off. */
export type SuperState = "on" | "clearing" | "off"

/** A look into a super. Shares are whole percents of all its sections; capped sections are filled, so capped <= filled. */
export type SuperCheck = {
	checkedOn: Day
	filledPercent: number
	cappedPercent: number
	/** One digit a section, row by row: 0 bare, 1 begun, 2 filling, 3 full, 4 capped; empty when only shares were noted. */
	sections: string
}

/** A super and what was seen in it. `checks` run from the latest back; the last few are enough for every rule here. */
export type SuperFacts = {
	capacityPieces: number
	setOn: Day
	state: SuperState
	/** The day the bee escape went in. */
	clearingOn: Day | null
	checks: readonly SuperCheck[]
}

/** How many checks of a super, from the latest back, the rules of this folder look at. */
export const CHECKS_LOOKED_AT = 4

/** Days between two checks that tell whether the flow still brings honey; common practice, no source. */
export const FLOW_DAYS = 7

/** Below this capped share capping has hardly begun; common practice, no source. */
export const CAPPING_BEGUN = 25

/** The latest look into a super, or null when nobody has looked yet. */
export function latestCheck(facts: Pick<SuperFacts, "checks">): SuperCheck | null {
	return facts.checks[0] ?? null
}

/** The latest check on an earlier day than the latest one; null when there is none. */
export function checkBefore({ checks }: Pick<SuperFacts, "checks">, daysEarlier = 1): SuperCheck | null {
	const [latest] = checks
	if (!latest) return null
	return checks.find((check) => daysBetween(check.checkedOn, latest.checkedOn) >= daysEarlier) ?? null
}

/**
 * Whether the flow has stopped for this super: its filled share did not rise between the latest check and the last one
 * at least seven days before it. A super that is filled through tells nothing of it.
 */
export function isFlowCutOff(facts: Pick<SuperFacts, "checks">): boolean {
	const latest = latestCheck(facts)
	const before = checkBefore(facts, FLOW_DAYS)
	if (!latest || !before || latest.filledPercent === 100) return false
	return latest.filledPercent <= before.filledPercent
}

/** Whether a super is to come off: capped to the share that the producer has set, or the bee escape is in. */
export function isReady(facts: Pick<SuperFacts, "checks" | "state">, readyCappedPercent: number): boolean {
	if (facts.state === "off") return false
	return facts.state === "clearing" || (latestCheck(facts)?.cappedPercent ?? 0) >= readyCappedPercent
}
