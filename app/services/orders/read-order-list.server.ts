import Papa from "papaparse"

/** A list of some thousand rows; a sheet has two hundred. */
const MOST_BYTES = 200_000

/**
 * The cells of an uploaded list in CSV, its separator found out: text in UTF-8, or else as older spreadsheets write it.
 * Refused when it is empty or above 200 kB; a file that is no text comes back as cells that match nothing.
 */
export async function readOrderList(
	file: File,
): Promise<{ ok: true; cells: string[][] } | { ok: false; reason: "empty" | "too-large" }> {
	if (file.size > MOST_BYTES) return { ok: false, reason: "too-large" }
	const bytes = await file.arrayBuffer()
	const text = textOf(bytes).replaceAll("\u0000", "")
	const { data } = Papa.parse<string[]>(text, { skipEmptyLines: false, delimiter: separatorOf(text) })
	const cells = data.map((row) => row.slice(0, 50).map((cell) => cell.slice(0, 200)))
	return cells.some((row) => row.some((cell) => cell.trim() !== ""))
		? { ok: true, cells }
		: { ok: false, reason: "empty" }
}

/** The separator that the first line with anything on it has most of; a comma where it has none. */
function separatorOf(text: string): string {
	const line = text.split(/\r?\n|\r/).find((one) => one.trim() !== "") ?? ""
	const counts = [",", ";", "\t"].map((separator) => ({ separator, count: line.split(separator).length }))
	return counts.toSorted((a, b) => b.count - a.count)[0]?.separator ?? ","
}

function textOf(bytes: ArrayBuffer): string {
	try {
		return new TextDecoder("utf-8", { fatal: true }).decode(bytes)
	} catch {
		return new TextDecoder("windows-1252").decode(bytes)
	}
}
