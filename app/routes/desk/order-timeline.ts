import { dayInZone, shortMonthDay, timeWords } from "~/domain/calendar"
import type { Timeline, TimelineEntry } from "~/services/messages/find-timeline.server"
import type { ShownEntry } from "~/ui/messages/order-timeline"
import { EVENT_WORDS } from "~/ui/orders/state-words"

const ANSWERS: Record<string, string> = {
	accepted: "Change accepted",
	declined: "Change declined",
	"taken-back": "Change taken back",
}

/** The timeline of an order as one side reads it; `earlier` and `latest` are addresses on the same page. */
export function timelineView(
	{ entries, earlier }: Timeline,
	{ zone, side, before }: { zone: string; side: "store" | "desk"; before: string | null },
): { entries: ShownEntry[]; earlierHref: string | null; latestHref: string | null } {
	return {
		entries: entries.map((entry) => ({
			id: entry.id,
			what: stepWords(entry),
			who: entry.who,
			at: entry.at.toISOString(),
			when: `${shortMonthDay(dayInZone(entry.at, zone))}, ${timeWords(entry.at, zone)}`,
			note: noteOf(entry),
			body: entry.body,
			isOwn: entry.side === side,
		})),
		earlierHref: earlier && `?${new URLSearchParams({ before: earlier })}`,
		latestHref: before && "?",
	}
}

function stepWords({ kind, detail }: TimelineEntry): string {
	if (kind === "message") return "wrote"
	if (detail.undone === "confirmation") return "Confirmation taken back"
	if (kind === "answered") return ANSWERS[String(detail.answer)] ?? EVENT_WORDS.answered
	return kind in EVENT_WORDS ? EVENT_WORDS[kind as keyof typeof EVENT_WORDS] : kind
}

/** The sentence that a step carries: why it is short, or why it was changed. */
function noteOf({ kind, detail }: TimelineEntry): string | null {
	const words = kind === "confirmed" ? detail.shortNote : detail.reason
	return typeof words === "string" && words.trim() !== "" ? words : null
}
