import { type CurveBucket, CurveFold } from "./curve"
import { FREEZE_TABLE, limitOf, type TemperatureUnit } from "./freezing"

/** A stretch of time in milliseconds; `from` is never after `to`. */
export type Stretch = { from: number; to: number }

/** Where the clock of the logger jumped, and by how many minutes; back is below zero. */
export type ClockStep = { at: number; minutes: number }

const HOUR = 3_600_000
/** Readings farther apart prove nothing about what lies between them; common practice, no source. */
const WIDEST_INTERVAL = HOUR
/** So many readings are looked at to learn which way the times run and how far apart they usually lie. */
const LEARNT_FROM = 65
const MOST_LISTED = 10

export type FreezeRuns = {
	readings: number
	/** The usual time between readings, in milliseconds; zero when there is none. */
	usualInterval: number
	span: Stretch
	/** The longest run at or below each row of the table, in its order; null where there was none. */
	longest: (Stretch | null)[]
	/** The longest run at or below freezing point. */
	longestAtZero: Stretch | null
	gaps: { count: number; longest: number; first: Stretch[] }
	clockSteps: ClockStep[]
	/** Readings with the time of the one before. */
	repeated: number
	/** Readings outside of the time that counts; they are drawn and do not count. */
	outside: number
	/** The first reading that is earlier than the one before and is no step of the clock: its number from 1, and when. */
	unsorted: { reading: number; at: number } | null
	/** The curve in stretches of equal length; each is named by the earlier of its ends. */
	buckets: CurveBucket[]
	/** Whether the file gives the latest reading first. */
	isBackwards: boolean
}

/**
 * Finds the longest unbroken run at or below each row of the freezing table while readings come in, and keeps none of
 * them. A run is broken by a warmer reading, by a gap (more than one and a half times the usual interval, or over an
 * hour) and by a step of the clock: what is not known does not count. Times are milliseconds; readings in the unit named
 * at the start; files that give the latest reading first are read as they are. Only readings within `counts` count.
 */
export class FreezeRunFold {
	readonly #limits: number[]
	readonly #counts: Stretch
	readonly #isCelsius: boolean
	readonly #isShiftDay: (at: number) => boolean
	readonly #early: [at: number, temperature: number][] = []
	#direction: 1 | -1 = 1
	#gapOver = 0
	#usual = 0
	#isLearnt = false

	readonly #runFrom: Float64Array
	readonly #best: { from: number; to: number }[]
	#last = Number.NaN
	#first = Number.NaN
	#latest = Number.NEGATIVE_INFINITY
	#curve = new CurveFold(1)
	#readings = 0
	#gaps: FreezeRuns["gaps"] = { count: 0, longest: 0, first: [] }
	#steps: ClockStep[] = []
	#repeated = 0
	#outside = 0
	#unsorted: FreezeRuns["unsorted"] = null

	/** `isShiftDay` says whether clocks are put forward or back on the day of a time; asked only about jumps of an hour. */
	constructor(unit: TemperatureUnit, counts: Stretch, isShiftDay: (at: number) => boolean) {
		this.#isShiftDay = isShiftDay
		this.#limits = [...FREEZE_TABLE.map((row) => limitOf(row, unit)), unit === "C" ? 0 : 32]
		this.#isCelsius = unit === "C"
		this.#counts = counts
		this.#runFrom = new Float64Array(this.#limits.length).fill(Number.NaN)
		this.#best = this.#limits.map(() => ({ from: Number.NaN, to: Number.NaN }))
	}

