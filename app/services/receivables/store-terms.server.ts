import { createHash } from "node:crypto"
import { and, eq } from "drizzle-orm"
import { priceTiers, type stores } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { Terms } from "~/domain/invoicing/terms"

/** What the producer sets of a store, in cents, days and basis points. */
export type StoreTerms = {
	name: string
	address: string
	phone: string
	email: string
	receivingNote: string
	tierId: string
	terms: Terms
	minimumCents: number
	deliveryChargeCents: number
	freeAboveCents: number | null
	invoicing: "each-order" | "month-end"
	taxPlace: string
	creditLimitCents: number | null
	isStopped: boolean
	remindersHeld: boolean
	isActive: boolean
}

type StoreRow = typeof stores.$inferSelect

/** The part of a store's row that the producer sets. */
export function termsOfRow(row: StoreRow): StoreTerms {
	return {
		name: row.name,
		address: row.address,
		phone: row.phone,
		email: row.email,
		receivingNote: row.receivingNote,
		tierId: row.tierId,
		terms: {
			kind: row.termsKind,
			days: row.termsDays,
			discountBasisPoints: row.termsDiscountBasisPoints,
			discountDays: row.termsDiscountDays,
		},
		minimumCents: row.minimumCents,
		deliveryChargeCents: row.deliveryChargeCents,
		freeAboveCents: row.freeAboveCents,
		invoicing: row.invoicing,
		taxPlace: row.taxPlace,
		creditLimitCents: row.creditLimitCents,
		isStopped: row.isStopped,
		remindersHeld: row.remindersHeld,
		isActive: row.isActive,
	}
}

/** The columns that hold these terms. */
export function columnsOf({ terms, ...facts }: StoreTerms) {
	return {
		...facts,
		termsKind: terms.kind,
		termsDays: terms.days,
		termsDiscountBasisPoints: terms.discountBasisPoints,
		termsDiscountDays: terms.discountDays,
	}
}

/** A mark of these terms: another whenever one of them is another, so that nobody overwrites what they have not seen. */
export function markOf(terms: StoreTerms): string {
	const { terms: pay, ...facts } = terms
	const values = [facts, pay].map((part) => Object.entries(part).toSorted(([a], [b]) => (a < b ? -1 : 1)))
	return createHash("sha256").update(JSON.stringify(values)).digest("base64url").slice(0, 22)
}

/** Whether the producer has that price tier. */
export async function hasTier(tx: Tx, query: { producerId: string; tierId: string }): Promise<boolean> {
	const found = await tx
		.select({ id: priceTiers.id })
		.from(priceTiers)
		.where(and(eq(priceTiers.producerId, query.producerId), eq(priceTiers.id, query.tierId)))
	return found.length > 0
}
