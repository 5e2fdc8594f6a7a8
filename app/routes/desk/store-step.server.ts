import { z } from "zod"
import { dayInZone } from "~/domain/calendar"
import { readCents, readDay } from "~/domain/pricing/read-figures"
import { now } from "~/platform/clock.server"
import { judgePromise, notePromise } from "~/services/receivables/payment-promises.server"
import { saveStore } from "~/services/receivables/save-store.server"
import { writeOff } from "~/services/receivables/write-off.server"
import type { DeskScope } from "../guard.server"
import { faultsOf, storeForm, typedFields, typedTerms } from "./store-form"

type Fault = { field?: string; message: string }
/** What came of a step at a store: done under a name, or refused with all that was typed. */
export type StoreStep =
	| { ok: true; done: string }
	| {
			ok: false
			status: number
			refused: {
				intent: string
				errors: Fault[]
				typed: Record<string, string>
				/** When somebody else has changed the store meanwhile: what holds now, as it would be typed, and its mark. */
				holds: { typed: Record<string, string>; mark: string } | null
			}
	  }

const amount = z
	.string()
	.default("")
	.transform((text, context) => {
		const cents = readCents(text)
		if (cents !== null && cents > 0) return cents
		context.addIssue({ code: "custom", message: "Write an amount, such as 929.90." })
		return z.NEVER
	})

const promiseForm = z.object({
	promiseId: z.guid(),
	amount,
	promisedOn: z
		.string()
		.default("")
		.transform((text, context) => {
			const day = readDay(text)
			if (day) return day
			context.addIssue({ code: "custom", message: "Write the day, such as 2026-08-18." })
			return z.NEVER
		}),
	note: z.string().trim().max(300, "Shorten the note to 300 characters.").default(""),
})

const judgeForm = z.object({ promiseId: z.guid(), state: z.enum(["kept", "broken"]) })

const writeOffForm = z.object({
	writeOffId: z.guid(),
	invoiceId: z.guid("Choose an invoice."),
	givenUp: amount,
	reason: z.string().trim().min(1, "Write why it is given up.").max(300, "Shorten the reason to 300 characters."),
})

const WRITE_OFF_FAULTS = {
	"no-such-invoice": { field: "invoiceId", message: "Choose an invoice of the list." },
	"more-than-open": { field: "givenUp", message: "That is more than is open on this invoice." },
	"books-closed": { message: "The books of today are closed. Nothing is entered in them any more." },
} as const

const OWNERS = ["save", "write-off"]

/** Takes one of the forms of a store's page. Terms and bad debts are the owner's; 403 for anyone else. */
export async function takeStoreStep(form: FormData, store: { id: string }, scope: DeskScope): Promise<StoreStep> {
	const { producer, person, roles } = scope
	const typed = typedFields(form)
	const intent = typed.intent ?? ""
	if (OWNERS.includes(intent) && !roles.includes("owner")) throw new Response(null, { status: 403 })
	const by = { producerId: producer.id, storeId: store.id, personId: person.id }
	const refuse = (
		errors: Fault[],
		status = 422,
		holds: { typed: Record<string, string>; mark: string } | null = null,
	) => ({
		ok: false as const,
		status,
		refused: { intent, errors, typed, holds },
	})
	if (intent === "save") {
		const parsed = storeForm.safeParse(typed)
		if (!parsed.success) return refuse(faultsOf(parsed.error))
		const saved = await saveStore({ ...by, mark: typed.mark ?? "", terms: parsed.data })
		if (saved.ok) return { ok: true, done: "saved" }
		if (saved.reason === "no-such-tier")
			return refuse([{ field: "tierId", message: "Choose a price tier of the list." }])
		if (saved.reason === "no-such-store") throw new Response(null, { status: 404 })
		const message = "Somebody has changed this store meanwhile. What holds now stands below each field that differs."
		return refuse([{ message }], 409, { typed: typedTerms(saved.now), mark: saved.mark })
	}
	if (intent === "promise") {
		const parsed = promiseForm.safeParse(typed)
		if (!parsed.success) return refuse(faultsOf(parsed.error))
		const { amount: amountCents, ...promise } = parsed.data
		await notePromise({ ...by, ...promise, amountCents })
		return { ok: true, done: "promise" }
	}
	if (intent === "judge") {
		const parsed = judgeForm.safeParse(typed)
		if (!parsed.success) throw new Response(null, { status: 400 })
		await judgePromise({ ...by, ...parsed.data })
		return { ok: true, done: "judged" }
	}
	if (intent === "write-off") {
		const parsed = writeOffForm.safeParse(typed)
		if (!parsed.success) return refuse(faultsOf(parsed.error))
		const { givenUp: amountCents, ...facts } = parsed.data
		const today = dayInZone(now(), producer.timeZone)
		const given = await writeOff({ ...by, ...facts, amountCents, today })
		return given.ok ? { ok: true, done: "given-up" } : refuse([WRITE_OFF_FAULTS[given.reason]])
	}
	return refuse([{ message: "Send one of the forms of this page." }], 400)
}
