import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { addDays, type Day } from "~/domain/calendar"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { type ReminderStep, stepToWrite } from "~/domain/receivables/reminders"
import { onAccountByStore } from "./aged-sums.server"

/** An open invoice that a step is to be written about; `openCents` is less what is on its way. */
export type DueReminder<Step> = {
	step: Step
	storeId: string
	invoice: { id: string; number: string; dueOn: Day; openCents: number }
}

type Row = {
	id: string
	storeId: string
	year: number
	sequence: number
	issuedOn: Day
	dueOn: Day
	openCents: number
	isTakenByItself: boolean
	writtenSteps: string[]
	onAccountCents: number
}

/**
 * The invoices that have reached a step of the schedule on `today`, by store and due day. Left out: stores on hold, what
 * was written already, what is paid or on its way, and stores with enough on their account to pay all that a letter names.
 */
export async function findDueReminders<Step extends ReminderStep>(
	tx: Tx,
	query: { producerId: string; today: Day; steps: readonly Step[] },
): Promise<DueReminder<Step>[]> {
	const { producerId, today, steps } = query
	if (steps.length === 0) return []
	const days = steps.map(({ daysAfterDue }) => daysAfterDue)
	const { rows } = await tx.execute<Row>(sql`
		select i.id, i.store_id as "storeId", i.year::int, i.sequence, i.issued_on::text as "issuedOn",
			i.due_on::text as "dueOn", (i.open_cents - coalesce(way.cents, 0))::int as "openCents",
			s.pays_automatically as "isTakenByItself",
			array(
				select r.step_id::text from reminders_sent r
				where r.producer_id = i.producer_id and r.invoice_id = i.id
			) as "writtenSteps",
			coalesce(a.cents, 0) as "onAccountCents"
		from invoices i
		join stores s on s.producer_id = i.producer_id and s.id = i.store_id and not s.reminders_held
		left join (${onAccountByStore(producerId)}) as a on a.store_id = i.store_id
		left join lateral (
			select sum(p.amount_cents + p.discount_cents) as cents
			from online_payment_parts p
			join online_payments o on o.producer_id = p.producer_id and o.id = p.online_payment_id and o.state = 'on-its-way'
			where p.producer_id = i.producer_id and p.invoice_id = i.id
		) as way on true
		where i.producer_id = ${producerId} and i.open_cents > 0 and i.open_cents > coalesce(way.cents, 0)
			and i.due_on between ${addDays(today, -Math.max(...days) - 7)} and ${addDays(today, -Math.min(...days))}
		order by i.store_id, i.due_on, i.year, i.sequence`)
	const due = rows.flatMap((row) => {
		const step = stepToWrite(row, steps, today)
		return step ? [{ row, step }] : []
	})
	const named = new Map<string, number>()
	const letterOf = ({ row, step }: { row: Row; step: Step }) => `${row.storeId} ${step.id}`
	for (const one of due) named.set(letterOf(one), (named.get(letterOf(one)) ?? 0) + one.row.openCents)
	return due
		.filter((one) => one.row.onAccountCents < (named.get(letterOf(one)) ?? 0))
		.map(({ row, step }) => ({
			step,
			storeId: row.storeId,
			invoice: {
				id: row.id,
				number: invoiceNumber(row.year, row.sequence),
				dueOn: row.dueOn,
				openCents: row.openCents,
			},
		}))
}
