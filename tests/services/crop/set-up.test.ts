import { randomUUID } from "node:crypto"
import { asc, eq } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { auditEntries, expectedSupplies, hives, supers } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { findBoard } from "~/services/crop/find-board.server"
import { findYardSetUp, listYards } from "~/services/crop/find-set-up.server"
import { markSupers } from "~/services/crop/mark-supers.server"
import { setCropSettings } from "~/services/crop/set-crop-settings.server"
import { setUpHivePlaces } from "~/services/crop/set-up-hive-places.server"
import { setUpHives } from "~/services/crop/set-up-hives.server"
import { setUpSupers } from "~/services/crop/set-up-supers.server"
import { setUpYard } from "~/services/crop/set-up-yard.server"
import { addHand } from "../desk/desk-steps"
import { addProduct, openYard, type Yard } from "../orders/place-yard"
import { addHives, addSuper } from "./crop-rows"

const TODAY = "2026-08-13"

async function start() {
	const yard = await openYard()
	const by = { producerId: yard.producerId, personId: await addHand(), today: TODAY }
	const productId = await addProduct(yard, { code: "11", readyCases: 0 })
	return { yard, by, productId }
}

const supersOf = (yard: Yard) =>
	withProducer(yard.producerId, (tx) =>
		tx
			.select({ id: supers.id, level: supers.level, state: supers.state, clearingOn: supers.clearingOn })
			.from(supers)
			.orderBy(asc(supers.setOn), asc(supers.level)),
	)
const expectedOn = (yard: Yard) =>
	withProducer(yard.producerId, async (tx) =>
		(await tx.select({ on: expectedSupplies.expectedOn }).from(expectedSupplies)).map(({ on }) => on),
	)
const actionsOf = (yard: Yard) =>
	withProducer(yard.producerId, async (tx) =>
		(await tx.select({ action: auditEntries.action }).from(auditEntries)).map(({ action }) => action),
	)

describe("yards and hives", () => {
	test("a yard is entered and changed, and no two have one name", async () => {
		const { yard, by } = await start()
		const entered = await setUpYard({ ...by, yardId: null, name: "Canal Bank", flora: "wildflower" })
		if (!entered.ok) throw new Error(entered.reason)
		expect(await setUpYard({ ...by, yardId: null, name: "Canal Bank", flora: "" })).toEqual({
			ok: false,
			reason: "name-taken",
		})
		await setUpYard({ ...by, yardId: entered.yardId, name: "Canal Bank", flora: "goldenrod" })
		expect(await listYards(yard.producerId)).toEqual([
			{ id: entered.yardId, name: "Canal Bank", flora: "goldenrod", hives: 0, supersOn: 0 },
		])
		expect(await actionsOf(yard)).toEqual(["yard entered", "yard changed"])
		expect(await setUpYard({ ...by, yardId: randomUUID(), name: "Nowhere", flora: "" })).toEqual({
			ok: false,
			reason: "not-found",
		})
	})

	test("a row of hives counts up, and none is entered when one label is taken", async () => {
		const { yard, by } = await start()
		const { yardId } = await addHives(yard, { count: 1, from: 12 })
		expect(await setUpHives({ ...by, yardId, firstLabel: "9", count: 3 })).toEqual({ ok: true, count: 3 })
		expect(await setUpHives({ ...by, yardId, firstLabel: "11", count: 5 })).toMatchObject({
			reason: "labels-taken",
			labels: expect.arrayContaining(["11", "12"]),
		})
		expect(await setUpHives({ ...by, yardId, firstLabel: "red", count: 2 })).toEqual({ ok: false, reason: "no-number" })
		expect(await setUpHives({ ...by, yardId, firstLabel: "red", count: 1 })).toEqual({ ok: true, count: 1 })
		const found = await findYardSetUp({ producerId: yard.producerId, yardId })
		expect(found?.hives.map(({ label }) => label)).toEqual(["9", "10", "11", "12", "red"])
	})

	test("hives are moved with what is on them, and not retired while a super is on", async () => {
		const { yard, by, productId } = await start()
		const { hiveIds } = await addHives(yard, { count: 2 })
		const { yardId: canal } = await addHives(yard, { count: 0, name: "Canal Bank" })
		await addSuper(yard, { hiveId: hiveIds[1] as string, productId })
		expect(await setUpHivePlaces({ ...by, hiveIds, change: { to: "yard", yardId: canal } })).toEqual({
			ok: true,
			count: 2,
		})
		expect((await findYardSetUp({ producerId: yard.producerId, yardId: canal }))?.hives).toHaveLength(2)
		expect(await setUpHivePlaces({ ...by, hiveIds, change: { to: "retired" } })).toEqual({
			ok: false,
			reason: "supers-on",
			labels: ["2"],
		})
		expect(await setUpHivePlaces({ ...by, hiveIds: hiveIds.slice(0, 1), change: { to: "retired" } })).toMatchObject({
			ok: true,
		})
		const board = await findBoard({ producerId: yard.producerId, today: TODAY, yardId: null, after: null })
		expect(board.yards[0]?.hives.map(({ label }) => label)).toEqual(["2"])
	})

	test("another producer's hives and yards are not found", async () => {
		const { by } = await start()
		const theirs = await openYard()
		const { yardId, hiveIds } = await addHives(theirs, { count: 1 })
		expect(await setUpHivePlaces({ ...by, hiveIds, change: { to: "retired" } })).toEqual({ ok: false, reason: "gone" })
		expect(await setUpHives({ ...by, yardId, firstLabel: "1", count: 1 })).toEqual({
			ok: false,
			reason: "no-such-yard",
		})
		expect(await findYardSetUp({ producerId: by.producerId, yardId })).toBeNull()
	})
})

