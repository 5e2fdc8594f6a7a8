import { askThread } from "~/platform/lasting-thread.server"
import { findInvoice } from "./find-invoice.server"

/** One with more lines than this takes so long to draw that others should not wait for it. */
const FEW_LINES = 40

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
	const apart = invoice.document.lines.length > FEW_LINES ? askThread("draw-invoices", invoice.document) : null
	if (apart) return apart
	// The drawing of PDFs takes a second to load, so that no other page should wait for it.
	const { renderInvoicePdf } = await import("~emails/documents/invoice")
	return new Uint8Array(await renderInvoicePdf(invoice.document))
}
