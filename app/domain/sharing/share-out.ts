import { inOrder, ranksOf } from "./in-order"
import { type ClaimColumns, setAsideHopeless, setAsideUnlifted } from "./set-aside"
import { SharingLevel, type SharingRule } from "./sharing-level"

export type { SharingRule } from "./sharing-level"

/** Served one after the other: commitments made before the season, then standing orders, then single orders. */
export const claimClasses = ["commitment", "standing", "single"] as const
export type ClaimClass = (typeof claimClasses)[number]

/** What one store asks of one product for one day; all figures in whole cases. */
export type Claim = {
	id: string
	claimClass: ClaimClass
	asked: number
	/** Less than this is of no use to the store; 0 where any number is. */
	least: number
	/** 1 unless the producer has set it; above 0. */
	weight: number
	/** What part of its asking it got when it was last short, 0 to 1; null where it never was. */
	lastPart: number | null
	/** Rises with the time of the order. */
	placed: number
}

/** Why a claim got what it got. */
export type ShareReason = "whole" | "shared" | "left-over" | "below-least" | "came-back" | "nothing-left"

/** What one claim is given: `exact` before whole cases, in the sharing that decided it. */
export type Share = { id: string; given: number; exact: number; reason: ShareReason }

/**
 * Divides `supply` cases of one product among `claims` by one of three rules, in whole cases.
 * Classes are served one after the other. Within a class each claim gets its exact share rounded down, and the left-over
 * cases go one each to the claims whose exact share is not whole: first to those that it lifts to their least
 * acceptable, then to those that got the smaller part of their asking when last short, then to the earlier order.
 * A claim that would get less than its least acceptable is set aside and the rest is shared again: one at a time, the one
 * whose exact share is furthest below its least acceptable first, the later order first on ties. What is over when all
 * others have all they asked goes back to claims set aside, in the order of left-over cases, where it covers their
 * least acceptable. Nobody gets more than asked. The order of `claims` changes nothing; shares come in that order.
 * Throws RangeError on figures that are not whole or negative, a weight of 0 or less, or a least above what is asked.
 * Sources: constrained equal awards, proportional and constrained equal losses as in Thomson, How to Divide When There
 * Isn't Enough (2019), held by the published values "allocation"; classes, whole cases and leasts are this product's own.
 */
export function shareOut(input: { supply: number; claims: readonly Claim[]; rule: SharingRule }): {
	shares: Share[]
	/** Cases that nobody can be given. */
	over: number
} {
	const { supply, claims, rule } = input
	requireSane(supply, claims)
	const { order, late } = turnsOf(claims)
	const shares = new Array<Share>(claims.length)
	let over = supply
	for (const claimClass of claimClasses) {
		const members = order.filter((place) => (claims[place] as Claim).claimClass === claimClass)
		const ofClass = shareClass(over, { claims, members, late }, rule)
		for (let index = 0; index < members.length; index += 1) {
			const share = ofClass[index] as Share
			shares[members[index] as number] = share
			over -= share.given
		}
	}
	return { shares, over }
}

/**
 * The exact shares of `supply` by one rule, without classes, leasts or whole cases, in the order of `claims`.
 * Equal shares: min(asked, weight × λ), constrained equal awards. In proportion: supply × asked over the sum of what is
 * asked; with weights, of weighted askings, none above its own. Equal shortfall: max(0, asked - λ ÷ weight), constrained
 * equal losses. λ is such that the shares sum to the supply, or to all that is asked where that is less.
 */
export function exactShares(
	supply: number,
	claims: readonly { asked: number; weight: number }[],
	rule: SharingRule,
): number[] {
	const asked = Float64Array.from(claims, (claim) => claim.asked)
	const weight = Float64Array.from(claims, (claim) => claim.weight)
	const level = new SharingLevel(supply, { asked, weight }, rule)
	return claims.map((_, index) => level.share(index))
}

/**
 * The order of left-over cases where none lifts anybody, the smaller part when last short, the earlier order, the id; and
 * the place of each claim by the time of its order and the id.
 */
function turnsOf(claims: readonly Claim[]): { order: Uint32Array; late: Uint32Array } {
	const late = new Uint32Array(claims.length)
	const placed = new Float64Array(claims.length)
	const parts = new Float64Array(claims.length)
	for (let index = 0; index < claims.length; index += 1) {
		const claim = claims[index] as Claim
		placed[index] = claim.placed
		parts[index] = claim.lastPart ?? 1
	}
	const byTime = inOrder(placed)
	const placedAt = (place: number) => placed[byTime[place] as number]
	for (let from = 0; from < byTime.length; ) {
		let to = from + 1
		while (to < byTime.length && placedAt(to) === placedAt(from)) to += 1
		const atOnce = byTime.subarray(from, to)
		if (atOnce.length > 1) atOnce.sort((a, b) => text((claims[a] as Claim).id, (claims[b] as Claim).id))
		for (let place = from; place < to; place += 1) late[byTime[place] as number] = place
		from = to
	}
	const { ranks } = ranksOf(parts)
	const keys = parts.map((_, index) => (ranks[index] as number) * claims.length + (late[index] as number))
	return { order: inOrder(keys), late }
}

