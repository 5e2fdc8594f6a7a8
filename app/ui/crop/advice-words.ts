import { dayWords, monthDay } from "~/domain/calendar"
import type { Advice } from "~/domain/crop/advice"

/** What the checks of one super suggest and why, in one sentence. The producer decides. */
export function adviceWords(advice: Advice): string {
	switch (advice.kind) {
		case "clearing":
			return `The bee escape went in on ${monthDay(advice.since)}: usually clear of bees by ${dayWords(advice.clearFrom)}, or the day after.`
		case "ready":
			return `Ready to come off: ${advice.cappedPercent} % capped, and you count ${advice.readyCappedPercent} % as ready.`
		case "flow-cut-off":
			return `The flow looks cut off: no more filled between ${monthDay(advice.before)} and ${monthDay(advice.on)}. What is full may be sealed early, or what is finished can be taken off (${advice.cappedPercent} % capped).`
		case "next-super":
			return `Time for the next super: this one is ${advice.filledPercent} % filled and capping has hardly begun (${advice.cappedPercent} %).`
		case "not-looked-at":
			return advice.wasSeen
				? `Not looked at for ${advice.days} days, since ${monthDay(advice.lastOn)}.`
				: `Nobody has looked since it was set on, ${advice.days} days ago.`
	}
}

const HEADS: Record<Advice["kind"], string> = {
	ready: "Ready",
	clearing: "Bee escape in",
	"flow-cut-off": "Flow cut off",
	"next-super": "Next super",
	"not-looked-at": "Not looked at",
}
const REASONS: Record<Advice["kind"], string> = {
	ready: "capped to the share you count as ready",
	clearing: "usually clear of bees one to two days after",
	"flow-cut-off": "no more filled in a week or longer; may be sealed early, or what is finished taken off",
	"next-super": "the last one is 60 % filled or more, and capping has hardly begun",
	"not-looked-at": "nobody has looked into it for ten days",
}

/** The order in which a yard's hints are told. */
export const ADVICE_ORDER: readonly Advice["kind"][] = [
	"ready",
	"clearing",
	"next-super",
	"flow-cut-off",
	"not-looked-at",
]

/** One kind of hint for several hives of a yard: its head, and the reason that holds for all of them. */
export function adviceGroupWords(kind: Advice["kind"]): { head: string; reason: string } {
	return { head: HEADS[kind], reason: REASONS[kind] }
}
