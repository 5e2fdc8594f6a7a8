/** More of one product than this is not sold in one go. */
const MOST_PIECES = 99

/** What is in the sale at hand: it lives in the address, so that Back, reload and a page without script keep it. */
export type SaleInHand = { saleId: string; items: { productId: string; pieces: number }[] }

/** The id of the sale that an address or a form names, or null. */
export function saleIdIn(fields: URLSearchParams | FormData): string | null {
	const saleId = fields.get("sale")
	return isId(saleId) ? saleId : null
}

/**
 * Reads the sale at hand from an address or a form: `sale` is its id, `n-<product>` the pieces of a product. `add` and
 * `fewer` name the product of the button that was pressed. What cannot be read counts as nothing.
 */
export function readSale(fields: URLSearchParams | FormData, newId: string): SaleInHand {
	const counts = new Map<string, number>()
	for (const [name, value] of fields.entries()) {
		const productId = name.startsWith("n-") ? name.slice(2) : null
		if (isId(productId) && typeof value === "string" && /^\d{1,2}$/.test(value)) counts.set(productId, Number(value))
	}
	step(counts, fields.get("add"), 1)
	step(counts, fields.get("fewer"), -1)
	return {
		saleId: saleIdIn(fields) ?? newId,
		items: [...counts].flatMap(([productId, pieces]) => (pieces > 0 ? { productId, pieces } : [])),
	}
}

/** The fields that carry a sale from page to page, as pairs. */
export function saleFields({ saleId, items }: SaleInHand): [name: string, value: string][] {
	return [
		["sale", saleId],
		...items.map(({ productId, pieces }): [string, string] => [`n-${productId}`, String(pieces)]),
	]
}

/** The same as the query of an address. */
export function saleQuery(sale: SaleInHand): string {
	return new URLSearchParams(saleFields(sale)).toString()
}

function step(counts: Map<string, number>, pressed: FormDataEntryValue | null, by: number): void {
	if (!isId(pressed)) return
	counts.set(pressed, Math.min(MOST_PIECES, Math.max(0, (counts.get(pressed) ?? 0) + by)))
}

// No schema library here: this runs on the phone too, where every kilobyte waits for the signal of a market square.
function isId(value: unknown): value is string {
	return typeof value === "string" && /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/.test(value)
}
