import { findInvoice } from "./find-invoice.server"

/**
 * The PDF of an invoice as it stands now, by its printed number. With `storeId` it must be that store's. Null when there
 * is none.
 */
export async function drawInvoice(query: {
	producerId: string
	storeId?: string
	number: string
}): Promise<Uint8Array<ArrayBuffer> | null> {
	const invoice = await findInvoice(query)
	if (!invoice) return null
	// The drawing of PDFs takes a second to load, so that no other page should wait for it.
	const { renderInvoicePdf } = await import("~emails/documents/invoice")
	return new Uint8Array(await renderInvoicePdf(invoice.document))
}
