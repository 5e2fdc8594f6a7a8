import type { Day } from "~/domain/calendar"
import { unkeptPromises } from "~/domain/promise/unkept-promises"
import { type CaseStrip, caseStrips } from "~/services/orders/cases-on-day.server"
import { promiseDay } from "~/services/orders/find-most-cases.server"
import type { ProductOutlook } from "~/services/promise/find-outlooks.server"
import type { OpenOrder } from "./find-open-orders.server"

/** A product of which less can be ready for a delivery day than is wanted, in whole cases. */
export type Shortage = {
	productId: string
	productName: string
	productCode: string
	deliveryOn: Day
	/** Cases that stores want shared out, and how many stores that are. */
	toShareCases: number
	stores: number
	/** What can be ready for them. */
	strip: CaseStrip
	/** What has been promised for the day beyond all that will be there. */
	overPromisedCases: number
	shortCases: number
}

/**
 * Where the crop does not reach: for each product and day, what is to be shared out beyond what is free, and what has
 * been promised beyond supply. By day, in the order of the orders. Reads nothing.
 */
export function findShortages(facts: {
	orders: readonly OpenOrder[]
	outlooks: ReadonlyMap<string, ProductOutlook>
	today: Day
}): Shortage[] {
	const { orders, outlooks, today } = facts
	const wanted = new Map<string, Shortage>()
	for (const order of orders) {
		const deliveryOn = promiseDay(order.deliveryOn, today)
		for (const line of order.lines) {
			const outlook = outlooks.get(line.productId)
			if (!outlook || order.state === "packed") continue
			const key = `${deliveryOn} ${line.productId}`
			const shortage = wanted.get(key) ?? blank(outlook, { line, deliveryOn })
			if (line.isToShare && line.givenCases === null) {
				shortage.toShareCases += line.askedCases - line.promisedCases
				shortage.stores += 1
			}
			wanted.set(key, shortage)
		}
	}
	return [...wanted.values()].flatMap((shortage) => {
		const beyondFree = Math.max(0, shortage.toShareCases - shortage.strip.freeCases)
		const shortCases = beyondFree + shortage.overPromisedCases
		return shortCases > 0 ? { ...shortage, shortCases } : []
	})
}

function blank(
	outlook: ProductOutlook,
	{ line, deliveryOn }: { line: OpenOrder["lines"][number]; deliveryOn: Day },
): Shortage {
	const [strip] = caseStrips(outlook, [deliveryOn])
	if (!strip) throw new Error("a strip for each day asked")
	return {
		productId: line.productId,
		productName: line.productName,
		productCode: line.code,
		deliveryOn,
		toShareCases: 0,
		stores: 0,
		strip,
		overPromisedCases: Math.ceil((unkeptPromises(outlook).get(deliveryOn) ?? 0) / outlook.piecesPerCase),
		shortCases: 0,
	}
}
