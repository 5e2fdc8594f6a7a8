import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { env } from "~/platform/env.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { findPeopleOfStores } from "~/services/orders/order-people.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"
import type { AddedLine } from "./add-instead.server"
import type { PlannedLine } from "./plan-given"
import type { SharingFacts } from "./read-sharing.server"

/** Names the letter of a run to a store in the outbox, so that undoing it can take it back. */
export const sharedKey = (runId: string, storeId: string) => `order-shared:${runId}:${storeId}`

type Facts = { storeSlug: string; lineId: string; caseCents: number }

/** Queues one letter for each store with all that it gets of the product, for each of its people. */
export async function tellStores(
	tx: Tx,
	query: {
		producer: { id: string; slug: string }
		facts: SharingFacts
		runId: string
		lines: readonly PlannedLine[]
		added: ReadonlyMap<string, AddedLine>
	},
): Promise<void> {
	const { producer, facts, runId, lines, added } = query
	const yard = letterHead(await findYard(tx, producer.id))
	const prices = await findLineFacts(tx, { producerId: producer.id, lineIds: lines.map(({ lineId }) => lineId) })
	const people = await findPeopleOfStores(tx, {
		producerId: producer.id,
		storeIds: lines.map(({ storeId }) => storeId),
		kind: "confirmations",
	})
	const told = [...people].flatMap(([storeId, those]) => those.map(({ email }) => ({ storeId, email })))
	const letters = told.flatMap(({ email, storeId }) => {
		const own = lines.filter((line) => line.storeId === storeId)
		const [first] = own
		const slug = prices.get(first?.lineId ?? "")?.storeSlug
		if (!first || !slug) return []
		const given = own.flatMap((line) =>
			linesOf(facts, line, { price: prices.get(line.lineId), added: added.get(line.lineId) }),
		)
		return {
			to: email,
			onceKey: sharedKey(runId, storeId),
			template: "order-shared" as const,
			props: {
				yard,
				sentTo: email,
				storeName: first.storeName,
				orderNumber: String(first.orderNumber),
				deliveryOn: facts.deliveryOn,
				orderUrl: `${env.BASE_URL}/buy/${producer.slug}/${slug}/orders/${first.orderNumber}`,
				productName: facts.product.name,
				sentences: own.map(({ sentence }) => sentence),
				lines: given,
				charges: [],
				totalCents: given.reduce((sum, line) => sum + line.amountCents, 0),
			},
		}
	})
	await queueMails(tx, producer.id, letters, { delaySeconds: env.UNDO_SECONDS })
}

function linesOf(
	facts: SharingFacts,
	line: PlannedLine,
	also: { price: Facts | undefined; added: AddedLine | undefined },
) {
	const { price, added } = also
	const caseCents = price?.caseCents ?? 0
	const shared = {
		productName: facts.product.name,
		productNote: facts.product.detail || null,
		casesAsked: line.askedCases,
		casesGiven: line.givenCases,
		priceCents: caseCents,
		amountCents: caseCents * line.givenCases,
		reason: null,
	}
	if (!added) return [shared]
	const { product, cases } = added
	return [
		shared,
		{
			productName: product.name,
			productNote: `${product.detail ? `${product.detail}, ` : ""}in place of ${facts.product.name}`,
			casesAsked: cases,
			casesGiven: cases,
			priceCents: added.caseCents,
			amountCents: added.caseCents * cases,
			reason: null,
		},
	]
}

async function findLineFacts(
	tx: Tx,
	query: { producerId: string; lineIds: readonly string[] },
): Promise<Map<string, Facts>> {
	const { rows } = await tx.execute<Facts>(sql`
		select l.id as "lineId", l.case_cents as "caseCents", s.slug as "storeSlug"
		from order_lines l
		join orders o on o.producer_id = l.producer_id and o.id = l.order_id
		join stores s on s.producer_id = o.producer_id and s.id = o.store_id
		where l.producer_id = ${query.producerId} and l.id = any(${sql.param([...query.lineIds])}::uuid[])`)
	return new Map(rows.map((row) => [row.lineId, row]))
}
