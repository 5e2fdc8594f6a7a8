import { sql } from "drizzle-orm"
import { stockMoves } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { PlannedCredit } from "~/domain/credits/plan-credit"
import { planWaste, type SentLot } from "~/domain/credits/plan-waste"
import type { InvoiceLeft } from "~/services/credits/read-invoice-left.server"

/**
 * Writes broken pieces off by lot: from sold with the order to waste of the same order, from the lots that filled the line,
 * the earliest best-before first. Answers how many pieces the ledger had no longer as sold.
 */
export async function wastePieces(
	tx: Tx,
	query: { producerId: string; invoice: InvoiceLeft; plan: PlannedCredit; personId: string },
): Promise<number> {
	const { producerId, invoice, plan, personId } = query
	const orderLines = new Map(invoice.lines.map(({ id, orderLineId }) => [id, orderLineId]))
	const broken = plan.lines
		.filter(({ pieces }) => pieces > 0)
		.map(({ lineId, pieces }) => ({ lineId: orderLines.get(lineId) ?? lineId, pieces }))
	const { moves, missing } = planWaste(broken, await readSentLots(tx, { producerId, lineIds: broken }))
	if (moves.length > 0) {
		await tx.insert(stockMoves).values(
			moves
				.toSorted((a, b) => (a.lotId < b.lotId ? -1 : a.lotId > b.lotId ? 1 : 0))
				.map(({ lotId, orderId, pieces }) => ({
					producerId,
					lotId,
					fromPlace: "sold" as const,
					fromRef: orderId,
					toPlace: "waste" as const,
					toRef: orderId,
					pieces,
					reason: `arrived broken, invoice ${invoice.number}`,
					movedBy: personId,
				})),
		)
	}
	return missing
}

async function readSentLots(
	tx: Tx,
	query: { producerId: string; lineIds: readonly { lineId: string }[] },
): Promise<SentLot[]> {
	const ids = sql.param(query.lineIds.map(({ lineId }) => lineId))
	const { rows } = await tx.execute<SentLot>(sql`
		select x.order_line_id as "lineId", x.lot_id as "lotId", e.order_id as "orderId", x.pieces,
			coalesce(b.pieces, 0) as sold
		from order_line_lots x
		join order_lines e on e.producer_id = x.producer_id and e.id = x.order_line_id
		join lots l on l.producer_id = x.producer_id and l.id = x.lot_id
		left join stock_balances b on b.producer_id = x.producer_id and b.lot_id = x.lot_id and b.place = 'sold'
			and b.place_ref = e.order_id
		where x.producer_id = ${query.producerId} and x.order_line_id = any(${ids}::uuid[])
		order by l.best_before_on, l.code`)
	return rows
}
