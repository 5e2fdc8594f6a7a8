import { z } from "zod"
import { isStoreSlug, slugOf } from "~/domain/receivables/store-slug"
import { emailField } from "../auth/sign-in-fields"
import { faultsOf, type StoreFormTerms, storeForm } from "./store-form"

export type NewStore = {
	storeId: string
	slug: string
	roundIds: string[]
	terms: StoreFormTerms
	buyer: { name: string; email: string } | null
}

const idForm = z.object({ storeId: z.guid() })
const buyerForm = z.object({
	buyerName: z.string().trim().min(1, "Write the buyer’s name.").max(120, "Shorten the name to 120 characters."),
	buyerEmail: emailField,
})

/**
 * Reads the form of a new store: its terms, its name in addresses (made from its name when left empty), the rounds that stop
 * there, and a buyer to invite, where one is named.
 */
export function readNewStore(
	typed: Readonly<Record<string, string>>,
): { ok: true; store: NewStore } | { ok: false; errors: { field: string; message: string }[] } {
	const id = idForm.safeParse(typed)
	if (!id.success) throw new Response(null, { status: 400 })
	const terms = storeForm.safeParse(typed)
	const errors = terms.success ? [] : faultsOf(terms.error)
	const slug = typed.slug?.trim() || slugOf(typed.name ?? "")
	if (!isStoreSlug(slug) && !errors.some(({ field }) => field === "name")) {
		errors.push({ field: "slug", message: "Write small letters and figures with dashes between, and not “new”." })
	}
	const rounds = (typed.rounds ?? "").split(",").filter(Boolean)
	const roundIds = z.array(z.guid()).max(7).safeParse(rounds)
	if (!roundIds.success) errors.push({ field: "rounds", message: "Choose rounds of the list." })
	const isInviting = Boolean(typed.buyerName?.trim() || typed.buyerEmail?.trim())
	const buyer = isInviting ? buyerForm.safeParse(typed) : null
	if (buyer && !buyer.success) errors.push(...faultsOf(buyer.error))
	if (!terms.success || !roundIds.success || errors.length > 0) return { ok: false, errors }
	return {
		ok: true,
		store: {
			storeId: id.data.storeId,
			slug,
			roundIds: roundIds.data,
			terms: terms.data,
			buyer: buyer?.success ? { name: buyer.data.buyerName, email: buyer.data.buyerEmail } : null,
		},
	}
}
