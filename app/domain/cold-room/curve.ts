/** A stretch of the curve: when it begins, in milliseconds, and the lowest and highest tenths of a degree Celsius in it. */
export type CurveBucket = [at: number, lowest: number, highest: number]

const MOST_BUCKETS = 600

/**
 * Draws a curve from readings as they come: at most 600 stretches of equal length, of which the lowest and the highest
 * reading are kept. When a reading lies beyond the last stretch, stretches are joined by twos until it does not. Times
 * are milliseconds that rise but for a clock that was set back; a reading before the first counts into the first stretch.
 */
export class CurveFold {
	readonly #lowest = new Int16Array(MOST_BUCKETS)
	readonly #highest = new Int16Array(MOST_BUCKETS)
	#used = 0
	#from = 0
	#width: number

	/** `width` is the length of a stretch to begin with, in milliseconds. */
	constructor(width: number) {
		this.#width = Math.max(1, width)
		this.#clear(0)
	}

	add(at: number, tenthsC: number): void {
		if (this.#used === 0) this.#from = at
		let index = Math.max(0, Math.floor((at - this.#from) / this.#width))
		while (index >= MOST_BUCKETS) {
			this.#join()
			index = Math.floor((at - this.#from) / this.#width)
		}
		const tenths = Math.max(-32_000, Math.min(32_000, tenthsC))
		if (tenths < (this.#lowest[index] as number)) this.#lowest[index] = tenths
		if (tenths > (this.#highest[index] as number)) this.#highest[index] = tenths
		if (index >= this.#used) this.#used = index + 1
	}

	/**
	 * The stretches that hold a reading, the first read first. `direction` is -1 when times were given below zero so that
	 * they rise; the beginning of a stretch is then its other end.
	 */
	buckets(direction: 1 | -1): CurveBucket[] {
		const buckets: CurveBucket[] = []
		for (let index = 0; index < this.#used; index += 1) {
			const lowest = this.#lowest[index] as number
			const highest = this.#highest[index] as number
			if (lowest > highest) continue
			const at = this.#from + index * this.#width
			buckets.push([direction === 1 ? at : -(at + this.#width), lowest, highest])
		}
		return buckets
	}

	#join(): void {
		const half = Math.ceil(this.#used / 2)
		for (let index = 0; index < half; index += 1) {
			const second = Math.min(index * 2 + 1, MOST_BUCKETS - 1)
			this.#lowest[index] = Math.min(this.#lowest[index * 2] as number, this.#lowest[second] as number)
			this.#highest[index] = Math.max(this.#highest[index * 2] as number, this.#highest[second] as number)
		}
		this.#clear(half)
		this.#used = half
		this.#width *= 2
	}

	#clear(from: number): void {
		this.#lowest.fill(32_767, from)
		this.#highest.fill(-32_768, from)
	}
}
