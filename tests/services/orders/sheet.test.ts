import { randomUUID } from "node:crypto"
import { describe, expect, test } from "vitest"
import { expectedSupplies, lots, stockMoves } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { readSheet } from "~/routes/buy/sheet-form"
import { findNextOpenDay, findOrderSheet } from "~/services/orders/find-order-sheet.server"
import { placeOrder } from "~/services/orders/place-order.server"
import { addProduct, openStore, openYard, type Shop, THURSDAY, TUESDAY_18, ZONE } from "./place-yard"

const sheetOf = (shop: Shop, day: string, now = THURSDAY) =>
	findOrderSheet({ producerId: shop.producerId, storeId: shop.storeId, now, zone: ZONE, day })

const order = (shop: Shop, productId: string, cases: number, deliveryOn: string, keep = false) =>
	placeOrder({
		producerId: shop.producerId,
		storeId: shop.storeId,
		person: shop.person,
		zone: ZONE,
		now: THURSDAY,
		deliveryOn,
		lines: [{ productId, cases, keep }],
		poNumber: "",
		note: "",
		idempotencyKey: randomUUID(),
	})

describe("the order sheet", () => {
	test("shows free, held and expected in whole cases, and what is asked but not promised", async () => {
		const yard = await openYard()
		const [shop, neighbour] = [await openStore(yard), await openStore(yard)]
		const productId = await addProduct(yard, { code: "11", readyCases: 4 })
		const { producerId } = yard
		await withProducer(producerId, async (tx) => {
			const lotId = randomUUID()
			await tx.insert(lots).values({
				producerId,
				id: lotId,
				code: "HELD",
				productId,
				state: "held",
				harvestedOn: "2026-08-01",
				expectedReleaseOn: "2026-08-14",
				bestBeforeOn: "2027-08-01",
				piecesHarvested: 30,
			})
			await tx.insert(stockMoves).values({ producerId, lotId, toPlace: "cold-room", pieces: 30, reason: "harvest" })
			await tx
				.insert(expectedSupplies)
				.values({ producerId, productId, expectedOn: "2026-08-17", lowPieces: 20, likelyPieces: 40, highPieces: 60 })
		})
		await order(neighbour, productId, 1, TUESDAY_18)
		await order(neighbour, productId, 50, TUESDAY_18, true)
		const [row] = (await sheetOf(shop, TUESDAY_18))?.rows ?? []
		// 36 pieces ready, 30 held, 20 expected: 3 whole cases, then 5 with the held, then 7 with all.
		expect(row?.strip).toMatchObject({
			free: 3,
			held: 2,
			heldUntil: "2026-08-14",
			expected: 2,
			expectedOn: "2026-08-17",
			freeCases: 7,
		})
		expect(row).toMatchObject({ toShareCases: 50, usualCases: 0, orderedCases: 0, lastCases: 0, mayAsk: true })
		expect(row?.breaks).toEqual([
			{ minCases: 1, caseCents: 11_400, poundCents: null },
			{ minCases: 3, caseCents: 10_830, poundCents: null },
		])
	})

	test("shows what the store had last time and has asked for, and nothing of its neighbour", async () => {
		const yard = await openYard()
		const [shop, neighbour] = [await openStore(yard), await openStore(yard)]
		const productId = await addProduct(yard, { code: "11", readyCases: 40 })
		await order(shop, productId, 2, TUESDAY_18)
		await order(shop, productId, 3, "2026-08-21")
		const sheet = await sheetOf(shop, "2026-08-21")
		expect(sheet?.rows[0]).toMatchObject({ lastCases: 2, orderedCases: 3 })
		expect(sheet?.orders).toEqual([{ number: 2, state: "placed", cases: 3 }])
		const ribbon = sheet?.fortnight.filter((day) => day.delivery) ?? []
		expect(ribbon.map(({ on, delivery, ownCases, freeCases }) => [on, delivery?.isOpen, ownCases, freeCases])).toEqual([
			["2026-08-14", false, 0, 0],
			[TUESDAY_18, true, 2, 35],
			["2026-08-21", true, 3, 35],
			["2026-08-25", true, 0, 35],
		])
		const other = await sheetOf(neighbour, "2026-08-21")
		expect(other?.rows[0]).toMatchObject({ lastCases: 0, orderedCases: 0 })
		expect(other?.orders).toEqual([])
	})

	test("is there for a closed day, and not for a day without a delivery", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		expect((await sheetOf(shop, "2026-08-14"))?.day.isOpen).toBe(false)
		expect(await sheetOf(shop, "2026-08-15")).toBeNull()
		const query = { producerId: yard.producerId, storeId: shop.storeId, now: THURSDAY, zone: ZONE }
		expect(await findNextOpenDay(query)).toBe(TUESDAY_18)
		expect(await findNextOpenDay({ ...query, from: "2026-08-19" })).toBe("2026-08-21")
	})
})

describe("a posted order sheet", () => {
	const productId = randomUUID()
	const post = (fields: Record<string, string>) => {
		const form = new FormData()
		for (const [name, value] of Object.entries({ idempotencyKey: randomUUID(), ...fields })) form.set(name, value)
		return readSheet(form)
	}

	test.each([
		["-2", "Cases cannot be less than none. Write 0 to take this line off."],
		["1.5", "Only whole cases are sold. Write a whole number, such as 3."],
		["1000000000", "One line takes at most 999 cases. For more, call or write."],
		["two", "Write the number of cases in figures, such as 3."],
	])("refuses %s cases with a sentence at the field, and keeps what was typed", (typed, sentence) => {
		const name = `cases-${productId}`
		const posted = post({ [name]: typed, note: "Ring first" })
		expect(posted?.errors).toEqual({ [name]: sentence })
		expect(posted?.values).toMatchObject({ [name]: typed, note: "Ring first" })
		expect(posted?.lines).toEqual([])
	})

	test("takes empty as none, and a choice of what to do with more than is free", () => {
		const empty = randomUUID()
		const posted = post({ [`cases-${empty}`]: " ", [`cases-${productId}`]: " 12 ", [`keep-${productId}`]: "rest" })
		expect(posted).toMatchObject({ lines: [{ productId, cases: 12, keep: "rest", leastCases: 0 }], errors: {} })
	})

	test("takes the least a store would have, and refuses one above what is asked", () => {
		const fields = { [`cases-${productId}`]: "4", [`seen-${productId}`]: "12;1:11400;3:10830" }
		const seen = {
			piecesPerCase: 12,
			breaks: [
				{ minCases: 1, caseCents: 11_400 },
				{ minCases: 3, caseCents: 10_830 },
			],
		}
		expect(post({ ...fields, [`least-${productId}`]: "2" })?.lines).toEqual([
			{ productId, cases: 4, keep: false, leastCases: 2, seen },
		])
		expect(post({ ...fields, [`least-${productId}`]: "5" })?.errors).toEqual({
			[`least-${productId}`]: "The least cannot be more than what you ask for.",
		})
	})

	test("refuses a note that is too long, and is no sheet of ours without its key", () => {
		expect(post({ note: "x".repeat(501) })?.errors).toEqual({ note: "A note has at most 500 signs." })
		expect(post({ idempotencyKey: "1" })).toBeNull()
	})
})
