import { ranksOf } from "./in-order"
import { LateRest } from "./late-rest"
import { NEARLY, type SharingLevel, type SharingRule } from "./sharing-level"

/**
 * Claims of one class, column by column, in the order in which left-over cases are given. `late` is the place of each by
 * the time of its order, higher for the later.
 */
export type ClaimColumns = { asked: Float64Array; least: Float64Array; weight: Float64Array; late: Uint32Array }

/**
 * Sets aside every claim that not even a left-over case would lift to its least acceptable, and answers which those are.
 * Shares only rise while others are set aside, so a claim is looked at again only when it may have become the furthest.
 * Claims that are always as far below as one another wait as one, the latest order of them last: else a thousand claims
 * with the same least acceptable would all be looked at again for each of them that goes.
 */
export function setAsideHopeless(sharing: SharingLevel, claims: ClaimColumns, rule: SharingRule): Uint8Array {
	const { least, late } = claims
	const isAside = new Uint8Array(least.length)
	const leastOf = (index: number) => least[index] as number
	const lateness = (index: number) => late[index] as number
	const isHopeless = (index: number) => leastOf(index) > Math.ceil(sharing.share(index))
	const groups = new Map<string, number[]>()
	for (let index = 0; index < least.length; index += 1) {
		if (!isHopeless(index)) continue
		const key = alikeKey(claims, index, { share: sharing.share(index), rule })
		const group = groups.get(key)
		if (group) group.push(index)
		else groups.set(key, [index])
	}
	const lastOf = (group: Waiting) => group.members.at(-1) as number
	const heap = new Heap((a, b) =>
		Math.abs(a.below - b.below) > NEARLY ? a.below > b.below : lateness(lastOf(a)) > lateness(lastOf(b)),
	)
	for (const members of groups.values()) {
		members.sort((a, b) => lateness(a) - lateness(b))
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
function alikeKey(claims: ClaimColumns, index: number, now: { share: number; rule: SharingRule }): string {
	const [asked, least] = [claims.asked[index] as number, claims.least[index] as number]
	const weight = claims.weight[index] as number
	const { share, rule } = now
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
export function setAsideUnlifted(
	sharing: SharingLevel,
	claims: ClaimColumns,
	{ supply, isAside }: { supply: number; isAside: Uint8Array },
): void {
	const { asked, least, late } = claims
	const isWaiting = new Uint8Array(asked.length)
	const keys = kindKeys(claims)
	const kinds = new Map<number, Alike>()
	let [askedInAll, wholeInAll] = [0, 0]
	for (let index = 0; index < asked.length; index += 1) {
		if (isAside[index]) continue
		const key = keys[index] as number
		let kind = kinds.get(key)
		if (!kind) {
			kind = { member: index, count: 0, whole: Math.floor(sharing.share(index)), waiting: [] }
			kinds.set(key, kind)
		}
		kind.count += 1
		askedInAll += asked[index] as number
		wholeInAll += kind.whole
		if ((least[index] as number) <= kind.whole) continue
		kind.waiting.push(index)
		isWaiting[index] = 1
	}
	const waiting = new LateRest(isWaiting, late)
	for (;;) {
		const latest = waiting.latestAfter(Math.max(0, Math.min(supply, askedInAll) - wholeInAll))
		if (latest === null) return
		const kind = kinds.get(keys[latest] as number) as Alike
		isAside[latest] = 1
		waiting.takeOut(latest)
		kind.count -= 1
		askedInAll -= asked[latest] as number
		wholeInAll -= kind.whole
		sharing.setAside(latest)
		for (const one of kinds.values()) wholeInAll += riseOf(one, sharing, waiting)
	}
}

/** A number for each claim, the same for all of one asking and weight. */
function kindKeys({ asked, weight }: ClaimColumns): Float64Array {
	const ofAsked = ranksOf(asked)
	const ofWeight = ranksOf(weight)
	return asked.map(
		(_, index) => (ofAsked.ranks[index] as number) * ofWeight.distinct + (ofWeight.ranks[index] as number),
	)
}

/** Brings a kind's whole cases up to its share, which lifts all of it that waited; answers by how many cases in all. */
function riseOf(kind: Alike, sharing: SharingLevel, waiting: LateRest): number {
	const whole = Math.floor(sharing.share(kind.member))
	if (whole === kind.whole) return 0
	const rise = (whole - kind.whole) * kind.count
	kind.whole = whole
	for (const index of kind.waiting) waiting.takeOut(index)
	kind.waiting = []
	return rise
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
