import { describe, expect, test } from "vitest"
import { withProducer } from "~/db/transaction.server"
import { findBoard } from "~/services/crop/find-board.server"
import { refreshExpected } from "~/services/crop/refresh-expected.server"
import { addLot, place } from "../desk/desk-steps"
import { addProduct, openStore, openYard, type Yard } from "../orders/place-yard"
import { addHives, addSuper } from "./crop-rows"

const TODAY = "2026-08-13"

const boardOf = (yard: Yard, filter: { yardId?: string; after?: string } = {}) =>
	findBoard({ producerId: yard.producerId, today: TODAY, yardId: filter.yardId ?? null, after: filter.after ?? null })

describe("the crop board", () => {
	test("is empty for a producer without hives", async () => {
		expect(await boardOf(await openYard())).toEqual({
			yards: [],
			summaries: [],
			next: null,
			weeks: [],
			heldCases: 0,
			lacking: { cases: 0, coveredIn: null },
			figure: "low",
			readyCappedPercent: 90,
		})
	})

	test("stands hives side by side by number, their supers as on the hive, each with its latest check", async () => {
		const yard = await openYard()
		const productId = await addProduct(yard, { code: "11", readyCases: 0 })
		const { hiveIds } = await addHives(yard, { count: 11 })
		await addSuper(yard, {
			hiveId: hiveIds[1] as string,
			productId,
			looks: [
				{ on: "2026-08-01", filled: 70, capped: 30 },
				{ on: "2026-08-12", filled: 100, capped: 95 },
			],
		})
		const upper = await addSuper(yard, { hiveId: hiveIds[1] as string, productId, level: 2, setOn: "2026-08-10" })
		await addSuper(yard, { hiveId: hiveIds[1] as string, productId, off: { on: "2026-07-30", finished: 30 } })
		const { yards, summaries } = await boardOf(yard)
		expect(yards[0]?.hives.map(({ label }) => label)).toEqual(
			Array.from({ length: 11 }, (_, index) => String(index + 1)),
		)
		const stack = yards[0]?.hives[1]?.supers
		expect(stack).toHaveLength(2)
		expect(stack?.[0]).toMatchObject({ id: upper, latest: null, isReady: false, isUnseen: false })
		expect(stack?.[1]).toMatchObject({
			latest: { checkedOn: "2026-08-12", cappedPercent: 95 },
			isReady: true,
			readyOn: "2026-08-14",
			advice: [{ kind: "ready", cappedPercent: 95, readyCappedPercent: 90 }],
		})
		expect(summaries).toMatchObject([{ name: "Home yard", hives: 11, supers: 2, ready: [{ hive: "2" }] }])
	})

	test("of several hundred hives shows sixty at a time, each once, and one yard alone when asked", async () => {
		const yard = await openYard()
		const { yardId } = await addHives(yard, { count: 70, name: "Canal Bank" })
		await addHives(yard, { count: 80, name: "Weld Farm", from: 71 })
		const seen: string[] = []
		let after: string | null = ""
		let pages = 0
		while (after !== null && pages < 9) {
			const board = await boardOf(yard, { after })
			seen.push(...board.yards.flatMap(({ hives }) => hives.map(({ label }) => label)))
			after = board.next
			pages++
		}
		expect(pages).toBe(3)
		expect(seen).toEqual(Array.from({ length: 150 }, (_, index) => String(index + 1)))
		const one = await boardOf(yard, { yardId })
		expect(one.yards.map(({ name }) => name)).toEqual(["Canal Bank"])
		expect(one.summaries.map(({ name }) => name)).toEqual(["Canal Bank", "Weld Farm"])
	})

	test("an address that was tampered with shows the first page", async () => {
		const yard = await openYard()
		await addHives(yard, { count: 2 })
		expect((await boardOf(yard, { yardId: "x'", after: "nonsense" })).yards[0]?.hives).toHaveLength(2)
	})

	test("says in which week the hives bring what is asked for and not in stock", async () => {
		const yard = await openYard()
		const productId = await addProduct(yard, { code: "11", readyCases: 1 })
		await addLot(yard, { productId, code: "H1", bestBeforeOn: "2027-02-01", coldRoom: 24, state: "held" })
		const { hiveIds } = await addHives(yard, { count: 2 })
		const looks = [{ on: "2026-08-12", filled: 100, capped: 95 }]
		for (const hiveId of hiveIds) await addSuper(yard, { hiveId, productId, looks })
		await withProducer(yard.producerId, (tx) => refreshExpected(tx, { producerId: yard.producerId, today: TODAY }))
		const shop = await openStore(yard)
		await place(shop, [productId, 5])
		// Two supers of 34 pieces at the low figure make five cases of 12; two cases are lacking.
		expect(await boardOf(yard)).toMatchObject({
			weeks: [{ on: "2026-08-10", low: 5, likely: 6, high: 6, days: [{ on: "2026-08-14", cases: 5 }] }],
			heldCases: 2,
			lacking: { cases: 2, coveredIn: "2026-08-10" },
		})
		await place(await openStore(yard), [productId, 6])
		expect((await boardOf(yard)).lacking).toEqual({ cases: 8, coveredIn: null })
	})

	test("shows nothing of another producer", async () => {
		const theirs = await openYard()
		const { yardId, hiveIds } = await addHives(theirs, { count: 3 })
		const ours = await openYard()
		await addHives(ours, { count: 1, name: "Ours" })
		expect((await boardOf(ours, { yardId })).yards).toEqual([])
		expect((await boardOf(ours, { after: hiveIds[0] as string })).yards).toEqual([])
	})
})
