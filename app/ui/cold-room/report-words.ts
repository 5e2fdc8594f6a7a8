import { degrees, hoursWords, limitOf, meetsPlainAdvice, rowNamed, rowWords } from "~/domain/cold-room/freezing"
import type { LoggerReport } from "~/domain/cold-room/logger-report"

export type ProofFacts = {
	isAccepted: boolean
	rowTenthsC: number | null
	requiredMinutes: number | null
	heldMinutes: number
	allowanceMinutes: number
}

/** What a reading decided, in one or two sentences. */
export function verdictWords(proof: ProofFacts): string {
	const row = rowNamed(proof.rowTenthsC)
	const required = proof.requiredMinutes ?? row?.minutes ?? 0
	const at = row ? rowWords(row) : `${degrees((proof.rowTenthsC ?? 0) / 10)} °C`
	const taken =
		proof.allowanceMinutes > 0
			? ` after the first ${hoursWords(proof.allowanceMinutes)}, in which the comb follows the air`
			: ""
	const held = `${hoursWords(proof.heldMinutes)} at ${at} or colder${taken}; the table asks ${hoursWords(required)}.`
	return proof.isAccepted ? `Proven: ${held}` : `Not proven yet: ${held}`
}

/** What is still missing at the row that came nearest; `runMinutes` is the run as the probe showed it. */
export function stillMissing(proof: ProofFacts, runMinutes: number): string {
	const row = rowNamed(proof.rowTenthsC)
	const missing = (proof.requiredMinutes ?? 0) + proof.allowanceMinutes - runMinutes
	if (proof.isAccepted || !row || missing <= 0) return ""
	return `${hoursWords(missing)} more at ${rowWords(row)} or colder, in one unbroken stretch.`
}

/** Everything that a logger file had to report, one sentence each. `when` says a moment in words. */
export function reportWords(report: LoggerReport, when: (at: number) => string): string[] {
	const { gaps, clockSteps } = report
	const order = { "year-first": "the year first", "month-first": "the month first", "day-first": "the day first" }
	return [
		`${report.readings.toLocaleString("en-US")} readings in °${report.unit}, usually ${everyWords(report.everySeconds)} apart, from ${when(report.span.from)} to ${when(report.span.to)}. Days were read with ${order[report.dates]}${report.hasZone ? ", times with their zone" : ", times as your clock shows them"}.`,
		report.otherColumns.length > 0
			? `The column “${report.column}” was read; ${report.otherColumns.map((name) => `“${name}”`).join(", ")} was not.`
			: "",
		report.everySeconds > 3600
			? "Readings more than an hour apart prove nothing: set the logger to one an hour at least."
			: "",
		report.outside > 0
			? `${report.outside.toLocaleString("en-US")} readings from before the loading do not count.`
			: "",
		gaps.count > 0
			? `${gaps.count === 1 ? "One gap breaks" : `${gaps.count.toLocaleString("en-US")} gaps break`} the stretch, the longest of ${hoursWords(gaps.longestMinutes)}; the first from ${when(gaps.first[0]?.from ?? 0)} to ${when(gaps.first[0]?.to ?? 0)}.`
			: "No gaps.",
		...clockSteps.map(
			({ at, minutes }) =>
				`The clock was put ${minutes < 0 ? "back" : "forward"} by ${hoursWords(Math.abs(minutes))} at ${when(at)}; this hour does not count.`,
		),
		report.repeated > 0
			? `${report.repeated.toLocaleString("en-US")} readings repeat the time of the one before; the warmer one counts.`
			: "",
		report.isBackwards ? "The file gives the latest reading first, and was read so." : "",
		report.skipped > 0 ? `${report.skipped.toLocaleString("en-US")} lines held no reading and were passed over.` : "",
		plainWords(report.minutesAtZero),
	].filter((words) => words !== "")
}

const everyWords = (seconds: number) =>
	seconds < 60
		? `${Math.round(seconds)} s`
		: seconds < 3600
			? `${Math.round(seconds / 60)} min`
			: hoursWords(Math.round(seconds / 60))

function plainWords(minutesAtZero: number): string {
	const advice = "The table's source also advises 0 °C or colder for more than 24 h; here the table decides."
	return meetsPlainAdvice(minutesAtZero)
		? `It stayed at 0 °C or colder for ${hoursWords(minutesAtZero)}. ${advice}`
		: `At 0 °C or colder for ${hoursWords(minutesAtZero)} at most.`
}

/** The freezing table in one sentence. */
export function tableWords(rows: readonly Parameters<typeof rowWords>[0][]): string {
	return `Comb must stay ${rows.map((row) => `${hoursWords(row.minutes)} at ${degrees(limitOf(row, "C"))} °C (${degrees(limitOf(row, "F"))} °F)`).join(", or ")}, or colder, counted from when the comb itself has got there (Charrière & Imdorf 1999, in the COLOSS BEEBOOK).`
}
