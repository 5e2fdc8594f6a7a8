import { type Day, monthDay } from "~/domain/calendar"

/** What is known of a lot's way to its release. Pieces, load numbers, days in the producer's zone. */
export type ReleaseFacts = {
	missing: readonly ("freezing" | "weighing")[]
	piecesOnShelves: number
	piecesFrozen: number
	openLoads: readonly number[]
	check: { checkedOn: Day; hasPassed: boolean } | null
}

/** What still stands between a held lot and its release, one sentence each; none when nothing does. */
export function missingWords(release: ReleaseFacts): string[] {
	return release.missing.map((what) => (what === "freezing" ? freezingWords(release) : weighingWords(release)))
}

function freezingWords({ openLoads, piecesFrozen, piecesOnShelves }: ReleaseFacts): string {
	const [load] = openLoads
	if (load !== undefined) return `Its freezing is not proven yet: it lies in load ${load}.`
	if (piecesFrozen > 0) return `Only ${piecesFrozen} of ${piecesOnShelves} pieces were frozen long enough.`
	return "It has not been frozen."
}

function weighingWords({ check }: ReleaseFacts): string {
	if (!check) return "Its net contents have not been checked."
	return `It failed the check of its net contents on ${monthDay(check.checkedOn)}.`
}

/** The one thing to do first with a held lot: its words, and the page under the lot (or the desk) where it is done. */
export function firstStep(release: ReleaseFacts): { words: string; page: "cold-room" | "scale" | "release" } {
	const isOut = release.missing.includes("freezing") && release.openLoads.length === 0
	if (isOut) return { words: "Put it in the freezer", page: "cold-room" }
	if (release.missing.includes("weighing")) return { words: "Check its net contents", page: "scale" }
	if (release.missing.includes("freezing")) return { words: "Prove its freezing", page: "cold-room" }
	return { words: "Release it", page: "release" }
}
