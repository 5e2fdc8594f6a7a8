/** Choices that look like chance and are the same on every machine. */
export type Chance = {
	/** A whole number from `least` to `most`, both included. */
	whole: (least: number, most: number) => number
	/** Whether something happens that happens in `percent` of 100 cases. */
	isLucky: (percent: number) => boolean
	/** `count` different entries of `list`, in the list's order; all of them where it has fewer. */
	some: <T>(list: readonly T[], count: number) => T[]
	/** An id in the form of a random UUID. */
	id: () => string
	/** 64 hexadecimal digits, as a hash would be. */
	hash: () => string
}

/** Starts a row of choices; the same `seed` gives the same row. Not for secrets. Source: mulberry32, public domain. */
export function startChance(seed: number): Chance {
	let state = seed >>> 0
	const next = () => {
		state = (state + 0x6d2b79f5) >>> 0
		let mixed = Math.imul(state ^ (state >>> 15), state | 1)
		mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
		return (mixed ^ (mixed >>> 14)) >>> 0
	}
	const whole = (least: number, most: number) => least + (next() % (most - least + 1))
	const digits = (words: number) => Array.from({ length: words }, () => next().toString(16).padStart(8, "0")).join("")
	return {
		whole,
		isLucky: (percent) => whole(1, 100) <= percent,
		some: (list, count) => {
			const left = list.map((entry, index) => ({ entry, index }))
			while (left.length > count) left.splice(whole(0, left.length - 1), 1)
			return left.map(({ entry }) => entry)
		},
		id: () => {
			const hex = digits(4)
			return [hex.slice(0, 8), hex.slice(8, 12), `4${hex.slice(13, 16)}`, `8${hex.slice(17, 20)}`, hex.slice(20)].join(
				"-",
			)
		},
		hash: () => digits(8),
	}
}
