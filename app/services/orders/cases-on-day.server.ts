import type { Day } from "~/domain/calendar"
import { fillStrips, type StripOnDay } from "~/domain/promise/fill-strip"
import { wholeCases } from "~/domain/quantity"
import type { ProductOutlook } from "~/services/promise/find-outlooks.server"

/** A fill strip in whole cases. `freeCases` is all that can be promised: free, held and expected together. */
export type CaseStrip = Omit<StripOnDay, "day"> & { freeCases: number }

/**
 * The strips of a product in whole cases, in the order of `days`. Pieces that make no whole case with those that are
 * surer are left to the next kind, so that the three parts sum to the whole cases that can be promised.
 */
export function caseStrips(outlook: ProductOutlook, days: readonly Day[]): CaseStrip[] {
	const cases = (pieces: number) => wholeCases(pieces, outlook.piecesPerCase)
	return fillStrips({ ...outlook, days }).map(({ day: _, ...strip }) => {
		const free = cases(strip.free)
		const withHeld = cases(strip.free + strip.held)
		const freeCases = cases(strip.free + strip.held + strip.expected)
		const next = strip.next && { ...strip.next, quantity: cases(strip.next.quantity) }
		return {
			free,
			held: withHeld - free,
			heldUntil: withHeld > free ? strip.heldUntil : null,
			expected: freeCases - withHeld,
			expectedOn: freeCases > withHeld ? strip.expectedOn : null,
			next: next && next.quantity > 0 ? next : null,
			freeCases,
		}
	})
}
