import { type SharingRule, shareOut } from "~/domain/sharing/share-out"
import { storeSentence, type ToldSharing } from "~/domain/sharing/share-words"
import { claimsOf, type SharingFacts, type SharingRow } from "./read-sharing.server"

/** What one line is to get, and the sentence that its store reads. */
export type PlannedLine = SharingRow & {
	ruleCases: number
	givenCases: number
	sentence: string
	/** The product that stands in for what is missing, and how many cases of it. */
	instead: { productId: string; cases: number } | null
}

/** A figure set by hand that cannot stand. */
export type RefusedByHand = {
	lineId: string
	reason: "more-than-asked" | "sure-already" | "under-least-without-note"
	/** The bound that it breaks, in cases. */
	bound: number
}

export type Plan =
	| { ok: true; lines: PlannedLine[] }
	| { ok: false; reason: "lines"; refused: RefusedByHand[] }
	| { ok: false; reason: "more-than-free"; supply: number; given: number }

/**
 * What each line gets by a rule, with the producer's own figures (`byHand`, whole cases of the whole line, by line id) in
 * place of the rule's. Refused: more than was asked, less than is sure already, something under the least acceptable
 * without a note, and more in all than can be ready. Stand-ins (`instead`, product by line id) fill what is missing as
 * far as they are over, the earlier order first. Reads nothing.
 */
export function planGiven(
	facts: SharingFacts,
	choice: {
		rule: SharingRule
		byHand: ReadonlyMap<string, number>
		note: string
		instead: ReadonlyMap<string, string>
	},
): Plan {
	const { rows, supply } = facts
	const claims = claimsOf(rows)
	const told: ToldSharing = {
		supply,
		rule: choice.rule,
		claims,
		shares: shareOut({ supply, claims, rule: choice.rule }).shares,
	}
	const lines = rows.map((row, index) => {
		const ruleCases = row.sureCases + (told.shares[index]?.given ?? 0)
		return { ...row, index, ruleCases, givenCases: choice.byHand.get(row.lineId) ?? ruleCases }
	})
	const refused = lines.flatMap((line) => refuse(line, choice.note))
	if (refused.length > 0) return { ok: false, reason: "lines", refused }
	const given = lines.reduce((sum, line) => sum + line.givenCases - line.sureCases, 0)
	if (given > supply) return { ok: false, reason: "more-than-free", supply, given }
	const over = new Map(facts.substitutes.map(({ productId, overCases }) => [productId, overCases]))
	return {
		ok: true,
		lines: lines.map(({ index, ...line }) => {
			const byHand = line.givenCases === line.ruleCases ? null : choice.note
			const result = { asked: line.askedCases, given: line.givenCases, sure: line.sureCases, byHand }
			return { ...line, sentence: storeSentence(told, index, result), instead: takeInstead(line, choice.instead, over) }
		}),
	}
}

function refuse(line: SharingRow & { givenCases: number; ruleCases: number }, note: string): RefusedByHand[] {
	const { lineId, givenCases, askedCases, sureCases, leastCases } = line
	if (givenCases > askedCases) return [{ lineId, reason: "more-than-asked", bound: askedCases }]
	if (givenCases < sureCases) return [{ lineId, reason: "sure-already", bound: sureCases }]
	const isUnder = givenCases !== line.ruleCases && givenCases > 0 && givenCases < leastCases
	if (isUnder && note.trim() === "") return [{ lineId, reason: "under-least-without-note", bound: leastCases }]
	return []
}

function takeInstead(
	line: SharingRow & { givenCases: number },
	chosen: ReadonlyMap<string, string>,
	over: Map<string, number>,
): PlannedLine["instead"] {
	const productId = chosen.get(line.lineId)
	if (!productId || !line.substituteIds.includes(productId)) return null
	const left = over.get(productId) ?? 0
	const cases = Math.min(left, line.askedCases - line.givenCases)
	if (cases <= 0) return null
	over.set(productId, left - cases)
	return { productId, cases }
}
