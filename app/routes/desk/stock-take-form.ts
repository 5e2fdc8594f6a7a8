import { z } from "zod"
import { type CountedPlace, countedPlaces } from "~/domain/stock/count-place"
import type { CountPlace, SheetLot } from "~/services/stock/find-count-sheet.server"

const NO_REF = "00000000-0000-0000-0000-000000000000"
const MOST_PIECES = 1_000_000
const MAX_REASON = 160
/** Rows for lots that lie there though the ledger has none of them there. */
export const OTHER_ROWS = 3

/** The place that an address names: `place=cold-room`, or `place=market` with `day`. Null where it names none. */
export function readCountPlace(params: URLSearchParams): CountPlace | null {
	const place = countedPlaces.find((one): one is CountedPlace => one === params.get("place"))
	if (!place) return null
	if (place !== "market") return { place, ref: NO_REF }
	const day = z.guid().safeParse(params.get("day"))
	return day.success ? { place, ref: day.data.toLowerCase() } : null
}

/** The search of an address that names the place. */
export function countPlaceSearch({ place, ref }: CountPlace): string {
	return `?${new URLSearchParams(place === "market" ? { place, day: ref } : { place })}`
}

/** Lots that were named by hand, without spaces, each once. */
export function readOtherCodes(form: FormData): string[] {
	const codes = Array.from({ length: OTHER_ROWS }, (_, row) => String(form.get(`other-code-${row}`) ?? "").trim())
	return [...new Set(codes.filter((code) => code !== "" && code.length <= 60))]
}

/** The lots that have a row in the form. */
export function readRowIds(form: FormData): string[] {
	return [...form.keys()].flatMap((name) => {
		const id = z.guid().safeParse(name.replace(/^count-/, ""))
		return name.startsWith("count-") && id.success ? [id.data.toLowerCase()] : []
	})
}

/**
 * A lot that was counted: by its row, or by a code written below. `compared` holds what was shown beside each other last:
 * the ledger, and the count it was compared with; null where nothing has been shown yet.
 */
type PostedCount = {
	lotId: string
	counted: number
	compared: { ledger: number; counted: number } | null
	reason: string
}

type PostedCounts = {
	values: Record<string, string>
	/** By field. */
	errors: Record<string, string>
	counts: PostedCount[]
}

type Read = { pieces: number } | { message: string } | null

/** Pieces as counted: null where the field is blank, a whole number from 0, or what is wrong with it. */
function readPieces(typed: string): Read {
	const text = typed.trim()
	if (text === "") return null
	if (/^\d{1,7}$/.test(text) && Number(text) <= MOST_PIECES) return { pieces: Number(text) }
	if (/^[-−–]\s*\d/.test(text)) return { message: "There cannot be less than none. Write 0 if there are none." }
	return { message: "Write whole pieces in figures, such as 24, or leave it blank if you did not count." }
}

/**
 * Reads a count of the lots of a sheet. A blank field is a lot that was not counted. Nothing is rounded or guessed; all
 * that was typed is in `values`.
 */
export function readCounts(form: FormData, lots: readonly SheetLot[]): PostedCounts {
	const posted: PostedCounts = { values: {}, errors: {}, counts: [] }
	const typedIn = (name: string) => {
		const typed = String(form.get(name) ?? "").slice(0, 200)
		posted.values[name] = typed
		return typed
	}
	for (const { lotId } of lots) {
		const read = readPieces(typedIn(`count-${lotId}`))
		const [, ledger, counted] = /^(\d{1,9}) (\d{1,9})$/.exec(String(form.get(`compared-${lotId}`) ?? "")) ?? []
		const compared = ledger && counted ? { ledger: Number(ledger), counted: Number(counted) } : null
		const reason = typedIn(`reason-${lotId}`).trim()
		if (reason.length > MAX_REASON) posted.errors[`reason-${lotId}`] = `Shorten the reason to ${MAX_REASON} characters.`
		if (read && "message" in read) posted.errors[`count-${lotId}`] = read.message
		if (read && "pieces" in read) posted.counts.push({ lotId, counted: read.pieces, compared, reason })
	}
	readOthers(typedIn, lots, posted)
	if (posted.counts.length === 0 && Object.keys(posted.errors).length === 0)
		posted.errors[""] = "Write the pieces of at least one lot. Nothing was compared."
	return posted
}

/** The rows for other lots: a code and pieces each. */
function readOthers(typedIn: (name: string) => string, lots: readonly SheetLot[], posted: PostedCounts): void {
	for (let row = 0; row < OTHER_ROWS; row += 1) {
		const code = typedIn(`other-code-${row}`).trim()
		const read = readPieces(typedIn(`other-count-${row}`))
		if (code === "" && read === null) continue
		const lot = lots.find((one) => one.code === code)
		if (!lot)
			posted.errors[`other-code-${row}`] = code === "" ? "Write the code of the lot." : `There is no lot ${code}.`
		else if (read === null) posted.errors[`other-count-${row}`] = `Write how many pieces of lot ${code} are there.`
		else if ("message" in read) posted.errors[`other-count-${row}`] = read.message
		else if (posted.counts.some(({ lotId }) => lotId === lot.lotId))
			posted.errors[`other-code-${row}`] = `Lot ${code} is counted above already. Write all its pieces there.`
		else posted.counts.push({ lotId: lot.lotId, counted: read.pieces, compared: null, reason: "" })
	}
}
