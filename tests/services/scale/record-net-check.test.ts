import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { expect, test } from "vitest"
import { netChecks } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { NetContentsInput } from "~/domain/scale/net-contents"
import { findNetCheck } from "~/services/scale/find-net-check.server"
import { findScalePage } from "~/services/scale/find-scale-page.server"
import { recordNetCheck } from "~/services/scale/record-net-check.server"
import { addHand, addLot } from "../desk/desk-steps"
import { addProduct, openYard, type Yard } from "../orders/place-yard"

const GOOD = [368, 370, 371, 369, 368, 372, 370, 367, 370, 369, 371, 368]
const LIGHT = [362, 364, 361, 363, 365, 360, 366, 362, 363, 364, 361, 365]

function weighed(gross: readonly number[], lotPackages = 90): NetContentsInput {
	return {
		lotPackages,
		label: { inchPound: { amount: "12", unit: "oz" }, metric: { amount: "340", unit: "g" } },
		unit: "g",
		division: "1",
		tare: { kind: "weighed", weights: ["27", "29"] },
		packages: gross.map((weight) => ({ gross: `${weight}` })),
	}
}

async function openScale() {
	const yard = await openYard()
	const productId = await addProduct(yard, { code: "41", readyCases: 0 })
	const code = "41-26-007"
	await addLot(yard, { productId, code, bestBeforeOn: "2027-06-01", coldRoom: 90, state: "held" })
	const personId = await addHand()
	const record = (input: NetContentsInput, checkId: string = randomUUID(), lotCode = code) =>
		recordNetCheck({
			producerId: yard.producerId,
			lotCode,
			checkId,
			personId,
			checkedOn: "2026-08-13",
			input,
			note: "the balance in the honey house",
		})
	return { yard, code, record }
}

async function audited(yard: Yard) {
	const { rows } = await withProducer(yard.producerId, (tx) =>
		tx.execute<{ action: string; passed: boolean }>(sql`
			select action, (detail ->> 'hasPassed')::boolean as passed from audit_entries
			where producer_id = ${yard.producerId} order by at, id`),
	)
	return rows
}

test("a check is kept with its weights and every step, and who made it", async () => {
	const { yard, code, record } = await openScale()
	const recorded = await record(weighed(GOOD))
	if (!recorded.ok) throw new Error(recorded.reason)
	const found = await findNetCheck({ producerId: yard.producerId, code, checkId: recorded.checkId })
	expect(found?.check).toMatchObject({ checkedOn: "2026-08-13", who: "Ida", note: "the balance in the honey house" })
	expect(found?.check.input).toEqual(weighed(GOOD))
	expect(found?.check.worksheet).toMatchObject({ hasPassed: true, averageTare: "28", variation: "16.3" })
	expect(await audited(yard)).toEqual([{ action: "check net contents", passed: true }])
})

test("a lot that is steadily short fails, and both checks stand in its list, the latest first", async () => {
	const { yard, code, record } = await openScale()
	await record(weighed(LIGHT))
	await record(weighed(GOOD))
	const page = await findScalePage({ producerId: yard.producerId, code, after: null })
	expect(page?.checks.map(({ hasPassed, sample, lotPackages }) => [hasPassed, sample, lotPackages])).toEqual([
		[true, 12, 90],
		[false, 12, 90],
	])
	expect(page?.lot).toMatchObject({ piecesHarvested: 90, leftPieces: 90, state: "held" })
})

test("the same form sent three times at once is one check", async () => {
	const { yard, record } = await openScale()
	const checkId = randomUUID()
	const answers = await Promise.all([1, 2, 3].map(() => record(weighed(GOOD), checkId)))
	expect(answers).toEqual([1, 2, 3].map(() => ({ ok: true, checkId, hasPassed: true })))
	expect(await audited(yard)).toHaveLength(1)
})

test("more packages than were harvested, a sample of another size and a lot that is none keep nothing", async () => {
	const { yard, code, record } = await openScale()
	expect(await record(weighed(GOOD, 91))).toEqual({ ok: false, reason: "more-than-harvested", pieces: 90 })
	expect(await record(weighed(GOOD.slice(1)))).toEqual({ ok: false, reason: "sample-size", needed: 12, given: 11 })
	expect(await record(weighed(GOOD), randomUUID(), "nonsense")).toEqual({ ok: false, reason: "no-such-lot" })
	expect((await findScalePage({ producerId: yard.producerId, code, after: null }))?.checks).toEqual([])
	expect(await audited(yard)).toEqual([])
})

test("a check of one producer's lot is not found by another, nor under another lot", async () => {
	const ours = await openScale()
	const theirs = await openScale()
	const recorded = await ours.record(weighed(GOOD))
	if (!recorded.ok) throw new Error(recorded.reason)
	const { checkId } = recorded
	expect(await findNetCheck({ producerId: theirs.yard.producerId, code: theirs.code, checkId })).toBeNull()
	expect(await findNetCheck({ producerId: ours.yard.producerId, code: ours.code, checkId: "nonsense" })).toBeNull()
})

test("a check is never altered or taken away", async () => {
	const { yard, record } = await openScale()
	await record(weighed(LIGHT))
	await expect(withProducer(yard.producerId, (tx) => tx.update(netChecks).set({ hasPassed: true }))).rejects.toThrow()
	await expect(withProducer(yard.producerId, (tx) => tx.delete(netChecks))).rejects.toThrow()
})

test("the list of checks goes on where its first page ended", async () => {
	const { yard, code, record } = await openScale()
	for (let count = 0; count < 21; count++) await record(weighed(count === 0 ? LIGHT : GOOD))
	const first = await findScalePage({ producerId: yard.producerId, code, after: null })
	expect(first?.checks).toHaveLength(20)
	const second = await findScalePage({ producerId: yard.producerId, code, after: first?.next ?? null })
	expect(second?.checks.map(({ hasPassed }) => hasPassed)).toEqual([false])
	expect(second?.next).toBeNull()
})
