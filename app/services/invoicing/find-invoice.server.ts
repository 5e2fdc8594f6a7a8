import { readProducer } from "~/db/transaction.server"
import { type InvoicePage, readInvoice } from "./read-invoice.server"

/** One invoice for its page: as `readInvoice`, in a transaction of its own. */
export function findInvoice(query: {
	producerId: string
	storeId?: string
	number: string
}): Promise<InvoicePage | null> {
	return readProducer(query.producerId, (tx) => readInvoice(tx, query))
}
