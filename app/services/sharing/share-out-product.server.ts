import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { auditEntries, orderEvents, sharingRuns } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import type { SharingRule } from "~/domain/sharing/share-out"
import { now } from "~/platform/clock.server"
import { lockProducts } from "~/services/orders/lock-products.server"
import { addInstead } from "./add-instead.server"
import { type Plan, type PlannedLine, planGiven } from "./plan-given"
import { claimsOf, readSharing, type SharingFacts } from "./read-sharing.server"
import { tellStores } from "./tell-stores.server"

export type SharingProducer = { id: string; slug: string; timeZone: string }

export type SharedOut =
	| { ok: true; runId: string }
	| { ok: false; reason: "no-such-product" | "nothing-to-share" | "changed" }
	| Extract<Plan, { ok: false }>

/**
 * Shares out a product of a day: writes the run with what each line gets, sets it on the lines, adds what stands in,
 * notes it on each order's timeline, and queues one letter a store, which waits for the time in which it can be undone.
 * `seen` names the facts that the page showed: where any has changed since, nothing is written. A second send of the
 * same form (`idempotencyKey`) finds the first run. One transaction; orders are locked first, then products.
 */
export async function shareOutProduct(query: {
	producer: SharingProducer
	productCode: string
	deliveryOn: Day
	personId: string
	seen: string
	rule: SharingRule
	byHand: ReadonlyMap<string, number>
	note: string
	instead: ReadonlyMap<string, string>
	idempotencyKey: string
}): Promise<SharedOut> {
	const { producer, productCode, deliveryOn } = query
	const producerId = producer.id
	const today = dayInZone(now(), producer.timeZone)
	return withProducer(producerId, async (tx) => {
		const productId = await findProductId(tx, { producerId, productCode })
		if (!productId) return { ok: false, reason: "no-such-product" }
		await lockOrders(tx, { producerId, productId, deliveryOn })
		await lockProducts(tx, { producerId, productIds: [productId, ...query.instead.values()] })
		const earlier = await findRun(tx, { producerId, idempotencyKey: query.idempotencyKey })
		if (earlier) return { ok: true, runId: earlier }
		const facts = await readSharing(tx, { producerId, productCode, deliveryOn, today })
		if (!facts || facts.rows.length === 0) return { ok: false, reason: "nothing-to-share" }
		if (facts.seen !== query.seen) return { ok: false, reason: "changed" }
		const plan = planGiven(facts, query)
		if (!plan.ok) return plan
		const runId = await writeRun(tx, { ...query, facts, lines: plan.lines })
		const added = await addInstead(tx, { producerId, today, lines: plan.lines })
		await noteOnOrders(tx, { producerId, runId, personId: query.personId, lines: plan.lines, added })
		await tellStores(tx, { producer, facts, runId, lines: plan.lines, added })
		return { ok: true, runId }
	})
}

async function findProductId(tx: Tx, query: { producerId: string; productCode: string }): Promise<string | null> {
	const { rows } = await tx.execute<{ id: string }>(sql`
		select id from products where producer_id = ${query.producerId} and code = ${query.productCode}`)
	return rows[0]?.id ?? null
}

/** Locks the orders of the day that still wait for this product, so that none is confirmed or cancelled meanwhile. */
async function lockOrders(tx: Tx, query: { producerId: string; productId: string; deliveryOn: Day }): Promise<void> {
	await tx.execute(sql`
		select o.id from orders o
		where o.producer_id = ${query.producerId} and o.delivery_on = ${query.deliveryOn} and o.state = 'placed'
			and exists (select from order_lines l
				where l.producer_id = o.producer_id and l.order_id = o.id and l.product_id = ${query.productId})
		order by o.id for update`)
}

async function findRun(tx: Tx, query: { producerId: string; idempotencyKey: string }): Promise<string | null> {
	const { rows } = await tx.execute<{ id: string }>(sql`
		select id from sharing_runs
		where producer_id = ${query.producerId} and idempotency_key = ${query.idempotencyKey}`)
	return rows[0]?.id ?? null
}

/** The run with its shares, and the lines as they are decided: given, and to be shared out whatever they were before. */
async function writeRun(
	tx: Tx,
	run: {
		producer: SharingProducer
		personId: string
		rule: SharingRule
		note: string
		idempotencyKey: string
		facts: SharingFacts
		lines: readonly PlannedLine[]
	},
): Promise<string> {
	const producerId = run.producer.id
	const runId = randomUUID()
	const { facts, lines } = run
	await tx.insert(sharingRuns).values({
		producerId,
		id: runId,
		productId: facts.product.id,
		deliveryOn: facts.deliveryOn,
		rule: run.rule,
		supplyCases: facts.supply,
		claims: claimsOf(facts.rows),
		note: run.note.trim(),
		sharedBy: run.personId,
		sharedAt: now(),
		idempotencyKey: run.idempotencyKey,
	})
	const column = (of: (line: PlannedLine) => string | number) => sql.param(lines.map(of))
	await tx.execute(sql`
		insert into sharing_shares (producer_id, run_id, order_line_id, store_id, asked_cases, rule_cases, given_cases, sentence)
		select ${producerId}::uuid, ${runId}::uuid, share.* from unnest(
			${column((line) => line.lineId)}::uuid[], ${column((line) => line.storeId)}::uuid[],
			${column((line) => line.askedCases)}::smallint[], ${column((line) => line.ruleCases)}::smallint[],
			${column((line) => line.givenCases)}::smallint[], ${column((line) => line.sentence)}::text[]) as share`)
	await tx.execute(sql`
		update order_lines set given_cases = share.given, is_to_share = true, promised_cases = share.sure
		from unnest(${column((line) => line.lineId)}::uuid[], ${column((line) => line.givenCases)}::int[],
			${column((line) => line.sureCases)}::int[]) as share(id, given, sure)
		where order_lines.producer_id = ${producerId} and order_lines.id = share.id`)
	return runId
}

async function noteOnOrders(
	tx: Tx,
	query: {
		producerId: string
		runId: string
		personId: string
		lines: readonly PlannedLine[]
		added: ReadonlyMap<string, { lineId: string }>
	},
): Promise<void> {
	const { producerId, runId, personId: userId, added } = query
	const at = now()
	const changes = query.lines.map(({ lineId, orderId, askedCases, givenCases }) => ({
		orderId,
		detail: { runId, lineId, askedCases, givenCases, addedLineId: added.get(lineId)?.lineId ?? null },
	}))
	await tx
		.insert(orderEvents)
		.values(
			changes.map(({ orderId, detail }) => ({ producerId, orderId, kind: "shared" as const, userId, at, detail })),
		)
	await tx.insert(auditEntries).values(
		changes.map(({ orderId, detail }) => ({
			producerId,
			userId,
			action: "order shared",
			subjectType: "order",
			subjectId: orderId,
			detail,
		})),
	)
}
