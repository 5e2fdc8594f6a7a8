import { sql } from "drizzle-orm"
import { remindersSent } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { dayInZone, instantAt } from "~/domain/calendar"
import { fillBlanks } from "~/domain/receivables/reminders"
import { env } from "~/platform/env.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { findPeopleOfStores } from "~/services/orders/order-people.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"
import { type DueReminder, findDueReminders } from "./find-due-reminders.server"

/** No letter goes before this hour of the producer's day. */
const MORNING = "07:00"
const AT_ONCE = 1_000

type Step = { id: string; daysAfterDue: number; subject: string; body: string }

/**
 * Writes to each store about the invoices that have reached a step of the producer's schedule: one letter for a store and
 * step, to each person who takes reminders. Once for an invoice and step, however often and late this runs; from seven in
 * the morning of the producer's day. Nothing while reminders are off. Returns how many letters were queued.
 */
export function sendReminders(query: { producerId: string; now: Date }): Promise<{ letters: number }> {
	const { producerId, now } = query
	return withProducer(producerId, async (tx) => {
		const schedule = await findSchedule(tx, producerId)
		if (!schedule) return { letters: 0 }
		const today = dayInZone(now, schedule.zone)
		if (now < instantAt(today, MORNING, schedule.zone)) return { letters: 0 }
		const due = await findDueReminders(tx, { producerId, today, steps: schedule.steps })
		const storeIds = [...new Set(due.map(({ storeId }) => storeId))]
		const people = await findPeopleOfStores(tx, { producerId, storeIds, kind: "reminders" })
		const fresh = await claim(
			tx,
			producerId,
			due.filter(({ storeId }) => (people.get(storeId) ?? []).length > 0),
		)
		const letters = await lettersOf(tx, { producerId, producerSlug: schedule.slug, due: fresh, people })
		if (letters.length > 0) await queueMails(tx, producerId, letters)
		return { letters: letters.length }
	})
}

async function findSchedule(tx: Tx, producerId: string) {
	const { rows } = await tx.execute<{ slug: string; zone: string; steps: Step[] }>(sql`
		select y.slug, y.time_zone as zone,
			coalesce((
				select json_agg(json_build_object('id', r.id, 'daysAfterDue', r.days_after_due, 'subject', r.subject, 'body', r.body))
				from reminder_steps r where r.producer_id = y.id and r.is_active
			), '[]'::json) as steps
		from producers y join producer_settings g on g.producer_id = y.id and g.reminders_on
		where y.id = ${producerId}`)
	return rows[0] ?? null
}

/** Notes that these are written; what another run has noted meanwhile is left out. */
async function claim(tx: Tx, producerId: string, due: readonly DueReminder<Step>[]): Promise<DueReminder<Step>[]> {
	const claimed = new Set<string>()
	for (let from = 0; from < due.length; from += AT_ONCE) {
		const rows = await tx
			.insert(remindersSent)
			.values(
				due.slice(from, from + AT_ONCE).map((one) => ({ producerId, invoiceId: one.invoice.id, stepId: one.step.id })),
			)
			.onConflictDoNothing()
			.returning({ invoiceId: remindersSent.invoiceId, stepId: remindersSent.stepId })
		for (const { invoiceId, stepId } of rows) claimed.add(`${invoiceId} ${stepId}`)
	}
	return due.filter((one) => claimed.has(`${one.invoice.id} ${one.step.id}`))
}

async function lettersOf(
	tx: Tx,
	query: {
		producerId: string
		producerSlug: string
		due: readonly DueReminder<Step>[]
		people: Awaited<ReturnType<typeof findPeopleOfStores>>
	},
) {
	const { producerId, producerSlug, due, people } = query
	if (due.length === 0) return []
	const yard = letterHead(await findYard(tx, producerId))
	const storeIds = [...new Set(due.map(({ storeId }) => storeId))]
	const { rows } = await tx.execute<{ id: string; name: string; slug: string }>(sql`
		select id, name, slug from stores
		where producer_id = ${producerId} and id = any(${sql.param(storeIds)}::uuid[])`)
	const stores = new Map(rows.map((store) => [store.id, store]))
	const groups = new Map<string, DueReminder<Step>[]>()
	for (const one of due) {
		const key = `${one.storeId} ${one.step.id}`
		groups.set(key, [...(groups.get(key) ?? []), one])
	}
	return [...groups.values()].flatMap((group) => {
		const [first] = group
		const store = first && stores.get(first.storeId)
		if (!first || !store) return []
		const invoicesUrl = `${env.BASE_URL}/buy/${producerSlug}/${store.slug}/invoices`
		const invoices = group.map(({ invoice }) => invoice)
		const fill = (text: string) => fillBlanks(text, { storeName: store.name, yardName: yard.name, invoices })
		return (people.get(first.storeId) ?? []).map(({ email }) => ({
			to: email,
			template: "reminder" as const,
			onceKey: `reminder:${first.step.id}:${first.invoice.id}`,
			props: {
				yard,
				sentTo: email,
				subject: fill(first.step.subject).slice(0, 300),
				body: fill(first.step.body),
				invoices: invoices.map(({ number, dueOn, openCents }) => ({
					number,
					dueOn,
					openCents,
					invoiceUrl: `${invoicesUrl}/${number}`,
				})),
				invoicesUrl,
			},
		}))
	})
}
