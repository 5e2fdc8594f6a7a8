import { closePayPage, findPayPage, openPayPage } from "~/platform/card-page.server"
import { env } from "~/platform/env.server"
import { log } from "~/platform/log.server"
import { closeVisit, storeSession, type TakenUp, takeUpVisit, type Wish } from "./visits.server"

export type PaymentStart =
	| { ok: true; url: string }
	| Exclude<TakenUp, { ok: true }>
	| { ok: false; reason: "under-way" | "no-answer" }

export type Payer = {
	producer: { id: string; slug: string; name: string; timeZone: string }
	store: { id: string; slug: string }
	person: { id: string; email: string }
	wishes: readonly Wish[]
	method: "card" | "bank-debit"
}

/**
 * Sends a person to the hosted page where so much of one invoice or several is paid by card or by bank debit. A visit that
 * is still open for the same is taken up again, so that a double click or a second tab leads to one page and one charge;
 * the page of another visit about one of these invoices is closed first. `under-way` when such a visit has been paid and
 * the event is on its way; `no-answer` when the payment service cannot be reached: nothing was charged, and trying again is
 * safe.
 */
export async function startPayment(payer: Payer): Promise<PaymentStart> {
	const { producer, store, person, wishes, method } = payer
	const found = await takeUpVisit({
		producerId: producer.id,
		storeId: store.id,
		zone: producer.timeZone,
		wishes,
		method,
		personId: person.id,
	})
	if (!found.ok) return found
	const { visit, rivals } = found
	const ofVisit = { producerId: producer.id, visitId: visit.id }
	try {
		for (const rival of rivals) {
			if ((await closePayPage(rival.sessionId)) === "complete") return { ok: false, reason: "under-way" }
			await closeVisit({ producerId: producer.id, visitId: rival.id })
		}
		if (!visit.sessionId) return { ok: true, url: await openPage(payer, found) }
		const page = await findPayPage(visit.sessionId)
		if (page.state === "open") return { ok: true, url: page.url }
		if (page.state === "complete") return { ok: false, reason: "under-way" }
	} catch (error) {
		log.warn({ err: error, onlinePaymentId: visit.id }, "the page to pay on could not be opened")
		// What failed under this key may be answered from memory for a day: the next try gets a key of its own.
		if (!visit.sessionId) await closeVisit(ofVisit)
		return { ok: false, reason: "no-answer" }
	}
	await closeVisit(ofVisit)
	return startPayment(payer)
}

async function openPage(payer: Payer, { visit, customerId }: TakenUp & { ok: true }): Promise<string> {
	const { producer, store, person, wishes, method } = payer
	const base = `${env.BASE_URL}/buy/${producer.slug}/${store.slug}`
	const [only] = wishes
	const page = wishes.length === 1 && only ? `${base}/invoices/${only.number}` : `${base}/invoices`
	const numbers = wishes.map(({ number }) => number)
	const session = await openPayPage({
		key: visit.id,
		method,
		amountCents: visit.amountCents,
		title: titleOf(producer.name, numbers),
		email: person.email,
		customerId,
		metadata: { producer_id: producer.id, online_payment_id: visit.id },
		doneUrl: `${page}?paid=${visit.id}`,
		backUrl: page,
	})
	await storeSession({ producerId: producer.id, visitId: visit.id, sessionId: session.id })
	return session.url
}

const NAMED = 5

/** "Larkmoor Bee Yard, invoice 2026-0007", "…, invoices 2026-0007, 2026-0009 and 12 more". */
export function titleOf(producerName: string, numbers: readonly string[]): string {
	const named = numbers.slice(0, NAMED).join(", ")
	const more = numbers.length > NAMED ? ` and ${numbers.length - NAMED} more` : ""
	return `${producerName}, ${numbers.length === 1 ? "invoice" : "invoices"} ${named}${more}`
}
