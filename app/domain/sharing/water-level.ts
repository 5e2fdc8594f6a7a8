/** One vessel of the level: it takes `rate` for each unit that the level rises, until `cap` is reached. */
export type Vessel = { cap: number; rate: number }

/**
 * A total spread over vessels so that each holds min(cap, rate × level), the sum being the total or, where that is more
 * than all caps, their sum. Vessels can be taken out one by one and the level follows; in all that costs no more than
 * sorting them once, as long as the level only rises or only falls meanwhile. Equal shares, shares in proportion and
 * equal shortfalls are three choices of cap and rate.
 */
export class WaterLevel {
	readonly #vessels: readonly Vessel[]
	/** Vessels in the order in which they fill, and the place of each in that order. */
	readonly #order: readonly number[]
	readonly #place: Int32Array
	readonly #isOut: Uint8Array
	#total: number
	/** So many of `#order` are full or out; what the full ones hold together. */
	#fullCount = 0
	#fullHold = 0
	/** How many are neither full nor out, and their rates together. */
	#openCount: number
	#openRate = 0

	constructor(vessels: readonly Vessel[], total: number) {
		const fullAt = Float64Array.from(vessels, ({ cap, rate }) => cap / rate)
		this.#vessels = vessels
		this.#total = total
		this.#openCount = vessels.length
		this.#order = vessels
			.map((_, index) => index)
			.sort((a, b) => (fullAt[a] as number) - (fullAt[b] as number) || a - b)
		this.#place = new Int32Array(vessels.length)
		this.#isOut = new Uint8Array(vessels.length)
		for (const [place, index] of this.#order.entries()) this.#place[index] = place
		for (const { rate } of vessels) this.#openRate += rate
		this.#settle()
	}

	/** The level now; infinite when every vessel is full. */
	get level(): number {
		if (this.#openCount === 0) return Number.POSITIVE_INFINITY
		return Math.max(0, this.#total - this.#fullHold) / this.#openRate
	}

	/** What a vessel holds at the present level. */
	held(index: number): number {
		const { cap, rate } = this.#vessels[index] as Vessel
		return Math.min(cap, rate * this.level)
	}

	/** Takes a vessel out; what is spread over the others is `total` from now on. */
	takeOut(index: number, total: number): void {
		const { cap, rate } = this.#vessels[index] as Vessel
		this.#isOut[index] = 1
		if ((this.#place[index] as number) < this.#fullCount) this.#fullHold -= cap
		else this.#close(rate)
		this.#total = total
		this.#settle()
	}

	#settle(): void {
		while (this.#fullCount < this.#order.length) {
			const index = this.#order[this.#fullCount] as number
			const { cap, rate } = this.#vessels[index] as Vessel
			if (!this.#isOut[index]) {
				if (cap * this.#openRate > (this.#total - this.#fullHold) * rate) break
				this.#fullHold += cap
				this.#close(rate)
			}
			this.#fullCount += 1
		}
		while (this.#fullCount > 0) {
			const index = this.#order[this.#fullCount - 1] as number
			const { cap, rate } = this.#vessels[index] as Vessel
			if (!this.#isOut[index]) {
				if (cap * (this.#openRate + rate) <= (this.#total - this.#fullHold + cap) * rate) break
				this.#fullHold -= cap
				this.#openRate += rate
				this.#openCount += 1
			}
			this.#fullCount -= 1
		}
	}

	#close(rate: number): void {
		this.#openRate -= rate
		this.#openCount -= 1
	}
}
