import { inOrder } from "./in-order"

/**
 * A total spread over vessels so that each holds min(cap, rate × level), the sum being the total or, where that is more
 * than all caps, their sum. A vessel takes `rate` for each unit that the level rises, until its cap is reached. Vessels can
 * be taken out one by one and the level follows; in all that costs no more than sorting them once, as long as the level
 * only rises or only falls meanwhile. Equal shares, shares in proportion and equal shortfalls are three choices of cap and
 * rate.
 */
export class WaterLevel {
	readonly #caps: Float64Array
	readonly #rates: Float64Array
	/** Vessels in the order in which they fill, and the place of each in that order. */
	readonly #order: Uint32Array
	readonly #place: Uint32Array
	readonly #isOut: Uint8Array
	#total: number
	/** So many of `#order` are full or out; what the full ones hold together. */
	#fullCount = 0
	#fullHold = 0
	/** How many are neither full nor out, and their rates together. */
	#openCount: number
	#openRate = 0

	constructor(caps: Float64Array, rates: Float64Array, total: number) {
		this.#caps = caps
		this.#rates = rates
		this.#total = total
		this.#openCount = caps.length
		this.#order = inOrder(caps.map((cap, index) => cap / (rates[index] as number)))
		this.#place = new Uint32Array(caps.length)
		this.#isOut = new Uint8Array(caps.length)
		for (let place = 0; place < caps.length; place += 1) {
			this.#place[this.#order[place] as number] = place
			this.#openRate += rates[place] as number
		}
		this.#settle()
	}

	/** The level now; infinite when every vessel is full. */
	get level(): number {
		if (this.#openCount === 0) return Number.POSITIVE_INFINITY
		return Math.max(0, this.#total - this.#fullHold) / this.#openRate
	}

	/** What a vessel holds at the present level. */
	held(index: number): number {
		return Math.min(this.#caps[index] as number, (this.#rates[index] as number) * this.level)
	}

	/** Takes a vessel out; what is spread over the others is `total` from now on. */
	takeOut(index: number, total: number): void {
		this.#isOut[index] = 1
		if ((this.#place[index] as number) < this.#fullCount) this.#fullHold -= this.#caps[index] as number
		else this.#close(this.#rates[index] as number)
		this.#total = total
		this.#settle()
	}

	#settle(): void {
		while (this.#fullCount < this.#order.length) {
			const index = this.#order[this.#fullCount] as number
			if (!this.#isOut[index]) {
				const [cap, rate] = [this.#caps[index] as number, this.#rates[index] as number]
				if (cap * this.#openRate > (this.#total - this.#fullHold) * rate) break
				this.#fullHold += cap
				this.#close(rate)
			}
			this.#fullCount += 1
		}
		while (this.#fullCount > 0) {
			const index = this.#order[this.#fullCount - 1] as number
			if (!this.#isOut[index]) {
				const [cap, rate] = [this.#caps[index] as number, this.#rates[index] as number]
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
