import { sql } from "drizzle-orm"
import { type Tx, withProducer } from "~/db/transaction.server"
import { cutoffWords } from "~/domain/delivery/last-orders"
import { linesOnDate } from "~/domain/standing-orders/lines-on-date"
import { env } from "~/platform/env.server"
import { queueMail } from "~/services/mail/queue-mail.server"
import { findPlacingFacts } from "~/services/orders/find-placing-facts.server"
import { findPeopleOfStores, type StorePerson } from "~/services/orders/order-people.server"
import { findStorePrices } from "~/services/pricing/find-store-prices.server"
import { findAllDates } from "./find-all-dates.server"

const A_DAY = 24 * 60 * 60 * 1000

/**
 * Writes to the people of a store who want to be reminded, a day before the last orders of each date of its standing
 * order: what comes, and where to change that one date. Once for a date, however often this runs; none for a date that is skipped or asks nothing, nor
 * for one that closed before the standing order was reminded of. Returns how many letters were queued.
 */
export function remindDates(query: { producerId: string; now: Date }): Promise<{ reminded: number }> {
	const { producerId, now } = query
	return withProducer(producerId, async (tx) => {
		const all = await findAllDates(tx, { ...query, condition: sql`so.ended_at is null` })
		const near = all.flatMap(({ standing, dates, schedule }) =>
			dates
				.filter((date) => date.isOpen && !date.isSkipped && date.cutoffAt.getTime() - now.getTime() <= A_DAY)
				.map((date) => ({
					standing,
					date,
					schedule,
					onceKey: `standing-reminder:${standing.storeId}:${date.ruleOn}`,
					asked: linesOnDate(standing.lines, standing.changes, date.ruleOn),
				}))
				.filter((one) => one.asked.length > 0),
		)
		const sent = await findSent(
			tx,
			producerId,
			near.map((one) => one.onceKey),
		)
		const due = near.filter((one) => !sent.has(one.onceKey))
		const storeIds = due.map(({ standing }) => standing.storeId)
		const people = await findPeopleOfStores(tx, { producerId, storeIds, kind: "reminders" })
		for (const one of due) await remind(tx, producerId, { ...one, people: people.get(one.standing.storeId) ?? [] })
		return { reminded: due.length }
	})
}

async function findSent(tx: Tx, producerId: string, keys: readonly string[]): Promise<Set<string>> {
	if (keys.length === 0) return new Set()
	const { rows } = await tx.execute<{ key: string }>(sql`
		select once_key as key from outbox_mails
		where producer_id = ${producerId} and once_key = any(${sql.param([...keys])}::text[])`)
	return new Set(rows.map((row) => row.key))
}

type Reminder = Pick<Awaited<ReturnType<typeof findAllDates>>[number], "standing" | "schedule"> & {
	date: { ruleOn: string; deliveryOn: string; cutoffAt: Date }
	onceKey: string
	asked: readonly { productId: string; cases: number }[]
	people: readonly StorePerson[]
}

async function remind(tx: Tx, producerId: string, { standing, schedule, date, onceKey, asked, people }: Reminder) {
	const { storeId } = standing
	const facts = await findPlacingFacts(tx, { producerId, storeId, idempotencyKey: standing.id })
	const productIds = asked.map((line) => line.productId)
	const products = await findStorePrices(tx, { producerId, storeId, today: schedule.today, productIds })
	const lines = products.map((product) => ({
		productName: product.name,
		productNote: [product.detail, `case of ${product.piecesPerCase}`].filter(Boolean).join(", "),
		cases: asked.find((line) => line.productId === product.productId)?.cases ?? 0,
	}))
	if (lines.length === 0) return
	const props = {
		yard: facts.yard,
		storeName: facts.storeName,
		deliveryOn: date.deliveryOn,
		changeUntil: cutoffWords(date.cutoffAt, schedule.zone),
		lines,
		dateUrl: `${env.BASE_URL}/buy/${facts.producerSlug}/${facts.storeSlug}/standing?date=${date.ruleOn}`,
	}
	for (const { email } of people) {
		const template = "standing-order-reminder"
		await queueMail(tx, { producerId, to: email, template, onceKey, props: { ...props, sentTo: email } })
	}
}
