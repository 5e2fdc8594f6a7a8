import { findCardPage, openCardPage } from "~/platform/card-page.server"
import { env } from "~/platform/env.server"
import { log } from "~/platform/log.server"
import { closeVisit, type OpenInvoice, storeSession, takeUpVisit } from "./card-visits.server"

export type CardPaymentStart =
	| { ok: true; url: string }
	| { ok: false; reason: "no-such-invoice" | "nothing-open" | "under-way" | "no-answer" }

type Payer = {
	producer: { id: string; slug: string; name: string }
	store: { id: string; slug: string }
	invoiceNumber: string
	personId: string
	personEmail: string
}

/**
 * Sends a person to the hosted card page for what is open on an invoice. A visit that is still open for the same amount
 * is taken up again, so that a double click or a second tab leads to one page and one charge. `under-way` when that
 * visit has been paid and the event is on its way; `no-answer` when the payment service cannot be reached: nothing was
 * charged, and trying again is safe.
 */
export async function startCardPayment(payer: Payer): Promise<CardPaymentStart> {
	const { producer } = payer
	const found = await takeUpVisit({
		producerId: producer.id,
		storeId: payer.store.id,
		invoiceNumber: payer.invoiceNumber,
		personId: payer.personId,
	})
	if (!found.ok) return found
	const { visit, invoice } = found
	try {
		if (!visit.sessionId) return { ok: true, url: await openPage(payer, { visitId: visit.id, invoice }) }
		const page = await findCardPage(visit.sessionId)
		if (page.state === "open") return { ok: true, url: page.url }
		if (page.state === "complete") return { ok: false, reason: "under-way" }
	} catch (error) {
		log.warn({ err: error, cardPaymentId: visit.id }, "the card page could not be opened")
		// What failed under this key may be answered from memory for a day: the next try gets a key of its own.
		if (!visit.sessionId) await closeVisit({ producerId: producer.id, visitId: visit.id })
		return { ok: false, reason: "no-answer" }
	}
	await closeVisit({ producerId: producer.id, visitId: visit.id })
	return startCardPayment(payer)
}

async function openPage(
	payer: Payer,
	{ visitId, invoice }: { visitId: string; invoice: OpenInvoice },
): Promise<string> {
	const { producer, store, invoiceNumber } = payer
	const page = `${env.BASE_URL}/buy/${producer.slug}/${store.slug}/invoices/${invoiceNumber}`
	const session = await openCardPage({
		key: visitId,
		amountCents: invoice.openCents,
		title: `${producer.name}, invoice ${invoiceNumber}`,
		email: payer.personEmail,
		metadata: { producer_id: producer.id, card_payment_id: visitId },
		paidUrl: `${page}?paid=${visitId}`,
		backUrl: page,
	})
	await storeSession({ producerId: producer.id, visitId, sessionId: session.id })
	return session.url
}
