import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { casePriceChanges, type SeenPrice } from "~/domain/orders/seen-price"
import { freeToPromise } from "~/domain/promise/free-to-promise"
import { wholeCases } from "~/domain/quantity"
import type { StoreProduct } from "~/services/pricing/find-store-prices.server"
import { findOutlooks, type ProductOutlook } from "~/services/promise/find-outlooks.server"

/**
 * What is to be done when more is asked than is free: ask the buyer (`false`); keep all that is asked to be shared out,
 * with nothing sure (`true`, as standing orders do); take what is free and no more; or take it and wait for the rest.
 * `share` leaves all of it to be shared out, also what is free: others ask for it at the same moment.
 */
export type Keep = boolean | "free" | "rest" | "share"

/** One product asked for. */
export type AskedLine = {
	productId: string
	cases: number
	keep: Keep
	/** Fewer than this are of no use to the store; 0 or left out, any number is welcome. */
	leastCases?: number
	/** The prices and the case that the buyer saw; left out where nobody saw any. */
	seen?: SeenPrice
}

/** A line that can stand: promised in whole, or to be shared out with `promisedCases` of it sure already. */
export type CheckedLine = {
	product: StoreProduct
	cases: number
	isToShare: boolean
	promisedCases: number
	leastCases: number
}

/** Why a line cannot stand as it is. `freeCases` is what could be promised, in whole cases. */
export type LineRefusal =
	| { productId: string; reason: "more-than-free"; freeCases: number }
	| { productId: string; reason: "not-sold" }
	| { productId: string; reason: "price-changed"; seenCents: number; caseCents: number }
	| { productId: string; reason: "case-changed"; seenPieces: number; piecesPerCase: number }

/** Lines of the order that is being changed: their own promises are set aside while it is checked. */
type OwnPromise = { productId: string; pieces: number }

/**
 * Holds what is asked against what is free to promise for the day, and against the prices that the buyer saw. The
 * products' rows must be locked by `products` having been read with `lock`: nobody else can then promise the same cases
 * before this transaction ends. Lines and refusals come in the order asked; a line of which none is free and no more than
 * the free is wanted falls away.
 */
export async function checkAsked(
	tx: Tx,
	query: {
		producerId: string
		today: Day
		deliveryOn: Day
		asked: readonly AskedLine[]
		products: readonly StoreProduct[]
		own?: readonly OwnPromise[]
	},
): Promise<{ lines: CheckedLine[]; refused: LineRefusal[] }> {
	const { producerId, today, deliveryOn, own = [] } = query
	const productIds = query.products.map(({ productId }) => productId)
	const outlooks = await findOutlooks(tx, { producerId, today, productIds })
	setFree(outlooks, deliveryOn, own)
	return checkAgainst(outlooks, query)
}

/** The same against outlooks that are read already; it reads nothing, and promises nothing. */
export function checkAgainst(
	outlooks: ReadonlyMap<string, ProductOutlook>,
	query: { deliveryOn: Day; asked: readonly AskedLine[]; products: readonly StoreProduct[] },
): { lines: CheckedLine[]; refused: LineRefusal[] } {
	const { deliveryOn, asked } = query
	const products = new Map(query.products.map((product) => [product.productId, product]))
	const lines: CheckedLine[] = []
	const refused: LineRefusal[] = []
	for (const line of asked) {
		const product = products.get(line.productId)
		const outlook = outlooks.get(line.productId)
		if (!product || !outlook) {
			refused.push({ productId: line.productId, reason: "not-sold" })
			continue
		}
		const freePieces = freeToPromise({ ...outlook, days: [deliveryOn] })[0]?.free ?? 0
		const checked = checkLine(line, product, wholeCases(freePieces, product.piecesPerCase))
		if ("reason" in checked) refused.push(checked)
		else if (checked.cases > 0) lines.push(checked)
	}
	return { lines, refused: [...refused, ...refusePrices(asked, query.products)] }
}

/** Sets free what an order that is being changed was promised itself for its day. */
export function setFree(outlooks: Map<string, ProductOutlook>, deliveryOn: Day, own: readonly OwnPromise[]): void {
	for (const { productId, pieces } of own) {
		const outlook = outlooks.get(productId)
		if (!outlook) continue
		outlooks.set(productId, { ...outlook, promises: [...outlook.promises, { on: deliveryOn, quantity: -pieces }] })
	}
}

function checkLine(line: AskedLine, product: StoreProduct, freeCases: number): CheckedLine | LineRefusal {
	const { cases, keep, leastCases = 0 } = line
	const free = Math.max(0, freeCases)
	const base = { product, leastCases: Math.min(leastCases, cases), isToShare: false, promisedCases: 0 }
	if (cases <= freeCases && keep !== "share") return { ...base, cases }
	switch (keep) {
		case false:
			return { productId: line.productId, reason: "more-than-free", freeCases }
		case "free":
			return { ...base, cases: free, leastCases: Math.min(leastCases, free) }
		case "rest":
			return { ...base, cases, isToShare: true, promisedCases: free }
		case true:
		case "share":
			return { ...base, cases, isToShare: true }
	}
}

/** Each line whose case, or the price of it at the cases now asked, is not what the buyer saw. */
function refusePrices(asked: readonly AskedLine[], products: readonly StoreProduct[]): LineRefusal[] {
	const known = new Map(products.map((product) => [product.productId, product]))
	const seen = asked.flatMap(({ productId, cases, seen }) => {
		const product = known.get(productId)
		return product ? [{ product, cases, seen: seen ?? product }] : []
	})
	return casePriceChanges(seen)
}
