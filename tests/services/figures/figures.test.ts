import { randomUUID } from "node:crypto"
import { eq } from "drizzle-orm"
import { expect, test } from "vitest"
import { lots, orders, stockMoves, stores } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { findFigures } from "~/services/figures/find-figures.server"
import { type FigureFile, writeFiguresCsv } from "~/services/figures/write-figures-csv.server"
import { credit, issue, type MoneyYard, openMoneyYard, sellAtStall } from "../books/money-yard"
import { addProduct, openStore } from "../orders/place-yard"

const TODAY = "2026-09-02"
const SEASON = { from: "2026-01-01", to: "2026-12-31", today: TODAY, quietWeeks: 6 }
const figuresOf = (at: MoneyYard, asked: Partial<typeof SEASON> = {}) =>
	findFigures({ producerId: at.producer.id, ...SEASON, ...asked })
const fileOf = (at: MoneyYard, of: FigureFile) => writeFiguresCsv({ producerId: at.producer.id, ...SEASON, of })

/** Two stores, two products, a market, and an invoice of last year. */
async function soldSeason() {
	const at = await openMoneyYard()
	const other = {
		...at,
		shop: await openStore(at.yard, `quiet-${randomUUID().slice(0, 8)}`),
		productId: await addProduct(at.yard, { code: "21", readyCases: 0 }),
	}
	await issue(at, { on: "2025-08-05", sequence: 1, linesCents: 7_000 })
	await issue(at, { on: "2026-08-04", sequence: 1, linesCents: 10_000, deliveryCents: 1_800, taxCents: 825 })
	await issue(at, { on: "2026-08-09", sequence: 2, linesCents: 20_000 })
	await issue(other, { on: "2026-08-25", sequence: 3, linesCents: 45_000 })
	await credit(at, { on: "2026-08-10", sequence: 1, linesCents: 900, reason: "broken" })
	await sellAtStall(at, { on: "2026-08-15", market: "Coopers Green", cash: [1_400, 1_700], card: [2_200] })
	return { at, other }
}

test("sales stand by week, product, way of selling and store, without delivery and tax", async () => {
	const { at, other } = await soldSeason()
	const {
		span,
		spans,
		products,
		channels,
		stores: bought,
		storeCount,
		creditedCents,
		firstSeason,
	} = await figuresOf(at)
	expect(span).toBe("week")
	expect(spans).toEqual([
		{ startOn: "2026-08-03", storeCents: 30_000, stallCents: 0 },
		{ startOn: "2026-08-10", storeCents: 0, stallCents: 5_300 },
		{ startOn: "2026-08-17", storeCents: 0, stallCents: 0 },
		{ startOn: "2026-08-24", storeCents: 45_000, stallCents: 0 },
	])
	expect(products).toMatchObject([
		{ code: "21", storeCents: 45_000, storeCases: 1, stallCents: 0, stallPieces: 0 },
		{ code: "11", storeCents: 30_000, storeCases: 2, stallCents: 5_300, stallPieces: 3 },
	])
	expect(channels).toEqual([
		{ of: null, cents: 75_000, count: 3 },
		{ of: "Coopers Green", cents: 5_300, count: 3 },
	])
	expect(bought).toMatchObject([
		{ slug: other.shop.slug, cents: 45_000, invoices: 1, lastOn: "2026-08-25" },
		{ slug: at.shop.slug, cents: 30_000, invoices: 2, lastOn: "2026-08-09" },
	])
	expect({ storeCount, creditedCents, firstSeason }).toEqual({ storeCount: 2, creditedCents: 900, firstSeason: 2025 })
})

test("two seasons are set out by month, and every figure is of the days that are asked for", async () => {
	const { at } = await soldSeason()
	const both = await figuresOf(at, { from: "2025-01-01" })
	expect(both.span).toBe("month")
	expect([both.spans.at(0), both.spans.at(-1)]).toEqual([
		{ startOn: "2025-08-01", storeCents: 7_000, stallCents: 0 },
		{ startOn: "2026-08-01", storeCents: 75_000, stallCents: 5_300 },
	])
	expect(both.spans).toHaveLength(13)
	const last = await figuresOf(at, { from: "2025-01-01", to: "2025-12-31" })
	expect(last.channels).toEqual([{ of: null, cents: 7_000, count: 1 }])
})

