import { randomUUID } from "node:crypto"
import { eq } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { saleLineLots, saleLines, sales } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { findDayTotals } from "~/services/stall/find-day-totals.server"
import { listMarketDays } from "~/services/stall/find-market-days.server"
import { findStallPage } from "~/services/stall/find-stall-page.server"
import { takeCash } from "~/services/stall/take-cash.server"
import { addProduct, lostLots, type Market, openMarket, placesOf } from "./market"

const sell = (market: Market, items: { productId: string; pieces: number }[], more: Record<string, unknown> = {}) =>
	takeCash({ ...market, saleId: randomUUID(), items, givenCents: 100_000, ...more })

const salesOf = ({ producerId }: Market) =>
	readProducer(producerId, (tx) => tx.select().from(sales).where(eq(sales.producerId, producerId)))

describe("selling for cash", () => {
	test("two phones race for the last piece: one sells it, the other is told who was quicker", async () => {
		const market = await openMarket()
		const { productId, lotIds } = await addProduct(market, { code: "11", ready: [5], loaded: [1] })
		const answers = await Promise.all([1, 2, 3].map(() => sell(market, [{ productId, pieces: 1 }])))
		expect(answers.filter(({ ok }) => ok)).toEqual([{ ok: true, totalCents: 1_400 }])
		expect(answers.filter(({ ok }) => !ok)).toEqual(
			[1, 2].map(() => ({ ok: false, reason: "not-so-many", productName: "Round", left: 0 })),
		)
		expect(await placesOf(market.producerId, lotIds[0] ?? "")).toEqual({ ready: 4, sold: 1 })
		expect(await salesOf(market)).toHaveLength(1)
	})

	test("a sale sent twice, also in the same moment, is sold once and answered the same", async () => {
		const market = await openMarket()
		const { productId, lotIds } = await addProduct(market, { code: "11", ready: [5], loaded: [5] })
		const saleId = randomUUID()
		const send = () => sell(market, [{ productId, pieces: 2 }], { saleId, givenCents: 5_000 })
		const answers = [...(await Promise.all([send(), send()])), await send()]
		expect(answers).toEqual([1, 2, 3].map(() => ({ ok: true, totalCents: 2_800 })))
		expect(await placesOf(market.producerId, lotIds[0] ?? "")).toEqual({ market: 3, sold: 2 })
		expect(await salesOf(market)).toMatchObject([
			{
				id: saleId,
				method: "cash",
				state: "paid",
				totalCents: 2_800,
				givenCents: 5_000,
				soldBy: market.viewer.personId,
			},
		])
	})

	test("another sale under the id of one that is taken is refused, and nothing more is sold", async () => {
		const market = await openMarket()
		const { productId, lotIds } = await addProduct(market, { code: "11", ready: [5], loaded: [5] })
		const saleId = randomUUID()
		await sell(market, [{ productId, pieces: 1 }], { saleId })
		expect(await sell(market, [{ productId, pieces: 2 }], { saleId })).toEqual({
			ok: false,
			reason: "written-before",
			earlier: { dayId: market.dayId, method: "cash", state: "paid", totalCents: 1_400 },
		})
		expect(await placesOf(market.producerId, lotIds[0] ?? "")).toEqual({ market: 4, sold: 1 })
	})

	test("pieces are taken from the lot with the earliest best-before first, and the sale knows its lots", async () => {
		const market = await openMarket()
		const { productId, lotIds } = await addProduct(market, { code: "11", ready: [3, 4], loaded: [2, 4] })
		const saleId = randomUUID()
		expect(await sell(market, [{ productId, pieces: 3 }], { saleId })).toEqual({ ok: true, totalCents: 4_200 })
		expect(await placesOf(market.producerId, lotIds[0] ?? "")).toEqual({ ready: 1, sold: 2 })
		expect(await placesOf(market.producerId, lotIds[1] ?? "")).toEqual({ market: 3, sold: 1 })
		const picked = await readProducer(market.producerId, (tx) =>
			tx.select().from(saleLineLots).where(eq(saleLineLots.saleId, saleId)).orderBy(saleLineLots.pieces),
		)
		expect(picked.map(({ lotId, pieces }) => [lotId, pieces])).toEqual([
			[lotIds[1], 1],
			[lotIds[0], 2],
		])
		expect(await lostLots(market.producerId)).toEqual([])
	})

	test("nothing tapped, too little given, too many pieces: refused with what is missing, and nothing is written", async () => {
		const market = await openMarket()
		const round = await addProduct(market, { code: "11", ready: [5], loaded: [2] })
		const unbrought = await addProduct(market, { code: "21", form: "basswood", ready: [5] })
		expect(await sell(market, [])).toEqual({ ok: false, reason: "nothing-sold" })
		expect(await sell(market, [{ productId: round.productId, pieces: 2 }], { givenCents: 2_799 })).toEqual({
			ok: false,
			reason: "too-little-given",
			totalCents: 2_800,
		})
		expect(await sell(market, [{ productId: round.productId, pieces: 3 }])).toEqual({
			ok: false,
			reason: "not-so-many",
			productName: "Round",
			left: 2,
		})
		expect(await sell(market, [{ productId: unbrought.productId, pieces: 1 }])).toMatchObject({ left: 0 })
		expect(await sell(market, [{ productId: randomUUID(), pieces: 1 }])).toMatchObject({ left: 0 })
		expect(await salesOf(market)).toEqual([])
	})

	test("a day that is not open sells nothing", async () => {
		for (const state of ["planned", "closed"] as const) {
			const market = await openMarket({ state })
			const { productId } = await addProduct(market, { code: "11", ready: [5], loaded: [5] })
			expect(await sell(market, [{ productId, pieces: 1 }])).toEqual({ ok: false, reason: "day-not-open" })
		}
	})
})

