import { randomUUID } from "node:crypto"
import sharp from "sharp"
import { expect, test } from "vitest"
import { memberships } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { findBreakageForm } from "~/services/breakage/find-breakage-form.server"
import { findBreakagePhoto } from "~/services/breakage/find-breakage-photo.server"
import { findReport } from "~/services/breakage/find-report.server"
import { listReports } from "~/services/breakage/list-reports.server"
import { standOnThursday } from "../desk/desk-steps"
import { findOutbox, openStore } from "../orders/place-yard"
import { answer, openDelivery, report, reported, takePhoto } from "./broken-steps"

standOnThursday()

test("a store reports broken pieces with photos, once however often the form is sent, and the desk is told", async () => {
	const delivery = await openDelivery()
	const reportId = randomUUID()
	const photos = [await takePhoto(), await takePhoto()]
	const lines = [{ invoiceLineId: delivery.lineId, pieces: 5, note: "crushed", photos }]
	const answers = await Promise.all([1, 2, 3].map(() => report(delivery, 5, { reportId, lines })))
	expect(answers.map((one) => one.ok)).toEqual([true, true, true])
	expect(answers.filter((one) => one.ok && one.isNew)).toHaveLength(1)

	const found = await findReport({ producerId: delivery.yard.producerId, reportId })
	expect(found).toMatchObject({ state: "open", storeName: "Pantry & Plume", invoiceNumber: delivery.invoiceNumber })
	expect(found?.lines).toMatchObject([{ pieces: 5, note: "crushed", acceptedPieces: null }])
	const photoId = found?.lines[0]?.photoIds[1] ?? ""
	const { producerId } = delivery.yard
	const photo = await findBreakagePhoto({ producerId, storeId: delivery.shop.storeId, photoId })
	expect(photo?.mediaType).toBe("image/jpeg")
	expect((await sharp(photo?.content).metadata()).exif).toBeUndefined()
	const other = await openStore(delivery.yard)
	expect(await findBreakagePhoto({ producerId, storeId: other.storeId, photoId })).toBeNull()
	expect(await findReport({ producerId, storeId: other.storeId, reportId })).toBeNull()
})

test("no more pieces than were sent can be reported, less what waits or is credited already", async () => {
	const delivery = await openDelivery()
	expect(await report(delivery, 25)).toEqual({
		ok: false,
		reason: "lines",
		refused: [{ lineId: delivery.lineId, reason: "more-than-left", leftPieces: 24, sentPieces: 24 }],
	})
	const first = await reported(delivery, 20)
	expect(await report(delivery, 5)).toMatchObject({ refused: [{ leftPieces: 4 }] })
	await answer(delivery, first, 8)
	// Twelve of them were not credited, and may be shown again with a better photo.
	expect(await report(delivery, 17)).toMatchObject({ refused: [{ leftPieces: 16 }] })
	expect(await report(delivery, 16)).toMatchObject({ ok: true })
})

test("two people of a store who report at once cannot report a piece twice", async () => {
	const delivery = await openDelivery()
	const answers = await Promise.all([report(delivery, 14), report(delivery, 14)])
	expect(answers.filter(({ ok }) => ok)).toHaveLength(1)
	expect(answers.find(({ ok }) => !ok)).toMatchObject({ refused: [{ leftPieces: 10 }] })
})

test("broken comb is taken through the third day after its delivery and not on the fourth", async () => {
	const delivery = await openDelivery()
	expect(await report(delivery, 1, { now: new Date("2026-08-22T03:59:00Z") })).toMatchObject({ ok: true })
	expect(await report(delivery, 1, { now: new Date("2026-08-22T04:01:00Z") })).toEqual({
		ok: false,
		reason: "lines",
		refused: [{ lineId: delivery.lineId, reason: "too-late", until: "2026-08-21" }],
	})
	const form = await findBreakageForm({
		producerId: delivery.yard.producerId,
		storeId: delivery.shop.storeId,
		invoiceNumber: delivery.invoiceNumber,
	})
	expect(form).toMatchObject({
		days: 3,
		lines: [{ until: "2026-08-21" }],
		yard: { email: "orders@larkmoor.example.test" },
	})
})

test("another store's invoice, a line of another invoice and a report of nothing are refused", async () => {
	const delivery = await openDelivery()
	const elsewhere = await openDelivery(delivery.yard)
	expect(await report({ ...elsewhere, shop: delivery.shop }, 1)).toEqual({ ok: false, reason: "no-such-invoice" })
	expect(await report({ ...delivery, lineId: elsewhere.lineId }, 1)).toMatchObject({
		refused: [{ reason: "no-such-line" }],
	})
	expect(await report(delivery, 0, { lines: [] })).toEqual({ ok: false, reason: "nothing-reported" })
})

test("the list has those without an answer first, page by page, and none twice", async () => {
	const delivery = await openDelivery(undefined, 6)
	const ids: string[] = []
	for (let count = 0; count < 33; count += 1) ids.push(await reported(delivery, 1))
	for (const id of ids.slice(0, 2)) await answer(delivery, id, 0)
	const { producerId } = delivery.yard
	const page = (after: string | null, filter: "all" | "open" | "answered" = "all") =>
		listReports({ producerId, storeId: null, filter, after })
	const first = await page(null)
	expect(first.reports).toHaveLength(30)
	expect(first.reports.every(({ state }) => state === "open")).toBe(true)
	const second = await page(first.next)
	expect(second.reports.map(({ state }) => state)).toEqual(["open", "declined", "declined"])
	expect(new Set([...first.reports, ...second.reports].map(({ id }) => id))).toEqual(new Set(ids))
	expect((await page(null, "answered")).reports).toHaveLength(2)
	expect((await page("nonsense")).reports).toEqual(first.reports)
})

test("the letter to the desk says what is broken", async () => {
	const delivery = await openDelivery()
	await withProducer(delivery.yard.producerId, (tx) =>
		tx.insert(memberships).values({ producerId: delivery.yard.producerId, userId: delivery.handId, role: "owner" }),
	)
	await reported(delivery, 5)
	const letters = (await findOutbox(delivery.yard.producerId)).filter(
		({ template }) => template === "breakage-reported",
	)
	expect(letters).toHaveLength(1)
	expect(letters[0]?.props).toMatchObject({
		storeName: "Pantry & Plume",
		personName: "Rosa Quill",
		lines: [{ pieces: 5, photos: 0 }],
	})
})
