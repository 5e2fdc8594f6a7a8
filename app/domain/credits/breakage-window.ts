import { addDays, type Day } from "~/domain/calendar"

/** The most photos of one line of a report. */
export const MOST_PHOTOS = 3

/**
 * The last day on which comb delivered on `deliveryOn` may be reported as broken: `days` after the delivery, that day
 * included. Common practice, no source; the producer sets the days.
 */
export function reportableUntil(deliveryOn: Day, days: number): Day {
	return addDays(deliveryOn, days)
}

/** How a report was answered, from the pieces that were reported and those that were accepted. */
export function answerState(
	lines: readonly { pieces: number; acceptedPieces: number }[],
): "accepted" | "part-accepted" | "declined" {
	if (lines.every((line) => line.acceptedPieces === 0)) return "declined"
	return lines.every((line) => line.acceptedPieces === line.pieces) ? "accepted" : "part-accepted"
}
