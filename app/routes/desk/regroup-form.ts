import { z } from "zod"
import { readLotCode } from "~/domain/lots/lot-code"

type Typed = { key?: string; [name: string]: string | undefined }
type FieldError = { field?: string; message: string }

export type RegroupAsk =
	| { way: "split"; pieces: number }
	| { way: "merge"; withCodes: string[] }
	| { way: "cut-up"; pieces: number; gramsIn: number | null; intoProductId: string; piecesMade: number }

/** What a form of the regroup page asks for, or what is wrong with it. */
export type ReadRegroup =
	| { ok: true; typed: Typed; newCode: string | null; ask: RegroupAsk }
	| { ok: false; typed: Typed; errors: FieldError[] }

/** Reads the form; `code` is the lot that the page is about. */
export function readRegroup(form: FormData, code: string): ReadRegroup {
	const typed: Typed = {}
	for (const [name, value] of form) if (typeof value === "string") typed[name] = value
	const errors: FieldError[] = []
	const wholeIn = (field: string, message: string) => {
		const text = (typed[field] ?? "").trim()
		if (/^[1-9]\d{0,5}$/.test(text)) return Number(text)
		errors.push({ field, message })
		return 0
	}
	const asked = askIn(form, { typed, code, errors, wholeIn })
	const newCode = codeIn(typed.code ?? "", errors)
	return errors.length > 0 || !asked ? { ok: false, typed, errors } : { ok: true, typed, newCode, ask: asked }
}

type Reading = {
	typed: Typed
	code: string
	errors: FieldError[]
	wholeIn: (field: string, message: string) => number
}

function askIn(form: FormData, { typed, code, errors, wholeIn }: Reading): RegroupAsk | null {
	const way = form.get("way")
	if (way === "merge") {
		const withCodes = form
			.getAll("with")
			.map(String)
			.filter((one) => one !== code)
		if (withCodes.length === 0) errors.push({ field: "with", message: "Choose at least one other lot to merge with." })
		if (withCodes.length > 40) errors.push({ field: "with", message: "Merge at most 40 lots at once." })
		return { way, withCodes }
	}
	const pieces = wholeIn("pieces", "Write how many pieces, in figures.")
	if (way === "split") return { way, pieces }
	if (way !== "cut-up") {
		errors.push({ message: "Choose what to do with the lot." })
		return null
	}
	const piecesMade = wholeIn("made", "Write how many pieces were made, in figures.")
	const gramsIn = typed.grams?.trim() ? wholeIn("grams", "Write the weight in whole grams, or leave it empty.") : null
	const into = z.guid().safeParse(typed.into)
	if (!into.success) errors.push({ field: "into", message: "Choose what it was cut into." })
	return { way, pieces, gramsIn, piecesMade, intoProductId: into.data ?? "" }
}

function codeIn(text: string, errors: FieldError[]): string | null {
	if (text.trim() === "") return null
	const read = readLotCode(text)
	if (read.ok) return read.code
	errors.push({ field: "code", message: read.message })
	return null
}
