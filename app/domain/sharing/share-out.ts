import { LateRest } from "./late-rest"
import { type Vessel, WaterLevel } from "./water-level"

/** How a short product is divided: see `exactShares`. */
export type SharingRule = "equal-shares" | "in-proportion" | "equal-shortfall"

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

type Ranked = Claim & {
	/** Its place in the order in which left-over cases are given: 0 first. */
	rank: number
}

/** Figures nearer than this to a whole number are that number: sums of weights are not exact in binary. */
const NEARLY = 1e-9

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
	const ranked = claims.toSorted(byLeftOver).map((claim, rank) => ({ ...claim, rank }))
	const shares = new Map<string, Share>()
	let over = supply
	for (const claimClass of claimClasses) {
		const ofClass = ranked.filter((claim) => claim.claimClass === claimClass)
		for (const share of shareClass(over, ofClass, rule)) shares.set(share.id, share)
		for (const { id } of ofClass) over -= shares.get(id)?.given ?? 0
	}
	return { shares: claims.map(({ id }) => shares.get(id) as Share), over }
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
	const level = new Sharing(supply, claims, rule)
	return claims.map((_, index) => level.share(index))
}

/** Exact shares from which claims can be taken out one by one. */
class Sharing {
	readonly #claims: readonly { asked: number; weight: number }[]
	readonly #isOfLosses: boolean
	readonly #supply: number
	readonly #water: WaterLevel
	#askedInAll = 0

	constructor(supply: number, claims: readonly { asked: number; weight: number }[], rule: SharingRule) {
		for (const { asked } of claims) this.#askedInAll += asked
		this.#claims = claims
		this.#supply = supply
		this.#isOfLosses = rule === "equal-shortfall"
		this.#water = new WaterLevel(
			claims.map((claim) => vesselOf(claim, rule)),
			this.#total(),
		)
	}

	share(index: number): number {
		const { asked } = this.#claims[index] as { asked: number }
		const held = this.#water.held(index)
		return nearlyWhole(this.#isOfLosses ? asked - held : held)
	}

	setAside(index: number): void {
		this.#askedInAll -= (this.#claims[index] as { asked: number }).asked
		this.#water.takeOut(index, this.#total())
	}

	#total(): number {
		return this.#isOfLosses ? Math.max(0, this.#askedInAll - this.#supply) : this.#supply
	}
}

function vesselOf({ asked, weight }: { asked: number; weight: number }, rule: SharingRule): Vessel {
	if (rule === "equal-shares") return { cap: asked, rate: weight }
	// A claim of nothing holds nothing at any rate, but a rate of 0 would fill at no level.
	if (rule === "in-proportion") return { cap: asked, rate: Math.max(asked, NEARLY) * weight }
	return { cap: asked, rate: 1 / weight }
}

function shareClass(supply: number, claims: readonly Ranked[], rule: SharingRule): Share[] {
	const sharing = new Sharing(supply, claims, rule)
	const wouldGet = claims.map((_, index) => sharing.share(index))
	const isAside = setAsideHopeless(sharing, claims, rule)
	setAsideUnlifted(sharing, claims, { supply, isAside })
	const round = wholeCases(sharing, claims, isAside)
	const back = comeBack(claims, { over: supply - round.sum, isAside })
	return claims.map(({ id, asked }, index): Share => {
		const given = isAside[index] ? (back.get(index) ?? 0) : (round.given[index] as number)
		const exact = isAside[index] ? (wouldGet[index] as number) : sharing.share(index)
		return { id, given, exact, reason: reasonOf({ asked, given, exact, isAside: isAside[index] === 1 }) }
	})
}

function reasonOf(facts: { asked: number; given: number; exact: number; isAside: boolean }): ShareReason {
	const { asked, given, exact, isAside } = facts
	if (isAside) return given > 0 ? "came-back" : "below-least"
	if (given === asked) return "whole"
	if (given === 0) return "nothing-left"
	return given > exact ? "left-over" : "shared"
}

/**
 * Sets aside every claim that not even a left-over case would lift to its least acceptable, and answers which those are.
 * Shares only rise while others are set aside, so a claim is looked at again only when it may have become the furthest.
 * Claims that are always as far below as one another wait as one, the latest order of them last: else a thousand claims
 * with the same least acceptable would all be looked at again for each of them that goes.
 */
