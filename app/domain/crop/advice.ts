import { addDays, type Day, daysBetween } from "~/domain/calendar"
import {
	CAPPING_BEGUN,
	checkBefore,
	FLOW_DAYS,
	isFlowCutOff,
	isReady,
	latestCheck,
	type SuperFacts,
} from "./super-facts"

/** The next super is given when the last one is filled to this share; common practice, no source. */
const NEXT_SUPER_FILLED = 60

/** A super that nobody has looked into for so many days is out of sight. */
const UNSEEN_DAYS = 10

/** A hint about one super with the facts it rests on. The producer decides: nothing follows from it by itself. */
export type Advice =
	| { kind: "clearing"; since: Day; clearFrom: Day; clearBy: Day }
	| { kind: "ready"; cappedPercent: number; readyCappedPercent: number }
	| { kind: "flow-cut-off"; filledPercent: number; before: Day; on: Day; cappedPercent: number }
	| { kind: "next-super"; filledPercent: number; cappedPercent: number }
	| { kind: "not-looked-at"; lastOn: Day; days: number; wasSeen: boolean }

/** Days since anybody last looked into a super, or since it was set on when nobody has. */
function daysUnseen({ checks, setOn }: Pick<SuperFacts, "checks" | "setOn">, today: Day): number {
	return Math.max(0, daysBetween(latestCheck({ checks })?.checkedOn ?? setOn, today))
}

/** Whether a super on a hive is drawn dashed: nobody has looked into it for ten days. */
export function isUnseen(facts: Pick<SuperFacts, "checks" | "setOn">, today: Day): boolean {
	return daysUnseen(facts, today) >= UNSEEN_DAYS
}

/**
 * What the checks of a super suggest, the weightiest first; empty when there is nothing to say. `isLastOnHive` is true
 * for the super set on last: the next one is given beside it. Sources: a bee escape clears in one to two days, and the next
 * super goes on at about 60 % filled, before capping begins; common practice, no source.
 */
export function adviseOn(
	facts: SuperFacts,
	given: { today: Day; readyCappedPercent: number; isLastOnHive: boolean },
): Advice[] {
	const { today, readyCappedPercent, isLastOnHive } = given
	if (facts.state === "off") return []
	if (facts.state === "clearing") return facts.clearingOn ? [clearing(facts.clearingOn)] : []
	const latest = latestCheck(facts)
	const advice: Advice[] = []
	if (latest && isReady(facts, readyCappedPercent)) {
		advice.push({ kind: "ready", cappedPercent: latest.cappedPercent, readyCappedPercent })
	} else if (latest && isFlowCutOff(facts)) {
		advice.push(flowCutOff(facts))
	}
	const isFilling = latest && latest.filledPercent >= NEXT_SUPER_FILLED && latest.cappedPercent < CAPPING_BEGUN
	if (isLastOnHive && isFilling && !isFlowCutOff(facts)) {
		const { filledPercent, cappedPercent } = latest
		advice.push({ kind: "next-super", filledPercent, cappedPercent })
	}
	if (isUnseen(facts, today)) {
		advice.push({
			kind: "not-looked-at",
			lastOn: latest?.checkedOn ?? facts.setOn,
			days: daysUnseen(facts, today),
			wasSeen: latest !== null,
		})
	}
	return advice
}

function clearing(since: Day): Advice {
	return { kind: "clearing", since, clearFrom: addDays(since, 1), clearBy: addDays(since, 2) }
}

function flowCutOff(facts: SuperFacts): Advice {
	const latest = latestCheck(facts)
	const before = checkBefore(facts, FLOW_DAYS)
	if (!latest || !before) throw new RangeError("a flow that is cut off shows in two checks")
	const { filledPercent, cappedPercent, checkedOn } = latest
	return { kind: "flow-cut-off", filledPercent, cappedPercent, before: before.checkedOn, on: checkedOn }
}
