import { type Claim, type SharingRule, shareOut } from "~/domain/sharing/share-out"
import { deskReason, type ToldSharing, type Verdict, verdictOf } from "~/domain/sharing/share-words"

/** A line that is to be shared out, as the page shows it. */
export type ShareRow = {
	lineId: string
	storeId: string
	storeName: string
	orderNumber: number
	askedCases: number
	sureCases: number
	leastCases: number
	weightPercent: number
	/** What the store got of this product when it was last short, and the day in words. */
	last: { asked: number; given: number; when: string } | null
	/** What may stand in for it and is over. */
	instead: { productId: string; code: string; name: string; overCases: number }[]
}

export const SHARING_RULES = ["equal-shares", "in-proportion", "equal-shortfall"] as const satisfies SharingRule[]

/** What one rule comes to: for each row the cases of its whole line, whether it was set aside, and why. */
export type ToldRule = {
	rule: SharingRule
	told: ToldSharing
	rows: { given: number; isAside: boolean; reason: string }[]
	verdict: Verdict
}

/** The three rules side by side, for so many cases; the claims are those of the rows, in their order. */
export function tellRules(rows: readonly ShareRow[], claims: readonly Claim[], supply: number): ToldRule[] {
	const names = rows.map((row) => row.storeName)
	return SHARING_RULES.map((rule) => {
		const told: ToldSharing = { supply, rule, claims, shares: shareOut({ supply, claims, rule }).shares }
		return {
			rule,
			told,
			rows: rows.map((row, index) => ({
				given: row.sureCases + (told.shares[index]?.given ?? 0),
				isAside: told.shares[index]?.reason === "below-least",
				reason: deskReason(told, index, row.last) + sureWords(row.sureCases),
			})),
			verdict: verdictOf(told, names),
		}
	})
}

const sureWords = (cases: number) => (cases === 0 ? "" : ` ${cases} ${cases === 1 ? "is" : "are"} sure already.`)