function setAsideHopeless(sharing: Sharing, claims: readonly Ranked[], rule: SharingRule): Uint8Array {
	const isAside = new Uint8Array(claims.length)
	const leastOf = (index: number) => (claims[index] as Ranked).least
	const isHopeless = (index: number) => leastOf(index) > Math.ceil(sharing.share(index))
	const groups = new Map<string, number[]>()
	for (const index of claims.keys()) {
		if (!isHopeless(index)) continue
		const key = alikeKey(claims[index] as Ranked, sharing.share(index), rule)
		const group = groups.get(key)
		if (group) group.push(index)
		else groups.set(key, [index])
	}
	const lastOf = (group: Waiting) => group.members.at(-1) as number
	const heap = new Heap((a, b) =>
		Math.abs(a.below - b.below) > NEARLY ? a.below > b.below : isLater(claims, lastOf(a), lastOf(b)),
	)
	for (const members of groups.values()) {
		members.sort((a, b) => (isLater(claims, a, b) ? 1 : -1))
		const [first] = members as [number]
		heap.push({ members, below: leastOf(first) - sharing.share(first) })
	}
	for (let group = heap.pop(); group; group = heap.pop()) {
		const index = lastOf(group)
		if (!isHopeless(index)) continue
		const below = leastOf(index) - sharing.share(index)
		if (group.below - below <= NEARLY) {
			group.members.pop()
			isAside[index] = 1
			sharing.setAside(index)
		}
		if (group.members.length > 0) heap.push({ members: group.members, below })
	}
	return isAside
}

/**
 * Claims with one key stay equally far below their least acceptable as shares rise. Under equal shortfall a claim that
 * gets nothing yet rises later than others, so only its like is like it.
 */
function alikeKey({ asked, least, weight }: Claim, share: number, rule: SharingRule): string {
	if (rule === "equal-shares") return `${least} ${weight}`
	if (rule === "in-proportion" || share === 0) return `${least} ${asked} ${weight}`
	return `${least - asked} ${weight}`
}

/** Claims of one asking and weight: they have one exact share. `waiting` need a left-over case to reach their least. */
type Alike = { member: number; count: number; whole: number; waiting: number[] }

/**
 * Sets aside those that no left-over case is left for, though it would lift them to their least acceptable: the latest
 * order first, until the left-over cases reach. After `setAsideHopeless` each claim lacks one case at most, and shares
 * only rise, so that nobody joins those who wait. Takes time in proportion to the claims set aside times the kinds of
 * claims (one asking and weight), not times all claims.
 */
function setAsideUnlifted(
	sharing: Sharing,
	claims: readonly Ranked[],
	{ supply, isAside }: { supply: number; isAside: Uint8Array },
): void {
	const isWaiting = new Uint8Array(claims.length)
	const kinds = new Map<string, Alike>()
	const kindOf: Alike[] = []
	let [askedInAll, wholeInAll] = [0, 0]
	for (const [index, { asked, weight, least }] of claims.entries()) {
		if (isAside[index]) continue
		const key = `${asked} ${weight}`
		const kind = kinds.get(key) ?? {
			member: index,
			count: 0,
			whole: Math.floor(sharing.share(index)),
			waiting: [],
		}
		kinds.set(key, kind)
		kindOf[index] = kind
		kind.count += 1
		askedInAll += asked
		wholeInAll += kind.whole
		if (least <= kind.whole) continue
		kind.waiting.push(index)
		isWaiting[index] = 1
	}
	const waiting = new LateRest(isWaiting, (a, b) => isLater(claims, a, b))
	for (;;) {
		const latest = waiting.latestAfter(Math.max(0, Math.min(supply, askedInAll) - wholeInAll))
		if (latest === null) return
		const kind = kindOf[latest] as Alike
		isAside[latest] = 1
		waiting.takeOut(latest)
		kind.count -= 1
		askedInAll -= (claims[latest] as Ranked).asked
		wholeInAll -= kind.whole
		sharing.setAside(latest)
		for (const one of kinds.values()) wholeInAll += riseOf(one, sharing, waiting)
	}
}

/** Brings a kind's whole cases up to its share, which lifts all of it that waited; answers by how many cases in all. */
function riseOf(kind: Alike, sharing: Sharing, waiting: LateRest): number {
	const whole = Math.floor(sharing.share(kind.member))
	if (whole === kind.whole) return 0
	const rise = (whole - kind.whole) * kind.count
	kind.whole = whole
	for (const index of kind.waiting) waiting.takeOut(index)
	kind.waiting = []
	return rise
}

type Round = { given: Int32Array; sum: number }

