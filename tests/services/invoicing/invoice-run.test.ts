import { randomUUID } from "node:crypto"
import { describe, expect, test, vi } from "vitest"
import { findInvoiceRun } from "~/services/invoicing/find-invoice-run.server"
import { sendInvoiceRun } from "~/services/invoicing/send-invoice-run.server"
import { startInvoiceRun } from "~/services/invoicing/start-invoice-run.server"
import { addHand, packed, standOnThursday } from "../desk/desk-steps"
import { addProduct, findOutbox, openStore, openYard, TUESDAY_18 } from "../orders/place-yard"
import { issued, priceByWeight } from "./invoicing-steps"

const faults = vi.hoisted(() => ({ left: 0 }))

/** So many invoices fail at the last moment, after their number was taken. */
vi.mock("~/services/numbers/take-number.server", async (original) => {
	const real = await original<typeof import("~/services/numbers/take-number.server")>()
	return {
		takeNumber: async (...asked: Parameters<typeof real.takeNumber>) => {
			const number = await real.takeNumber(...asked)
			if (asked[1].series !== "invoice" || faults.left === 0) return number
			faults.left -= 1
			throw new Error("the line broke")
		},
	}
})

standOnThursday()

/** A yard with packed orders for Tuesday, August 18; the numbers in their order. */
async function packedYard(count: number) {
	const yard = await openYard()
	const shop = await openStore(yard)
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: count + 4 })
	const numbers: number[] = []
	for (let made = 0; made < count; made += 1) numbers.push(await packed(yard, shop, personId, [round, 1]))
	const start = (runId = randomUUID()) =>
		startInvoiceRun({ producerId: yard.producerId, day: TUESDAY_18, personId, runId })
	const found = async (runId: string) => {
		const run = await findInvoiceRun({ producerId: yard.producerId, runId })
		if (!run) throw new Error("no such run")
		return run
	}
	return { yard, shop, personId, numbers, start, found }
}

async function begun(yard: Awaited<ReturnType<typeof packedYard>>): Promise<string> {
	const started = await yard.start()
	if (!started.ok) throw new Error(started.reason)
	return started.runId
}

describe("sending all that is packed for a day", () => {
	test("sends and invoices each order once, without gaps, by however many workers at a time", async () => {
		const yard = await packedYard(6)
		const runId = await begun(yard)
		expect(await yard.found(runId)).toMatchObject({ waiting: 6, done: 0, finishedAt: null, day: TUESDAY_18 })
		const job = { producerId: yard.yard.producerId, runId }
		await Promise.all([sendInvoiceRun(job), sendInvoiceRun(job), sendInvoiceRun(job)])
		await sendInvoiceRun(job)
		const run = await yard.found(runId)
		expect(run).toMatchObject({ waiting: 0, done: 6, refused: [] })
		expect(run.finishedAt).not.toBeNull()
		const all = await issued(yard.yard)
		expect(all.map(({ sequence }) => sequence)).toEqual([1, 2, 3, 4, 5, 6])
		expect(all.flatMap(({ orders }) => orders).toSorted()).toEqual(yard.numbers)
		const mails = (await findOutbox(yard.yard.producerId)).filter(({ template }) => template === "invoice")
		expect(mails).toHaveLength(6)
	})

	test("says in words why an order was refused, and sends the others", async () => {
		const yard = await packedYard(2)
		const other = await addProduct(yard.yard, { code: "51", readyCases: 2 })
		const byWeight = await packed(yard.yard, yard.shop, yard.personId, [other, 1])
		await priceByWeight(yard.yard, other, { poundCents: 1_250, weighedGrams: null })
		const runId = await begun(yard)
		await sendInvoiceRun({ producerId: yard.yard.producerId, runId })
		const run = await yard.found(runId)
		expect(run).toMatchObject({ waiting: 0, done: 2 })
		expect(run.refused).toEqual([
			{
				orderNumber: byWeight,
				storeName: "Pantry & Plume",
				problem: `Round section 51 in order ${byWeight} is sold by weight and was not weighed. Take the order back, weigh it and pack it again.`,
			},
		])
	})

	test("goes on where it stopped: what failed after its number was taken gives it back, and is sent the next time", async () => {
		const yard = await packedYard(3)
		const runId = await begun(yard)
		const job = { producerId: yard.yard.producerId, runId }
		faults.left = 1
		await expect(sendInvoiceRun(job)).rejects.toThrow("the line broke")
		expect(await yard.found(runId)).toMatchObject({ waiting: 1, done: 2, refused: [], finishedAt: null })
		expect((await issued(yard.yard)).map(({ sequence }) => sequence)).toEqual([1, 2])
		await sendInvoiceRun(job)
		expect(await yard.found(runId)).toMatchObject({ waiting: 0, done: 3 })
		const all = await issued(yard.yard)
		expect(all.map(({ sequence, orders }) => [sequence, ...orders])).toEqual([
			[1, yard.numbers[1]],
			[2, yard.numbers[2]],
			[3, yard.numbers[0]],
		])
		expect((await findOutbox(yard.yard.producerId)).filter(({ template }) => template === "invoice")).toHaveLength(3)
	})

	test("takes a form that is sent twice as one run, and refuses a day with nothing packed", async () => {
		const yard = await packedYard(1)
		const runId = randomUUID()
		expect(await yard.start(runId)).toEqual({ ok: true, runId })
		expect(await yard.start(runId)).toEqual({ ok: true, runId })
		// Another tab finds the run that has them in hand.
		expect(await yard.start()).toEqual({ ok: true, runId })
		await sendInvoiceRun({ producerId: yard.yard.producerId, runId })
		expect(await yard.start()).toEqual({ ok: false, reason: "nothing-packed" })
	})
})