test("of the crop it is told what is sold, in stock, waste, missing and cut up; moved to another lot counts once", async () => {
	const { at } = await soldSeason()
	const producerId = at.producer.id
	const [first, second] = [randomUUID(), randomUUID()]
	await withProducer(producerId, async (tx) => {
		const lot = {
			producerId,
			productId: at.productId,
			state: "released" as const,
			harvestedOn: "2026-07-01",
			expectedReleaseOn: "2026-07-10",
			bestBeforeOn: "2027-07-01",
		}
		await tx.insert(lots).values([
			{ ...lot, id: first, code: "L1", piecesHarvested: 100 },
			{ ...lot, id: second, code: "L2", piecesHarvested: 30 },
		])
		const move = (
			lotId: string,
			fromPlace: "cold-room" | "ready" | null,
			toPlace: "cold-room" | "ready" | "sold" | "waste" | "missing" | "cut-up" | "other-lot",
			pieces: number,
		) => tx.insert(stockMoves).values({ producerId, lotId, fromPlace, toPlace, pieces, reason: "test" })
		await move(first, null, "cold-room", 100)
		await move(first, "cold-room", "ready", 80)
		await move(first, "ready", "sold", 40)
		await move(first, "ready", "waste", 4)
		await move(first, "ready", "missing", 1)
		await move(first, "ready", "cut-up", 5)
		await move(first, "ready", "other-lot", 30)
		await move(second, null, "ready", 30)
	})
	const { crop } = await figuresOf(at)
	expect(crop).toMatchObject([
		{ code: "11", soldPieces: 40, stockPieces: 20 + 30, wastePieces: 4, missingPieces: 1, cutUpPieces: 5 },
	])
	expect((await figuresOf(at, { from: "2025-01-01", to: "2025-12-31" })).crop).toEqual([])
	expect(await fileOf(at, "crop")).toContain('11,Round section 11,"Fancy, 8 oz",100,40,50,4,1,5')
})

test("a store sleeps that ordered last season or this and has been quiet for so many weeks", async () => {
	const { at, other } = await soldSeason()
	const order = (of: MoneyYard, number: number, deliveryOn: string, state: "received" | "cancelled" | "placed") =>
		withProducer(at.producer.id, (tx) =>
			tx.insert(orders).values({ producerId: at.producer.id, number, storeId: of.shop.storeId, deliveryOn, state }),
		)
	await order(at, 1, "2026-07-07", "received")
	await order(at, 2, "2026-09-08", "cancelled")
	await order(other, 3, "2026-08-25", "received")
	expect((await figuresOf(at)).sleeping).toMatchObject([{ slug: at.shop.slug, lastOn: "2026-07-07", cents: 37_000 }])
	expect((await figuresOf(at, { quietWeeks: 9 })).sleeping).toEqual([])
	await order(at, 4, "2026-09-15", "placed")
	expect((await figuresOf(at)).sleeping).toEqual([])
})

test("each figure is a file, and a name that a spreadsheet would run is written as text", async () => {
	const { at, other } = await soldSeason()
	await withProducer(at.producer.id, async (tx) => {
		await tx.update(stores).set({ name: "=SUM(A1)" }).where(eq(stores.id, other.shop.storeId))
	})
	expect((await fileOf(at, "stores")).split("\r\n")).toEqual([
		"\uFEFFStore,Amount,Invoices,Last invoice",
		'"\'=SUM(A1)",450.00,1,2026-08-25',
		"Pantry & Plume,300.00,2,2026-08-09",
		"",
	])
	expect((await fileOf(at, "spans")).split("\r\n").slice(0, 3)).toEqual([
		"\uFEFFFirst day of the week,Stores,Stall",
		"2026-08-03,300.00,0.00",
		"2026-08-10,0.00,53.00",
	])
	for (const of of ["products", "channels", "sleeping"] as const)
		expect((await fileOf(at, of)).length).toBeGreaterThan(20)
})
