import { WaterLevel } from "./water-level"

/** How a short product is divided: see `exactShares`. */
export type SharingRule = "equal-shares" | "in-proportion" | "equal-shortfall"

/** Figures nearer than this to a whole number are that number: sums of weights are not exact in binary. */
export const NEARLY = 1e-9

/** What is asked and with which weight, claim by claim. */
type Askings = { asked: Float64Array; weight: Float64Array }

/** Exact shares by one rule, from which claims can be taken out one by one; what they had goes to the others. */
export class SharingLevel {
	readonly #asked: Float64Array
	readonly #isOfLosses: boolean
	readonly #supply: number
	readonly #water: WaterLevel
	#askedInAll: number

	constructor(supply: number, { asked, weight }: Askings, rule: SharingRule) {
		this.#askedInAll = asked.reduce((sum, one) => sum + one, 0)
		this.#asked = asked
		this.#supply = supply
		this.#isOfLosses = rule === "equal-shortfall"
		const rates = weight.map((one, index) => rateOf(asked[index] as number, one, rule))
		this.#water = new WaterLevel(asked, rates, this.#total())
	}

	share(index: number): number {
		const held = this.#water.held(index)
		return nearlyWhole(this.#isOfLosses ? (this.#asked[index] as number) - held : held)
	}

	setAside(index: number): void {
		this.#askedInAll -= this.#asked[index] as number
		this.#water.takeOut(index, this.#total())
	}

	#total(): number {
		return this.#isOfLosses ? Math.max(0, this.#askedInAll - this.#supply) : this.#supply
	}
}

function rateOf(asked: number, weight: number, rule: SharingRule): number {
	if (rule === "equal-shares") return weight
	// A claim of nothing holds nothing at any rate, but a rate of 0 would fill at no level.
	return rule === "in-proportion" ? Math.max(asked, NEARLY) * weight : 1 / weight
}

function nearlyWhole(share: number): number {
	const whole = Math.round(share)
	return Math.abs(share - whole) <= NEARLY * Math.max(1, whole) ? whole : share
}
