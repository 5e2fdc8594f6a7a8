import { z } from "zod"
import { plainMoney } from "~/domain/money"
import { readBasisPoints, readCents } from "~/domain/pricing/read-figures"

/** Reads a field as typed by `read`; what it answers null for is refused with `message`. */
const field = <T>(read: (text: string) => T | null, message: string) =>
	z
		.string()
		.default("")
		.transform((text, context) => {
			const value = read(text.trim())
			if (value !== null) return value
			context.addIssue({ code: "custom", message })
			return z.NEVER
		})

const words = (most: number, message: string) => z.string().trim().max(most, message).default("")
const tick = z
	.string()
	.optional()
	.transform((value) => value === "yes")

const days = (text: string) => (/^\d{1,3}$/.test(text) && Number(text) <= 365 ? Number(text) : null)
const noneOr =
	<T>(read: (text: string) => T | null) =>
	(text: string) =>
		text === "" ? { value: null } : wrapped(read(text))
const wrapped = <T>(value: T | null) => (value === null ? null : { value })

const AMOUNT = "Write an amount, such as 18.00."
const AMOUNT_OR_NONE = "Write an amount, such as 600.00, or leave it empty."
const DAYS = "Write whole days from 0 to 365."

/** What the producer sets of a store, as typed. An empty free amount is never, an empty limit is none. */
export const storeForm = z
	.object({
		name: z.string().trim().min(1, "Write the store’s name.").max(120, "Shorten the name to 120 characters."),
		address: words(300, "Shorten the address to 300 characters."),
		phone: words(40, "Shorten the telephone number to 40 characters."),
		email: z.union([z.literal(""), z.email()], "Write an e-mail address, or leave it empty.").default(""),
		receivingNote: words(200, "Shorten it to 200 characters."),
		tierId: z.guid("Choose a price tier."),
		termsKind: z.enum(["on-receipt", "net", "end-of-month"], "Choose when invoices fall due."),
		termsDays: field(days, DAYS),
		discount: field(
			(text) => (/^0*([.,]0*)?\s*%?$/.test(text) ? 0 : readBasisPoints(text)),
			"Write a percentage, such as 2, or 0 for none.",
		),
		discountDays: field(days, DAYS),
		minimum: field(readCents, AMOUNT),
		deliveryCharge: field(readCents, AMOUNT),
		freeAbove: field(noneOr(readCents), AMOUNT_OR_NONE),
		invoicing: z.enum(["each-order", "month-end"], "Choose how it is invoiced."),
		taxPlace: words(120, "Choose a place of the tax table."),
		creditLimit: field(noneOr(readCents), AMOUNT_OR_NONE),
		isStopped: tick,
		remindersHeld: tick,
		isActive: tick,
	})
	.transform(
		({ termsKind, termsDays, discount, discountDays, minimum, deliveryCharge, freeAbove, creditLimit, ...rest }) => ({
			...rest,
			terms: { kind: termsKind, days: termsDays, discountBasisPoints: discount, discountDays },
			minimumCents: minimum,
			deliveryChargeCents: deliveryCharge,
			freeAboveCents: freeAbove.value,
			creditLimitCents: creditLimit.value,
		}),
	)

/** The terms of a store as `storeForm` reads them. */
export type StoreFormTerms = z.infer<typeof storeForm>

/** The fields of the form as these terms would be typed. */
export function typedTerms(terms: StoreFormTerms): Record<string, string> {
	const percent = plainMoney(terms.terms.discountBasisPoints).replace(/\.?0+$/, "") || "0"
	const money = (cents: number | null) => (cents === null ? "" : plainMoney(cents))
	return {
		name: terms.name,
		address: terms.address,
		phone: terms.phone,
		email: terms.email,
		receivingNote: terms.receivingNote,
		tierId: terms.tierId,
		termsKind: terms.terms.kind,
		termsDays: String(terms.terms.days),
		discount: percent,
		discountDays: String(terms.terms.discountDays),
		minimum: money(terms.minimumCents),
		deliveryCharge: money(terms.deliveryChargeCents),
		freeAbove: money(terms.freeAboveCents),
		invoicing: terms.invoicing,
		taxPlace: terms.taxPlace,
		creditLimit: money(terms.creditLimitCents),
		isStopped: terms.isStopped ? "yes" : "",
		remindersHeld: terms.remindersHeld ? "yes" : "",
		isActive: terms.isActive ? "yes" : "",
	}
}

/** A new store has these terms until they are set otherwise. */
export const NEW_STORE: Record<string, string> = {
	termsKind: "net",
	termsDays: "14",
	discount: "0",
	discountDays: "0",
	minimum: "0.00",
	deliveryCharge: "0.00",
	invoicing: "each-order",
	isActive: "yes",
}

/** What was typed, by name; several of one name are joined by commas. */
export function typedFields(form: FormData): Record<string, string> {
	const typed: Record<string, string> = {}
	for (const [name, value] of form) {
		if (typeof value !== "string") continue
		typed[name] = typed[name] === undefined ? value.slice(0, 3000) : `${typed[name]},${value.slice(0, 3000)}`
	}
	return typed
}

/** The faults of a form, one for each field. */
export function faultsOf(error: z.ZodError): { field: string; message: string }[] {
	const faults = error.issues.map(({ path, message }) => ({ field: String(path[0]), message }))
	return faults.filter(({ field }, index) => faults.findIndex((one) => one.field === field) === index)
}
