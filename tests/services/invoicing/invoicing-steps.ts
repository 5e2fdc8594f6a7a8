import { and, eq, sql } from "drizzle-orm"
import { invoices, orderLines, products, stores, taxRates } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { findInvoice } from "~/services/invoicing/find-invoice.server"
import type { Shop, Yard } from "../orders/place-yard"

/** Changes what a store has agreed with the producer. */
export async function agree(yard: Yard, shop: Shop, terms: Partial<typeof stores.$inferInsert>): Promise<void> {
	await withProducer(yard.producerId, (tx) =>
		tx
			.update(stores)
			.set(terms)
			.where(and(eq(stores.producerId, yard.producerId), eq(stores.id, shop.storeId))),
	)
}

/** Makes the lines of a product priced by weight at so many cents a pound, weighed or not yet. */
export async function priceByWeight(
	yard: Yard,
	productId: string,
	{ poundCents, weighedGrams }: { poundCents: number; weighedGrams: number | null },
): Promise<void> {
	await withProducer(yard.producerId, (tx) =>
		tx
			.update(orderLines)
			.set({ poundCents, weighedGrams })
			.where(and(eq(orderLines.producerId, yard.producerId), eq(orderLines.productId, productId))),
	)
}

/** Sales tax is due on everything from here on. */
export async function taxAll(yard: Yard): Promise<void> {
	await withProducer(yard.producerId, (tx) =>
		tx.update(products).set({ isTaxable: true }).where(eq(products.producerId, yard.producerId)),
	)
}

export async function addRate(yard: Yard, place: string, validFrom: string, basisPoints: number): Promise<void> {
	await withProducer(yard.producerId, (tx) =>
		tx.insert(taxRates).values({ producerId: yard.producerId, place, validFrom, basisPoints }),
	)
}

/** The invoice as its page shows it. Throws when there is none. */
export async function invoiceAt(yard: Yard, number: string) {
	const page = await findInvoice({ producerId: yard.producerId, number })
	if (!page) throw new Error(`no invoice ${number}`)
	return page
}

/** The invoices of a producer by number: what was issued when, and the orders on each. */
export async function issued(yard: Yard) {
	return readProducer(yard.producerId, async (tx) => {
		const { rows } = await tx.execute<{ sequence: number; issuedOn: string; totalCents: number; orders: number[] }>(sql`
			select i.sequence, i.issued_on::text as "issuedOn", i.total_cents as "totalCents",
				array(select o.number from invoice_orders x join orders o on o.producer_id = x.producer_id and o.id = x.order_id
					where x.producer_id = i.producer_id and x.invoice_id = i.id order by o.number) as orders
			from ${invoices} i where i.producer_id = ${yard.producerId} order by i.sequence`)
		return rows
	})
}
