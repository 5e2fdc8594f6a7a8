import { randomUUID } from "node:crypto"
import { credits, invoices, paymentReturns, payments, settlements } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { renderMail } from "~emails/render"
import { findOutbox, type Shop } from "../orders/place-yard"

type Kind = (typeof settlements.$inferInsert)["kind"]

/**
 * Writes what moves a store's account, as the use cases leave it behind: papers, money and the ledger of settlements.
 * Numbers go on from `numberedFrom`, since one producer gives none twice.
 */
export function openAccount(shop: Shop, personId: string, numberedFrom = 0) {
	const { producerId, storeId } = shop
	let sequence = numberedFrom
	return {
		invoice: async (
			totalCents: number,
			facts: { issuedOn?: Day; dueOn?: Day; kind?: "goods" | "finance-charge" } = {},
		): Promise<string> => {
			const id = randomUUID()
			const { issuedOn = "2026-08-01", dueOn = "2026-08-15", kind = "goods" } = facts
			sequence += 1
			await withProducer(producerId, (tx) =>
				tx.insert(invoices).values({
					producerId,
					id,
					year: 2026,
					sequence,
					storeId,
					kind,
					issuedOn,
					dueOn,
					linesCents: totalCents,
					deliveryCents: 0,
					taxCents: 0,
					totalCents,
				}),
			)
			return id
		},
		credit: async (totalCents: number, issuedOn: Day = "2026-08-02"): Promise<string> => {
			const id = randomUUID()
			sequence += 1
			await withProducer(producerId, (tx) =>
				tx.insert(credits).values({
					producerId,
					id,
					year: 2026,
					sequence,
					storeId,
					issuedOn,
					kind: "goodwill",
					reason: "For the broken case.",
					linesCents: totalCents,
					taxCents: 0,
					totalCents,
					issuedBy: personId,
				}),
			)
			return id
		},
		payment: async (
			amountCents: number,
			receivedOn: Day = "2026-08-03",
			state: "settled" | "on-its-way" = "settled",
		): Promise<string> => {
			const id = randomUUID()
			const ofStripe = state === "on-its-way" ? { stripePaymentIntentId: `pi_${id}` } : {}
			const method = state === "on-its-way" ? ("bank-debit" as const) : ("cheque" as const)
			await withProducer(producerId, (tx) =>
				tx
					.insert(payments)
					.values({ producerId, id, storeId, method, state, amountCents, receivedOn, reference: "104", ...ofStripe }),
			)
			return id
		},
		giveBack: (paymentId: string, amountCents: number, returnedOn: Day = "2026-08-04") =>
			withProducer(producerId, (tx) =>
				tx
					.insert(paymentReturns)
					.values({ producerId, paymentId, kind: "refund", state: "done", amountCents, returnedOn }),
			),
		settle: (
			invoiceId: string,
			amountCents: number,
			by: { kind: Kind; paymentId?: string; creditId?: string },
			settledOn: Day = "2026-08-05",
		) =>
			withProducer(producerId, (tx) =>
				tx.insert(settlements).values({ producerId, invoiceId, amountCents, settledOn, ...by }),
			),
	}
}

/** Writes every letter that waits in a producer's outbox as the worker would. Throws at the first that cannot be written. */
export async function writeLetters(producerId: string): Promise<string[]> {
	const subjects: string[] = []
	for (const { template, props } of await findOutbox(producerId))
		subjects.push((await renderMail(template, props)).subject)
	return subjects
}
