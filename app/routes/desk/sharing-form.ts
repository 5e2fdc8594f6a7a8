import { z } from "zod"
import { casesWords, parseCases } from "~/domain/quantity"
import type { RefusedByHand } from "~/services/sharing/plan-given"
import { handName } from "~/ui/sharing/hand-fields"
import { SHARING_RULES } from "~/ui/sharing/told-rules"
import { weightName } from "~/ui/sharing/weights-form"

const MAX_NOTE = 300

const decision = z.object({
	seen: z.string().min(1).max(100),
	rule: z.enum(SHARING_RULES),
	idempotencyKey: z.uuid(),
})

/** What was posted to share a product out, and what it means; `errors` by field name. */
export type PostedSharing = {
	values: Record<string, string>
	errors: Record<string, string>
	/** Null where a hidden field of the form is not as the page wrote it. */
	decision: z.infer<typeof decision> | null
	byHand: Map<string, number>
	instead: Map<string, string>
	note: string
}

/** Reads the sharing form. Fields by hand that are empty leave it to the rule; nothing is rounded or guessed. */
export function readSharingForm(form: FormData): PostedSharing {
	const values: Record<string, string> = {}
	const errors: Record<string, string> = {}
	const byHand = new Map<string, number>()
	const instead = new Map<string, string>()
	for (const [name, posted] of form) {
		const typed = String(posted).slice(0, 400)
		const [kind, id] = [name.slice(0, name.indexOf("-")), name.slice(name.indexOf("-") + 1)]
		if (kind !== "given" && kind !== "instead") continue
		values[name] = typed
		if (kind === "instead" && z.uuid().safeParse(typed).success) instead.set(id, typed)
		if (kind !== "given" || typed.trim() === "") continue
		const read = parseCases(typed)
		if (read.ok) byHand.set(id, read.cases)
		else errors[name] = read.message
	}
	const note = String(form.get("note") ?? "")
	values.note = note
	values.rule = String(form.get("rule") ?? "")
	if (note.trim().length > MAX_NOTE) errors.note = `Shorten the reason to ${MAX_NOTE} characters.`
	const parsed = decision.safeParse(
		Object.fromEntries(["seen", "rule", "idempotencyKey"].map((name) => [name, form.get(name)])),
	)
	return { values, errors, decision: parsed.success ? parsed.data : null, byHand, instead, note: note.trim() }
}

/** What is wrong with figures set by hand, by field name. */
export function handProblems(refused: readonly RefusedByHand[]): Record<string, string> {
	return Object.fromEntries(refused.map((one) => [handName(one.lineId), handProblem(one)]))
}

function handProblem({ reason, bound }: RefusedByHand): string {
	if (reason === "more-than-asked") return `That is more than was asked for: ${casesWords(bound)}.`
	if (reason === "sure-already") return `${casesWords(bound)} ${bound === 1 ? "is" : "are"} promised to it already.`
	return `It takes ${bound} or more. Write why, or give it none.`
}

/** What was posted of how much stores count: whole numbers from 10 to 1000, for these stores. */
export function readWeights(form: FormData, storeIds: readonly string[]) {
	const values: Record<string, string> = {}
	const errors: Record<string, string> = {}
	const weights = storeIds.flatMap((storeId) => {
		const name = weightName(storeId)
		const typed = String(form.get(name) ?? "").slice(0, 40)
		values[name] = typed
		const percent = /^\s*\d{1,4}\s*$/.test(typed) ? Number(typed) : Number.NaN
		if (percent >= 10 && percent <= 1000) return [{ storeId, percent }]
		errors[name] = "Write a whole number from 10 to 1000."
		return []
	})
	return { values, errors, weights }
}
