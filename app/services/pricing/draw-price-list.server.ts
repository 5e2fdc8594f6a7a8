import type { PricedList } from "./find-priced-list.server"

/** The printed page of a price list. */
export async function drawPriceList(list: PricedList): Promise<Uint8Array<ArrayBuffer>> {
	// The drawing of PDFs takes a second to load, so that no other page should wait for it.
	const { renderPriceListPdf } = await import("~emails/documents/price-list")
	return new Uint8Array(await renderPriceListPdf(list))
}
