import { now as askClock } from "~/platform/clock.server"
import { streamUpload, UploadCut } from "~/platform/upload-stream.server"
import { readLoggerFile } from "~/services/cold-room/read-logger-file.server"
import { refusalWords } from "~/ui/cold-room/logger-words"
import type { DeskScope } from "../guard.server"
import { loadNumber, loggerForm } from "./cold-room-form"

const MOST_BYTES = 200 * 1024 * 1024

export type TakenFile =
	| { ok: true; href: string }
	| { ok: false; status: number; errors: { field?: string; message: string }[]; typed: Record<string, string> }

/** Reads a posted logger file as it comes in, judges it, and answers where its findings stand or what is wrong with it. */
export async function takeLoggerFile(request: Request, scope: DeskScope, load: string): Promise<TakenFile> {
	const { producer, person } = scope
	const number = loadNumber(load)
	const refuse = (
		status: number,
		typed: Record<string, string>,
		...errors: { field?: string; message: string }[]
	): TakenFile => ({
		ok: false,
		status,
		errors,
		typed,
	})
	if (number === null) return refuse(404, {}, { message: "There is no such load." })
	try {
		const upload = await streamUpload(request, { mostBytes: MOST_BYTES })
		if (!upload || upload.fileName === "")
			return refuse(400, {}, { field: "file", message: "Choose the logger's file." })
		const parsed = loggerForm.safeParse(upload.fields)
		if (!parsed.success)
			return refuse(
				400,
				upload.fields,
				...parsed.error.issues.map(({ path, message }) => ({ field: String(path[0]), message })),
			)
		const read = await readLoggerFile({
			producerId: producer.id,
			personId: person.id,
			zone: producer.timeZone,
			number,
			...parsed.data,
			fileName: upload.fileName,
			content: upload.content,
			now: askClock(),
		})
		if (read.ok) return { ok: true, href: `/desk/${producer.slug}/cold-room/${number}?read=${parsed.data.proofId}` }
		if (read.reason === "no-such-load") return refuse(404, {}, { message: "There is no such load." })
		return refuse(422, upload.fields, refusalWords(read))
	} catch (error) {
		if (!(error instanceof UploadCut)) throw error
		const isLarge = error.reason === "too-large"
		return refuse(
			isLarge ? 413 : 400,
			{},
			{
				field: "file",
				message: isLarge
					? "The file is larger than 200 MB. Export fewer days and choose that file."
					: "The file did not arrive whole. Nothing was changed; choose it again.",
			},
		)
	}
}
