import { readProducer } from "~/db/transaction.server"
import type { CreditProps } from "~emails/documents/credit-props"
import { readCredit } from "./read-credit.server"

/** One credit for its page: as `readCredit`, in a transaction of its own. */
export function findCredit(query: {
	producerId: string
	storeId?: string
	number: string
}): Promise<CreditProps | null> {
	return readProducer(query.producerId, (tx) => readCredit(tx, query))
}