describe("who sees a market day", () => {
	test("who is not named on it sees and sells nothing; the owner sees every day", async () => {
		const market = await openMarket({ on: "2026-08-15" })
		const { productId } = await addProduct(market, { code: "11", ready: [5], loaded: [5] })
		const other = await openMarket()
		const stranger = { ...market, viewer: other.viewer }
		expect(await findStallPage({ ...stranger, saleId: null })).toBeNull()
		expect(await findDayTotals(stranger)).toBeNull()
		expect(await sell(stranger, [{ productId, pieces: 1 }])).toEqual({ ok: false, reason: "no-such-day" })
		expect(await listMarketDays({ ...stranger, today: "2026-08-15" })).toEqual([])
		const ownDays = await listMarketDays({ ...market, today: "2026-08-15" })
		expect(ownDays.map(({ id }) => id)).toEqual([market.dayId])
		const owner = { personId: other.viewer.personId, seesEveryDay: true }
		expect((await listMarketDays({ ...market, today: "2026-08-15", viewer: owner })).map(({ id }) => id)).toEqual([
			market.dayId,
		])
		// A day of another producer is none, even for an owner.
		expect(await findStallPage({ ...market, dayId: other.dayId, viewer: owner, saleId: null })).toBeNull()
	})
})

test("a day's totals add up the sales, and say when the books do not agree", async () => {
	const market = await openMarket()
	const round = await addProduct(market, { code: "11", ready: [20, 10], loaded: [6, 2] })
	const comb = await addProduct(market, { code: "41", form: "cut-comb", pieceCents: 1_700, ready: [9], loaded: [4] })
	await sell(market, [{ productId: round.productId, pieces: 7 }])
	await sell(market, [
		{ productId: round.productId, pieces: 1 },
		{ productId: comb.productId, pieces: 1 },
	])
	const found = await findDayTotals(market)
	expect(found?.totals).toEqual({
		salesCount: 2,
		pieces: 9,
		cardCents: 0,
		cashCents: 8 * 1_400 + 1_700,
		totalCents: 12_900,
		expectedCashCents: 20_900,
	})
	expect(found?.pieces).toEqual([
		{ productId: round.productId, name: "Round", brought: 8, returned: 0, sold: 8, atCard: 0, left: 0, agrees: true },
		{ productId: comb.productId, name: "Cut comb", brought: 4, returned: 0, sold: 1, atCard: 0, left: 3, agrees: true },
	])
	expect(await lostLots(market.producerId)).toEqual([])

	// A sale that says less than what left the table is found out.
	await withProducer(market.producerId, (tx) => tx.update(saleLines).set({ pieces: 6 }).where(eq(saleLines.pieces, 7)))
	expect((await findDayTotals(market))?.pieces.map(({ agrees }) => agrees)).toEqual([false, true])
})
