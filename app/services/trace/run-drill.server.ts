import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { balanceOf, type DrilledLot, drillFaults } from "~/domain/trace/balance"
import { now } from "~/platform/clock.server"
import { type ForwardTrace, readForwardTrace } from "./find-forward-trace.server"

/** One trace as an exercise: how long it took, who was found, and whether every piece is accounted for. */
export type Drill = {
	/** The order whose lots were traced, where a number was given. */
	orderNumber: number | null
	trace: ForwardTrace
	lots: (DrilledLot & { code: string; productName: string })[]
	/** What does not add up, as sentences. */
	faults: string[]
	tookMilliseconds: number
	ranAt: Date
}

/**
 * Traces a lot by its code, or the lots of an order by its number, and adds up the pieces. A lot's code goes before an
 * order's number. Null when there is neither.
 */
export async function runDrill(query: { producerId: string; asked: string }): Promise<Drill | null> {
	const { producerId } = query
	const asked = query.asked.trim()
	const ranAt = now()
	const began = performance.now()
	const found = await readProducer(producerId, async (tx) => {
		const number = /^[1-9]\d{0,8}$/.test(asked) ? Number(asked) : null
		const { rows } = await tx.execute<{ code: string; isOfOrder: boolean }>(sql`
			select l.code, false as "isOfOrder" from lots l where l.producer_id = ${producerId} and lower(l.code) = lower(${asked})
			union
			select l.code, true from orders o
			join order_lines e on e.producer_id = o.producer_id and e.order_id = o.id
			join order_line_lots x on x.producer_id = e.producer_id and x.order_line_id = e.id
			join lots l on l.producer_id = x.producer_id and l.id = x.lot_id
			where o.producer_id = ${producerId} and o.number = ${number}::int`)
		const ofLot = rows.filter((row) => !row.isOfOrder)
		const chosen = ofLot.length > 0 ? ofLot : rows
		if (chosen.length === 0) return null
		const trace = await readForwardTrace(tx, { producerId, codes: chosen.map(({ code }) => code) })
		return { trace, orderNumber: ofLot.length > 0 ? null : number }
	})
	if (!found) return null
	const lots = found.trace.lots.map((lot) => drilled(lot, found.trace))
	const tookMilliseconds = Math.round(performance.now() - began)
	return { ...found, lots, faults: lots.flatMap((lot) => drillFaults(lot.code, lot)), tookMilliseconds, ranAt }
}

function drilled(lot: ForwardTrace["lots"][number], trace: ForwardTrace): Drill["lots"][number] {
	const sent = trace.orders.filter(
		({ lot: code, state }) => code === lot.code && (state === "sent" || state === "received"),
	)
	const atMarket = trace.marketDays.filter(({ lot: code }) => code === lot.code)
	const namedPieces = [...sent.map(({ pieces }) => pieces), ...atMarket.map(({ sold }) => sold)].reduce(
		(a, b) => a + b,
		0,
	)
	return {
		code: lot.code,
		productName: lot.productName,
		...balanceOf(lot.piecesHarvested, lot.places),
		namedPieces,
		linkedPieces: lot.linkedPieces,
	}
}
