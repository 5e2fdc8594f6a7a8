import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { freeToPromise } from "~/domain/promise/free-to-promise"
import { wholeCases } from "~/domain/quantity"
import type { StoreProduct } from "~/services/pricing/find-store-prices.server"
import { findOutlooks } from "~/services/promise/find-outlooks.server"

/** One product asked for. `keep` says: if more is asked than is free, keep it and let it be shared out. */
export type AskedLine = { productId: string; cases: number; keep: boolean }

/** A line that can stand: promised in whole, or, where more is asked than is free, to be shared out. */
export type CheckedLine = { product: StoreProduct; cases: number; isToShare: boolean }

/** Why a line cannot stand as it is. `freeCases` is what could be promised, in whole cases. */
export type LineRefusal =
	| { productId: string; reason: "more-than-free"; freeCases: number }
	| { productId: string; reason: "not-sold" }

/**
 * Holds what is asked against what is free to promise for the day. The products' rows must be locked by `products` having
 * been read with `lock`: nobody else can then promise the same cases before this transaction ends. Lines and refusals
 * come in the order asked.
 */
export async function checkAsked(
	tx: Tx,
	query: {
		producerId: string
		today: Day
		deliveryOn: Day
		asked: readonly AskedLine[]
		products: readonly StoreProduct[]
	},
): Promise<{ lines: CheckedLine[]; refused: LineRefusal[] }> {
	const { producerId, today, deliveryOn, asked } = query
	const products = new Map(query.products.map((product) => [product.productId, product]))
	const outlooks = await findOutlooks(tx, { producerId, today, productIds: [...products.keys()] })
	const lines: CheckedLine[] = []
	const refused: LineRefusal[] = []
	for (const { productId, cases, keep } of asked) {
		const product = products.get(productId)
		const outlook = outlooks.get(productId)
		if (!product || !outlook) {
			refused.push({ productId, reason: "not-sold" })
			continue
		}
		const freePieces = freeToPromise({ ...outlook, days: [deliveryOn] })[0]?.free ?? 0
		const freeCases = wholeCases(freePieces, product.piecesPerCase)
		if (cases <= freeCases) lines.push({ product, cases, isToShare: false })
		else if (keep) lines.push({ product, cases, isToShare: true })
		else refused.push({ productId, reason: "more-than-free", freeCases })
	}
	return { lines, refused }
}