/** Exact shares rounded down, and the left-over cases given out. */
function wholeCases(sharing: Sharing, claims: readonly Ranked[], isAside: Uint8Array): Round {
	const given = new Int32Array(claims.length)
	const parts: number[] = []
	let [sum, exactSum] = [0, 0]
	for (const [index] of claims.entries()) {
		if (isAside[index]) continue
		const exact = sharing.share(index)
		given[index] = Math.floor(exact)
		sum += given[index] as number
		exactSum += exact
		if (exact > Math.floor(exact)) parts.push(index)
	}
	const leftOver = Math.round(exactSum) - sum
	const isLifted = (index: number) => (given[index] as number) + 1 === (claims[index] as Ranked).least
	// `claims` come by rank, so both halves keep the order of left-over cases.
	const inTurn = [...parts.filter(isLifted), ...parts.filter((index) => !isLifted(index))]
	for (const index of inTurn.slice(0, leftOver)) given[index] = (given[index] as number) + 1
	return { given, sum: sum + Math.min(leftOver, inTurn.length) }
}

/** Who of those set aside gets something of what is over: first their least acceptable, then a case each in turn. */
function comeBack(
	claims: readonly Ranked[],
	{ over, isAside }: { over: number; isAside: Uint8Array },
): Map<number, number> {
	const back = new Map<number, number>()
	let left = over
	for (const [index, { least }] of claims.entries()) {
		if (!isAside[index] || least > left) continue
		back.set(index, least)
		left -= least
	}
	for (let gave = true; gave && left > 0; ) {
		gave = false
		for (const [index, given] of back) {
			if (left === 0 || given >= (claims[index] as Ranked).asked) continue
			back.set(index, given + 1)
			left -= 1
			gave = true
		}
	}
	return back
}

const text = (a: string, b: string) => (a < b ? -1 : a > b ? 1 : 0)

/** The order of left-over cases where none lifts anybody: the smaller part when last short, the earlier order, the id. */
function byLeftOver(a: Claim, b: Claim): number {
	return (a.lastPart ?? 1) - (b.lastPart ?? 1) || a.placed - b.placed || text(a.id, b.id)
}

function isLater(claims: readonly Ranked[], a: number, b: number): boolean {
	const [one, other] = [claims[a] as Ranked, claims[b] as Ranked]
	return one.placed !== other.placed ? one.placed > other.placed : one.id > other.id
}

function nearlyWhole(share: number): number {
	const whole = Math.round(share)
	return Math.abs(share - whole) <= NEARLY * Math.max(1, whole) ? whole : share
}

function requireSane(supply: number, claims: readonly Claim[]): void {
	const isWhole = (cases: number) => Number.isSafeInteger(cases) && cases >= 0
	if (!isWhole(supply)) throw new RangeError(`not whole cases: ${supply}`)
	for (const { id, asked, least, weight } of claims) {
		if (!isWhole(asked) || !isWhole(least) || least > asked || !(weight > 0) || !Number.isFinite(weight)) {
			throw new RangeError(`not a claim: ${id}`)
		}
	}
	if (new Set(claims.map(({ id }) => id)).size !== claims.length) throw new RangeError("a claim is there twice")
}

/** Claims that are equally far below their least acceptable. */
type Waiting = { members: number[]; below: number }

/** A binary heap, the first by `isBefore` on top. */
class Heap {
	readonly #items: Waiting[] = []
	readonly #isBefore: (a: Waiting, b: Waiting) => boolean

	constructor(isBefore: (a: Waiting, b: Waiting) => boolean) {
		this.#isBefore = isBefore
	}

	push(item: Waiting): void {
		const items = this.#items
		let at = items.length
		items.push(item)
		while (at > 0) {
			const above = (at - 1) >> 1
			if (!this.#isBefore(item, items[above] as Waiting)) break
			items[at] = items[above] as Waiting
			at = above
		}
		items[at] = item
	}

	pop(): Waiting | undefined {
		const items = this.#items
		const top = items[0]
		const last = items.pop()
		if (top === undefined || last === undefined || items.length === 0) return top
		let at = 0
		for (;;) {
			let below = 2 * at + 1
			if (below >= items.length) break
			const right = below + 1
			if (right < items.length && this.#isBefore(items[right] as Waiting, items[below] as Waiting)) below = right
			if (!this.#isBefore(items[below] as Waiting, last)) break
			items[at] = items[below] as Waiting
			at = below
		}
		items[at] = last
		return top
	}
}
