import { and, asc, eq, sql } from "drizzle-orm"
import { products } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { type CaseStrip, caseStrips } from "~/services/orders/cases-on-day.server"
import { findOutlooks } from "./find-outlooks.server"

/** What can still be promised of one product for a day, in whole cases. */
export type FreeProduct = { code: string; name: string; detail: string; strip: CaseStrip }

/** The products on sale of which anything is there, expected or promised, with what is free of each for `day`, by code. */
export function listFreeOnDay(query: { producerId: string; day: Day; today: Day }): Promise<FreeProduct[]> {
	const { producerId, day, today } = query
	return readProducer(producerId, async (tx) => {
		const outlooks = await findOutlooks(tx, { producerId, today })
		const sold = await tx
			.select({ id: products.id, code: products.code, name: products.name, detail: products.detail })
			.from(products)
			.where(and(eq(products.producerId, producerId), eq(products.isActive, true)))
			.orderBy(asc(sql`length(${products.code})`), asc(products.code))
		return sold.flatMap(({ id, ...product }) => {
			const outlook = outlooks.get(id)
			if (!outlook || (outlook.supplies.length === 0 && outlook.promises.length === 0)) return []
			const [strip] = caseStrips(outlook, [day])
			return strip ? [{ ...product, strip }] : []
		})
	})
}
