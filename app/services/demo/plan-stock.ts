import { dayInZone } from "~/domain/calendar"
import { type Ledger, move, type Stock } from "./ledger"
import type { Catalogue, CatalogueProduct } from "./plan-catalogue"
import type { MarketDayOfSeason } from "./plan-market-days"
import type { OrderOfSeason } from "./plan-orders"
import { named, type Season } from "./season"
import { openShelf, type Taken } from "./shelf"
import { writeHeld, writeLots } from "./stock-lots"

type Plans = { catalogue: Catalogue; orders: readonly OrderOfSeason[]; marketDays: readonly MarketDayOfSeason[] }

/**
 * Lots and moves behind everything that was packed, sent and sold, and what is ready and held now, so that
 * the coming delivery day has the free cases the scenario names. Writes the lots of each packed line into `orders`.
 */
export function planStock(season: Season, { catalogue, orders, marketDays }: Plans): Stock {
	const products = [...catalogue.products.values()]
	const shelves = new Map(products.map((product) => [product.code, openShelf(season, product)]))
	const ledger: Ledger = { season, shelves, lots: [], moves: [], lineLots: [], saleLots: [] }
	const steps = [
		...orders.map((order) => ({ at: order.packedAt, run: (at: Date) => pack(ledger, order, at) })),
		...marketDays.flatMap((day) => marketSteps(ledger, day)),
	]
		.flatMap(({ at, run }) => (at ? { at, run } : []))
		.toSorted((a, b) => a.at.getTime() - b.at.getTime())
	for (const { at, run } of steps) run(at)

	for (const product of products) {
		const shelf = named(shelves, product.code)
		shelf.settle(readyPieces(product, orders), season.today)
		writeLots(ledger, shelf)
		writeHeld(ledger, product, shelf.nextCode)
	}
	const { lots, lineLots, saleLots } = ledger
	return {
		lots,
		lineLots,
		saleLots,
		moves: ledger.moves.toSorted((a, b) => a.movedAt.getTime() - b.movedAt.getTime()),
	}
}

/** What must be ready: the free cases, everything promised and not yet packed, and the reserve. */
function readyPieces(product: CatalogueProduct, orders: readonly OrderOfSeason[]): number {
	const promisedCases = orders
		.filter((order) => order.state === "placed" || order.state === "confirmed")
		.flatMap((order) => order.lines)
		.filter((line) => line.product === product)
		.reduce((sum, line) => sum + (line.given ?? (line.isToShare ? 0 : line.asked)), 0)
	return (product.freeCases + promisedCases) * product.piecesPerCase + product.reservePieces
}

function pack(ledger: Ledger, order: OrderOfSeason, at: Date): void {
	const { producerId, scenario } = ledger.season
	for (const line of order.lines) {
		const pieces = (line.given ?? 0) * line.product.piecesPerCase
		const shelf = named(ledger.shelves, line.product.code)
		for (const taken of shelf.take(pieces, dayInZone(at, scenario.timeZone))) {
			const { id, code } = taken.lot
			line.lots.push({ lotId: id, code, pieces: taken.pieces })
			ledger.lineLots.push({ producerId, orderLineId: line.id, lotId: id, pieces: taken.pieces })
			const reason = `packed for order ${order.number}`
			move(ledger, taken, at, { fromPlace: "ready", toPlace: "packed", toRef: order.id, reason })
			if (!order.sentAt) continue
			move(ledger, taken, order.sentAt, {
				fromPlace: "packed",
				fromRef: order.id,
				toPlace: "sold",
				toRef: order.id,
				reason: `sent with order ${order.number}`,
			})
		}
	}
}

/** Load-out, sales and what came back, of one market day; the pieces on the table are kept by product in between. */
function marketSteps(ledger: Ledger, day: MarketDayOfSeason) {
	const { producerId, scenario } = ledger.season
	const { timeZone } = scenario
	const table = new Map<string, Taken[]>()
	const loadOut = (at: Date) => {
		for (const { product, pieces } of day.load) {
			const taken = named(ledger.shelves, product.code).take(pieces, dayInZone(at, timeZone))
			table.set(product.code, taken)
			for (const some of taken) {
				move(ledger, some, at, { fromPlace: "ready", toPlace: "market", toRef: day.id, reason: "loaded out" })
			}
		}
	}
	const sell = (at: Date, saleId: string, product: CatalogueProduct, pieces: number) => {
		let needed = pieces
		for (const stack of named(table, product.code)) {
			const some = Math.min(needed, stack.pieces)
			if (some === 0) continue
			stack.pieces -= some
			needed -= some
			ledger.saleLots.push({ producerId, saleId, productId: product.id, lotId: stack.lot.id, pieces: some })
			const places = { fromPlace: "market", fromRef: day.id, toPlace: "sold", toRef: day.id } as const
			move(ledger, { lot: stack.lot, pieces: some }, at, { ...places, reason: "sold at the stall" })
		}
	}
	const bringBack = (at: Date) => {
		for (const { lot, pieces } of [...table.values()].flat()) {
			if (pieces === 0) continue
			lot.ready += pieces
			move(ledger, { lot, pieces }, at, {
				fromPlace: "market",
				fromRef: day.id,
				toPlace: "ready",
				reason: "brought back",
			})
		}
	}
	return [
		{ at: day.state === "planned" ? null : day.loadedAt, run: loadOut },
		...day.sales.flatMap((sale) =>
			sale.lines.map((line) => ({ at: sale.at, run: (at: Date) => sell(at, sale.id, line.product, line.pieces) })),
		),
		{ at: day.returnedAt, run: bringBack },
	]
}
