import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { balanceOf, type Totals } from "~/domain/books/trial-balance"
import type { BooksQuery } from "./read-rare-events.server"

/** Two figures that must be the same when the books are right, reckoned in two ways. In cents. */
export type BooksCheck = {
	of: "invoices" | "invoice-lines" | "credit-lines" | "stall-lines" | "payouts" | "fees" | "owed"
	/** Reckoned from the papers, and from the entries. */
	papersCents: number
	booksCents: number
}

/**
 * Lays the entries of a period beside what they come from: sums of papers beside sums of their lines, Stripe's payouts
 * beside the payments that name them. Where the period runs to `today` or beyond, what stores owe by the books is laid
 * beside their open invoices less what they have on account. `after` are the totals at the end of the period.
 */
export async function findChecks(
	tx: Tx,
	query: BooksQuery & { today: string },
	{ after }: { after: Totals },
): Promise<BooksCheck[]> {
	const checks = [...(await checkPapers(tx, query)), ...(await checkPayouts(tx, query))]
	if (query.to >= query.today) checks.push(await checkOwed(tx, query, after))
	return checks
}

async function checkPapers(tx: Tx, { producer, from, to }: BooksQuery): Promise<BooksCheck[]> {
	const { rows } = await tx.execute<Record<string, string>>(sql`
		with issued as (
			select id, lines_cents, lines_cents + delivery_cents + tax_cents as entered, total_cents from invoices
			where producer_id = ${producer.id} and issued_on between ${from}::date and ${to}::date
		), given as (
			select id, total_cents from credits
			where producer_id = ${producer.id} and issued_on between ${from}::date and ${to}::date
		), sold as (
			select id, total_cents from sales where producer_id = ${producer.id} and state = 'paid'
				and (paid_at at time zone ${producer.timeZone})::date between ${from}::date and ${to}::date
		)
		select (select coalesce(sum(total_cents), 0) from issued) as invoices,
			(select coalesce(sum(entered), 0) from issued) as entered,
			(select coalesce(sum(l.line_cents), 0) from issued i
				join invoice_lines l on l.producer_id = ${producer.id} and l.invoice_id = i.id) as "invoiceLines",
			(select coalesce(sum(lines_cents), 0) from issued) as goods,
			(select coalesce(sum(l.line_cents + l.tax_cents), 0) from given c
				join credit_lines l on l.producer_id = ${producer.id} and l.credit_id = c.id) as "creditLines",
			(select coalesce(sum(total_cents), 0) from given) as credits,
			(select coalesce(sum(l.pieces * l.piece_cents), 0) from sold s
				join sale_lines l on l.producer_id = ${producer.id} and l.sale_id = s.id) as "saleLines",
			(select coalesce(sum(total_cents), 0) from sold) as sales`)
	const at = (name: string) => Number(rows[0]?.[name] ?? 0)
	return [
		{ of: "invoices", papersCents: at("invoices"), booksCents: at("entered") },
		{ of: "invoice-lines", papersCents: at("invoiceLines"), booksCents: at("goods") },
		{ of: "credit-lines", papersCents: at("creditLines"), booksCents: at("credits") },
		{ of: "stall-lines", papersCents: at("saleLines"), booksCents: at("sales") },
	]
}

/** What payments and card sales name a payout of the period, less what went back of them, and the fees noted on each. */
async function checkPayouts(tx: Tx, { producer, from, to }: BooksQuery): Promise<BooksCheck[]> {
	const { rows } = await tx.execute<Record<string, string>>(sql`
		with paid_out as (
			select stripe_payout_id as name, gross_cents, fee_cents from payouts
			where producer_id = ${producer.id} and arrived_on between ${from}::date and ${to}::date
		), brought as (
			select p.amount_cents - p.returned_cents as cents, p.fee_cents
			from payments p join paid_out o on o.name = p.stripe_payout_id where p.producer_id = ${producer.id}
			union all
			select s.total_cents, s.fee_cents
			from sales s join paid_out o on o.name = s.stripe_payout_id where s.producer_id = ${producer.id}
		)
		select (select coalesce(sum(cents), 0) from brought) as brought,
			(select coalesce(sum(fee_cents), 0) from brought) as "feesNoted",
			(select coalesce(sum(gross_cents), 0) from paid_out) as gross,
			(select coalesce(sum(fee_cents), 0) from paid_out) as fees`)
	const at = (name: string) => Number(rows[0]?.[name] ?? 0)
	return [
		{ of: "payouts", papersCents: at("brought"), booksCents: at("gross") },
		{ of: "fees", papersCents: at("feesNoted"), booksCents: at("fees") },
	]
}

async function checkOwed(tx: Tx, { producer }: BooksQuery, after: Totals): Promise<BooksCheck> {
	const { rows } = await tx.execute<{ owed: string }>(sql`
		select (select coalesce(sum(open_cents), 0) from invoices where producer_id = ${producer.id} and open_cents > 0)
			- (select coalesce(sum(amount_cents - settled_cents - returned_cents), 0) from payments
				where producer_id = ${producer.id} and state = 'settled' and settled_cents + returned_cents < amount_cents)
			- (select coalesce(sum(total_cents - settled_cents), 0) from credits
				where producer_id = ${producer.id} and settled_cents < total_cents) as owed`)
	return { of: "owed", papersCents: Number(rows[0]?.owed ?? 0), booksCents: balanceOf(after, "receivable") }
}
