import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { type ForwardTrace, readForwardTrace, type TracedMarketDay } from "~/services/trace/find-forward-trace.server"
import { inHandOf } from "./pieces-of-lot.server"

/** Which notices of a withdrawal a page shows. */
export type NoticeFilter = "all" | "no-letter" | "not-opened" | "not-answered" | "answered"

/** One store's notice. `letters` counts those queued, `sent` those that the mail server took. */
export type Notice = {
	id: string
	storeName: string
	phone: string
	pieces: number
	letters: number
	sent: number
	lastError: string
	openedAt: Date | null
	answeredAt: Date | null
	heldPieces: number | null
	answerNote: string
}

export type Withdrawal = {
	number: number
	reason: string
	instructions: string
	startedAt: Date
	startedBy: string | null
	lots: { code: string; productName: string; piecesOut: number; inHand: number }[]
	totals: {
		stores: number
		pieces: number
		mailed: number
		toCall: number
		opened: number
		answered: number
		heldPieces: number
		/** Pieces of the stores that have not answered. */
		unansweredPieces: number
	}
	/** Orders that were packed from the lots and have not left. */
	packedOrders: ForwardTrace["orders"]
	marketDays: TracedMarketDay[]
	notices: Notice[]
	next: string | null
}

const PAGE = 100

/**
 * One withdrawal by its number, with what is left where and a page of its notices: 100 by the stores' names, of those that
 * `filter` names. `after` is the `next` of an earlier page. Null when the producer has none of that number.
 */
export function findWithdrawal(query: {
	producerId: string
	number: number
	filter: NoticeFilter
	after: string | null
}): Promise<Withdrawal | null> {
	const { producerId, number } = query
	return readProducer(producerId, async (tx) => {
		const {
			rows: [found],
		} = await tx.execute<
			Pick<Withdrawal, "reason" | "instructions" | "startedBy"> & {
				id: string
				startedAt: Date | string
				lots: { code: string; productName: string; piecesOut: number }[]
			}
		>(sql`
			select w.id, w.reason, w.instructions, w.started_at as "startedAt", u.name as "startedBy",
				(select coalesce(json_agg(json_build_object('code', l.code, 'productName', p.name, 'piecesOut', x.pieces_out)
					order by l.code), '[]'::json)
					from withdrawal_lots x
					join lots l on l.producer_id = x.producer_id and l.id = x.lot_id
					join products p on p.producer_id = l.producer_id and p.id = l.product_id
					where x.producer_id = w.producer_id and x.withdrawal_id = w.id) as lots
			from withdrawals w left join users u on u.id = w.started_by
			where w.producer_id = ${producerId} and w.number = ${number}`)
		if (!found) return null
		const codes = found.lots.map(({ code }) => code)
		const trace = await readForwardTrace(tx, { producerId, codes })
		const withdrawn = new Map(trace.lots.map((lot) => [lot.code, inHandOf(lot)]))
		const { id, ...facts } = found
		return {
			number,
			...facts,
			startedAt: new Date(found.startedAt),
			lots: found.lots.map((lot) => ({ ...lot, inHand: withdrawn.get(lot.code) ?? 0 })),
			totals: await countNotices(tx, { producerId, withdrawalId: id }),
			packedOrders: trace.orders.filter(({ lot, state }) => codes.includes(lot) && state === "packed"),
			marketDays: trace.marketDays.filter(({ lot }) => codes.includes(lot)),
			...(await listNotices(tx, { ...query, withdrawalId: id })),
		}
	})
}

/** The letters of a notice in the outbox: how many, how many have gone, and what the mail server last said. */
const LETTERS = sql`
	select count(*)::int as letters, count(m.sent_at)::int as sent,
		coalesce(max(m.last_error) filter (where m.sent_at is null), '') as "lastError"
	from outbox_mails m where m.producer_id = n.producer_id and m.once_key = 'withdrawal ' || n.id`

async function countNotices(
	tx: Tx,
	query: { producerId: string; withdrawalId: string },
): Promise<Withdrawal["totals"]> {
	const { rows } = await tx.execute<Withdrawal["totals"]>(sql`
		select count(*)::int as stores, coalesce(sum(n.pieces), 0)::int as pieces,
			count(*) filter (where m.sent > 0)::int as mailed, count(*) filter (where m.letters = 0)::int as "toCall",
			count(n.opened_at)::int as opened, count(n.answered_at)::int as answered,
			coalesce(sum(n.held_pieces), 0)::int as "heldPieces",
			coalesce(sum(n.pieces) filter (where n.answered_at is null), 0)::int as "unansweredPieces"
		from withdrawal_notices n join lateral (${LETTERS}) m on true
		where n.producer_id = ${query.producerId} and n.withdrawal_id = ${query.withdrawalId}`)
	const [totals] = rows
	if (!totals) throw new Error("an aggregate answers one row")
	return totals
}

const FILTERS: Record<NoticeFilter, ReturnType<typeof sql>> = {
	all: sql``,
	"no-letter": sql`and m.letters = 0`,
	"not-opened": sql`and n.opened_at is null`,
	"not-answered": sql`and n.answered_at is null`,
	answered: sql`and n.answered_at is not null`,
}

async function listNotices(
	tx: Tx,
	query: { producerId: string; withdrawalId: string; filter: NoticeFilter; after: string | null },
): Promise<Pick<Withdrawal, "notices" | "next">> {
	const { producerId, withdrawalId, filter, after } = query
	const [, afterId] = /^([0-9a-f-]{36})$/.exec(after ?? "") ?? []
	const beyond = afterId
		? sql`and (s.name, n.id) > (select t.name, x.id from withdrawal_notices x
			join stores t on t.producer_id = x.producer_id and t.id = x.store_id
			where x.producer_id = ${producerId} and x.id = ${afterId})`
		: sql``
	type Row = Omit<Notice, "openedAt" | "answeredAt"> & { openedAt: string | null; answeredAt: string | null }
	const { rows } = await tx.execute<Row>(sql`
		select n.id, s.name as "storeName", s.phone, n.pieces, m.letters, m.sent, m."lastError",
			n.opened_at as "openedAt", n.answered_at as "answeredAt", n.held_pieces as "heldPieces",
			n.answer_note as "answerNote"
		from withdrawal_notices n
		join stores s on s.producer_id = n.producer_id and s.id = n.store_id
		join lateral (${LETTERS}) m on true
		where n.producer_id = ${producerId} and n.withdrawal_id = ${withdrawalId} ${FILTERS[filter]} ${beyond}
		order by s.name, n.id limit ${PAGE + 1}`)
	const notices = rows.slice(0, PAGE).map((row) => ({
		...row,
		openedAt: row.openedAt === null ? null : new Date(row.openedAt),
		answeredAt: row.answeredAt === null ? null : new Date(row.answeredAt),
	}))
	return { notices, next: rows.length > PAGE ? (notices.at(-1)?.id ?? null) : null }
}
