import { parentPort } from "node:worker_threads"
import { renderInvoicePdf } from "~emails/documents/invoice"
import type { InvoiceProps } from "~emails/documents/invoice-props"

/** Draws invoices one after the other for as long as it is asked to, and hands back the pages of each. */
parentPort?.on("message", async ({ id, data }: { id: number; data: InvoiceProps }) => {
	try {
		parentPort?.postMessage({ id, bytes: new Uint8Array(await renderInvoicePdf(data)) })
	} catch (error) {
		parentPort?.postMessage({ id, error: error instanceof Error ? error.message : "the invoice was not drawn" })
	}
})
