import type { CurvePoint } from "~/db/schema"
import { minutesAfter } from "./season"

const MINUTES_APART = 20
/** Tenths of a degree Celsius: as it came from the hive, when it counts as cold, and where the freezer stands. */
const WARM = 180
const COLD = -150
const DEEP = -186

/** What a logger in the middle of a case writes: down to the cold by `runFrom`, then even until `runTo`. */
export function freezerCurve({
	loadedAt,
	runFrom,
	runTo,
}: Record<"loadedAt" | "runFrom" | "runTo", Date>): CurvePoint[] {
	const points: CurvePoint[] = []
	const downMinutes = (runFrom.getTime() - loadedAt.getTime()) / 60_000
	// Cools like any warm thing in the cold: by the same part of what is left in each stretch of time.
	const rate = Math.log((WARM - DEEP) / (COLD - 1 - DEEP)) / downMinutes
	for (let at = loadedAt; at <= runTo; at = minutesAfter(at, MINUTES_APART)) {
		const minutes = (at.getTime() - loadedAt.getTime()) / 60_000
		const tenths = Math.round(DEEP + (WARM - DEEP) * Math.exp(-rate * minutes))
		const swing = points.length % 9 === 4 ? 3 : 1
		points.push([at.getTime(), tenths - 1, at < runFrom ? tenths : Math.min(COLD, tenths + swing)])
	}
	return points
}
