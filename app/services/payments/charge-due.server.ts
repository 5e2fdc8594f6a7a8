import { and, eq, sql } from "drizzle-orm"
import { onlinePaymentParts, onlinePayments } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { discountOn } from "~/domain/payments/lay-payment"
import { now } from "~/platform/clock.server"
import { chargeKept, isRefusal, type KeptCharge } from "~/platform/stripe-kept.server"
import { lockStoreAccount } from "~/services/credits/lock-store-account.server"
import { bringIntent } from "./bring-from-stripe.server"
import { queueFailure } from "./queue-failure.server"
import { readPayable } from "./read-payable.server"
import { titleOf } from "./start-payment.server"
import { LEAST_CENTS, leftToPay } from "./visits.server"

/**
 * Takes what is due from the stores that have agreed to it: one payment a store and day, of the invoices that fell due
 * since the store agreed. An invoice is tried once; where the bank refuses, a letter says so and the next try is made by
 * hand. Running it again finds what was begun: its key makes Stripe answer with the same charge. Throws when Stripe does
 * not answer, so that the job comes again.
 */
export async function chargeDue({ producerId }: { producerId: string }): Promise<void> {
	const due = await withProducer(producerId, (tx) => readDueStores(tx, producerId))
	for (const store of due) await withProducer(producerId, (tx) => beginCharge(tx, { producerId, ...store }))
	const begun = await withProducer(producerId, (tx) => readBegun(tx, producerId))
	let failure: unknown
	for (const charge of begun) {
		try {
			await bringIntent(await chargeKept(charge))
		} catch (error) {
			// A request that is refused is refused again; whatever else went wrong is tried anew.
			if (isRefusal(error)) await withProducer(producerId, (tx) => noteRefusal(tx, { producerId, charge }))
			else failure = error
		}
	}
	if (failure) throw failure
}

/** Stripe takes nothing from this way to pay any more: the payer is told, as when the bank refuses. */
async function noteRefusal(tx: Tx, { producerId, charge }: { producerId: string; charge: KeptCharge }): Promise<void> {
	const declineMessage = "The kept way to pay cannot be used any more."
	const [visit] = await tx
		.update(onlinePayments)
		.set({ state: "declined", declineMessage })
		.where(
			and(
				eq(onlinePayments.producerId, producerId),
				eq(onlinePayments.id, charge.key),
				eq(onlinePayments.state, "open"),
			),
		)
		.returning()
	if (!visit) return
	const { method, amountCents } = visit
	await queueFailure(tx, { visit, facts: { intentId: visit.id, method, madeAt: null, amountCents, declineMessage } })
}

type DueStore = { storeId: string; zone: string; invoiceIds: string[] }

async function readDueStores(tx: Tx, producerId: string): Promise<DueStore[]> {
	const today = sql`(${now().toISOString()}::timestamptz at time zone p.time_zone)::date`
	const { rows } = await tx.execute<DueStore>(sql`
		select s.id as "storeId", p.time_zone as zone, array_agg(i.id) as "invoiceIds"
		from stores s
		join producers p on p.id = s.producer_id
		join invoices i on i.producer_id = s.producer_id and i.store_id = s.id and i.open_cents > 0
			and i.due_on between (s.autopay_agreed_at at time zone p.time_zone)::date and ${today}
		where s.producer_id = ${producerId} and s.pays_automatically
			and not exists (
				select from online_payments o
				where o.producer_id = s.producer_id and o.store_id = s.id and o.due_on = ${today}
			)
			and not exists (
				select from online_payment_parts x
				join online_payments o on o.producer_id = x.producer_id and o.id = x.online_payment_id and o.kind = 'automatic'
					and o.state <> 'expired'
				where x.producer_id = i.producer_id and x.invoice_id = i.id
			)
		group by s.id, p.time_zone order by s.id`)
	return rows
}

async function beginCharge(tx: Tx, query: DueStore & { producerId: string }): Promise<void> {
	const { producerId, storeId, zone } = query
	await lockStoreAccount(tx, { producerId, storeId })
	const today: Day = dayInZone(now(), zone)
	const open = (await readPayable(tx, query))
		.map((invoice) => ({ invoice, cents: leftToPay(invoice, today) }))
		.filter(({ cents }) => cents > 0)
	const amountCents = open.reduce((sum, { cents }) => sum + cents, 0)
	if (amountCents < LEAST_CENTS) return
	const { rows } = await tx.execute<{ method: "card" | "bank-debit" }>(sql`
		select case when pays_with_words like 'bank account%' then 'bank-debit' else 'card' end as method
		from stores where producer_id = ${producerId} and id = ${storeId} and pays_automatically`)
	const method = rows[0]?.method
	if (!method) return
	const [made] = await tx
		.insert(onlinePayments)
		.values({ producerId, storeId, kind: "automatic", method, amountCents, dueOn: today })
		.onConflictDoNothing()
		.returning({ id: onlinePayments.id })
	if (!made) return
	await tx.insert(onlinePaymentParts).values(
		open.map(({ invoice, cents }) => ({
			producerId,
			onlinePaymentId: made.id,
			invoiceId: invoice.id,
			amountCents: cents,
			discountCents: invoice.onItsWayCents > 0 ? 0 : discountOn(invoice, today),
		})),
	)
}

type Begun = { id: string; amountCents: number; customerId: string; methodId: string; name: string; numbers: string[] }

/** What was begun and has not been answered; older than Stripe keeps a key, it is left to the nightly look. */
async function readBegun(tx: Tx, producerId: string): Promise<KeptCharge[]> {
	const { rows } = await tx.execute<Begun>(sql`
		select o.id, o.amount_cents as "amountCents", s.stripe_customer_id as "customerId",
			s.stripe_payment_method_id as "methodId", p.name,
			(select array_agg(i.year || '-' || i.sequence order by i.year, i.sequence) from online_payment_parts x
				join invoices i on i.producer_id = x.producer_id and i.id = x.invoice_id
				where x.producer_id = o.producer_id and x.online_payment_id = o.id) as numbers
		from online_payments o
		join stores s on s.producer_id = o.producer_id and s.id = o.store_id
		join producers p on p.id = o.producer_id
		where o.producer_id = ${producerId} and o.kind = 'automatic' and o.state = 'open'
			and o.created_at > now() - interval '20 hours' and s.pays_automatically and s.stripe_customer_id is not null
		order by o.created_at`)
	return rows.map(({ id, name, numbers, ...charge }) => ({
		...charge,
		key: id,
		title: titleOf(name, numbers.map(printed)),
		metadata: { producer_id: producerId, online_payment_id: id },
	}))
}

function printed(yearAndSequence: string): string {
	const [year, sequence] = yearAndSequence.split("-")
	return invoiceNumber(Number(year), Number(sequence))
}
