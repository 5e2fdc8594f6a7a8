import { sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { auditEntries, withdrawalLots, withdrawals } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import type { Result } from "~/domain/result"
import { takeNumber } from "~/services/numbers/take-number.server"
import { lockProducts } from "~/services/orders/lock-products.server"
import { tellStores } from "./tell-stores.server"

/** Withdrawals are counted on from year to year. */
const NO_YEAR = 0

export type StartWithdrawal = {
	producer: { id: string; slug: string }
	personId: string
	/** Codes of the lots to withdraw, at least one. */
	codes: readonly string[]
	reason: string
	/** What those who hold pieces should do with them. */
	instructions: string
	/** Made with the form: a second send finds what the first began. */
	idempotencyKey: string
}

export type StartedWithdrawal = Result<
	{ number: number },
	{ ok: false; reason: "no-such-lot"; code: string } | { ok: false; reason: "withdrawn-before"; codes: string[] }
>

/**
 * Withdraws lots, in one transaction: they are withdrawn from this moment (nothing of them is free to promise, and the
 * database lets no piece leave the shelves), each store that had pieces gets one notice with a secret link, and a letter
 * goes to its people. Nothing is moved. Sending the same form again answers the first withdrawal. Refused, with nothing
 * written, when a lot is not there or is withdrawn already.
 *
 * Locks: packed orders, products, lots by id, packed orders once more, the counter. A packing or sending that is under way
 * is waited for, so that it counts; one that comes later finds the lot withdrawn.
 */
export async function startWithdrawal(query: StartWithdrawal): Promise<StartedWithdrawal> {
	try {
		return await withProducer(query.producer.id, (tx) => start(tx, query))
	} catch (error) {
		if (breaksConstraint(error, "withdrawals_sent_once")) return startWithdrawal(query)
		throw error
	}
}

type LockedLot = { id: string; code: string; productId: string; state: string; piecesOut: number }

async function start(tx: Tx, query: StartWithdrawal): Promise<StartedWithdrawal> {
	const { producer, personId, reason, instructions, idempotencyKey } = query
	const producerId = producer.id
	const lots = await lockLots(tx, query)
	const earlier = await findEarlier(tx, query)
	if (earlier !== null) return { ok: true, number: earlier }
	const missing = query.codes.find((code) => !lots.some((lot) => lot.code === code))
	if (missing !== undefined) return { ok: false, reason: "no-such-lot", code: missing }
	const gone = lots.filter(({ state }) => state === "withdrawn")
	if (gone.length > 0) return { ok: false, reason: "withdrawn-before", codes: gone.map(({ code }) => code) }

	const number = await takeNumber(tx, { producerId, series: "withdrawal", year: NO_YEAR })
	const [withdrawal] = await tx
		.insert(withdrawals)
		.values({ producerId, number, reason, instructions, startedBy: personId, idempotencyKey })
		.returning({ id: withdrawals.id })
	if (!withdrawal) throw new Error("a withdrawal was not written")
	await tx
		.insert(withdrawalLots)
		.values(lots.map((lot) => ({ producerId, withdrawalId: withdrawal.id, lotId: lot.id, piecesOut: lot.piecesOut })))
	const lotIds = lots.map(({ id }) => id)
	await tx.execute(sql`
		update lots set state = 'withdrawn' where producer_id = ${producerId} and id = any(${sql.param(lotIds)}::uuid[])`)
	const told = await tellStores(tx, { producer, withdrawalId: withdrawal.id, number, lotIds, reason, instructions })
	await tx.insert(auditEntries).values({
		producerId,
		userId: personId,
		action: "lots withdrawn",
		subjectType: "withdrawal",
		subjectId: withdrawal.id,
		detail: { number, lots: lots.map(({ code }) => code), stores: told.stores, letters: told.letters },
	})
	return { ok: true, number }
}

async function findEarlier(tx: Tx, { producer, idempotencyKey }: StartWithdrawal): Promise<number | null> {
	const { rows } = await tx.execute<{ number: number }>(sql`
		select number from withdrawals where producer_id = ${producer.id} and idempotency_key = ${idempotencyKey}`)
	return rows[0]?.number ?? null
}

/** The lots as they stand once nobody else can pack, send or sell of them; in the order of their ids. */
async function lockLots(tx: Tx, { producer, codes }: StartWithdrawal): Promise<LockedLot[]> {
	const producerId = producer.id
	const ofLots = sql`l.producer_id = ${producerId} and l.code = any(${sql.param(codes)}::text[])`
	const lockPackedOrders = sql`
		select o.id from orders o
		where o.producer_id = ${producerId} and o.state = 'packed' and o.id in (
			select e.order_id from lots l
			join order_line_lots x on x.producer_id = l.producer_id and x.lot_id = l.id
			join order_lines e on e.producer_id = x.producer_id and e.id = x.order_line_id
			where ${ofLots})
		order by o.id for update`
	await tx.execute(lockPackedOrders)
	const { rows: found } = await tx.execute<{ productId: string }>(
		sql`select distinct l.product_id as "productId" from lots l where ${ofLots}`,
	)
	await lockProducts(tx, { producerId, productIds: found.map(({ productId }) => productId) })
	await tx.execute(sql`select l.id from lots l where ${ofLots} order by l.id for no key update`)
	// Those that were packed while the lots were waited for: their sending must not slip past the notices either.
	await tx.execute(lockPackedOrders)
	const { rows } = await tx.execute<LockedLot>(sql`
		select l.id, l.code, l.product_id as "productId", l.state,
			(select coalesce(sum(b.pieces), 0)::int from stock_balances b
				where b.producer_id = l.producer_id and b.lot_id = l.id and b.place = 'sold') as "piecesOut"
		from lots l where ${ofLots} order by l.id`)
	return rows
}
