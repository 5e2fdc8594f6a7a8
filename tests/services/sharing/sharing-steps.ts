import { randomUUID } from "node:crypto"
import { and, eq } from "drizzle-orm"
import { orderLines, orders, sharingRuns } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { findSharing } from "~/services/sharing/find-sharing.server"
import { shareOutProduct } from "~/services/sharing/share-out-product.server"
import { producerOf } from "../desk/desk-steps"
import { type Shop, TUESDAY_18, type Yard } from "../orders/place-yard"

export const TODAY = "2026-08-13"
let numbers = 1000

type Ask = Partial<typeof orderLines.$inferInsert> & { productId: string; askedCases: number }

/** An order for Tuesday as it stands in the book, each line to be shared out unless it says otherwise; answers its number. */
export async function ask(shop: Shop, ...lines: Ask[]): Promise<number> {
	const { producerId, storeId } = shop
	const orderId = randomUUID()
	numbers += 1
	const number = numbers
	await withProducer(producerId, async (tx) => {
		await tx.insert(orders).values({ producerId, id: orderId, number, storeId, deliveryOn: TUESDAY_18 })
		await tx
			.insert(orderLines)
			.values(
				lines.map((line) => ({ producerId, orderId, isToShare: true, caseCents: 11_400, piecesPerCase: 12, ...line })),
			)
	})
	return number
}

/** What is to be shared out of a product for Tuesday. Throws when there is no such product. */
export async function sharingOf(yard: Yard, productCode: string) {
	const found = await findSharing({ producerId: yard.producerId, productCode, deliveryOn: TUESDAY_18, today: TODAY })
	if (!found) throw new Error(`no product ${productCode}`)
	return found
}

type Choice = Partial<Parameters<typeof shareOutProduct>[0]> & { personId: string }

/** Shares out by equal shares what the page would show now, unless the choice says otherwise. */
export async function shareOutNow(yard: Yard, productCode: string, choice: Choice) {
	const { facts } = await sharingOf(yard, productCode)
	return shareOutProduct({
		producer: producerOf(yard),
		productCode,
		deliveryOn: TUESDAY_18,
		seen: facts.seen,
		rule: "equal-shares",
		byHand: new Map(),
		note: "",
		instead: new Map(),
		idempotencyKey: randomUUID(),
		...choice,
	})
}

/** The lines of an order: product, asked, given and whether they wait to be shared out. */
export function linesOf(yard: Yard, number: number) {
	return withProducer(yard.producerId, (tx) =>
		tx
			.select({
				id: orderLines.id,
				productId: orderLines.productId,
				asked: orderLines.askedCases,
				given: orderLines.givenCases,
				caseCents: orderLines.caseCents,
			})
			.from(orderLines)
			.innerJoin(orders, and(eq(orders.producerId, orderLines.producerId), eq(orders.id, orderLines.orderId)))
			.where(and(eq(orders.producerId, yard.producerId), eq(orders.number, number))),
	)
}

/** What each order was given of its first line, in the order of the numbers. */
export async function givenOf(yard: Yard, numbers: readonly number[]): Promise<(number | null | undefined)[]> {
	const lines = await Promise.all(numbers.map((number) => linesOf(yard, number)))
	return lines.map(([line]) => line?.given)
}

/** The runs of a producer, by state. */
export function runsOf(yard: Yard) {
	return withProducer(yard.producerId, (tx) =>
		tx
			.select({ id: sharingRuns.id, state: sharingRuns.state, rule: sharingRuns.rule })
			.from(sharingRuns)
			.where(eq(sharingRuns.producerId, yard.producerId)),
	)
}
