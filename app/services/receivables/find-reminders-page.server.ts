import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"

/** The producer's schedule of reminders, and what has gone by it lately. */
export type RemindersPage = {
	remindersOn: boolean
	financeChargeBasisPoints: number
	financeChargeAfterDays: number
	steps: { id: string; daysAfterDue: number; subject: string; body: string; isActive: boolean }[]
	held: { slug: string; name: string }[]
	/** The latest letters, one line for a store, step and moment. */
	sent: { storeSlug: string; storeName: string; daysAfterDue: number; invoices: number; at: Date }[]
}

const LAST_SENT = 20

/** Reads the schedule by day, the stores on hold by name, and the last letters. One statement each. */
export function findRemindersPage(query: { producerId: string }): Promise<RemindersPage> {
	const { producerId } = query
	return readProducer(producerId, async (tx) => {
		const { rows: settings } = await tx.execute<
			Pick<RemindersPage, "remindersOn" | "financeChargeBasisPoints" | "financeChargeAfterDays">
		>(sql`
			select reminders_on as "remindersOn", finance_charge_basis_points as "financeChargeBasisPoints",
				finance_charge_after_days::int as "financeChargeAfterDays"
			from producer_settings where producer_id = ${producerId}`)
		if (!settings[0]) throw new Error("every producer has settings")
		const { rows: steps } = await tx.execute<RemindersPage["steps"][number]>(sql`
			select id, days_after_due::int as "daysAfterDue", subject, body, is_active as "isActive"
			from reminder_steps where producer_id = ${producerId} order by days_after_due`)
		const { rows: held } = await tx.execute<RemindersPage["held"][number]>(sql`
			select slug, name from stores where producer_id = ${producerId} and reminders_held order by name, id`)
		const { rows: sent } = await tx.execute<Omit<RemindersPage["sent"][number], "at"> & { at: string }>(sql`
			select s.slug as "storeSlug", s.name as "storeName", t.days_after_due::int as "daysAfterDue",
				count(*)::int as invoices, r.sent_at as at
			from (
				select * from reminders_sent where producer_id = ${producerId} order by sent_at desc limit 500
			) as r
			join invoices i on i.producer_id = r.producer_id and i.id = r.invoice_id
			join stores s on s.producer_id = i.producer_id and s.id = i.store_id
			join reminder_steps t on t.producer_id = r.producer_id and t.id = r.step_id
			group by s.slug, s.name, t.days_after_due, r.sent_at
			order by r.sent_at desc, s.name limit ${LAST_SENT}`)
		return { ...settings[0], steps, held, sent: sent.map((one) => ({ ...one, at: new Date(one.at) })) }
	})
}
