import { MOST_PHOTOS } from "~/domain/credits/breakage-window"
import { piecesWords } from "~/domain/quantity"
import type { BreakableLine } from "~/services/breakage/find-breakage-form.server"
import type { RefusedLine, ReportedLine } from "~/services/breakage/report-breakage.server"
import { type KeptPhoto, PHOTO_BYTES, reencodePhoto } from "~/services/uploads/reencode-photo.server"
import type { TypedReport } from "~/ui/breakage/report-form"
import { PHOTO_WORDS } from "~/ui/crop/check-words"

export type FormErrors = { field?: string; message: string }[]

/** A posted report as it was typed, the lines that can be taken, and what is wrong with the others. */
export type ReadReport = { typed: TypedReport; lines: ReportedLine[]; errors: FormErrors }

/**
 * Reads a posted report against the lines of its invoice. Photos are drawn anew here; those of a form that is refused come
 * back inside it, as a page cannot keep a chosen file, and are drawn anew once more when they return.
 */
export async function readReport(form: FormData, lines: readonly BreakableLine[]): Promise<ReadReport> {
	const text = (name: string, most: number) => String(form.get(name) ?? "").slice(0, most)
	const typed: TypedReport = { reportId: text("reportId", 36), fields: { note: text("note", 1000) }, kept: {} }
	const errors: FormErrors = []
	const reported: ReportedLine[] = []
	for (const { id } of lines) {
		const piecesText = text(`pieces-${id}`, 20)
		const note = text(`note-${id}`, 500).trim()
		Object.assign(typed.fields, { [`pieces-${id}`]: piecesText, [`note-${id}`]: note })
		const { photos, problem } = await readPhotos(form, id)
		typed.kept[id] = photos.map(({ content }) => content.toString("base64"))
		if (problem) errors.push({ field: `photos-${id}`, message: problem })
		const pieces = readPieces(piecesText)
		if (pieces === null) {
			errors.push({ field: `pieces-${id}`, message: "Write whole pieces in figures, such as 3." })
		} else if (pieces > 0) {
			reported.push({ invoiceLineId: id, pieces, note, photos })
		} else if (note !== "" || photos.length > 0) {
			errors.push({
				field: `pieces-${id}`,
				message: "Write how many pieces are broken, or leave the note and the photos out.",
			})
		}
	}
	return { typed, lines: reported, errors }
}

/** Whole pieces as typed; nothing typed is 0, and null is what cannot be read. */
function readPieces(text: string): number | null {
	const typed = text.trim()
	if (typed === "") return 0
	return /^\d{1,5}$/.test(typed) ? Number(typed) : null
}

async function readPhotos(form: FormData, lineId: string): Promise<{ photos: KeptPhoto[]; problem: string | null }> {
	const chosen = form.getAll(`photos-${lineId}`).filter((file): file is File => file instanceof File && file.size > 0)
	const kept = form.getAll(`kept-${lineId}`).filter((photo): photo is string => typeof photo === "string")
	const photos: KeptPhoto[] = []
	for (const photo of kept.slice(0, MOST_PHOTOS)) {
		const read = await reencodePhoto(Buffer.from(photo, "base64"))
		if (read.ok) photos.push(read.photo)
	}
	const problems: string[] = []
	if (photos.length + chosen.length > MOST_PHOTOS)
		problems.push(
			`A line takes ${MOST_PHOTOS} photos. The first ${MOST_PHOTOS} are kept; leave out what should not go.`,
		)
	for (const file of chosen.slice(0, MOST_PHOTOS - photos.length)) {
		const read = await readFile(file)
		if (read.ok) photos.push(read.photo)
		else problems.push(`${file.name.slice(0, 60)}: ${PHOTO_WORDS[read.reason]}`)
	}
	return { photos, problem: problems.length > 0 ? problems.join(" ") : null }
}

/** A file over the limit is not even read. */
async function readFile(file: File) {
	if (file.size > PHOTO_BYTES) return { ok: false, reason: "photo-too-heavy" } as const
	return reencodePhoto(new Uint8Array(await file.arrayBuffer()))
}

/** Why a line was refused, for the side of its field. */
export function refusedWords(refused: RefusedLine): string {
	if (refused.reason === "no-such-line") return "This line is not on the invoice."
	if (refused.reason === "too-late") return "It is too late to report this line here."
	const { leftPieces, sentPieces } = refused
	if (leftPieces === sentPieces) return `Only ${piecesWords(sentPieces)} were sent.`
	return leftPieces === 0
		? `All ${piecesWords(sentPieces)} that were sent are reported or credited already.`
		: `${piecesWords(sentPieces)} were sent, and ${sentPieces - leftPieces} of them are reported or credited already.`
}
