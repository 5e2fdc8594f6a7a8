/**
 * Members in a fixed order (0, 1, 2 …), some of which leave. Tells which of those beyond the first so many is the latest
 * by another order, in which `late` is the place of each. Taking out and asking each cost the logarithm of the number of members.
 */
export class LateRest {
	readonly #late: Uint32Array
	/** A binary tree in an array: node n has the children 2n and 2n + 1, the leaves begin at `#first`. */
	readonly #first: number
	readonly #counts: Int32Array
	/** The latest member under each node, -1 where there is none. */
	readonly #latest: Int32Array

	constructor(isMember: Uint8Array, late: Uint32Array) {
		this.#late = late
		this.#first = 1
		while (this.#first < isMember.length) this.#first *= 2
		this.#counts = new Int32Array(2 * this.#first)
		this.#latest = new Int32Array(2 * this.#first).fill(-1)
		for (let member = 0; member < isMember.length; member += 1) {
			const is = isMember[member] as number
			this.#counts[this.#first + member] = is
			this.#latest[this.#first + member] = is ? member : -1
		}
		for (let node = this.#first - 1; node > 0; node -= 1) this.#sumUp(node)
	}

	takeOut(member: number): void {
		let node = this.#first + member
		this.#counts[node] = 0
		this.#latest[node] = -1
		for (node >>= 1; node > 0; node >>= 1) this.#sumUp(node)
	}

	/** The latest of the members that come after the first `count`; null where there are no more than those. */
	latestAfter(count: number): number | null {
		if (count >= (this.#counts[1] as number)) return null
		let left = count
		let latest = -1
		let node = 1
		while (node < this.#first) {
			const inLeft = this.#counts[2 * node] as number
			if (left < inLeft) {
				latest = this.#later(latest, this.#latest[2 * node + 1] as number)
				node = 2 * node
			} else {
				left -= inLeft
				node = 2 * node + 1
			}
		}
		return this.#later(latest, this.#latest[node] as number)
	}

	#sumUp(node: number): void {
		this.#counts[node] = (this.#counts[2 * node] as number) + (this.#counts[2 * node + 1] as number)
		this.#latest[node] = this.#later(this.#latest[2 * node] as number, this.#latest[2 * node + 1] as number)
	}

	#later(a: number, b: number): number {
		if (a === -1 || b === -1) return Math.max(a, b)
		return (this.#late[a] as number) > (this.#late[b] as number) ? a : b
	}
}
