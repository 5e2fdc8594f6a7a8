import { readProducer } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import { deliveryDayOn, findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { findOpenOrders, type OpenLine } from "~/services/desk/find-open-orders.server"
import { findOutlooks } from "~/services/promise/find-outlooks.server"
import { shareable } from "./read-sharing.server"

/** A product of a day that is to be shared out. */
export type OpenSharing = {
	productCode: string
	productName: string
	deliveryOn: Day
	/** Last orders for the day; null when the van no longer comes on such days. */
	cutoffAt: Date | null
	/** Cases asked beyond what is sure, by how many orders, and what can be ready for them. */
	askedCases: number
	orders: number
	supply: number
}

/** All that is to be shared out, the nearest delivery first, then by product code. */
export function listSharings(query: { producerId: string; now: Date; zone: string }): Promise<OpenSharing[]> {
	const { producerId, now, zone } = query
	const today = dayInZone(now, zone)
	return readProducer(producerId, async (tx) => {
		const orders = await findOpenOrders(tx, { producerId, states: ["placed"] })
		const outlooks = await findOutlooks(tx, { producerId, today })
		const schedule = await findDeliverySchedule(tx, { producerId, storeId: null, now, zone })
		const waiting = new Map<string, { deliveryOn: Day; lines: OpenLine[] }>()
		for (const { deliveryOn, lines } of orders) {
			for (const line of lines) {
				if (line.givenCases !== null) continue
				const key = `${deliveryOn} ${line.productId}`
				const of = waiting.get(key) ?? { deliveryOn, lines: [] }
				of.lines.push(line)
				waiting.set(key, of)
			}
		}
		const open = [...waiting.values()].flatMap(({ deliveryOn, lines }): OpenSharing[] => {
			const [first] = lines as [OpenLine]
			const { supply, claimants, isOverPromised } = shareable(outlooks.get(first.productId), {
				lines,
				deliveryOn,
				today,
			})
			if (claimants.length === 0) return []
			const asked = claimants.map((line) => line.askedCases - (isOverPromised ? 0 : line.promisedCases))
			return [
				{
					productCode: first.code,
					productName: first.productName,
					deliveryOn,
					cutoffAt: deliveryDayOn(schedule, deliveryOn)?.cutoffAt ?? null,
					askedCases: asked.reduce((sum, cases) => sum + cases, 0),
					orders: claimants.length,
					supply,
				},
			]
		})
		return open.toSorted((a, b) =>
			a.deliveryOn === b.deliveryOn ? byCode(a, b) : a.deliveryOn < b.deliveryOn ? -1 : 1,
		)
	})
}

const byCode = (a: OpenSharing, b: OpenSharing) =>
	a.productCode.length - b.productCode.length || (a.productCode < b.productCode ? -1 : 1)
