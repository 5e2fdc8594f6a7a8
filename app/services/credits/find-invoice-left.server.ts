import { readProducer } from "~/db/transaction.server"
import { type InvoiceLeft, readInvoiceLeft } from "./read-invoice-left.server"

/** What of an invoice can still be credited, for the desk's form. Null when there is no such invoice. */
export function findInvoiceLeft(query: { producerId: string; number: string }): Promise<InvoiceLeft | null> {
	return readProducer(query.producerId, (tx) => readInvoiceLeft(tx, query))
}
