import { and, eq, ne, sql } from "drizzle-orm"
import { onlinePaymentParts, onlinePayments, stores } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import { parseInvoiceNumber } from "~/domain/invoicing/invoice-number"
import { discountOn, payableOn, type ToldPart } from "~/domain/payments/lay-payment"
import { now } from "~/platform/clock.server"
import { lockStoreAccount } from "~/services/credits/lock-store-account.server"
import { type OpenAccountInvoice, readPayable } from "./read-payable.server"

/** Stripe takes no less than fifty cents at a time. */
export const LEAST_CENTS = 50

/** So much of an invoice, by its printed number. */
export type Wish = { number: string; cents: number }

/** A visit to the hosted page; `sessionId` is null until the page has been opened. */
type Visit = { id: string; sessionId: string | null; amountCents: number }

/** Another visit whose page may be open still and is about one of the same invoices. */
type Rival = { id: string; sessionId: string }

export type TakenUp =
	| { ok: true; visit: Visit; rivals: Rival[]; customerId: string | null }
	| { ok: false; reason: "nothing-chosen" | "no-such-invoice" | "nothing-open" | "too-little" }
	| { ok: false; reason: "too-much"; number: string; payableCents: number }

type Query = {
	producerId: string
	storeId: string
	zone: string
	wishes: readonly Wish[]
	method: "card" | "bank-debit"
	personId: string
}

/**
 * The visit under which so much of these invoices is to be paid: one that is open for the same, else a new one. One whose
 * page was never opened is taken up only within a minute, as the other half of a double click: afterwards its key may be
 * spent on an answer that failed. The store stays locked meanwhile, so that two clicks find one visit. `too-much` is more
 * than is to be paid today, less what debits on their way will settle.
 */
export function takeUpVisit(query: Query): Promise<TakenUp> {
	const { producerId, storeId } = query
	return withProducer(producerId, async (tx) => {
		await lockStoreAccount(tx, { producerId, storeId })
		const parts = await readParts(tx, query, dayInZone(now(), query.zone))
		if (!parts.ok) return parts
		const others = await readVisits(tx, query, parts.told)
		const same = others.find((visit) => isSame(visit, query, parts.told))
		const visit = same ?? (await makeVisit(tx, query, parts))
		const rivals = others.flatMap(({ id, sessionId }) => (sessionId && id !== visit.id ? [{ id, sessionId }] : []))
		const [store] = await tx
			.select({ customerId: stores.stripeCustomerId, methodId: stores.stripePaymentMethodId })
			.from(stores)
			.where(and(eq(stores.producerId, producerId), eq(stores.id, storeId)))
		return { ok: true, visit, rivals, customerId: store?.methodId ? store.customerId : null }
	})
}

type Parts = { ok: true; told: (ToldPart & { discountCents: number })[] }

async function readParts(tx: Tx, query: Query, today: Day): Promise<Parts | Exclude<TakenUp, { ok: true }>> {
	if (query.wishes.length === 0) return { ok: false, reason: "nothing-chosen" }
	const open = new Map((await readPayable(tx, query)).map((invoice) => [invoice.number, invoice]))
	const told: Parts["told"] = []
	for (const { number, cents } of query.wishes) {
		const invoice = open.get(number)
		if (!invoice)
			return { ok: false, reason: (await isInvoice(tx, query, number)) ? "nothing-open" : "no-such-invoice" }
		const payableCents = leftToPay(invoice, today)
		if (cents > payableCents) return { ok: false, reason: "too-much", number, payableCents }
		const isWhole = cents === payableOn(invoice, today)
		told.push({ invoiceId: invoice.id, cents, discountCents: isWhole ? discountOn(invoice, today) : 0 })
	}
	const sum = told.reduce((cents, part) => cents + part.cents, 0)
	return sum < LEAST_CENTS ? { ok: false, reason: "too-little" } : { ok: true, told }
}

