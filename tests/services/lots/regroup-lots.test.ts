import { randomUUID } from "node:crypto"
import fc from "fast-check"
import { beforeAll, describe, expect, test } from "vitest"
import { lotReleases, products } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { cutUpLot } from "~/services/lots/cut-up-lot.server"
import { mergeLots } from "~/services/lots/merge-lots.server"
import { splitLot } from "~/services/lots/split-lot.server"
import { addProduct, openStore, openYard, type Yard } from "../orders/place-yard"
import { placesOf } from "./lot-rows"

const TODAY = "2026-08-13"
let yard: Yard
let personId: string

beforeAll(async () => {
	yard = await openYard()
	personId = (await openStore(yard)).person.id
})

const asked = () => ({ producerId: yard.producerId, personId, newLotId: randomUUID(), newCode: null })
const sum = (places: Record<string, number>) => Object.values(places).reduce((all, pieces) => all + pieces, 0)

/** A product with one released lot of so many pieces; answers the lot's code. */
async function addLot(pieces = 48): Promise<{ code: string; productId: string }> {
	const code = randomUUID().slice(0, 8)
	const productId = await addProduct(yard, { code, readyCases: pieces / 12 })
	return { code: `L-${code}`, productId }
}

async function addCutProduct(): Promise<string> {
	const id = randomUUID()
	await withProducer(yard.producerId, (tx) =>
		tx.insert(products).values({
			producerId: yard.producerId,
			id,
			code: id.slice(0, 3),
			name: "Cut comb",
			form: "cut-comb",
			colour: "light",
			pieceNetGrams: 113,
			piecesPerCase: 12,
			breakFamily: "cut",
		}),
	)
	return id
}

describe("splitting a lot", () => {
	test("a part of a released lot is released with the proof of the lot it came from", async () => {
		const { code } = await addLot()
		await withProducer(yard.producerId, async (tx) => {
			const [lot] = (await placesOf(yard.producerId)).filter((one) => one.code === code)
			await tx.insert(lotReleases).values({
				producerId: yard.producerId,
				lotId: lot?.id ?? "",
				kind: "by-hand",
				reason: "frozen at the neighbour's, seen by Ida",
			})
		})
		const answer = await splitLot({ ...asked(), code, pieces: 10 })
		if (!answer.ok) throw new Error(answer.message)
		const lots = await placesOf(yard.producerId)
		expect(lots.find((lot) => lot.code === code)?.places).toEqual({ ready: 38, "other-lot": 10 })
		expect(lots.find((lot) => lot.code === answer.code)).toMatchObject({
			state: "released",
			harvested: 10,
			places: { "cold-room": 10 },
			release: {
				kind: "by-hand",
				reason: `split from lot ${code}, released by hand: frozen at the neighbour's, seen by Ida`,
			},
		})
	})

	test("more than lies there, and all of it, are refused", async () => {
		const { code } = await addLot()
		expect(await splitLot({ ...asked(), code, pieces: 49 })).toMatchObject({ ok: false, field: "pieces" })
		expect(await splitLot({ ...asked(), code, pieces: 48 })).toMatchObject({ ok: false, field: "pieces" })
	})

	test("the same form sent twice at once splits once", async () => {
		const { code } = await addLot()
		const form = { ...asked(), code, pieces: 20 }
		const [first, second] = await Promise.all([splitLot(form), splitLot(form)])
		expect(second).toEqual(first)
		expect((await placesOf(yard.producerId)).find((lot) => lot.code === code)?.places.ready).toBe(28)
	})

	test("of two splits that together ask more than there is, one is refused", async () => {
		const { code } = await addLot()
		const answers = await Promise.all([
			splitLot({ ...asked(), code, pieces: 30 }),
			splitLot({ ...asked(), code, pieces: 30 }),
		])
		expect(answers.filter(({ ok }) => ok)).toHaveLength(1)
	})
})

describe("merging lots", () => {
	test("a lot that was split is made whole again, and its release names both", async () => {
		const { code } = await addLot()
		const part = await splitLot({ ...asked(), code, pieces: 10 })
		if (!part.ok) throw new Error(part.message)
		const whole = await mergeLots({ ...asked(), codes: [code, part.code] })
		if (!whole.ok) throw new Error(whole.message)
		const lots = await placesOf(yard.producerId)
		const merged = lots.find((lot) => lot.code === whole.code)
		expect(merged).toMatchObject({ state: "released", harvested: 48, places: { "cold-room": 48 } })
		expect(merged?.release?.reason).toContain(`lot ${code}`)
		expect(merged?.release?.reason).toContain(`lot ${part.code}`)
	})

	test("lots of two products do not become one", async () => {
		const [first, second] = [await addLot(), await addLot()]
		expect(await mergeLots({ ...asked(), codes: [first.code, second.code] })).toMatchObject({
			ok: false,
			message: "Only lots of one product can become one.",
		})
	})
})

describe("cutting a lot up", () => {
	test("what is cut is held, and more comb than went in is refused", async () => {
		const { code } = await addLot()
		const intoProductId = await addCutProduct()
		const cut = { code, pieces: 10, gramsIn: null, intoProductId, today: TODAY }
		expect(await cutUpLot({ ...asked(), ...cut, piecesMade: 21 })).toMatchObject({ ok: false, field: "made" })
		const answer = await cutUpLot({ ...asked(), ...cut, piecesMade: 17 })
		if (!answer.ok) throw new Error(answer.message)
		const lots = await placesOf(yard.producerId)
		expect(lots.find((lot) => lot.code === code)?.places).toEqual({ ready: 38, "cut-up": 10 })
		expect(lots.find((lot) => lot.code === answer.code)).toMatchObject({
			state: "held",
			harvested: 17,
			places: { "cold-room": 17 },
		})
	})
})

test("whatever is split, merged or cut up, harvested is the sum over places for every lot", async () => {
	yard = await openYard()
	personId = (await openStore(yard)).person.id
	const { code: first } = await addLot(96)
	const intoProductId = await addCutProduct()
	const step = fc.oneof(
		fc.record({ do: fc.constant("split" as const), at: fc.nat(), pieces: fc.integer({ min: 1, max: 40 }) }),
		fc.record({ do: fc.constant("merge" as const), at: fc.nat(), with: fc.nat() }),
		fc.record({ do: fc.constant("cut" as const), at: fc.nat(), pieces: fc.integer({ min: 1, max: 20 }) }),
	)
	await fc.assert(
		fc.asyncProperty(fc.array(step, { minLength: 1, maxLength: 6 }), async (steps) => {
			for (const one of steps) {
				const codes = (await placesOf(yard.producerId)).map(({ code }) => code)
				const code = codes[one.at % codes.length] ?? first
				if (one.do === "split") await splitLot({ ...asked(), code, pieces: one.pieces })
				else if (one.do === "merge") {
					await mergeLots({ ...asked(), codes: [code, codes[one.with % codes.length] ?? first] })
				} else {
					const cut = { code, pieces: one.pieces, gramsIn: null, intoProductId, today: TODAY }
					await cutUpLot({ ...asked(), ...cut, piecesMade: one.pieces })
				}
			}
			for (const { harvested, places } of await placesOf(yard.producerId)) expect(sum(places)).toBe(harvested)
		}),
		{ numRuns: 15 },
	)
	const lots = await placesOf(yard.producerId)
	const whole = lots.find(({ code }) => code === first)
	expect(whole?.harvested).toBe(96)
	expect(lots.length).toBeGreaterThan(1)
})
