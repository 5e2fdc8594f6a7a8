import { previewOf } from "~/domain/receivables/reminder-preview"
import {
	saveReminderStep,
	setFinanceCharge,
	switchReminders,
	takeFirstSteps,
} from "~/services/receivables/set-reminders.server"
import type { DeskScope } from "../guard.server"
import { financeForm, stepForm } from "./reminders-form"
import { faultsOf, typedFields } from "./store-form"

type Answer = {
	intent: string
	typed: Record<string, string>
	errors: { field?: string; message: string }[]
	preview: { subject: string; body: string } | null
}

/** Takes one of the forms of the reminders page: done, or what is to be shown again with all that was typed. */
export async function takeRemindersStep(
	form: FormData,
	{ producer, person }: DeskScope,
): Promise<{ ok: true } | { ok: false; status: number; answer: Answer }> {
	const typed = typedFields(form)
	const intent = typed.intent ?? ""
	const by = { producerId: producer.id, personId: person.id }
	const answer = (status: number, errors: Answer["errors"], preview: Answer["preview"] = null) => ({
		ok: false as const,
		status,
		answer: { intent, typed, errors, preview },
	})
	if (intent === "on" || intent === "off") {
		await switchReminders({ ...by, on: intent === "on" })
		return { ok: true }
	}
	if (intent === "first-steps") {
		await takeFirstSteps(by)
		return { ok: true }
	}
	if (intent === "finance") {
		const parsed = financeForm.safeParse(typed)
		if (!parsed.success) return answer(422, faultsOf(parsed.error))
		await setFinanceCharge({ ...by, basisPoints: parsed.data.rate, afterDays: parsed.data.afterDays })
		return { ok: true }
	}
	if (intent !== "save-step" && intent !== "look")
		return answer(400, [{ message: "Send one of the forms of this page." }])
	const parsed = stepForm.safeParse(typed)
	if (!parsed.success) return answer(422, faultsOf(parsed.error))
	if (intent === "look") return answer(200, [], previewOf(parsed.data.step, producer.name))
	const saved = await saveReminderStep({ ...by, ...parsed.data })
	if (saved.ok) return { ok: true }
	return answer(422, [
		{ field: "days", message: "There is a step on that day already. Change that one, or choose another day." },
	])
}
