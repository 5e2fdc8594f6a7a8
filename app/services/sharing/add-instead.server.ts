import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { priceOrder } from "~/domain/pricing/price-order"
import { findStorePrices, type StoreProduct } from "~/services/pricing/find-store-prices.server"
import type { PlannedLine } from "./plan-given"

/** A line that was added to an order in place of what is missing of another. */
export type AddedLine = {
	lineId: string
	product: StoreProduct
	cases: number
	caseCents: number
	poundCents: number | null
}

/**
 * Adds to each order what stands in for what it does not get, at its store's price of today, with the break that the
 * whole order reaches. A product that the store cannot buy any more is left out. Answers the lines by the line they stand in for. Each store has
 * its own prices, so they are read for each that takes something: few do.
 */
export async function addInstead(
	tx: Tx,
	query: { producerId: string; today: Day; lines: readonly PlannedLine[] },
): Promise<Map<string, AddedLine>> {
	const added = new Map<string, AddedLine>()
	for (const line of query.lines) {
		if (!line.instead) continue
		const priced = await priceInstead(tx, { ...query, line, instead: line.instead })
		if (priced) added.set(line.lineId, priced)
	}
	const orderOf = new Map(query.lines.map(({ lineId, orderId }) => [lineId, orderId]))
	const rows = [...added].map(([lineId, one]) => ({ ...one, orderId: orderOf.get(lineId) as string }))
	if (rows.length > 0) {
		await tx.execute(sql`
			insert into order_lines (producer_id, id, order_id, product_id, asked_cases, case_cents, pound_cents,
				pieces_per_case)
			select ${query.producerId}::uuid, line.* from unnest(
				${sql.param(rows.map((row) => row.lineId))}::uuid[], ${sql.param(rows.map((row) => row.orderId))}::uuid[],
				${sql.param(rows.map((row) => row.product.productId))}::uuid[], ${sql.param(rows.map((row) => row.cases))}::smallint[],
				${sql.param(rows.map((row) => row.caseCents))}::integer[],
				${sql.param(rows.map((row) => row.poundCents))}::integer[],
				${sql.param(rows.map((row) => row.product.piecesPerCase))}::smallint[]) as line`)
	}
	return added
}

async function priceInstead(
	tx: Tx,
	query: {
		producerId: string
		today: Day
		line: PlannedLine
		instead: { productId: string; cases: number }
	},
): Promise<AddedLine | null> {
	const { producerId, today, line, instead } = query
	const products = await findStorePrices(tx, { producerId, storeId: line.storeId, today })
	const product = products.find(({ productId }) => productId === instead.productId)
	if (!product) return null
	const { rows } = await tx.execute<{ productId: string; cases: number }>(sql`
		select product_id as "productId", asked_cases as cases from order_lines
		where producer_id = ${producerId} and order_id = ${line.orderId}`)
	const cases = new Map(rows.map((row) => [row.productId, row.cases]))
	if (cases.has(instead.productId)) return null
	cases.set(instead.productId, instead.cases)
	const price = priceOrder({
		lines: products.map((one) => ({ ...one, cases: cases.get(one.productId) ?? 0 })),
		terms: { minimumCents: 0, deliveryChargeCents: 0, freeAboveCents: null },
	})
	const priced = price.lines[products.indexOf(product)]
	if (!priced) return null
	const { caseCents, poundCents } = priced
	return { lineId: randomUUID(), product, cases: instead.cases, caseCents, poundCents }
}
