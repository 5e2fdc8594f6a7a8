/** The unit that a thermometer or a logger shows. */
export type TemperatureUnit = "C" | "F"

/** A row of the freezing table: comb at this temperature or colder, in either unit as printed, for so long. */
export type FreezeRow = { tenthsC: number; tenthsF: number; minutes: number }

/**
 * How long comb must be held against every stage of the wax moth, the warmest row first. The hours count from when the
 * comb itself has reached the temperature. Source: Charrière & Imdorf 1999, as given in the COLOSS BEEBOOK, vol. II, wax
 * moths, 5.8.1. The source's Fahrenheit figures are rounded, so a reading is held against the figure of its own unit.
 */
export const FREEZE_TABLE: readonly FreezeRow[] = [
	{ tenthsC: -70, tenthsF: 200, minutes: 270 },
	{ tenthsC: -120, tenthsF: 100, minutes: 180 },
	{ tenthsC: -150, tenthsF: 50, minutes: 120 },
]

/**
 * The same source's plain advice: at 0 °C or colder for more than this. It is shown as a note beside a proof and decides
 * nothing, as the table does.
 */
const PLAIN_ADVICE_MINUTES = 24 * 60

/** Whether a stretch at 0 °C or colder also meets the source's plain advice of more than 24 hours. */
export function meetsPlainAdvice(minutesAtZero: number): boolean {
	return minutesAtZero > PLAIN_ADVICE_MINUTES
}

/** Where the probe was: in the middle of a comb, or in the air beside loose pieces or closed cases. */
export const PROBE_PLACES = ["comb", "air-loose", "air-cases"] as const
export type ProbePlace = (typeof PROBE_PLACES)[number]

/**
 * Minutes taken off what the probe says, in which the middle of the comb gets as cold as the air: none for a probe in the
 * comb, a day beside loose pieces, two beside closed cases. Common practice, no source: the trade freezes for 24 to 48
 * hours so that the core reaches the temperature (from memory, high confidence).
 */
export function coolingAllowance(probe: ProbePlace): number {
	return { comb: 0, "air-loose": 24 * 60, "air-cases": 48 * 60 }[probe]
}

/** The coldest row that a temperature reaches: between two rows it is the warmer one. Null when it reaches none. */
export function rowReached(temperature: number, unit: TemperatureUnit): FreezeRow | null {
	return FREEZE_TABLE.findLast((row) => temperature <= limitOf(row, unit)) ?? null
}

/** The temperature of a row in degrees of a unit. */
export function limitOf(row: FreezeRow, unit: TemperatureUnit): number {
	return (unit === "C" ? row.tenthsC : row.tenthsF) / 10
}

export type FreezeVerdict = {
	isProven: boolean
	/** The row that decided, or that came nearest to it. */
	row: FreezeRow
	/** Where that row stands in the table. */
	rowIndex: number
	/** Minutes at or below the row that count: without the allowance, never below zero. */
	countedMinutes: number
	/** Minutes that are still missing at that row; zero when it is proven. */
	missingMinutes: number
}

/**
 * Decides a treatment by the longest unbroken run at or below each row of the table, in the table's order, in minutes as
 * the probe shows them. It is proven when at one row the run, less the allowance, lasts as long as the row asks; a part
 * of a minute never counts. The row named is the one that asks the least more, the colder one on ties. Throws RangeError
 * unless there is one run of zero or more minutes for each row.
 */
export function judgeFreezing(runMinutes: readonly number[], allowanceMinutes = 0): FreezeVerdict {
	if (runMinutes.length !== FREEZE_TABLE.length || !runMinutes.every((minutes) => minutes >= 0))
		throw new RangeError(`not a run for each row: ${runMinutes}`)
	const [first, ...others] = FREEZE_TABLE.map((row, index) => {
		const counted = Math.max(0, Math.floor(runMinutes[index] ?? 0) - allowanceMinutes)
		// What is missing of a run that is shorter than the allowance includes the rest of the allowance.
		const missing = row.minutes + allowanceMinutes - Math.floor(runMinutes[index] ?? 0)
		return { row, index, counted, missing }
	})
	if (!first) throw new Error("the table has no rows")
	const nearest = others.reduce((best, one) => (one.missing <= best.missing ? one : best), first)
	return {
		isProven: nearest.missing <= 0,
		row: nearest.row,
		rowIndex: nearest.index,
		countedMinutes: nearest.counted,
		missingMinutes: Math.max(0, nearest.missing),
	}
}

/**
 * The runs that a treatment entered by hand claims: one temperature for so many minutes is a run at every row that the
 * temperature reaches. In the table's order.
 */
export function enteredRuns(entry: { temperature: number; unit: TemperatureUnit; minutes: number }): number[] {
	return FREEZE_TABLE.map((row) => (entry.temperature <= limitOf(row, entry.unit) ? entry.minutes : 0))
}

/** The row of the table that a kept proof names by its temperature; null for one that is in no table. */
export function rowNamed(tenthsC: number | null): FreezeRow | null {
	return FREEZE_TABLE.find((row) => row.tenthsC === tenthsC) ?? null
}

/** "−12 °C (10 °F)": a row as it is said. */
export function rowWords(row: FreezeRow): string {
	return `${degrees(row.tenthsC / 10)} °C (${degrees(row.tenthsF / 10)} °F)`
}

/** A temperature with at most one decimal and a true minus sign: "−18.2". */
export function degrees(temperature: number): string {
	const rounded = Math.round(temperature * 10) / 10
	return rounded < 0 ? `−${-rounded}` : String(Math.abs(rounded))
}

/** Minutes as hours and minutes: "4 h 30 min", "3 h", "40 min". */
export function hoursWords(minutes: number): string {
	const hours = Math.floor(minutes / 60)
	const rest = minutes % 60
	if (hours === 0) return `${rest} min`
	return rest === 0 ? `${hours} h` : `${hours} h ${rest} min`
}

/** What is still missing, as one sentence: "1 h 40 min more at −12 °C (10 °F) or colder." Empty when nothing is. */
export function missingWords(verdict: Pick<FreezeVerdict, "row" | "missingMinutes">): string {
	if (verdict.missingMinutes === 0) return ""
	return `${hoursWords(verdict.missingMinutes)} more at ${rowWords(verdict.row)} or colder, in one unbroken stretch.`
}
