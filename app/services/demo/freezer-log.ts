import { coolingAllowance } from "~/domain/cold-room/freezing"
import { LoggerReader } from "~/domain/cold-room/logger-reader"
import { concludeLogger } from "~/domain/cold-room/logger-report"
import { shiftDaysOf, wallOfMoment } from "~/domain/cold-room/wall-clock"
import { minutesAfter } from "./season"

const MINUTES_APART = 20
/** Degrees Celsius: as it came from the hive, when it counts as cold, and where the freezer stands. */
const WARM = 18
const COLD = -15.1
const DEEP = -18.6

type Frozen = Record<"loadedAt" | "coldAt" | "outAt", Date>

/** What a logger in the middle of a comb wrote of a load, judged as an uploaded file is. */
export function readFreezerLog(frozen: Frozen, zone: string) {
	const moments = { from: frozen.loadedAt.getTime(), to: frozen.outAt.getTime() }
	const wall = { from: wallOfMoment(moments.from, zone), to: wallOfMoment(moments.to, zone) }
	const reader = new LoggerReader({ unit: null, dates: null, counts: { moments, wall }, isShiftDay: shiftDaysOf(zone) })
	reader.feed(freezerLog(frozen))
	const reading = reader.finish()
	if (!reading.ok) throw new Error(`the demo's freezer log is refused: ${reading.reason}`)
	const { verdict, run, report, curve } = concludeLogger(reading, { probe: "comb", zone })
	return {
		verdict,
		allowanceMinutes: coolingAllowance("comb"),
		runFrom: run && new Date(run.from),
		runTo: run && new Date(run.to),
		report,
		curve,
	}
}

/** The file: down to the cold by `coldAt` as any warm thing cools, then even until it was taken out. */
function freezerLog({ loadedAt, coldAt, outAt }: Frozen): string {
	const lines = ["Time,Temperature (°C)"]
	const rate = Math.log((WARM - DEEP) / (COLD - DEEP)) / (coldAt.getTime() - loadedAt.getTime())
	for (let at = loadedAt; at <= outAt; at = minutesAfter(at, MINUTES_APART)) {
		const degrees = DEEP + (WARM - DEEP) * Math.exp(-rate * (at.getTime() - loadedAt.getTime()))
		// The door is opened now and then.
		const swing = at > minutesAfter(coldAt, 240) && lines.length % 9 === 4 ? 0.7 : 0
		lines.push(`${at.toISOString()},${(degrees + swing).toFixed(1)}`)
	}
	return `${lines.join("\n")}\n`
}
