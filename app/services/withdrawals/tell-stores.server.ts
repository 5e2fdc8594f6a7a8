import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { withdrawalNotices } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { env } from "~/platform/env.server"
import { randomToken } from "~/platform/secrets.server"
import { hashToken } from "~/platform/session-cookie.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"

const AT_ONCE = 1_000

/** A store that had pieces of the lots: how many of each, and who is told. */
type Holder = {
	storeId: string
	storeName: string
	pieces: number
	lots: { code: string; productName: string; pieces: number }[]
	recipients: string[]
}

/**
 * Writes one notice for each store that was sent pieces of the lots, and queues a letter to each of its buyers and
 * payers, or to the store's own address where it has none of those. A store without either keeps its notice, and has
 * to be called. Answers how many of each.
 */
export async function tellStores(
	tx: Tx,
	query: {
		producer: { id: string; slug: string }
		withdrawalId: string
		number: number
		lotIds: readonly string[]
		reason: string
		instructions: string
	},
): Promise<{ stores: number; letters: number }> {
	const { producer, withdrawalId, number, lotIds, reason, instructions } = query
	const producerId = producer.id
	const holders = await findHolders(tx, { producerId, lotIds })
	if (holders.length === 0) return { stores: 0, letters: 0 }
	const told = holders.map((holder) => ({ ...holder, noticeId: randomUUID(), token: randomToken() }))
	for (let from = 0; from < told.length; from += AT_ONCE) {
		await tx.insert(withdrawalNotices).values(
			told.slice(from, from + AT_ONCE).map(({ noticeId, storeId, pieces, token }) => ({
				producerId,
				id: noticeId,
				withdrawalId,
				storeId,
				pieces,
				tokenHash: hashToken(token),
			})),
		)
	}
	const yard = letterHead(await findYard(tx, producerId))
	const mails = told.flatMap(({ noticeId, token, storeName, lots, recipients }) =>
		recipients.map((to) => ({
			to,
			onceKey: noticeKey(noticeId),
			template: "withdrawal" as const,
			props: {
				yard,
				sentTo: to,
				storeName,
				number,
				reason,
				instructions,
				lots,
				noticeUrl: `${env.BASE_URL}/shop/${producer.slug}/notices/${token}`,
			},
		})),
	)
	await queueMails(tx, producerId, mails)
	return { stores: told.length, letters: mails.length }
}

/** Names the letters of one notice in the outbox. */
function noticeKey(noticeId: string): string {
	return `withdrawal ${noticeId}`
}

async function findHolders(tx: Tx, query: { producerId: string; lotIds: readonly string[] }): Promise<Holder[]> {
	const { producerId, lotIds } = query
	const { rows } = await tx.execute<Holder>(sql`
		with had as (
			select o.store_id, l.code, p.name as product_name, sum(x.pieces)::int as pieces
			from order_line_lots x
			join lots l on l.producer_id = x.producer_id and l.id = x.lot_id
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
			join order_lines e on e.producer_id = x.producer_id and e.id = x.order_line_id
			join orders o on o.producer_id = e.producer_id and o.id = e.order_id and o.state in ('sent', 'received')
			where x.producer_id = ${producerId} and x.lot_id = any(${sql.param(lotIds)}::uuid[])
			group by 1, 2, 3
		), people as (
			select m.store_id, array_agg(distinct u.email) as emails
			from memberships m join users u on u.id = m.user_id
			where m.producer_id = ${producerId} and m.role in ('buyer', 'payer') and m.ended_at is null
			group by 1
		)
		select s.id as "storeId", s.name as "storeName", sum(h.pieces)::int as pieces,
			json_agg(json_build_object('code', h.code, 'productName', h.product_name, 'pieces', h.pieces)
				order by h.code) as lots,
			coalesce((select r.emails from people r where r.store_id = s.id),
				case when s.email = '' then array[]::text[] else array[s.email] end) as recipients
		from had h join stores s on s.producer_id = ${producerId} and s.id = h.store_id
		group by s.id, s.name, s.email
		order by s.name, s.id`)
	return rows
}
