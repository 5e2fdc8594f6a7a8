import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { findShelves, pickShelves, type ShelfPick } from "~/services/orders/pick-shelves.server"
import { findOpenOrders, type OpenOrder } from "./find-open-orders.server"

/** A line to pack; `lots` are those packed, or those to take while it is only confirmed. */
export type PackingLine = {
	id: string
	code: string
	productName: string
	cases: number
	pieces: number
	lots: { code: string; pieces: number }[]
	/** Pieces that no released lot can give. */
	missingPieces: number
	/** Where it is priced by weight: the price of a pound, what its pieces weigh by their label, and what was weighed. */
	byWeight: { poundCents: number; usualGrams: number; weighedGrams: number | null } | null
}

export type PackingOrder = {
	number: number
	state: "confirmed" | "packed"
	storeName: string
	lines: PackingLine[]
}

/** So much to take from one place of one lot, for all orders of the day that are not packed yet. */
export type Pick = {
	place: "ready" | "cold-room"
	lotCode: string
	code: string
	productName: string
	pieces: number
	piecesPerCase: number
	bestBeforeOn: Day
}

export type Packing = { days: Day[]; day: Day | null; picks: Pick[]; orders: PackingOrder[] }

/**
 * What is to pack for `day`, or for the first day that has anything: the pick list by place and lot, and the orders with
 * the lots for each. The lots are a proposal, earliest best-before first, until an order is packed.
 */
export function findPacking(query: { producerId: string; day: Day | null }): Promise<Packing> {
	const { producerId } = query
	return readProducer(producerId, async (tx) => {
		const open = await findOpenOrders(tx, { producerId, states: ["confirmed", "packed"] })
		const days = [...new Set(open.map((order) => order.deliveryOn))]
		const day = query.day ?? days[0] ?? null
		const orders = open.filter((order) => order.deliveryOn === day)
		if (!day || orders.length === 0) return { days, day, picks: [], orders: [] }
		const toPack = orders.filter((order) => order.state === "confirmed")
		const picked = await proposePicks(tx, { producerId, day, orders: toPack })
		const packed = await findPacked(tx, { producerId, orderIds: orders.map((order) => order.id) })
		return {
			days,
			day,
			picks: pickList(picked.map(({ pick, line }) => ({ ...pick, ...line }))),
			orders: orders.map((order) => ({
				number: order.number,
				state: order.state === "packed" ? "packed" : "confirmed",
				storeName: order.storeName,
				lines: order.lines
					.filter((line) => (line.givenCases ?? 0) > 0)
					.map((line) => packingLine(order, line, { picked, packed })),
			})),
		}
	})
}

type Line = OpenOrder["lines"][number]
type Proposal = { pick: ShelfPick; line: Line }

const piecesOf = (line: Line) => (line.givenCases ?? 0) * line.piecesPerCase

async function proposePicks(
	tx: Tx,
	query: { producerId: string; day: Day; orders: readonly OpenOrder[] },
): Promise<Proposal[]> {
	const { producerId, day, orders } = query
	const productIds = [...new Set(orders.flatMap((order) => order.lines.map((line) => line.productId)))]
	const shelves = await findShelves(tx, { producerId, productIds, on: day })
	return productIds.flatMap((productId) => {
		const wanted = orders.flatMap((order) =>
			order.lines.filter((line) => line.productId === productId).map((line) => ({ order, line })),
		)
		const { picks } = pickShelves(
			shelves.filter((shelf) => shelf.productId === productId),
			wanted.map(({ order, line }) => ({ orderId: order.id, on: day, pieces: piecesOf(line) })),
		)
		return picks.flatMap((pick) => {
			const line = wanted.find(({ order }) => order.id === pick.orderId)?.line
			return line ? { pick, line } : []
		})
	})
}

function pickList(picked: readonly (ShelfPick & Line)[]): Pick[] {
	const picks = new Map<string, Pick>()
	for (const { place, lotCode, code, productName, pieces, piecesPerCase, bestBeforeOn } of picked) {
		const key = `${place} ${lotCode}`
		const before = picks.get(key)?.pieces ?? 0
		picks.set(key, { place, lotCode, code, productName, pieces: before + pieces, piecesPerCase, bestBeforeOn })
	}
	return [...picks.values()].toSorted(
		(a, b) => b.place.localeCompare(a.place) || a.code.localeCompare(b.code, "en", { numeric: true }),
	)
}

function packingLine(
	order: OpenOrder,
	line: Line,
	{ picked, packed }: { picked: readonly Proposal[]; packed: ReadonlyMap<string, { code: string; pieces: number }[]> },
): PackingLine {
	const proposed = new Map<string, number>()
	for (const { pick, line: other } of picked) {
		if (other.id === line.id) proposed.set(pick.lotCode, (proposed.get(pick.lotCode) ?? 0) + pick.pieces)
	}
	const lots =
		order.state === "packed" ? (packed.get(line.id) ?? []) : [...proposed].map(([code, pieces]) => ({ code, pieces }))
	const pieces = piecesOf(line)
	return {
		id: line.id,
		code: line.code,
		productName: line.productName,
		cases: line.givenCases ?? 0,
		pieces,
		lots,
		missingPieces: pieces - lots.reduce((sum, lot) => sum + lot.pieces, 0),
		byWeight: weightOf(line, pieces),
	}
}

function weightOf({ poundCents, weighedGrams, pieceNetGrams }: Line, pieces: number): PackingLine["byWeight"] {
	if (poundCents === null) return null
	return { poundCents, usualGrams: pieces * pieceNetGrams, weighedGrams }
}

/** The lots that fill each line that is packed, by line id. */
async function findPacked(
	tx: Tx,
	query: { producerId: string; orderIds: readonly string[] },
): Promise<Map<string, { code: string; pieces: number }[]>> {
	const { rows } = await tx.execute<{ lineId: string; code: string; pieces: number }>(sql`
		select f.order_line_id as "lineId", t.code, f.pieces
		from order_lines l
		join order_line_lots f on f.producer_id = l.producer_id and f.order_line_id = l.id
		join lots t on t.producer_id = f.producer_id and t.id = f.lot_id
		where l.producer_id = ${query.producerId} and l.order_id = any(${sql.param([...query.orderIds])}::uuid[])
		order by t.best_before_on, t.code`)
	const packed = new Map<string, { code: string; pieces: number }[]>()
	for (const { lineId, ...lot } of rows) packed.set(lineId, [...(packed.get(lineId) ?? []), lot])
	return packed
}
