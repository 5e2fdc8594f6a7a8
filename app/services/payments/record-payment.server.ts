import { and, eq, sql } from "drizzle-orm"
import { auditEntries, payments } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { invoiceNumber, parseInvoiceNumber } from "~/domain/invoicing/invoice-number"
import { type LaidPart, layAsTold, layOldestFirst } from "~/domain/payments/lay-payment"
import type { Result } from "~/domain/result"
import { lockStoreAccount, withAccount } from "~/services/credits/lock-store-account.server"
import { type OpenAccountInvoice, readPayable } from "./read-payable.server"
import { writeSettlements } from "./write-settlements.server"

export type HandMethod = "cheque" | "cash" | "transfer"

export type RecordedPayment = Result<
	{ settledInvoices: { number: string; cents: number; discountCents: number }[]; onAccountCents: number },
	| { ok: false; reason: "no-such-invoice" | "no-such-store" | "books-closed" | "told-more-than-paid" }
	| { ok: false; reason: "told-more-than-open"; number: string }
>

/**
 * Where the money goes: to one invoice first and then to the store's others, the one due first before the later; to the
 * store's invoices in that order; or to each as told, and the rest to the store's account.
 */
export type Aim =
	| { invoiceNumber: string }
	| { storeId: string }
	| { storeId: string; told: readonly { number: string; cents: number }[] }

/**
 * Notes money that came in by hand. A discount is taken where what is put to an invoice pays all the rest of it in time;
 * what is over stays on the store's account. `paymentId` is made with the form: a second send of the same form finds the
 * first payment and changes nothing. `books-closed` where `receivedOn` lies in closed books.
 */
export async function recordPayment(query: {
	producerId: string
	aim: Aim
	method: HandMethod
	amountCents: number
	reference: string
	personId: string
	paymentId: string
	/** The day it counts: when the money came in. */
	receivedOn: Day
}): Promise<RecordedPayment> {
	const { producerId, aim, amountCents, paymentId, personId, receivedOn, method, reference } = query
	const done = await withAccount<RecordedPayment>(producerId, async (tx) => {
		const storeId = "storeId" in aim ? aim.storeId : await storeOfInvoice(tx, { producerId, number: aim.invoiceNumber })
		if (!storeId) return { ok: false, reason: "no-such-invoice" }
		await lockStoreAccount(tx, { producerId, storeId })
		const open = await readPayable(tx, { producerId, storeId })
		const laid =
			"told" in aim ? layTold(query, aim.told, open) : { ok: true as const, parts: layFirst(query, aim, open) }
		if (!laid.ok) return (await isNoted(tx, query)) ? readPayment(tx, query) : laid
		const [payment] = await tx
			.insert(payments)
			.values({ producerId, id: paymentId, storeId, method, amountCents, receivedOn, reference, enteredBy: personId })
			.onConflictDoNothing()
			.returning({ id: payments.id })
		if (!payment) return readPayment(tx, query)
		await writeSettlements(tx, { producerId, settledOn: receivedOn, personId }, [{ paymentId, parts: laid.parts }])
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: "record payment",
			subjectType: "payment",
			subjectId: paymentId,
			detail: { method, amountCents, receivedOn, reference, parts: laid.parts },
		})
		return readPayment(tx, query)
	})
	return done === "books-closed" ? { ok: false, reason: "books-closed" } : done
}

type Query = Parameters<typeof recordPayment>[0]

async function storeOfInvoice(tx: Tx, query: { producerId: string; number: string }): Promise<string | null> {
	const named = parseInvoiceNumber(query.number)
	if (!named) return null
	const { rows } = await tx.execute<{ storeId: string }>(sql`
		select store_id as "storeId" from invoices
		where producer_id = ${query.producerId} and year = ${named.year} and sequence = ${named.sequence}`)
	return rows[0]?.storeId ?? null
}

function layFirst({ amountCents, receivedOn }: Query, aim: Aim, open: readonly OpenAccountInvoice[]): LaidPart[] {
	const named = "invoiceNumber" in aim ? open.filter(({ number }) => number === aim.invoiceNumber) : []
	const first = layOldestFirst(amountCents, named, receivedOn)
	const others = open.filter(({ id }) => !named.some((invoice) => invoice.id === id))
	return [...first.parts, ...layOldestFirst(first.onAccountCents, others, receivedOn).parts]
}

type Laid = { ok: true; parts: LaidPart[] } | Exclude<RecordedPayment, { ok: true }>

function layTold(
	{ amountCents, receivedOn }: Query,
	told: readonly { number: string; cents: number }[],
	open: readonly OpenAccountInvoice[],
): Laid {
	const byNumber = new Map(open.map((invoice) => [invoice.number, invoice]))
	const wanted = told.filter(({ cents }) => cents > 0)
	const beyond = wanted.find(({ number, cents }) => cents > (byNumber.get(number)?.openCents ?? 0))
	if (beyond) return { ok: false, reason: "told-more-than-open", number: beyond.number }
	if (wanted.reduce((sum, { cents }) => sum + cents, 0) > amountCents)
		return { ok: false, reason: "told-more-than-paid" }
	const parts = wanted.map(({ number, cents }) => ({ invoiceId: byNumber.get(number)?.id ?? "", cents }))
	return { ok: true, parts: layAsTold(amountCents, parts, open, receivedOn).parts }
}

async function isNoted(tx: Tx, { producerId, paymentId }: Query): Promise<boolean> {
	const [row] = await tx
		.select({ id: payments.id })
		.from(payments)
		.where(and(eq(payments.producerId, producerId), eq(payments.id, paymentId)))
	return row !== undefined
}

type Part = { year: number; sequence: number; cents: number; discountCents: number }

async function readPayment(tx: Tx, { producerId, paymentId }: Query): Promise<RecordedPayment> {
	const { rows: parts } = await tx.execute<Part>(sql`
		select i.year, i.sequence, coalesce(sum(t.amount_cents) filter (where t.kind = 'payment'), 0)::int as cents,
			coalesce(sum(t.amount_cents) filter (where t.kind = 'discount'), 0)::int as "discountCents"
		from settlements t join invoices i on i.producer_id = t.producer_id and i.id = t.invoice_id
		where t.producer_id = ${producerId} and t.payment_id = ${paymentId}
		group by i.year, i.sequence, i.due_on
		order by i.due_on, i.year, i.sequence`)
	const [payment] = await tx
		.select({ amountCents: payments.amountCents })
		.from(payments)
		.where(and(eq(payments.producerId, producerId), eq(payments.id, paymentId)))
	const settled = parts.reduce((sum, part) => sum + part.cents, 0)
	return {
		ok: true,
		settledInvoices: parts.map(({ year, sequence, ...part }) => ({ number: invoiceNumber(year, sequence), ...part })),
		onAccountCents: (payment?.amountCents ?? 0) - settled,
	}
}
