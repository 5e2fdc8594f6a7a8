import { z } from "zod"
import { type Day, dayInZone } from "~/domain/calendar"
import { readDay } from "~/domain/pricing/read-figures"
import { CERTIFICATE_BYTES } from "~/domain/receivables/certificate"
import { now } from "~/platform/clock.server"
import { streamUpload, UploadCut } from "~/platform/upload-stream.server"
import { handInCertificate } from "~/services/certificates/hand-in-certificate.server"
import type { StoreScope } from "../guard.server"

type Fault = { field?: string; message: string }
export type HandedIn = { ok: true } | { ok: false; status: number; errors: Fault[]; typed: Record<string, string> }

const form = z.object({
	certificateId: z.guid(),
	number: z.string().trim().min(1, "Write the certificate’s number.").max(80, "Shorten the number to 80 characters."),
	validUntil: z
		.string()
		.default("")
		.transform((text, context): Day => {
			const day = readDay(text)
			if (day) return day
			context.addIssue({ code: "custom", message: "Write the last day it is good, such as 2027-06-30." })
			return z.NEVER
		}),
})

const FAULTS = {
	expired: { field: "validUntil", message: "This certificate has run out already. Hand in one that is still good." },
	empty: { field: "file", message: "Choose the file of the certificate." },
	"too-large": { field: "file", message: "The file is larger than 10 MB. Take a smaller photo, or a PDF." },
	"other-type": { field: "file", message: "The file is no PDF, JPEG, PNG or WebP, whatever its name says." },
} as const

/** Reads a posted certificate as it comes in and keeps it, or says what is wrong; what was typed is kept. */
export async function takeCertificate(request: Request, scope: StoreScope): Promise<HandedIn> {
	const { producer, store, person } = scope
	let typed: Record<string, string> = {}
	const refuse = (status: number, ...errors: Fault[]): HandedIn => ({ ok: false, status, errors, typed })
	try {
		const upload = await streamUpload(request, { mostBytes: CERTIFICATE_BYTES })
		if (!upload) return refuse(400, { field: "file", message: "Choose the file of the certificate." })
		typed = upload.fields
		const parsed = form.safeParse(typed)
		if (!parsed.success) {
			const errors = parsed.error.issues.map(({ path, message }) => ({ field: String(path[0]), message }))
			if (errors.some(({ field }) => field === "certificateId")) throw new Response(null, { status: 400 })
			return refuse(422, ...errors)
		}
		const pieces: Uint8Array[] = []
		for await (const piece of upload.content) pieces.push(Uint8Array.from(piece))
		const kept = await handInCertificate({
			producerId: producer.id,
			storeId: store.id,
			personId: person.id,
			...parsed.data,
			fileName: upload.fileName.slice(0, 200),
			content: Buffer.concat(pieces),
			today: dayInZone(now(), producer.timeZone),
		})
		return kept.ok ? { ok: true } : refuse(kept.reason === "too-large" ? 413 : 422, FAULTS[kept.reason])
	} catch (error) {
		if (!(error instanceof UploadCut)) throw error
		if (error.reason === "too-large") return refuse(413, FAULTS["too-large"])
		return refuse(400, { field: "file", message: "The file did not arrive whole. Send it again." })
	}
}
