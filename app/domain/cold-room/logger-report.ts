import type { CurveBucket } from "./curve"
import type { Stretch } from "./freeze-runs"
import { coolingAllowance, type FreezeVerdict, judgeFreezing, type ProbePlace, type TemperatureUnit } from "./freezing"
import type { LoggerReading } from "./logger-reader"
import type { DateOrder } from "./logger-time"
import { momentOfWall } from "./wall-clock"

/** What is kept of a logger file beside its curve: how it was read and what was found in it. Times are moments. */
export type LoggerReport = {
	readings: number
	/** Lines that held no reading. */
	skipped: number
	unit: TemperatureUnit
	dates: DateOrder
	hasZone: boolean
	column: string
	otherColumns: string[]
	everySeconds: number
	span: Stretch
	gaps: { count: number; longestMinutes: number; first: Stretch[] }
	clockSteps: { at: number; minutes: number }[]
	repeated: number
	/** Readings from before the loading. */
	outside: number
	isBackwards: boolean
	probe: ProbePlace
	/** The longest run at 0 °C or colder, in minutes. */
	minutesAtZero: number
	/** The longest run at each row of the table, in minutes, before the allowance. */
	runMinutes: number[]
}

const minutesIn = (stretch: Stretch | null) => (stretch === null ? 0 : (stretch.to - stretch.from) / 60_000)

/**
 * Judges what a logger file showed, with the allowance for where its probe was, and turns its times into moments. The
 * curve is sorted by time.
 */
export function concludeLogger(
	reading: LoggerReading,
	{ probe, zone }: { probe: ProbePlace; zone: string },
): { verdict: FreezeVerdict; run: Stretch | null; report: LoggerReport; curve: CurveBucket[] } {
	const { runs, format } = reading
	const momentOf = (at: number) => (format.hasZone ? at : momentOfWall(at, zone))
	const onTheClock = ({ from, to }: Stretch): Stretch => ({ from: momentOf(from), to: momentOf(to) })
	const runMinutes = runs.longest.map(minutesIn)
	const verdict = judgeFreezing(runMinutes, coolingAllowance(probe))
	const run = runs.longest[verdict.rowIndex] ?? null
	const report: LoggerReport = {
		readings: runs.readings,
		skipped: reading.skipped,
		unit: reading.unit,
		dates: reading.dates,
		hasZone: format.hasZone,
		column: format.temperatureHead,
		otherColumns: format.otherTemperatures,
		everySeconds: runs.usualInterval / 1000,
		span: onTheClock(runs.span),
		gaps: {
			count: runs.gaps.count,
			longestMinutes: Math.round(runs.gaps.longest / 60_000),
			first: runs.gaps.first.map(onTheClock),
		},
		clockSteps: runs.clockSteps.map((step) => ({ ...step, at: momentOf(step.at) })),
		repeated: runs.repeated,
		outside: runs.outside,
		isBackwards: runs.isBackwards,
		probe,
		minutesAtZero: Math.floor(minutesIn(runs.longestAtZero)),
		runMinutes: runMinutes.map(Math.floor),
	}
	const curve = runs.buckets.map(([at, lowest, highest]): CurveBucket => [momentOf(at), lowest, highest])
	return { verdict, run: run && onTheClock(run), report, curve: curve.toSorted(([a], [b]) => a - b) }
}
