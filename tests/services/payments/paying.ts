import { createServer } from "node:http"
import type { AddressInfo } from "node:net"
import { eq } from "drizzle-orm"
import { invoiceOrders, invoices, onlinePayments, orders, paymentReturns, payments, settlements } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { findInvoice } from "~/services/invoicing/find-invoice.server"
import { applyStripeEvent } from "~/services/payments/apply-stripe-event.server"
import { receiveStripeEvent } from "~/services/payments/receive-stripe-event.server"
import { startPayment } from "~/services/payments/start-payment.server"
import type { BankStep } from "../../../fakes/stripe/control"
import { type StripeFake, startStripeFake } from "../../../fakes/stripe/start"
import { producerOf } from "../desk/desk-steps"
import { type Shop, type Yard, ZONE } from "../orders/place-yard"

/** A payment fake that posts its events to an endpoint which takes them in as the product does. */
export type PaymentService = {
	fake: StripeFake
	/** Ids of the events taken in, one for each delivery, oldest first. */
	taken: string[]
	close: () => Promise<void>
}

/** Starts the fake and points the product at it. Call it before anything reads the environment. */
export async function startPaymentService(): Promise<PaymentService> {
	const taken: string[] = []
	const server = createServer(async (request, response) => {
		let body = ""
		for await (const part of request) body += part
		const isTaken = await receiveStripeEvent(body, String(request.headers["stripe-signature"]))
		if (isTaken) taken.push((JSON.parse(body) as { id: string }).id)
		response.writeHead(isTaken ? 200 : 400).end()
	})
	await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve))
	const { port } = server.address() as AddressInfo
	const secret = process.env.STRIPE_WEBHOOK_SECRET ?? ""
	const fake = await startStripeFake({ webhook: { url: `http://127.0.0.1:${port}/webhooks/stripe`, secret } })
	process.env.STRIPE_API_BASE = fake.url
	return {
		fake,
		taken,
		close: async () => {
			await fake.close()
			await new Promise<void>((resolve) => {
				server.close(() => resolve())
				server.closeAllConnections()
			})
		},
	}
}

/** Applies every event that was taken in, in the order of the deliveries, or in the opposite one. */
export async function applyAll(
	{ fake, taken }: PaymentService,
	order: "as-taken" | "reverse" = "as-taken",
): Promise<void> {
	await fake.idle()
	const ids = taken.splice(0)
	for (const eventId of order === "reverse" ? ids.reverse() : ids) await applyStripeEvent({ eventId })
}

/** An order of the store with an issued invoice of so many cents, due on that day; answers its printed number. */
export async function addInvoice(
	yard: Yard,
	shop: Shop,
	invoice: {
		sequence: number
		totalCents: number
		dueOn?: string
		discountUntil?: string
		discountBasisPoints?: number
	},
): Promise<string> {
	const { producerId } = yard
	const { sequence, totalCents, dueOn = "2026-08-27", discountUntil, discountBasisPoints } = invoice
	await withProducer(producerId, async (tx) => {
		const [order] = await tx
			.insert(orders)
			.values({ producerId, number: sequence, storeId: shop.storeId, deliveryOn: "2026-08-13", state: "sent" })
			.returning({ id: orders.id })
		const [invoice] = await tx
			.insert(invoices)
			.values({
				producerId,
				year: 2026,
				sequence,
				storeId: shop.storeId,
				issuedOn: "2026-07-30",
				dueOn,
				linesCents: totalCents,
				deliveryCents: 0,
				taxCents: 0,
				totalCents,
				...(discountUntil && { discountUntil, discountBasisPoints }),
			})
			.returning({ id: invoices.id })
		await tx.insert(invoiceOrders).values({ producerId, orderId: order?.id ?? "", invoiceId: invoice?.id ?? "" })
	})
	return invoiceNumber(2026, sequence)
}

/** Opens the page for so much of some invoices, as the store's person. */
export const startPayingParts = (
	yard: Yard,
	shop: Shop,
	wishes: readonly { number: string; cents: number }[],
	method: "card" | "bank-debit" = "card",
) =>
	startPayment({
		producer: { ...producerOf(yard), timeZone: ZONE },
		store: { id: shop.storeId, slug: shop.slug },
		person: shop.person,
		wishes,
		method,
	})

/** Opens the card page for all that is open of an invoice, as the store's person. */
export async function startPaying(yard: Yard, shop: Shop, number: string) {
	const page = await findInvoice({ producerId: yard.producerId, number })
	return startPayingParts(yard, shop, [{ number, cents: page?.openCents ?? 1_000 }])
}

