import { randomUUID } from "node:crypto"
import { expect, test } from "vitest"
import { expectedSupplies, standingOrderLines, standingOrderSkips, standingOrders } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { findSeason } from "~/services/desk/find-season.server"
import { makeDueOrders } from "~/services/standing-orders/make-due-orders.server"
import { remindDates } from "~/services/standing-orders/remind-dates.server"
import { addProduct, openStore, openYard, type Shop, THURSDAY, type Yard, ZONE } from "../orders/place-yard"
import { place, standOnThursday } from "./desk-steps"

standOnThursday()

const seasonOf = (yard: Yard) => findSeason({ producerId: yard.producerId, now: THURSDAY, zone: ZONE })

async function addStanding(
	shop: Shop,
	standing: { productId: string; cases: number; isCommitment?: boolean; skips?: Day[]; endsOn?: Day; rule?: string },
): Promise<string> {
	const { producerId, storeId, person } = shop
	const { productId, cases, isCommitment = false, skips = [], endsOn = null } = standing
	const { rule = "FREQ=WEEKLY;BYDAY=TU" } = standing
	const id = randomUUID()
	await withProducer(producerId, async (tx) => {
		await tx.insert(standingOrders).values({
			producerId,
			id,
			storeId,
			rule,
			startsOn: "2026-08-25",
			endsOn,
			isCommitment,
			createdBy: person.id,
			createdAt: new Date("2026-08-01T12:00:00Z"),
		})
		await tx.insert(standingOrderLines).values({ producerId, standingOrderId: id, productId, cases })
		for (const skipOn of skips) await tx.insert(standingOrderSkips).values({ producerId, standingOrderId: id, skipOn })
	})
	return id
}

test("commitments, standing orders and single orders stand apart, week by week, beside what will be there", async () => {
	const yard = await openYard()
	const { producerId } = yard
	const round = await addProduct(yard, { code: "11", readyCases: 6 })
	await place(await openStore(yard), [round, 2])
	await addStanding(await openStore(yard), { productId: round, cases: 3, skips: ["2026-09-01"], endsOn: "2026-09-08" })
	await addStanding(await openStore(yard), { productId: round, cases: 1, isCommitment: true, endsOn: "2026-08-25" })
	await withProducer(producerId, (tx) =>
		tx.insert(expectedSupplies).values({
			producerId,
			productId: round,
			expectedOn: "2026-09-02",
			lowPieces: 12,
			likelyPieces: 24,
			highPieces: 48,
		}),
	)

	const { products, weeks } = await seasonOf(yard)
	expect(weeks).toHaveLength(26)
	expect(weeks[0]).toBe("2026-08-10")
	const [product] = products
	expect(product?.weeks.slice(0, 5).map(({ wanted }) => [wanted.commitment, wanted.standing, wanted.single])).toEqual([
		[0, 0, 0],
		[0, 0, 24],
		[12, 36, 0],
		[0, 0, 0],
		[0, 36, 0],
	])
	// Six cases in stock serve 2, then 4; what the hives give at the low figure is one case of the three of September 8.
	expect(product?.weeks.map(({ short }) => [short.low, short.likely, short.high]).filter(([low]) => low)).toEqual([
		[24, 12, 0],
	])
})

test("a season without stores, crop or stock has no products to show", async () => {
	expect((await seasonOf(await openYard())).products).toEqual([])
})

test("a standing order whose rule is spoilt is named, and stops neither the page nor the orders of others", async () => {
	const yard = await openYard()
	const round = await addProduct(yard, { code: "11", readyCases: 9 })
	await addStanding(await openStore(yard), { productId: round, cases: 3, endsOn: "2026-08-25" })
	await addStanding(await openStore(yard), { productId: round, cases: 2, rule: "FREQ=FORTNIGHTLY" })
	const { products, unreadStores } = await seasonOf(yard)
	expect(unreadStores).toEqual(["Pantry & Plume"])
	expect(products[0]?.weeks.map(({ wanted }) => wanted.standing).filter((pieces) => pieces > 0)).toEqual([36])
	const afterLastOrders = new Date("2026-08-21T17:00:00Z")
	expect(await makeDueOrders({ producerId: yard.producerId, now: afterLastOrders })).toEqual({ made: 1 })
	expect(await remindDates({ producerId: yard.producerId, now: afterLastOrders })).toEqual({ reminded: 0 })
})
