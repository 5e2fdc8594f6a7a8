import type { Result } from "../result"
import { asNumber, plainDecimal } from "./fraction"
import { parseWeight, type WeightUnit, weightIn } from "./weight-units"

export type WeightsRefusal =
	| { ok: false; reason: "empty" | "comma-in-doubt" | "too-many" }
	| { ok: false; reason: "not-a-weight"; cells: string[] }
	| { ok: false; reason: "several-columns"; columns: number }

const MOST_WEIGHTS = 1000
/** Weights of the packages of one lot lie closer together than this; what does not is no list of weights. */
const CLOSE = 2

/**
 * Reads weights as typed, pasted or sent as a file: one on a line, or apart by spaces, tabs, semicolons or commas; with a
 * point or a comma before the decimals; with or without a unit; a heading and a column of running numbers are passed
 * over. Answers decimal text in `unit`. Refused, and never guessed, when a comma may be either, when several columns could
 * be the weights, or when a cell is no weight.
 */
export function parseWeights(text: string, unit: WeightUnit): Result<{ weights: string[] }, WeightsRefusal> {
	const lines = text
		.replace(/^\uFEFF/, "")
		.replace(/\u00A0/g, " ")
		.split(/\r\n|\n|\r/)
		.map((line) => line.trim())
		.filter((line) => line !== "")
	if (lines.length === 0) return { ok: false, reason: "empty" }
	const rows = splitRows(lines, unit)
	if (rows === null) return { ok: false, reason: "comma-in-doubt" }
	const chosen = chooseCells(rows, unit)
	if (!chosen.ok) return chosen
	if (chosen.cells.length === 0) return { ok: false, reason: "empty" }
	if (chosen.cells.length > MOST_WEIGHTS) return { ok: false, reason: "too-many" }
	const wrong: string[] = []
	const weights = chosen.cells.map((cell) => {
		const read = parseWeight(cell, unit)
		if (!read.ok) wrong.push(cell)
		return read.ok ? plainDecimal(weightIn(read.weight, unit)) : ""
	})
	return wrong.length > 0 ? { ok: false, reason: "not-a-weight", cells: wrong } : { ok: true, weights }
}

const tidy = (cells: string[]) =>
	cells.map((cell) =>
		cell
			.trim()
			.replace(/^"(.*)"$/, "$1")
			.trim(),
	)

/** A weight with its unit, as far as it can be told from blanks: "12", "1.5 lb", "1 lb 2 oz", "12 1/2 oz". */
const SPACED =
	/\d+\s+\d+\/\d+\s*[a-z]*|[^\s]+\s*lbs?\.?\s+[^\s]+\s*oz\.?|[^\s]*\d[^\s]*(?:\s+(?:kg|g|oz|lbs?)\b\.?)?|[^\s]+/gi

/** Lines as cells; null when a comma may stand between two weights or before decimals. */
function splitRows(lines: readonly string[], unit: WeightUnit): string[][] | null {
	const by = (mark: string | RegExp) => lines.map((line) => tidy(line.split(mark)).filter((cell) => cell !== ""))
	if (lines.some((line) => line.includes(";"))) return by(";")
	if (lines.some((line) => line.includes("\t"))) return by("\t")
	const bySpace = () => lines.map((line) => line.match(SPACED) ?? [])
	if (!lines.some((line) => line.includes(","))) return lines.some(hasLetters) ? headed(lines, bySpace()) : bySpace()
	if (lines.some((line) => /,\s/.test(line) || /,[^,\s]*,/.test(line) || /\.\d/.test(line))) return by(",")
	return commaBetweenDigits(lines, bySpace(), by(","), unit)
}

const hasLetters = (line: string) => /[a-z]/i.test(line)

/** A first line of words alone is a heading, however many words it has. */
function headed(lines: readonly string[], rows: string[][]): string[][] {
	return /\d/.test(lines[0] ?? "") ? rows : [[lines[0] ?? ""], ...rows.slice(1)]
}

/** One comma to a cell and no other sign of what it is: the two readings are tried, and one must make no sense. */
function commaBetweenDigits(lines: readonly string[], asDecimals: string[][], asList: string[][], unit: WeightUnit) {
	const isNumbered = lines.length > 1 && asList.every((row, place) => row.length === 2 && row[0] === `${place + 1}`)
	if (isNumbered) return asList
	const isHeaded = lines.length > 1 && hasLetters(lines[0] ?? "") && (lines[0] ?? "").includes(",")
	if (isHeaded) return asList
	const couldBeList = areClose(asList.flat(), unit)
	const couldBeDecimals = areClose(asDecimals.flat(), unit)
	if (couldBeList && couldBeDecimals) return looksLikeThousandths(asDecimals) ? asList : null
	return couldBeList ? asList : asDecimals
}

/** "368,365": three figures on both sides are two weights in grams, as no scale for packages shows so many decimals. */
const looksLikeThousandths = (rows: string[][]) => rows.flat().every((cell) => /^[1-9]\d\d,\d{3}$/.test(cell))

function areClose(cells: readonly string[], unit: WeightUnit): boolean {
	const read = cells.map((cell) => parseWeight(cell, unit)).map((each) => (each.ok ? asNumber(each.weight.amount) : 0))
	return Math.min(...read) > 0 && Math.max(...read) <= CLOSE * Math.min(...read)
}

const GROSS = /gross|full|weight|weigh|brutto|reading/i

type Chosen = Result<{ cells: string[] }, WeightsRefusal>

/** The cells that are weights: all of them, or one column of a table. */
function chooseCells(rows: string[][], unit: WeightUnit): Chosen {
	const isWeight = (cell: string) => parseWeight(cell, unit).ok
	const isHeading = rows[0]?.every((cell) => !isWeight(cell) && !/\d/.test(cell)) === true
	const body = isHeading ? rows.slice(1) : rows
	const widths = new Set(body.map((row) => row.length))
	const width = body[0]?.length ?? 0
	if (widths.size > 1 || width < 2 || body.length < 2) return { ok: true, cells: body.flat() }
	const columns = Array.from({ length: width }, (_, column) => body.map((row) => row[column] ?? ""))
	const named = isHeading ? (rows[0] ?? []).flatMap((head, column) => (GROSS.test(head) ? [column] : [])) : []
	if (named.length === 1) return { ok: true, cells: columns[named[0] ?? 0] ?? [] }
	const kept = columns.filter(
		(cells) => cells.every(isWeight) && !cells.every((cell, place) => cell === `${place + 1}`),
	)
	if (kept.length === 1 || areClose(kept.flat(), unit)) {
		return { ok: true, cells: kept.length === 1 ? (kept[0] ?? []) : acrossRows(body, columns, kept) }
	}
	return kept.length === 0
		? { ok: true, cells: body.flat() }
		: { ok: false, reason: "several-columns", columns: kept.length }
}

/** Several columns of weights are read line by line, as they stand on paper. */
function acrossRows(body: string[][], columns: string[][], kept: string[][]): string[] {
	return body.flatMap((row) => row.filter((_, column) => kept.includes(columns[column] ?? [])))
}
