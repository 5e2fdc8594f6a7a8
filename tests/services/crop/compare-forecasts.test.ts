import { describe, expect, test } from "vitest"
import { cropForecasts, expectedSupplies } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { howForecastsFared } from "~/domain/crop/hindsight"
import { compareForecasts } from "~/services/crop/compare-forecasts.server"
import { refreshTonight } from "~/services/crop/refresh-tonight.server"
import { standOnThursday } from "../desk/desk-steps"
import { addProduct, openYard, type Yard } from "../orders/place-yard"
import { addHives, addSuper } from "./crop-rows"

standOnThursday()

const TODAY = "2026-08-13"
const compare = (yard: Yard, more: { productId?: string; year?: number } = {}) =>
	compareForecasts({
		producerId: yard.producerId,
		today: TODAY,
		productId: more.productId ?? null,
		year: more.year ?? null,
	})

const keepForecasts = (yard: Yard, productId: string, ...rows: [madeOn: Day, weekOn: Day, likely: number][]) =>
	withProducer(yard.producerId, (tx) =>
		tx.insert(cropForecasts).values(
			rows.map(([madeOn, weekOn, likely]) => ({
				producerId: yard.producerId,
				productId,
				madeOn,
				weekOn,
				lowPieces: likely - 10,
				likelyPieces: likely,
				highPieces: likely + 10,
			})),
		),
	)

describe("forecasts against what came off", () => {
	test("each week has the last forecast made two and four weeks before its Monday", async () => {
		const yard = await openYard()
		const productId = await addProduct(yard, { code: "11", readyCases: 0 })
		const { hiveIds } = await addHives(yard, { count: 1 })
		const hiveId = hiveIds[0] as string
		await keepForecasts(
			yard,
			productId,
			["2026-07-06", "2026-08-03", 80],
			["2026-07-19", "2026-08-03", 60],
			["2026-07-20", "2026-08-03", 50],
			["2026-07-21", "2026-08-03", 40],
		)
		await addSuper(yard, { hiveId, productId, off: { on: "2026-08-03", finished: 30 } })
		await addSuper(yard, { hiveId, productId, off: { on: "2026-08-09", finished: 31 } })
		const { shown } = await compare(yard)
		expect(shown?.weeks).toEqual([
			{
				weekOn: "2026-08-03",
				cameOff: 61,
				twoAhead: { madeOn: "2026-07-20", low: 40, likely: 50, high: 60 },
				fourAhead: { madeOn: "2026-07-06", low: 70, likely: 80, high: 90 },
			},
		])
		expect(howForecastsFared(shown?.weeks ?? [], "twoAhead")).toEqual({ weeks: 1, within: 0, under: 0, over: 1 })
		expect(howForecastsFared(shown?.weeks ?? [], "fourAhead")).toEqual({ weeks: 1, within: 0, under: 1, over: 0 })
	})

	test("a forecast older than a week stands for none, and this week is not over yet", async () => {
		const yard = await openYard()
		const productId = await addProduct(yard, { code: "11", readyCases: 0 })
		await keepForecasts(yard, productId, ["2026-07-13", "2026-08-03", 50], ["2026-07-27", "2026-08-10", 50])
		const { shown } = await compare(yard)
		expect(shown?.weeks).toEqual([{ weekOn: "2026-08-03", cameOff: 0, twoAhead: null, fourAhead: null }])
		expect(howForecastsFared(shown?.weeks ?? [], "twoAhead").weeks).toBe(0)
	})

	test("are of one product and year; an unknown one shows the first product and the latest year", async () => {
		const yard = await openYard()
		const first = await addProduct(yard, { code: "11", readyCases: 0 })
		const second = await addProduct(yard, { code: "21", readyCases: 0 })
		await addProduct(yard, { code: "31", readyCases: 0 })
		const { hiveIds } = await addHives(yard, { count: 1 })
		const hiveId = hiveIds[0] as string
		await addSuper(yard, { hiveId, productId: first, off: { on: "2026-07-30", finished: 9 } })
		await addSuper(yard, {
			hiveId,
			productId: second,
			setOn: "2025-06-01",
			off: { on: "2025-07-30", finished: 8 },
		})
		const all = await compare(yard, { productId: "nothing", year: 1066 })
		expect(all.products.map(({ id }) => id)).toEqual([first, second])
		expect(all.years).toEqual([2026, 2025])
		expect(all.shown).toMatchObject({ product: { id: first }, year: 2026, weeks: [{ cameOff: 9 }] })
		expect((await compare(yard, { productId: second, year: 2025 })).shown?.weeks).toMatchObject([{ cameOff: 8 }])
	})

	test("are nothing for a producer whose hives have not been entered", async () => {
		expect(await compare(await openYard())).toEqual({ products: [], years: [], shown: null })
	})
})

test("at night what has not come off moves on to the next day, though nobody has looked", async () => {
	const yard = await openYard()
	const productId = await addProduct(yard, { code: "11", readyCases: 0 })
	const { hiveIds } = await addHives(yard, { count: 1 })
	await addSuper(yard, {
		hiveId: hiveIds[0] as string,
		productId,
		looks: [{ on: "2026-08-01", filled: 100, capped: 100 }],
	})
	await refreshTonight({ producerId: yard.producerId })
	const days = await withProducer(yard.producerId, (tx) =>
		tx.select({ on: expectedSupplies.expectedOn }).from(expectedSupplies),
	)
	expect(days).toEqual([{ on: "2026-08-14" }])
	await refreshTonight({ producerId: "00000000-0000-4000-8000-000000000000" })
})
