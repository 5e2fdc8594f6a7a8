import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { readProducer } from "~/db/transaction.server"
import { type BringInHarvest, bringInHarvest, lookAtHarvest } from "~/services/harvest/bring-in-harvest.server"
import { findHarvest } from "~/services/harvest/find-harvest.server"
import { addHives, addSuper } from "../crop/crop-rows"
import { placesOf } from "../lots/lot-rows"
import { addProduct, openStore, openYard, type Yard } from "../orders/place-yard"

const TODAY = "2026-08-13"

async function openCrop() {
	const yard = await openYard()
	const { person } = await openStore(yard)
	const productId = await addProduct(yard, { code: "21", readyCases: 0 })
	const { hiveIds } = await addHives(yard, { count: 2 })
	const superIds = await Promise.all(
		hiveIds.map((hiveId) =>
			addSuper(yard, { hiveId, productId, looks: [{ on: "2026-08-10", filled: 100, capped: 95 }] }),
		),
	)
	return { yard, person, productId, superIds }
}

type Crop = Awaited<ReturnType<typeof openCrop>>

function written({ yard, person, productId, superIds }: Crop, more: Partial<BringInHarvest> = {}): BringInHarvest {
	return {
		producerId: yard.producerId,
		personId: person.id,
		today: TODAY,
		harvestedOn: TODAY,
		note: "",
		idempotencyKey: randomUUID(),
		products: [
			{
				productId,
				supers: superIds.map((id) => ({ id, counted: { Fancy: 30, "No. 1": 6, Culls: 4 } })),
				total: {},
				moistureTenths: 176,
				pfundTenths: 210,
				flora: "clover",
				expectedReleaseOn: "2026-08-16",
				bestBeforeOn: "2027-06-09",
				codes: {},
			},
		],
		...more,
	}
}

async function supersOf({ producerId }: Yard) {
	const { rows } = await readProducer(producerId, (tx) =>
		tx.execute<{ state: string; finished: number; off: string | null }>(sql`
			select state, finished_pieces as finished, off_on::text as off from supers where producer_id = ${producerId}`),
	)
	return rows
}

describe("bringing supers in", () => {
	test("makes a held lot of each grade, every piece in the cold room, and sets the supers off", async () => {
		const crop = await openCrop()
		const form = written(crop)
		expect(await lookAtHarvest(form)).toMatchObject({
			products: [{ proposedCodes: ["2126-001", "2126-002", "2126-003"] }],
		})
		const answer = await bringInHarvest(form)
		if (!answer.ok) throw new Error(JSON.stringify(answer))
		const harvest = await findHarvest({ producerId: crop.yard.producerId, harvestId: answer.harvestId })
		expect(harvest).toMatchObject({ supers: 2, capacityPieces: 80, finishedPieces: 72 })
		expect(harvest?.lots.map(({ code, grade, pieces }) => [code, grade, pieces])).toEqual([
			["2126-001", "Fancy", 60],
			["2126-002", "No. 1", 12],
			["2126-003", "Culls", 8],
		])
		expect(await supersOf(crop.yard)).toEqual([
			{ state: "off", finished: 36, off: TODAY },
			{ state: "off", finished: 36, off: TODAY },
		])
		expect(await placesOf(crop.yard.producerId)).toMatchObject([
			{ code: "2126-001", state: "held", harvested: 60, places: { "cold-room": 60 } },
			{ code: "2126-002", state: "held", harvested: 12, places: { "cold-room": 12 } },
			{ code: "2126-003", state: "held", harvested: 8, places: { "cold-room": 8 } },
		])
	})

	test("the same form sent twice at once brings in one harvest", async () => {
		const crop = await openCrop()
		const form = written(crop)
		const [first, second] = await Promise.all([bringInHarvest(form), bringInHarvest(form)])
		expect(second).toEqual(first)
		expect(await bringInHarvest(form)).toEqual(first)
		expect(await placesOf(crop.yard.producerId)).toHaveLength(3)
	})

	test("two people who bring in the same supers make one harvest", async () => {
		const crop = await openCrop()
		const answers = await Promise.all([bringInHarvest(written(crop)), bringInHarvest(written(crop))])
		expect(answers.filter(({ ok }) => ok)).toHaveLength(1)
		expect(await placesOf(crop.yard.producerId)).toHaveLength(3)
	})

	test("more pieces than the supers hold are refused, and nothing changes", async () => {
		const crop = await openCrop()
		const form = written(crop)
		const products = form.products.map((product) => ({
			...product,
			supers: product.supers.map(({ id }) => ({ id, counted: {} })),
			total: { Fancy: 81 },
		}))
		const answer = await bringInHarvest({ ...form, products })
		expect(answer).toMatchObject({
			ok: false,
			problems: [{ message: "These supers hold 80 pieces together, and 81 are written down." }],
		})
		expect(await lookAtHarvest({ ...form, products })).toEqual(answer)
		expect(await placesOf(crop.yard.producerId)).toEqual([])
		expect((await supersOf(crop.yard)).map(({ state }) => state)).toEqual(["on", "on"])
	})

	test("a lot code that is taken is refused, and the numbers go on as if nothing had been asked", async () => {
		const crop = await openCrop()
		await addProduct(crop.yard, { code: "2126-001", readyCases: 1 })
		const form = written(crop)
		const withCode = form.products.map((product) => ({ ...product, codes: { Fancy: "L-2126-001" } }))
		expect(await bringInHarvest({ ...form, products: withCode })).toMatchObject({
			ok: false,
			problems: [{ at: { part: "code-Fancy" }, message: expect.stringContaining("L-2126-001 is there already") }],
		})
		expect((await bringInHarvest(form)).ok).toBe(true)
		expect((await placesOf(crop.yard.producerId)).map(({ code }) => code)).toContain("2126-001")
	})

	test("a day to come, and one before the super was set on, are refused", async () => {
		const crop = await openCrop()
		expect(await bringInHarvest(written(crop, { harvestedOn: "2026-08-14" }))).toMatchObject({ ok: false })
		expect(await bringInHarvest(written(crop, { harvestedOn: "2026-07-09" }))).toMatchObject({ ok: false })
	})
})
