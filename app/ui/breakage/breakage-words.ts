import { piecesWords } from "~/domain/quantity"

type Told = {
	state: "open" | "accepted" | "part-accepted" | "declined"
	pieces: number
	acceptedPieces: number
}

/** How a report stands, inside a sentence: "waits for an answer", "4 of 5 pieces credited". */
export function reportWords({ state, pieces, acceptedPieces }: Told): string {
	if (state === "open") return "waits for an answer"
	if (state === "declined") return "not credited"
	if (state === "accepted") return `${piecesWords(pieces)} credited`
	return `${acceptedPieces} of ${piecesWords(pieces)} credited`
}

/** "no photo", "1 photo", "3 photos". */
export function photoWords(count: number): string {
	return count === 0 ? "no photo" : count === 1 ? "1 photo" : `${count} photos`
}

/** A share of pieces: "1.6 %", and "under 0.1 %" where it would round to nothing. "none" where there is none. */
export function shareWords(part: number, whole: number): string {
	if (part === 0) return "none"
	const percent = (part / whole) * 100
	return percent < 0.1 ? "under 0.1 %" : `${percent.toFixed(1)} %`
}
