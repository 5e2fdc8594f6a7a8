import { z } from "zod"
import type { WantedCredit } from "~/domain/credits/plan-credit"
import { formatMoney } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import type { CreditByHandRefusal } from "~/services/credits/credit-by-hand.server"
import type { InvoiceLeft } from "~/services/credits/read-invoice-left.server"
import { centsOf } from "./payment-form"

type Errors = { field?: string; message: string }[]

const head = z.object({
	creditId: z.guid(),
	kind: z.enum(["price", "quantity", "goodwill"], "Choose what it puts right."),
	reason: z.string().trim().min(1, "Write why, in words that the store reads.").max(500),
})

/** What the desk's form for a credit says, and what cannot be read of it. */
export type ReadCredit = {
	typed: Record<string, string>
	errors: Errors
	head: z.infer<typeof head> | null
	wanted: WantedCredit[]
	wholeCents: number
}

const MONEY = "Write dollars and cents, such as 9.50."

/** Reads a posted credit: of each line either pieces or an amount, and an amount for the whole. */
export function readCreditForm(form: FormData, lines: InvoiceLeft["lines"]): ReadCredit {
	const typed: Record<string, string> = {}
	const text = (name: string) => {
		typed[name] = String(form.get(name) ?? "").slice(0, 500)
		return typed[name].trim()
	}
	const parsed = head.safeParse({ creditId: text("creditId"), kind: text("kind"), reason: text("reason") })
	const errors: Errors = parsed.success
		? []
		: parsed.error.issues.map(({ path, message }) => ({ field: String(path[0]), message }))
	const wanted = lines.flatMap((line): WantedCredit[] => {
		const [pieces, amount] = [text(`pieces-${line.id}`), text(`amount-${line.id}`)]
		if (pieces !== "" && amount !== "") {
			errors.push({ field: `amount-${line.id}`, message: "Write pieces or an amount, not both." })
			return []
		}
		if (pieces !== "") {
			if (/^\d{1,5}$/.test(pieces)) return [{ lineId: line.id, pieces: Number(pieces) }]
			errors.push({ field: `pieces-${line.id}`, message: "Write whole pieces in figures, such as 3." })
		}
		const cents = amount === "" ? 0 : centsOf(amount)
		if (cents === null) errors.push({ field: `amount-${line.id}`, message: MONEY })
		return cents ? [{ lineId: line.id, cents }] : []
	})
	const whole = text("whole")
	const wholeCents = whole === "" ? 0 : centsOf(whole)
	if (wholeCents === null) errors.push({ field: "whole", message: MONEY })
	return { typed, errors, head: parsed.success ? parsed.data : null, wanted, wholeCents: wholeCents ?? 0 }
}

/** Why a credit was refused, in words beside its field. */
export function creditRefusal(refusal: CreditByHandRefusal, read: ReadCredit): Errors {
	switch (refusal.reason) {
		case "line-exceeded":
			return refusal.lines.map(({ lineId, leftPieces, leftCents }) =>
				read.typed[`pieces-${lineId}`]?.trim()
					? { field: `pieces-${lineId}`, message: `Only ${piecesWords(leftPieces)} are left to credit.` }
					: { field: `amount-${lineId}`, message: `Only ${formatMoney(leftCents)} is left to credit.` },
			)
		case "invoice-exceeded":
			return [
				{
					field: "whole",
					message: `It comes to ${formatMoney(refusal.askedCents)}, and only ${formatMoney(refusal.leftCents)} of the invoice can still be credited.`,
				},
			]
		case "nothing-to-credit":
			return [{ message: "Write at one line, or for the invoice as a whole, what is credited." }]
		case "books-closed":
			return [{ message: "The books of today are closed. Nothing was credited." }]
		case "no-such-invoice":
			return [{ message: "There is no such invoice." }]
	}
}
