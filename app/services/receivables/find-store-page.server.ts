import { and, eq, sql } from "drizzle-orm"
import { stores } from "~/db/schema"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { type Ageing, ageingOf } from "~/domain/invoicing/ageing"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { agedSums, onAccountByStore } from "./aged-sums.server"
import { markOf, type StoreTerms, termsOfRow } from "./store-terms.server"

/** One store as its producer sees it. Money is cents. */
export type StorePage = {
	id: string
	terms: StoreTerms
	/** Of the terms as they are now, for a form that sets them. */
	mark: string
	tierName: string
	owed: { ageing: Ageing; owedCents: number; onAccountCents: number; onItsWayCents: number }
	waysToPay: { words: string; isAutomatic: boolean; agreedBy: string | null; agreedAt: Date | null }
	resaleCertificateUntil: Day | null
	certificatesWaiting: number
	rounds: number[]
	people: { name: string; email: string; pays: boolean }[]
	promises: {
		id: string
		amountCents: number
		promisedOn: Day
		note: string
		state: "open" | "kept" | "broken"
		notedBy: string
	}[]
	orders: { number: number; deliveryOn: Day; state: string; cases: number }[]
	openInvoices: { id: string; number: string; dueOn: Day; openCents: number }[]
	reminders: { at: Date; daysAfterDue: number; invoices: string[] }[]
	givenUp: { number: string; on: Day; cents: number }[]
}

const LAST = 8
const MOST_OPEN = 100

/** Reads a store by the name it has in addresses; null when there is none. One moment. */
export function findStorePage(query: { producerId: string; slug: string; today: Day }): Promise<StorePage | null> {
	const { producerId, slug, today } = query
	return readProducer(producerId, async (tx) => {
		const [row] = await tx
			.select()
			.from(stores)
			.where(and(eq(stores.producerId, producerId), eq(stores.slug, slug)))
		if (!row) return null
		const of = { producerId, storeId: row.id }
		const terms = termsOfRow(row)
		return {
			id: row.id,
			terms,
			mark: markOf(terms),
			owed: await readOwed(tx, { ...of, today }),
			resaleCertificateUntil: row.resaleCertificateUntil,
			...(await readFacts(tx, row)),
			...(await readLists(tx, of)),
		}
	})
}

type Of = { producerId: string; storeId: string }

async function readOwed(tx: Tx, { producerId, storeId, today }: Of & { today: Day }): Promise<StorePage["owed"]> {
	const { rows } = await tx.execute<{
		aged: (number | null)[]
		owedCents: number
		onAccountCents: number
		onItsWayCents: number
	}>(sql`
		select ${agedSums(sql`i.due_on`, sql`i.open_cents`, today)} as aged,
			coalesce(sum(i.open_cents), 0)::float8 as "owedCents",
			coalesce((select cents from (${onAccountByStore(producerId, storeId)}) as a), 0) as "onAccountCents",
			coalesce((
				select sum(p.amount_cents) from payments p
				where p.producer_id = ${producerId} and p.store_id = ${storeId} and p.state = 'on-its-way'
			), 0)::float8 as "onItsWayCents"
		from invoices i
		where i.producer_id = ${producerId} and i.store_id = ${storeId} and i.open_cents > 0`)
	const { aged, ...sums } = rows[0] as (typeof rows)[number]
	return { ageing: ageingOf(aged), ...sums }
}

type Facts = Pick<StorePage, "tierName" | "rounds" | "people" | "certificatesWaiting" | "waysToPay">

