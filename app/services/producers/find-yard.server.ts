import { eq } from "drizzle-orm"
import { producerSettings, producers } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"

/** The producer as letters, invoices and labels name it. */
export type Yard = {
	name: string
	address: string
	email: string
	phone: string | null
	contactName: string | null
	invoiceNote: string
}

/** What stands at the head and foot of everything the producer sends. Throws when the producer has no settings. */
export async function findYard(tx: Tx, producerId: string): Promise<Yard> {
	const [row] = await tx
		.select({
			name: producers.name,
			address: producerSettings.address,
			email: producerSettings.email,
			phone: producerSettings.phone,
			contactName: producerSettings.contactName,
			invoiceNote: producerSettings.invoiceNote,
		})
		.from(producers)
		.innerJoin(producerSettings, eq(producerSettings.producerId, producers.id))
		.where(eq(producers.id, producerId))
	if (!row) throw new Error("every producer has settings")
	return { ...row, phone: row.phone || null, contactName: row.contactName || null }
}

/** The part of it that letters take. */
export function letterHead({ name, address, email, phone, contactName }: Yard) {
	return { name, address, email, phone, contactName }
}
