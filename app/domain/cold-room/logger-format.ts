import type { TemperatureUnit } from "./freezing"
import { LoggerTime } from "./logger-time"

export type Delimiter = "," | ";" | "\t"

/** Where the figures of a logger file stand; columns count from 0. */
export type LoggerFormat = {
	delimiter: Delimiter
	timeColumn: number
	/** The time of day where it has a column of its own; -1 when it stands with the date. */
	clockColumn: number
	temperatureColumn: number
	/** The head of the column that is read; empty in a file without heads. */
	temperatureHead: string
	/** Heads of further temperatures, which are not read. */
	otherTemperatures: string[]
	/** As the heads or the lines above them say; null when they do not. */
	unit: TemperatureUnit | null
	hasZone: boolean
}

const DELIMITERS: readonly Delimiter[] = [";", "\t", ","]
const IS_TEMPERATURE = /temp|celsius|fahrenheit|[°º˚\uFFFD]\s*[cf]\b|\(\s*[cf]\s*\)|probe|channel|\bch\s?\d/i
const IS_NO_TEMPERATURE = /humid|\brh\b|%|dew|volt|batter/i
const IS_FIGURE = /^[+−-]?\d+(?:[.,]\d+)?\s*(?:[°º˚\uFFFD]?\s*[CFcf])?$/

/** Splits one line into its cells; quotes around a cell are taken off. */
export function cellsOf(line: string, delimiter: Delimiter): string[] {
	const cells: string[] = []
	let cell = ""
	let isQuoted = false
	for (const letter of line) {
		if (letter === '"') isQuoted = !isQuoted
		else if (letter === delimiter && !isQuoted) {
			cells.push(cell.trim())
			cell = ""
		} else cell += letter
	}
	cells.push(cell.trim())
	return cells
}

/** The unit that a text names: "Temp (°F)", "degC", "Celsius"; null when it names none or both. */
export function unitNamed(text: string): TemperatureUnit | null {
	const isF = /fahrenheit|(?:[°º˚\uFFFD]|deg(?:rees)?)\s*F\b|(?:^|[(\s_[])F(?=$|[)\s_\]])/i.test(text)
	const isC = /celsius|(?:[°º˚\uFFFD]|deg(?:rees)?)\s*C\b|(?:^|[(\s_[])C(?=$|[)\s_\]])/i.test(text)
	return isF === isC ? null : isF ? "F" : "C"
}

/**
 * Finds the format from the first lines of a file: the separator that makes the most of them a time with a temperature,
 * their columns, and the heads above them. "none" when no line can be read so; "decimal-comma" when commas stand both
 * between the cells and in the figures, so that rows have more cells than there are heads.
 */
export function findFormat(lines: readonly string[]): LoggerFormat | "none" | "decimal-comma" {
	const found = DELIMITERS.map((delimiter) => readRows(lines, delimiter)).toSorted((a, b) => b.rows - a.rows)[0]
	if (!found?.first) return "none"
	const { first, delimiter } = found
	const above = lines.slice(0, first.line).map((line) => cellsOf(line, delimiter))
	const heads = above.findLast((cells) => cells.length > first.timeColumn && cells.some((cell) => cell !== "")) ?? []
	const temperatures = heads.flatMap((head, column) => (isTemperatureHead(head) && column > 0 ? [column] : []))
	const named = temperatures.filter((column) => column !== first.timeColumn && column !== first.clockColumn)
	const temperatureColumn = named.find((column) => IS_FIGURE.test(first.cells[column] ?? "")) ?? first.figureColumn
	if (temperatureColumn === -1) return "none"
	if (delimiter === "," && heads.length > 0 && heads.length < first.cells.length) return "decimal-comma"
	const temperatureHead = heads[temperatureColumn] ?? ""
	const unit = unitNamed(temperatureHead) ?? unitAbove(above.filter((cells) => cells !== heads))
	return {
		delimiter,
		timeColumn: first.timeColumn,
		clockColumn: first.clockColumn,
		temperatureColumn,
		temperatureHead,
		otherTemperatures: named.filter((column) => column !== temperatureColumn).map((column) => heads[column] ?? ""),
		unit,
		hasZone: first.hasZone,
	}
}

const isTemperatureHead = (head: string) => IS_TEMPERATURE.test(head) && !IS_NO_TEMPERATURE.test(head)

/** A line above the table that names the unit: "Temperature unit;°F". */
function unitAbove(above: readonly (readonly string[])[]): TemperatureUnit | null {
	const units = above
		.filter((cells) => /unit|temp/i.test(cells.join(" ")))
		.map((cells) => unitNamed(cells.join(" ")))
		.filter((unit) => unit !== null)
	return new Set(units).size === 1 ? (units[0] ?? null) : null
}

type FirstRow = {
	line: number
	cells: string[]
	timeColumn: number
	clockColumn: number
	/** The first figure after the time, or the last before it; -1 when there is none. */
	figureColumn: number
	hasZone: boolean
}

/** How many lines are rows when split so, and the first of them. */
function readRows(lines: readonly string[], delimiter: Delimiter) {
	const time = new LoggerTime()
	let rows = 0
	let first: FirstRow | null = null
	for (const [line, text] of lines.entries()) {
		const row = readRow(cellsOf(text, delimiter), time)
		if (!row) continue
		rows += 1
		first ??= { line, ...row }
	}
	return { delimiter, rows, first }
}

function readRow(cells: string[], time: LoggerTime): Omit<FirstRow, "line"> | null {
	const timeColumn = cells.findIndex((cell) => time.read(cell, 0, cell.length))
	if (timeColumn === -1) return null
	let clockColumn = -1
	if (!time.hasTime) {
		clockColumn = cells.findIndex((cell, column) => column > timeColumn && time.addTime(cell, 0, cell.length))
		if (clockColumn === -1) return null
	}
	const figures = cells.flatMap((cell, column) => (IS_FIGURE.test(cell) ? [column] : []))
	const last = Math.max(timeColumn, clockColumn)
	const figureColumn =
		figures.find((column) => column > last) ?? figures.findLast((column) => column < timeColumn) ?? -1
	if (figureColumn === -1) return null
	return { cells, timeColumn, clockColumn, figureColumn, hasZone: time.hasZone }
}