async function isInvoice(tx: Tx, { producerId, storeId }: Query, number: string): Promise<boolean> {
	const named = parseInvoiceNumber(number)
	if (!named) return false
	const { rows } = await tx.execute(sql`
		select 1 from invoices where producer_id = ${producerId} and store_id = ${storeId}
			and year = ${named.year} and sequence = ${named.sequence}`)
	return rows.length > 0
}

/** What is to be paid of an invoice on a day, less what debits on their way will settle. */
export function leftToPay(invoice: OpenAccountInvoice, day: Day): number {
	const { onItsWayCents } = invoice
	return Math.max(0, onItsWayCents > 0 ? invoice.openCents - onItsWayCents : payableOn(invoice, day))
}

type Found = Visit & { method: string; state: string; isFresh: boolean; parts: Record<string, number> }

/** The visits about any of these invoices that may still be paid, the latest first. */
async function readVisits(tx: Tx, query: Query, told: readonly ToldPart[]): Promise<Found[]> {
	const { rows } = await tx.execute<Found>(sql`
		select o.id, o.stripe_session_id as "sessionId", o.amount_cents as "amountCents", o.method, o.state,
			o.created_at > now() - interval '1 minute' as "isFresh",
			(select json_object_agg(p.invoice_id, p.amount_cents) from online_payment_parts p
				where p.producer_id = o.producer_id and p.online_payment_id = o.id) as parts
		from online_payments o
		where o.producer_id = ${query.producerId} and o.store_id = ${query.storeId} and o.kind = 'visit'
			and (o.state = 'open' or (o.state = 'declined' and o.method = 'card'))
			and exists (select from online_payment_parts p where p.producer_id = o.producer_id and p.online_payment_id = o.id
				and p.invoice_id = any(${sql.param(told.map(({ invoiceId }) => invoiceId))}::uuid[]))
		order by o.created_at desc`)
	return rows
}

function isSame(visit: Found, query: Query, told: readonly ToldPart[]): boolean {
	return (
		visit.method === query.method &&
		(visit.sessionId !== null || visit.isFresh) &&
		Object.keys(visit.parts).length === told.length &&
		told.every(({ invoiceId, cents }) => visit.parts[invoiceId] === cents)
	)
}

async function makeVisit(tx: Tx, query: Query, { told }: Parts): Promise<Visit> {
	const { producerId, storeId, method, personId } = query
	const amountCents = told.reduce((sum, { cents }) => sum + cents, 0)
	const [made] = await tx
		.insert(onlinePayments)
		.values({ producerId, storeId, method, amountCents, startedBy: personId })
		.returning({ id: onlinePayments.id })
	if (!made) throw new Error("an insert returns its row")
	const { id } = made
	await tx.insert(onlinePaymentParts).values(
		told.map(({ invoiceId, cents, discountCents }) => ({
			...{ producerId, onlinePaymentId: id, invoiceId, amountCents: cents, discountCents },
		})),
	)
	return { id, sessionId: null, amountCents }
}

const isVisit = ({ producerId, visitId }: { producerId: string; visitId: string }) =>
	and(eq(onlinePayments.producerId, producerId), eq(onlinePayments.id, visitId))

/** Writes down which page was opened for a visit; one that another click had given up meanwhile is open again. */
export async function storeSession(query: { producerId: string; visitId: string; sessionId: string }): Promise<void> {
	await withProducer(query.producerId, (tx) =>
		tx
			.update(onlinePayments)
			.set({
				stripeSessionId: query.sessionId,
				state: sql`case ${onlinePayments.state} when 'expired' then 'open' else ${onlinePayments.state} end`,
			})
			.where(isVisit(query)),
	)
}

/** Gives a visit up: it is not taken up again. Should it turn out paid after all, its event still settles it. */
export async function closeVisit(query: { producerId: string; visitId: string }): Promise<void> {
	await withProducer(query.producerId, (tx) =>
		tx
			.update(onlinePayments)
			.set({ state: "expired" })
			.where(and(isVisit(query), ne(onlinePayments.state, "paid"), ne(onlinePayments.state, "on-its-way"))),
	)
}
