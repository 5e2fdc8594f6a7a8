import { and, eq } from "drizzle-orm"
import { credits } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { creditNumber } from "~/domain/credits/credit-number"
import type { CreditKind } from "~/domain/credits/credit-words"
import { type PlanRefusal, planCredit, type WantedCredit } from "~/domain/credits/plan-credit"
import type { Result } from "~/domain/result"
import { now } from "~/platform/clock.server"
import { issueCredit } from "./issue-credit.server"
import { lockStoreAccount, withAccount } from "./lock-store-account.server"
import { readInvoiceLeft } from "./read-invoice-left.server"
import { tellCredit } from "./tell-credit.server"

export type CreditByHand = {
	producer: { id: string; slug: string; timeZone: string }
	invoiceNumber: string
	/** Made with the form: a second send finds the first credit and issues no other. */
	creditId: string
	kind: Exclude<CreditKind, "breakage">
	reason: string
	wanted: WantedCredit[]
	/** An amount off the invoice as a whole. */
	wholeCents: number
	personId: string
}

export type CreditByHandRefusal =
	| PlanRefusal
	| { ok: false; reason: "no-such-invoice" }
	| { ok: false; reason: "books-closed" }

/**
 * Issues a credit on an invoice by hand, in one transaction with what it settles and its letters. Refuses what is above
 * what was invoiced less credited before, by line and in all. Moves no pieces: what never arrived was never sold, and the
 * lot's own page puts it right.
 */
export async function creditByHand(query: CreditByHand): Promise<Result<{ number: string }, CreditByHandRefusal>> {
	const issued = await withAccount(query.producer.id, (tx) => creditInTransaction(tx, query))
	return issued === "books-closed" ? { ok: false, reason: "books-closed" } : issued
}

async function creditInTransaction(
	tx: Tx,
	query: CreditByHand,
): Promise<Result<{ number: string }, CreditByHandRefusal>> {
	const { producer, creditId, kind, reason, personId } = query
	const named = { producerId: producer.id, number: query.invoiceNumber }
	const found = await readInvoiceLeft(tx, named)
	if (!found) return { ok: false, reason: "no-such-invoice" }
	await lockStoreAccount(tx, { producerId: producer.id, storeId: found.storeId })
	const [earlier] = await tx
		.select({ year: credits.year, sequence: credits.sequence })
		.from(credits)
		.where(and(eq(credits.producerId, producer.id), eq(credits.id, creditId)))
	if (earlier) return { ok: true, number: creditNumber(earlier.year, earlier.sequence) }
	const invoice = await readInvoiceLeft(tx, named)
	if (!invoice) throw new Error("an issued invoice is never taken away")
	const { lines, leftCents } = invoice
	const plan = planCredit({ lines, leftCents, wanted: query.wanted, wholeCents: query.wholeCents })
	if (!plan.ok) return plan
	const issuedOn = dayInZone(now(), producer.timeZone)
	const number = await issueCredit(tx, {
		producerId: producer.id,
		creditId,
		invoice,
		kind,
		reason,
		plan,
		issuedOn,
		personId,
	})
	await tellCredit(tx, { producer, store: { id: invoice.storeId, slug: invoice.storeSlug }, number, breakage: null })
	return { ok: true, number }
}
