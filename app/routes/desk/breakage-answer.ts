import { formatMoney } from "~/domain/money"
import type { AnswerRefusal } from "~/services/breakage/answer-report.server"
import type { BreakageReport } from "~/services/breakage/find-report.server"

export type AnswerErrors = { field?: string; message: string }[]

/** What the desk's form says: pieces by line of the report, the sentence, and what cannot be read of it. */
export type ReadAnswer = {
	typed: Record<string, string>
	accepted: Map<string, number>
	answer: string
	errors: AnswerErrors
}

/** Reads a posted answer. Declining accepts nothing, whatever is written in the fields. */
export function readAnswer(form: FormData, lines: BreakageReport["lines"]): ReadAnswer {
	const isDeclined = form.get("intent") === "decline"
	const answer = String(form.get("answer") ?? "").slice(0, 1000)
	const read: ReadAnswer = { typed: { answer }, accepted: new Map(), answer: answer.trim(), errors: [] }
	for (const line of lines) {
		const field = `accepted-${line.id}`
		const text = String(form.get(field) ?? "").slice(0, 20)
		read.typed[field] = text
		if (isDeclined) continue
		const pieces = /^\d{1,5}$/.test(text.trim()) ? Number(text) : null
		if (pieces === null) read.errors.push({ field, message: "Write whole pieces in figures; 0 credits none of it." })
		else if (pieces > line.pieces) read.errors.push({ field, message: `Only ${line.pieces} were reported.` })
		else read.accepted.set(line.id, pieces)
	}
	const isNone = !isDeclined && read.errors.length === 0 && [...read.accepted.values()].every((pieces) => pieces === 0)
	if (isNone) read.errors.push({ message: "Nothing would be credited. Write pieces, or say why nothing is credited." })
	if (isDeclined && read.answer === "") read.errors.push({ field: "answer", message: NO_SENTENCE })
	return read
}

const NO_SENTENCE = "Write a sentence to the store: not all of it is credited."

/** Why an answer was refused, in words. */
export function answerRefusal(refusal: AnswerRefusal, report: BreakageReport): AnswerErrors {
	switch (refusal.reason) {
		case "no-sentence":
			return [{ field: "answer", message: NO_SENTENCE }]
		case "too-many-pieces":
			return refusal.lineIds.map((id) => ({ field: `accepted-${id}`, message: "More than were reported." }))
		case "line-exceeded":
			return refusal.lines.map(({ lineId, leftPieces }) => ({
				field: `accepted-${report.lines.find((line) => line.invoiceLineId === lineId)?.id}`,
				message: `Of this line only ${leftPieces} are not credited yet.`,
			}))
		case "invoice-exceeded":
			return [
				{
					message: `It comes to ${formatMoney(refusal.askedCents)}, and only ${formatMoney(refusal.leftCents)} of the invoice is not credited yet. Credit fewer pieces.`,
				},
			]
		case "nothing-to-credit":
			return [{ message: "Nothing of these lines is left to credit. Say why nothing is credited." }]
		case "answered-already":
			return [{ message: `${refusal.by ?? "Someone"} has answered this report already. Nothing was changed.` }]
		case "books-closed":
			return [{ message: "The books of today are closed. Nothing was credited." }]
		case "no-such-report":
			return [{ message: "There is no such report." }]
	}
}