/** Opens the card page and answers its address. Throws when there is none. */
export async function openCardPage(yard: Yard, shop: Shop, number: string): Promise<string> {
	const started = await startPaying(yard, shop, number)
	if (!started.ok) throw new Error(`no card page: ${started.reason}`)
	return started.url
}

export const GOOD_CARD = "4242424242424242"
export const DECLINED_CARD = "4000000000000002"

/** Types a card on the hosted page and sends it, as a browser does. Answers the page's status. */
export async function typeCard(url: string, number: string): Promise<number> {
	const body = new URLSearchParams({ number, expiry: "12/34", cvc: "123", name: "Rosa Quill" })
	const answer = await fetch(url, { method: "POST", body, redirect: "manual" })
	await answer.arrayBuffer()
	return answer.status
}

export const GOOD_ACCOUNT = "000123456789"
export const EMPTY_ACCOUNT = "000222222227"

/** Pays so much of some invoices by a debit of an account; answers the payment's id at Stripe. */
export async function debit(
	{ fake }: PaymentService,
	yard: Yard,
	shop: Shop,
	of: { wishes: readonly { number: string; cents: number }[]; account: string },
): Promise<string> {
	const started = await startPayingParts(yard, shop, of.wishes, "bank-debit")
	if (!started.ok) throw new Error(`no page: ${started.reason}`)
	const body = new URLSearchParams({ routing: "110000000", account: of.account, name: "Pantry & Plume" })
	const answer = await fetch(started.url, { method: "POST", body, redirect: "manual" })
	await answer.arrayBuffer()
	if (answer.status !== 303) throw new Error(`the debit was not taken: ${answer.status}`)
	return String([...fake.state.sessions.values()].at(-1)?.payment_intent)
}

/** Has the payer's bank do something. */
export function bankSays({ fake }: PaymentService, step: BankStep): void {
	fake.bank(step)
}

/**
 * The account of a yard: what is open and what discount was taken by invoice, payments and what went back in words, and
 * what is on account. `payments` are ids instead where those are asked for.
 */
export function readAccount(yard: Yard, as: "words" | "ids" = "words") {
	return readProducer(yard.producerId, async (tx) => {
		const invoiced = await tx
			.select({ open: invoices.openCents, discount: invoices.discountCents })
			.from(invoices)
			.where(eq(invoices.producerId, yard.producerId))
			.orderBy(invoices.sequence)
		const paid = await tx
			.select()
			.from(payments)
			.where(eq(payments.producerId, yard.producerId))
			.orderBy(payments.receivedAt, payments.amountCents, payments.stripePaymentIntentId)
		const gone = await tx
			.select()
			.from(paymentReturns)
			.where(eq(paymentReturns.producerId, yard.producerId))
			.orderBy(paymentReturns.kind, paymentReturns.amountCents, paymentReturns.state)
		const left = (one: (typeof paid)[number]) =>
			one.state === "settled" ? one.amountCents - one.settledCents - one.returnedCents : 0
		return {
			open: invoiced.map(({ open }) => open),
			discount: invoiced.map(({ discount }) => discount),
			payments: paid.map((one) =>
				as === "ids"
					? one.id
					: `${one.method} ${one.amountCents} ${one.state} settled ${one.settledCents} returned ${one.returnedCents}`,
			),
			onAccountCents: paid.reduce((sum, one) => sum + left(one), 0),
			returns: gone.map(({ kind, state, amountCents }) => `${kind} ${state} ${amountCents}`),
		}
	})
}

/** What the producer's books say: invoices by sequence, payments with what they settle, visits by state. */
export function readBooks(yard: Yard) {
	return readProducer(yard.producerId, async (tx) => {
		const ofYard = (table: { producerId: typeof invoices.producerId }) => eq(table.producerId, yard.producerId)
		const paid = await tx
			.select({ paidCents: invoices.paidCents })
			.from(invoices)
			.where(ofYard(invoices))
			.orderBy(invoices.sequence)
		const money = await tx
			.select({ method: payments.method, amountCents: payments.amountCents })
			.from(payments)
			.where(eq(payments.producerId, yard.producerId))
			.orderBy(payments.receivedAt, payments.id)
		const parts = await tx
			.select({ amountCents: settlements.amountCents })
			.from(settlements)
			.where(eq(settlements.producerId, yard.producerId))
		const visits = await tx
			.select({ state: onlinePayments.state })
			.from(onlinePayments)
			.where(eq(onlinePayments.producerId, yard.producerId))
			.orderBy(onlinePayments.createdAt)
		return {
			paid: paid.map(({ paidCents }) => paidCents),
			payments: money.map(({ method, amountCents }) => `${method} ${amountCents}`),
			settledCents: parts.reduce((sum, { amountCents }) => sum + amountCents, 0),
			visits: visits.map(({ state }) => state),
		}
	})
}