type ClassMembers = { claims: readonly Claim[]; members: Uint32Array; late: Uint32Array }

function columnsOf({ claims, members, late }: ClassMembers): ClaimColumns {
	const columns = {
		asked: new Float64Array(members.length),
		least: new Float64Array(members.length),
		weight: new Float64Array(members.length),
		late: new Uint32Array(members.length),
	}
	for (let index = 0; index < members.length; index += 1) {
		const place = members[index] as number
		const { asked, least, weight } = claims[place] as Claim
		columns.asked[index] = asked
		columns.least[index] = least
		columns.weight[index] = weight
		columns.late[index] = late[place] as number
	}
	return columns
}

/** The shares of the members of one class, in the order of left-over cases. */
function shareClass(supply: number, of: ClassMembers, rule: SharingRule): Share[] {
	const columns = columnsOf(of)
	const { asked } = columns
	const sharing = new SharingLevel(supply, columns, rule)
	const wouldGet = asked.map((_, index) => sharing.share(index))
	const isAside = setAsideHopeless(sharing, columns, rule)
	setAsideUnlifted(sharing, columns, { supply, isAside })
	const round = wholeCases(sharing, columns, isAside)
	const back = comeBack(columns, { over: supply - round.sum, isAside })
	return Array.from(of.members, (place, index): Share => {
		const aside = isAside[index] === 1
		const given = aside ? (back.get(index) ?? 0) : (round.given[index] as number)
		const exact = aside ? (wouldGet[index] as number) : sharing.share(index)
		const reason = reasonOf({ asked: asked[index] as number, given, exact, isAside: aside })
		return { id: (of.claims[place] as Claim).id, given, exact, reason }
	})
}

function reasonOf(facts: { asked: number; given: number; exact: number; isAside: boolean }): ShareReason {
	const { asked, given, exact, isAside } = facts
	if (isAside) return given > 0 ? "came-back" : "below-least"
	if (given === asked) return "whole"
	if (given === 0) return "nothing-left"
	return given > exact ? "left-over" : "shared"
}

type Round = { given: Int32Array; sum: number }

/** Exact shares rounded down, and the left-over cases given out. */
function wholeCases(sharing: SharingLevel, { least }: ClaimColumns, isAside: Uint8Array): Round {
	const given = new Int32Array(least.length)
	const parts: number[] = []
	let [sum, exactSum] = [0, 0]
	for (let index = 0; index < least.length; index += 1) {
		if (isAside[index]) continue
		const exact = sharing.share(index)
		const whole = Math.floor(exact)
		given[index] = whole
		sum += whole
		exactSum += exact
		if (exact > whole) parts.push(index)
	}
	const leftOver = Math.round(exactSum) - sum
	const isLifted = (index: number) => (given[index] as number) + 1 === least[index]
	// The columns are in the order of left-over cases, so both halves keep it.
	const inTurn = [...parts.filter(isLifted), ...parts.filter((index) => !isLifted(index))]
	for (const index of inTurn.slice(0, leftOver)) given[index] = (given[index] as number) + 1
	return { given, sum: sum + Math.min(leftOver, inTurn.length) }
}

/** Who of those set aside gets something of what is over: first their least acceptable, then a case each in turn. */
function comeBack(
	{ asked, least }: ClaimColumns,
	{ over, isAside }: { over: number; isAside: Uint8Array },
): Map<number, number> {
	const back = new Map<number, number>()
	let left = over
	for (let index = 0; index < least.length; index += 1) {
		const needed = least[index] as number
		if (!isAside[index] || needed > left) continue
		back.set(index, needed)
		left -= needed
	}
	for (let gave = true; gave && left > 0; ) {
		gave = false
		for (const [index, given] of back) {
			if (left === 0 || given >= (asked[index] as number)) continue
			back.set(index, given + 1)
			left -= 1
			gave = true
		}
	}
	return back
}

const text = (a: string, b: string) => (a < b ? -1 : a > b ? 1 : 0)

function requireSane(supply: number, claims: readonly Claim[]): void {
	const isWhole = (cases: number) => Number.isSafeInteger(cases) && cases >= 0
	if (!isWhole(supply)) throw new RangeError(`not whole cases: ${supply}`)
	const ids = new Set<string>()
	for (const { id, asked, least, weight } of claims) {
		ids.add(id)
		if (!isWhole(asked) || !isWhole(least) || least > asked || !(weight > 0) || !Number.isFinite(weight)) {
			throw new RangeError(`not a claim: ${id}`)
		}
	}
	if (ids.size !== claims.length) throw new RangeError("a claim is there twice")
}
