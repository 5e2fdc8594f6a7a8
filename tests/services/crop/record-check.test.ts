import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { withProducer } from "~/db/transaction.server"
import { findPhoto } from "~/services/crop/find-photo.server"
import { listSuperChecks } from "~/services/crop/list-super-checks.server"
import { addHand } from "../desk/desk-steps"
import { countOf, look, openBeeYard, takeOff } from "./yard-steps"

const PHOTO = { mediaType: "image/jpeg" as const, content: Buffer.from("a photo"), width: 40, height: 30 }

describe("a check from the yard", () => {
	test("is recorded with who made it, and changes what should come off", async () => {
		const yard = await openBeeYard()
		expect(await look(yard, { by: "rows", rows: ["44444", "4433", "", "1"], note: "lids white" })).toEqual({
			ok: true,
			isNew: true,
		})
		const { checks } = await listSuperChecks({ ...yard, after: null })
		expect(checks).toMatchObject([
			{
				checkedOn: "2026-08-13",
				filledPercent: 45,
				cappedPercent: 35,
				sections: "4444444444033444433000000000000000110000",
				note: "lids white",
				who: "Ida",
				photoId: null,
			},
		])
		const { rows } = await withProducer(yard.producerId, (tx) =>
			tx.execute(sql`select low_pieces from expected_supplies where producer_id = ${yard.producerId}`),
		)
		expect(rows).toHaveLength(1)
	})

	test("is one check, however often it is sent and even after the super came off", async () => {
		const yard = await openBeeYard()
		const checkId = randomUUID()
		const sent = await Promise.all([1, 2, 3, 4].map(() => look(yard, {}, { checkId, photo: PHOTO })))
		expect(sent.map((one) => one.ok)).toEqual([true, true, true, true])
		expect(sent.filter((one) => one.ok && one.isNew)).toHaveLength(1)
		await takeOff(yard, "2026-08-13")
		expect(await look(yard, {}, { checkId })).toEqual({ ok: true, isNew: false })
		expect([await countOf(yard, "super_checks"), await countOf(yard, "uploads")]).toEqual([1, 1])
	})

	test("does not stand in for another one sent under its id", async () => {
		const yard = await openBeeYard()
		const checkId = randomUUID()
		await look(yard, {}, { checkId })
		const other = { ok: false, reason: "other-check-recorded" }
		expect(await look(yard, { filled: "70" }, { checkId })).toEqual(other)
		expect(await look(yard, { filled: "nonsense" }, { checkId })).toEqual(other)
		expect(await look(yard, {}, { checkId, personId: await addHand() })).toEqual(other)
		expect(await countOf(yard, "super_checks")).toBe(1)
	})

	test("is refused for a super that came off meanwhile, and nothing is written", async () => {
		const yard = await openBeeYard()
		await takeOff(yard, "2026-08-12")
		expect(await look(yard, {}, { photo: PHOTO })).toEqual({ ok: false, reason: "super-off", offOn: "2026-08-12" })
		expect([await countOf(yard, "super_checks"), await countOf(yard, "uploads")]).toEqual([0, 0])
	})

	test("is refused for a day in the future where the bees are, and for one before the super was set on", async () => {
		const yard = await openBeeYard()
		// In Greenwich it is the 14th already; in the yard it is not.
		const now = new Date("2026-08-14T01:00:00Z")
		expect(await look(yard, { checkedOn: "2026-08-14" }, { now })).toMatchObject({
			reason: "fields",
			refused: [{ field: "checkedOn", reason: "in-future" }],
		})
		expect(await look(yard, { checkedOn: "2026-06-30" })).toMatchObject({
			refused: [{ field: "checkedOn", reason: "before-set-on" }],
		})
		expect(await countOf(yard, "super_checks")).toBe(0)
	})

	test("cannot reach another producer’s super or photo", async () => {
		const [ours, theirs] = [await openBeeYard(), await openBeeYard()]
		expect(await look(ours, {}, { superId: theirs.superId })).toEqual({ ok: false, reason: "no-super" })
		await look(theirs, {}, { photo: PHOTO })
		const [check] = (await listSuperChecks({ ...theirs, after: null })).checks
		const photoId = check?.photoId ?? ""
		expect(await findPhoto({ producerId: theirs.producerId, photoId })).toMatchObject({ content: PHOTO.content })
		expect(await findPhoto({ producerId: ours.producerId, photoId })).toBeNull()
		expect((await listSuperChecks({ ...theirs, producerId: ours.producerId, after: null })).checks).toEqual([])
	})

	test("stays as it was recorded: the product can neither change nor delete it", async () => {
		const yard = await openBeeYard()
		await look(yard)
		for (const statement of [sql`update super_checks set filled_percent = 90`, sql`delete from super_checks`]) {
			await expect(withProducer(yard.producerId, (tx) => tx.execute(statement))).rejects.toMatchObject({
				cause: { code: "42501", message: "permission denied for table super_checks" },
			})
		}
	})
})