	add(at: number, temperature: number): void {
		if (this.#isLearnt) this.#take(at * this.#direction, temperature)
		else if (this.#early.push([at, temperature]) === LEARNT_FROM) this.#learn()
	}

	/** Everything that was found. Nothing can be added after. */
	finish(): FreezeRuns {
		if (!this.#isLearnt) this.#learn()
		const stretches = this.#best.map((run) => (run.to >= run.from ? this.#onTheClock(run.from, run.to) : null))
		return {
			readings: this.#readings,
			usualInterval: this.#usual,
			span: this.#onTheClock(this.#first, this.#latest),
			longest: stretches.slice(0, FREEZE_TABLE.length),
			longestAtZero: stretches[FREEZE_TABLE.length] ?? null,
			gaps: this.#gaps,
			clockSteps: this.#steps,
			repeated: this.#repeated,
			outside: this.#outside,
			unsorted: this.#unsorted,
			buckets: this.#curve.buckets(this.#direction),
			isBackwards: this.#direction === -1,
		}
	}

	/** The usual interval is the middle one of the first; the times run the way that most of those do. */
	#learn(): void {
		const steps = this.#early.slice(1).map(([at], index) => at - (this.#early[index]?.[0] ?? at))
		const later = steps.filter((step) => step > 0).length
		const earlier = steps.filter((step) => step < 0).length
		this.#direction = earlier > later ? -1 : 1
		const along = steps.map((step) => step * this.#direction).filter((step) => step > 0)
		this.#usual = along.toSorted((a, b) => a - b)[Math.floor(along.length / 2)] ?? 0
		this.#gapOver = Math.min(this.#usual * 1.5, WIDEST_INTERVAL)
		this.#curve = new CurveFold(this.#usual)
		this.#isLearnt = true
		for (const [at, temperature] of this.#early) this.#take(at * this.#direction, temperature)
		this.#early.length = 0
	}

	/** Takes a reading at `at`, which rises whichever way the file runs. */
	#take(at: number, temperature: number): void {
		this.#readings += 1
		if (this.#readings === 1) this.#first = at
		else this.#compare(at - this.#last, at)
		this.#last = at
		if (at > this.#latest) this.#latest = at
		this.#curve.add(at, Math.round(this.#isCelsius ? temperature * 10 : ((temperature - 32) * 50) / 9))
		const time = at * this.#direction
		const doesCount = time >= this.#counts.from && time <= this.#counts.to
		if (!doesCount) this.#outside += 1
		for (let index = 0; index < this.#limits.length; index += 1) {
			if (doesCount && temperature <= (this.#limits[index] as number)) this.#lengthen(index, at)
			else this.#runFrom[index] = Number.NaN
		}
	}

	#lengthen(index: number, at: number): void {
		const from = this.#runFrom[index] as number
		if (Number.isNaN(from)) this.#runFrom[index] = at
		const best = this.#best[index] as { from: number; to: number }
		const begun = Number.isNaN(from) ? at : from
		if (!(at - begun <= best.to - best.from)) {
			best.from = begun
			best.to = at
		}
	}

	/** Holds the time since the last reading against what is usual. */
	#compare(passed: number, at: number): void {
		if (passed > 0 && passed <= this.#gapOver) return
		if (passed === 0) {
			this.#repeated += 1
			return
		}
		this.#runFrom.fill(Number.NaN)
		const isStep = this.#steps.length < MOST_LISTED && this.#isHourOff(passed, at)
		if (isStep) this.#noteStep(passed, at)
		else if (passed > 0) this.#noteGap(passed, at)
		else this.#unsorted ??= { reading: this.#readings, at: at * this.#direction }
	}

	/**
	 * A clock that is put back or forward is off by an hour between two readings. Back, nothing else explains it; forward,
	 * an hour may as well be missing, so the calendar decides.
	 */
	#isHourOff(passed: number, at: number): boolean {
		const leeway = Math.min(this.#usual / 2, 5 * 60_000)
		const isOff = (by: number) => Math.abs(passed - this.#usual - by) <= leeway
		return isOff(-HOUR) || (isOff(HOUR) && this.#isShiftDay(at * this.#direction))
	}

	#noteGap(passed: number, at: number): void {
		this.#gaps.count += 1
		this.#gaps.longest = Math.max(this.#gaps.longest, passed)
		if (this.#gaps.first.length < MOST_LISTED) this.#gaps.first.push(this.#onTheClock(at - passed, at))
	}

	#noteStep(passed: number, at: number): void {
		const minutes = Math.round((passed - this.#usual) / 60_000)
		this.#steps.push({ at: at * this.#direction, minutes })
	}

	#onTheClock(from: number, to: number): Stretch {
		return this.#direction === 1 ? { from, to } : { from: -to, to: -from }
	}
}
