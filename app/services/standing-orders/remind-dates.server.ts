import { sql } from "drizzle-orm"
import { type Tx, withProducer } from "~/db/transaction.server"
import { cutoffWords } from "~/domain/delivery/last-orders"
import { linesOnDate } from "~/domain/standing-orders/lines-on-date"
import { env } from "~/platform/env.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { findPeopleOfStores } from "~/services/orders/order-people.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"
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
		if (due.length > 0) await queueMails(tx, producerId, await lettersOf(tx, producerId, due))
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
}

/** One letter to each person for each date that still asks for something that is sold; three statements for all. */
async function lettersOf(tx: Tx, producerId: string, due: readonly Reminder[]) {
	const storeIds = [...new Set(due.map(({ standing }) => standing.storeId))]
	const people = await findPeopleOfStores(tx, { producerId, storeIds, kind: "reminders" })
	const yard = letterHead(await findYard(tx, producerId))
	const stores = await findSold(tx, producerId, due)
	return due.flatMap(({ standing, schedule, date, onceKey, asked }) => {
		const store = stores.get(standing.storeId)
		const lines = asked.flatMap(({ productId, cases }) => {
			const product = store?.products.get(productId)
			return product ? { productName: product.name, productNote: product.note, cases } : []
		})
		if (!store || lines.length === 0) return []
		return (people.get(standing.storeId) ?? []).map(({ email }) => ({
			to: email,
			template: "standing-order-reminder" as const,
			onceKey,
			props: {
				yard,
				sentTo: email,
				storeName: store.name,
				deliveryOn: date.deliveryOn,
				changeUntil: cutoffWords(date.cutoffAt, schedule.zone),
				lines,
				dateUrl: `${env.BASE_URL}/buy/${store.producerSlug}/${store.slug}/standing?date=${date.ruleOn}`,
			},
		}))
	})
}

type Store = {
	name: string
	slug: string
	producerSlug: string
	products: Map<string, { name: string; note: string }>
}

/** The stores of these dates, and what of their lines is sold to them: active, and with a price of the store or its tier. */
async function findSold(tx: Tx, producerId: string, due: readonly Reminder[]): Promise<Map<string, Store>> {
	const pairs = due.flatMap(({ standing, asked }) => asked.map(({ productId }) => [standing.storeId, productId]))
	const { rows } = await tx.execute<
		Omit<Store, "products"> & { storeId: string; productId: string; productName: string; note: string }
	>(sql`
		select distinct s.id as "storeId", s.name, s.slug, y.slug as "producerSlug", p.id as "productId",
			p.name as "productName", concat_ws(', ', nullif(p.detail, ''), 'case of ' || p.pieces_per_case) as note
		from unnest(${sql.param(pairs.map(([storeId]) => storeId))}::uuid[],
			${sql.param(pairs.map(([, productId]) => productId))}::uuid[]) as asked(store_id, product_id)
		join stores s on s.producer_id = ${producerId} and s.id = asked.store_id
		join producers y on y.id = s.producer_id
		join products p on p.producer_id = s.producer_id and p.id = asked.product_id and p.is_active
		where exists (select from prices r
				where r.producer_id = s.producer_id and r.tier_id = s.tier_id and r.product_id = p.id)
			or exists (select from store_prices o
				where o.producer_id = s.producer_id and o.store_id = s.id and o.product_id = p.id)`)
	const stores = new Map<string, Store>()
	for (const { storeId, productId, productName, note, ...store } of rows) {
		const found = stores.get(storeId) ?? { ...store, products: new Map() }
		found.products.set(productId, { name: productName, note })
		stores.set(storeId, found)
	}
	return stores
}
