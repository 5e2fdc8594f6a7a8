import { sql } from "drizzle-orm"
import { auditEntries, invoiceLines, invoices } from "~/db/schema"
import { readProducer, type Tx, withProducer } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { percentWords } from "~/domain/invoicing/percent-words"
import { dueDates, type Terms, termsWords } from "~/domain/invoicing/terms"
import { formatMoney } from "~/domain/money"
import { type ChargedInvoice, chargedMonth, financeCharge } from "~/domain/receivables/finance-charge"
import { mailInvoice } from "~/services/invoicing/issue-invoice.server"
import { takeNumber } from "~/services/numbers/take-number.server"

type Rule = { basisPoints: number; afterDays: number; slug: string; zone: string }

/**
 * Charges what stores had overdue on the first of the month, on its first three days: one invoice for a store and month,
 * however often this runs. Nothing while the producer charges nothing. Each store is charged in a transaction of its own.
 * Returns the numbers of the invoices, by store.
 */
export async function chargeOverdue(query: { producerId: string; now: Date }): Promise<{ charged: string[] }> {
	const { producerId, now } = query
	const rule = await findRule(producerId)
	if (!rule || rule.basisPoints === 0) return { charged: [] }
	const today = dayInZone(now, rule.zone)
	const month = chargedMonth(today)
	if (!month) return { charged: [] }
	const charged: string[] = []
	for (const storeId of await findLateStores({ producerId, asOf: month.asOf, afterDays: rule.afterDays })) {
		const number = await withProducer(producerId, (tx) => chargeStore(tx, { producerId, storeId, rule, month, today }))
		if (number) charged.push(number)
	}
	return { charged }
}

function findRule(producerId: string): Promise<Rule | null> {
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Rule>(sql`
			select g.finance_charge_basis_points as "basisPoints", g.finance_charge_after_days::int as "afterDays", y.slug,
				y.time_zone as zone
			from producer_settings g join producers y on y.id = g.producer_id where g.producer_id = ${producerId}`)
		return rows[0] ?? null
	})
}

function findLateStores(query: { producerId: string; asOf: Day; afterDays: number }): Promise<string[]> {
	const { producerId, asOf, afterDays } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<{ id: string }>(sql`
			select distinct i.store_id as id from invoices i
			where i.producer_id = ${producerId} and i.open_cents > 0 and i.kind = 'goods'
				and i.due_on < ${asOf}::date - ${afterDays}::int
			order by i.store_id`)
		return rows.map(({ id }) => id)
	})
}

type StoreRow = {
	slug: string
	kind: Terms["kind"]
	days: number
	discountBasisPoints: number
	discountDays: number
}

async function chargeStore(
	tx: Tx,
	query: { producerId: string; storeId: string; rule: Rule; month: { key: string; asOf: Day }; today: Day },
): Promise<string | null> {
	const { producerId, storeId, rule, month, today } = query
	// Whoever settles or charges something of the store waits here, so that nothing is charged that is just being paid.
	const { rows: stores } = await tx.execute<StoreRow>(sql`
		select slug, terms_kind as kind, terms_days::int as days, 0 as "discountBasisPoints", 0 as "discountDays"
		from stores where producer_id = ${producerId} and id = ${storeId} for no key update`)
	const [store] = stores
	if (!store) return null
	const onceKey = `finance-charge ${month.key} ${storeId}`
	const { rows: open } = await tx.execute<Omit<ChargedInvoice, "number"> & { year: number; sequence: number }>(sql`
		select year::int, sequence, kind, due_on::text as "dueOn", open_cents as "openCents" from invoices
		where producer_id = ${producerId} and store_id = ${storeId} and open_cents > 0
			and not exists (select from invoices m where m.producer_id = ${producerId} and m.once_key = ${onceKey})
		order by due_on, year, sequence`)
	const charge = financeCharge(
		open.map(({ year, sequence, ...invoice }) => ({ ...invoice, number: invoiceNumber(year, sequence) })),
		{ ...rule, asOf: month.asOf },
	)
	if (!charge) return null
	const year = Number(today.slice(0, 4))
	const sequence = await takeNumber(tx, { producerId, series: "invoice", year })
	const number = invoiceNumber(year, sequence)
	const [written] = await tx
		.insert(invoices)
		.values({
			producerId,
			year,
			sequence,
			storeId,
			kind: "finance-charge",
			onceKey,
			issuedOn: today,
			dueOn: dueDates(store, today).dueOn,
			linesCents: charge.cents,
			deliveryCents: 0,
			taxCents: 0,
			totalCents: charge.cents,
			termsWords: termsWords(store),
		})
		.returning({ id: invoices.id })
	if (!written) throw new Error("an insert returns its row")
	await tx.insert(invoiceLines).values({
		producerId,
		invoiceId: written.id,
		position: 1,
		code: "",
		name: "Charge for paying late",
		detail: chargeWords(charge, rule),
		netGrams: 0,
		askedCases: 0,
		sentCases: 0,
		caseCents: 0,
		lineCents: charge.cents,
	})
	await tx.insert(auditEntries).values({
		producerId,
		action: "finance charge issued",
		subjectType: "invoice",
		subjectId: written.id,
		detail: { number, month: month.key, ...charge },
	})
	await mailInvoice(tx, {
		producer: { id: producerId, slug: rule.slug },
		store: { id: storeId, slug: store.slug },
		number,
	})
	return number
}

/** "1.5 % of $1,200.00 that was more than 30 days late: 2026-0012, 2026-0013"; long lists are cut. */
function chargeWords({ overdueCents, numbers }: { overdueCents: number; numbers: string[] }, rule: Rule): string {
	const named = numbers.slice(0, 8).join(", ")
	const more = numbers.length > 8 ? ` and ${numbers.length - 8} more` : ""
	return `${percentWords(rule.basisPoints)} of ${formatMoney(overdueCents)} that was more than ${rule.afterDays} days late: ${named}${more}`
}
