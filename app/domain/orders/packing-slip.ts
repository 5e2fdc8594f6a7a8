import { type Day, dayWords, monthDay, shortMonthDay } from "~/domain/calendar"
import type { Party } from "~/domain/invoicing/invoice-facts"
import { casesWords, piecesWords } from "~/domain/quantity"

/** What goes into an order, as the slip in its cases says it; weights are in words, and there is no money on it. */
export type PackingSlip = {
	yard: { name: string; address: string; email: string; phone: string | null }
	orderNumber: number
	placedOn: Day
	poNumber: string | null
	deliveryOn: Day
	store: { name: string; address: string | null; contactName: string | null; receivingNote: string | null }
	lines: {
		code: string
		name: string
		detail: string | null
		lots: { code: string; pieces: number; bestBeforeOn: Day }[]
		cases: number
		pieces: number
		netWeight: string
	}[]
	netWeight: string
	/** What the store wrote with its order. */
	note: string | null
	/** How to keep the comb, and the caution that belongs to it. */
	care: string
}

/** Most cases that are drawn as boxes to tick; above it the number alone is read better. */
const MOST_BOXES = 40

/** How many boxes to tick stand on a line: one for each case, none where there are too many to count by eye. */
export function boxesOf(cases: number): number {
	return cases <= MOST_BOXES ? cases : 0
}

/** The groups of facts at the head of a packing slip. */
export function slipParties(slip: PackingSlip): Party[] {
	const { store, poNumber, lines } = slip
	const cases = lines.reduce((sum, line) => sum + line.cases, 0)
	const pieces = lines.reduce((sum, line) => sum + line.pieces, 0)
	const known = (facts: readonly (string | null | false)[]) => facts.filter((fact): fact is string => Boolean(fact))
	return [
		{
			group: "To",
			name: store.name,
			facts: known([store.contactName, store.address, poNumber && `Your number: ${poNumber}`]),
		},
		{
			group: "For",
			name: dayWords(slip.deliveryOn),
			facts: known([`Your order of ${monthDay(slip.placedOn)}`, store.receivingNote]),
		},
		{ group: "In it", name: casesWords(cases), facts: [piecesWords(pieces), `${slip.netWeight} of comb, net`] },
	]
}

/** "R09, 24 pieces, best before Jan 12". */
export function lotWords({ code, pieces, bestBeforeOn }: PackingSlip["lines"][number]["lots"][number]): string {
	return `${code}, ${piecesWords(pieces)}, best before ${shortMonthDay(bestBeforeOn)}`
}