describe("many supers at once", () => {
	test("the next super goes on top of each chosen hive, once however often the form is sent", async () => {
		const { yard, by, productId } = await start()
		const { hiveIds } = await addHives(yard, { count: 2 })
		await addSuper(yard, { hiveId: hiveIds[0] as string, productId, setOn: "2026-07-01" })
		const form = { ...by, hiveIds, productId, capacityPieces: 40, setOn: TODAY, idempotencyKey: randomUUID() }
		const [first, second] = await Promise.all([setUpSupers(form), setUpSupers(form)])
		expect([first, second].map((answer) => answer.ok && answer.setOn).sort()).toEqual([0, 2])
		expect((await supersOf(yard)).map(({ level }) => level)).toEqual([1, 1, 2])
		expect(await expectedOn(yard)).toHaveLength(2)
	})

	test("none is set on for a day to come, on a retired hive, or for a product that is not sold", async () => {
		const { yard, by, productId } = await start()
		const { hiveIds } = await addHives(yard, { count: 2 })
		const form = { ...by, hiveIds, productId, capacityPieces: 40, setOn: TODAY, idempotencyKey: randomUUID() }
		expect(await setUpSupers({ ...form, setOn: "2026-08-14" })).toEqual({ ok: false, reason: "in-the-future" })
		expect(await setUpSupers({ ...form, productId: randomUUID() })).toEqual({ ok: false, reason: "no-such-product" })
		await withProducer(yard.producerId, (tx) =>
			tx
				.update(hives)
				.set({ isActive: false })
				.where(eq(hives.id, hiveIds[0] as string)),
		)
		expect(await setUpSupers(form)).toEqual({ ok: false, reason: "gone" })
		expect(await supersOf(yard)).toEqual([])
	})

	test("the bee escape goes in under all that were chosen, and what should come off moves up", async () => {
		const { yard, by, productId } = await start()
		const { hiveIds } = await addHives(yard, { count: 2 })
		const superIds = [
			await addSuper(yard, { hiveId: hiveIds[0] as string, productId, setOn: "2026-08-10" }),
			await addSuper(yard, { hiveId: hiveIds[1] as string, productId, setOn: "2026-08-11" }),
		]
		const press = { ...by, superIds, mark: "escape-in" as const, on: TODAY }
		expect(await markSupers(press)).toEqual({ ok: true, marked: 2 })
		expect(await markSupers(press)).toEqual({ ok: true, marked: 0 })
		expect(await supersOf(yard)).toMatchObject([
			{ state: "clearing", clearingOn: TODAY },
			{ state: "clearing", clearingOn: TODAY },
		])
		expect(await expectedOn(yard)).toEqual(["2026-08-15"])
		expect(await markSupers({ ...press, mark: "escape-out" })).toEqual({ ok: true, marked: 2 })
		expect((await supersOf(yard)).map(({ state }) => state)).toEqual(["on", "on"])
	})

	test("all are marked or none: not before one was set on, not for a day to come, not what has come off", async () => {
		const { yard, by, productId } = await start()
		const { hiveIds } = await addHives(yard, { count: 1 })
		const hiveId = hiveIds[0] as string
		const superIds = [
			await addSuper(yard, { hiveId, productId, setOn: "2026-08-01" }),
			await addSuper(yard, { hiveId, productId, setOn: "2026-08-12", level: 2 }),
		]
		const press = { ...by, superIds, mark: "escape-in" as const }
		expect(await markSupers({ ...press, on: "2026-08-11" })).toEqual({
			ok: false,
			reason: "before-set-on",
			setOn: "2026-08-12",
		})
		expect(await markSupers({ ...press, on: "2026-08-14" })).toEqual({ ok: false, reason: "in-the-future" })
		const off = await addSuper(yard, { hiveId, productId, off: { on: TODAY, finished: 30 } })
		expect(await markSupers({ ...press, superIds: [...superIds, off], on: TODAY })).toEqual({
			ok: false,
			reason: "gone",
		})
		expect((await supersOf(yard)).map(({ state }) => state).sort()).toEqual(["off", "on", "on"])
	})
})

test("the crop settings move the day on which supers should come off", async () => {
	const { yard, by, productId } = await start()
	const { hiveIds } = await addHives(yard, { count: 1 })
	await addSuper(yard, {
		hiveId: hiveIds[0] as string,
		productId,
		looks: [
			{ on: "2026-08-03", filled: 100, capped: 10 },
			{ on: TODAY, filled: 100, capped: 60 },
		],
	})
	await setCropSettings({ ...by, readyCappedPercent: 90, figure: "low" })
	expect(await expectedOn(yard)).toEqual(["2026-08-19"])
	await setCropSettings({ ...by, readyCappedPercent: 100, figure: "likely" })
	expect(await expectedOn(yard)).toEqual(["2026-08-21"])
	const board = await findBoard({ producerId: yard.producerId, today: TODAY, yardId: null, after: null })
	expect(board).toMatchObject({ readyCappedPercent: 100, figure: "likely" })
})