async function readFacts(tx: Tx, row: typeof stores.$inferSelect): Promise<Facts> {
	const { producerId, id: storeId, autopayAgreedBy, tierId } = row
	const { rows } = await tx.execute<Omit<Facts, "waysToPay"> & { agreedBy: string | null }>(sql`
		select t.name as "tierName", (select u.name from users u where u.id = ${autopayAgreedBy}) as "agreedBy",
			(
				select count(*)::int from exemption_certificates c
				where c.producer_id = ${producerId} and c.store_id = ${storeId} and c.state = 'handed-in'
			) as "certificatesWaiting",
			array(
				select r.weekday::int from store_rounds sr
				join delivery_rounds r on r.producer_id = sr.producer_id and r.id = sr.round_id
				where sr.producer_id = ${producerId} and sr.store_id = ${storeId} order by r.weekday
			) as rounds,
			coalesce((
				select json_agg(json_build_object('name', who.name, 'email', who.email, 'pays', who.pays) order by who.name)
				from (
					select u.name, u.email, bool_or(m.role = 'payer') as pays from memberships m join users u on u.id = m.user_id
					where m.producer_id = ${producerId} and m.store_id = ${storeId} and m.ended_at is null
					group by u.id, u.name, u.email
				) as who
			), '[]'::json) as people
		from price_tiers t where t.producer_id = ${producerId} and t.id = ${tierId}`)
	const { agreedBy, ...facts } = rows[0] as (typeof rows)[number]
	const { paysWithWords: words, paysAutomatically: isAutomatic, autopayAgreedAt: agreedAt } = row
	return { ...facts, waysToPay: { words, isAutomatic, agreedBy, agreedAt } }
}

type Lists = Pick<StorePage, "promises" | "orders" | "openInvoices" | "reminders" | "givenUp">
type Numbered = { year: number; sequence: number }

async function readLists(tx: Tx, { producerId, storeId }: Of): Promise<Lists> {
	const { rows: promises } = await tx.execute<StorePage["promises"][number]>(sql`
		select p.id, p.amount_cents as "amountCents", p.promised_on::text as "promisedOn", p.note, p.state, u.name as "notedBy"
		from payment_promises p join users u on u.id = p.noted_by
		where p.producer_id = ${producerId} and p.store_id = ${storeId}
		order by p.promised_on desc, p.id desc limit ${LAST}`)
	const { rows: orders } = await tx.execute<StorePage["orders"][number]>(sql`
		select o.number, o.delivery_on::text as "deliveryOn", o.state,
			coalesce((
				select sum(coalesce(l.given_cases, l.asked_cases)) from order_lines l
				where l.producer_id = o.producer_id and l.order_id = o.id
			), 0)::int as cases
		from orders o where o.producer_id = ${producerId} and o.store_id = ${storeId}
		order by o.delivery_on desc, o.number desc limit ${LAST}`)
	const { rows: open } = await tx.execute<Numbered & { id: string; dueOn: Day; openCents: number }>(sql`
		select id, year::int, sequence, due_on::text as "dueOn", open_cents as "openCents" from invoices
		where producer_id = ${producerId} and store_id = ${storeId} and open_cents > 0
		order by due_on, id limit ${MOST_OPEN}`)
	const { rows: reminders } = await tx.execute<{ at: string; daysAfterDue: number; invoices: string[] }>(sql`
		select r.sent_at as at, t.days_after_due::int as "daysAfterDue",
			array_agg(i.year || '-' || lpad(i.sequence::text, greatest(4, length(i.sequence::text)), '0')
				order by i.year, i.sequence) as invoices
		from invoices i
		join reminders_sent r on r.producer_id = i.producer_id and r.invoice_id = i.id
		join reminder_steps t on t.producer_id = r.producer_id and t.id = r.step_id
		where i.producer_id = ${producerId} and i.store_id = ${storeId}
		group by r.sent_at, t.days_after_due order by r.sent_at desc limit ${LAST}`)
	const { rows: givenUp } = await tx.execute<Numbered & { on: Day; cents: number }>(sql`
		select i.year::int, i.sequence, t.settled_on::text as "on", t.amount_cents as cents
		from invoices i join settlements t on t.producer_id = i.producer_id and t.invoice_id = i.id and t.kind = 'write-off'
		where i.producer_id = ${producerId} and i.store_id = ${storeId} and i.written_off_cents > 0
		order by t.settled_at desc limit ${LAST}`)
	return {
		promises,
		orders,
		openInvoices: open.map(({ year, sequence, ...rest }) => ({ ...rest, number: invoiceNumber(year, sequence) })),
		reminders: reminders.map((one) => ({ ...one, at: new Date(one.at) })),
		givenUp: givenUp.map(({ year, sequence, ...rest }) => ({ ...rest, number: invoiceNumber(year, sequence) })),
	}
}
