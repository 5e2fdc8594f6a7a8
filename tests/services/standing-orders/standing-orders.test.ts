import { randomUUID } from "node:crypto"
import { and, eq } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { orderLines, orders, products, shutDays } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { changeDate } from "~/services/standing-orders/change-date.server"
import { endStandingOrder } from "~/services/standing-orders/end-standing-order.server"
import { findStandingPage } from "~/services/standing-orders/find-standing-page.server"
import { makeDueOrders } from "~/services/standing-orders/make-due-orders.server"
import { pauseStandingOrder } from "~/services/standing-orders/pause-standing-order.server"
import { remindDates } from "~/services/standing-orders/remind-dates.server"
import { type SetStandingOrder, setStandingOrder } from "~/services/standing-orders/set-standing-order.server"
import { skipDate } from "~/services/standing-orders/skip-date.server"
import { renderMail } from "~emails/render"
import { addProduct, findOutbox, openStore, openYard, type Shop, THURSDAY, ZONE } from "../orders/place-yard"

const FRIDAY_NOON = new Date("2026-08-14T16:00:00Z")
const HOURS_LATE = new Date("2026-08-15T03:00:00Z")

function everyOtherTuesday(shop: Shop, productId: string, more: Partial<SetStandingOrder> = {}): SetStandingOrder {
	return {
		producerId: shop.producerId,
		storeId: shop.storeId,
		person: shop.person,
		zone: ZONE,
		now: THURSDAY,
		cadence: { every: "week", interval: 2, weekday: 2, months: [] },
		startsOn: "2026-08-18",
		endsOn: null,
		lines: [{ productId, cases: 3, leastCases: 1, substituteIds: [] }],
		isCommitment: false,
		idempotencyKey: randomUUID(),
		...more,
	}
}

async function openWithRound(readyCases = 10) {
	const yard = await openYard()
	const shop = await openStore(yard)
	const productId = await addProduct(yard, { code: "11", readyCases })
	return { yard, shop, productId, producerId: yard.producerId }
}

const ordersOf = (producerId: string) =>
	readProducer(producerId, (tx) =>
		tx
			.select({ deliveryOn: orders.deliveryOn, standingOn: orders.standingOn, number: orders.number })
			.from(orders)
			.where(eq(orders.producerId, producerId))
			.orderBy(orders.number),
	)

const pageOf = (shop: Shop, now = THURSDAY) =>
	findStandingPage({ producerId: shop.producerId, storeId: shop.storeId, now, zone: ZONE })

describe("setting a standing order", () => {
	test("shows its next six dates and acknowledges them by mail", async () => {
		const { shop, productId, producerId } = await openWithRound()
		expect(await setStandingOrder(everyOtherTuesday(shop, productId))).toEqual({ ok: true })
		const page = await pageOf(shop)
		expect(page.dates.map((date) => date.deliveryOn)).toEqual([
			"2026-08-18",
			"2026-09-01",
			"2026-09-15",
			"2026-09-29",
			"2026-10-13",
			"2026-10-27",
		])
		expect(page.dates[0]?.cutoffAt).toEqual(FRIDAY_NOON)
		const [mail, ...others] = await findOutbox(producerId)
		expect(others).toEqual([])
		const letter = await renderMail(mail?.template ?? "", mail?.props)
		expect(letter.subject).toBe("Your standing order with Larkmoor Bee Yard: every other Tuesday")
		expect(letter.text).toContain("noon on Friday, August 14")
		expect(letter.text).toContain("Tuesday, September 1")
	})

	test("is set once by two sends of one form, and one that is changed takes over the dates skipped", async () => {
		const { shop, productId, producerId } = await openWithRound()
		const form = everyOtherTuesday(shop, productId)
		expect(await Promise.all([setStandingOrder(form), setStandingOrder(form)])).toEqual([{ ok: true }, { ok: true }])
		expect(await findOutbox(producerId)).toHaveLength(1)
		const skip = { producerId, storeId: shop.storeId, personId: shop.person.id, now: THURSDAY, zone: ZONE }
		await skipDate({ ...skip, ruleOn: "2026-09-15", isSkipped: true })
		const before = await pageOf(shop)
		await setStandingOrder(
			everyOtherTuesday(shop, productId, { lines: [{ productId, cases: 5, leastCases: 0, substituteIds: [] }] }),
		)
		const after = await pageOf(shop)
		expect(after.standing?.id).not.toBe(before.standing?.id)
		expect(after.standing?.lines).toEqual([{ productId, cases: 5, leastCases: 0, substituteIds: [] }])
		expect(after.dates.filter((date) => date.isSkipped).map((date) => date.ruleOn)).toEqual(["2026-09-15"])
	})

	test("is refused without lines, with a foreign product, above what is asked, and for a weekday without a van", async () => {
		const { shop, productId } = await openWithRound()
		const foreign = (await openWithRound()).productId
		const set = (more: Partial<SetStandingOrder>) => setStandingOrder(everyOtherTuesday(shop, productId, more))
		expect(await set({ lines: [] })).toEqual({ ok: false, reason: "nothing-asked" })
		expect(await set({ lines: [{ productId: foreign, cases: 1, leastCases: 0, substituteIds: [] }] })).toEqual({
			ok: false,
			reason: "not-sold",
			productIds: [foreign],
		})
		expect(await set({ lines: [{ productId, cases: 1, leastCases: 2, substituteIds: [] }] })).toEqual({
			ok: false,
			reason: "least-above-asked",
			productIds: [productId],
		})
		expect(await set({ cadence: { every: "week", interval: 1, weekday: 3, months: [] } })).toEqual({
			ok: false,
			reason: "no-delivery-that-weekday",
		})
		expect(await set({ endsOn: "2026-08-17" })).toEqual({ ok: false, reason: "no-dates" })
		expect((await pageOf(shop)).standing).toBeNull()
	})

	test("forecasts each date from what the earlier dates leave", async () => {
		const { shop, productId } = await openWithRound(7)
		await setStandingOrder(everyOtherTuesday(shop, productId))
		const page = await pageOf(shop)
		expect(page.dates.map(({ forecast: [line] }) => [line?.free, line?.short])).toEqual([
			[3, 0],
			[3, 0],
			[1, 2],
			[0, 3],
			[0, 3],
			[0, 3],
		])
	})
})

describe("making orders at the cut-off", () => {
	test("makes each date's order once: not before, once at the cut-off, however many run and however late", async () => {
		const { shop, productId, producerId } = await openWithRound()
		await setStandingOrder(everyOtherTuesday(shop, productId))
		expect(await makeDueOrders({ producerId, now: THURSDAY })).toEqual({ made: 0 })
		const runs = await Promise.all(
			[FRIDAY_NOON, FRIDAY_NOON, HOURS_LATE, HOURS_LATE].map((now) => makeDueOrders({ producerId, now })),
		)
		expect(runs.reduce((sum, run) => sum + run.made, 0)).toBe(1)
		expect(await makeDueOrders({ producerId, now: HOURS_LATE })).toEqual({ made: 0 })
		expect(await ordersOf(producerId)).toEqual([{ deliveryOn: "2026-08-18", standingOn: "2026-08-18", number: 1 }])
		const page = await pageOf(shop, HOURS_LATE)
		expect(page.dates[0]).toMatchObject({ deliveryOn: "2026-08-18", isOpen: false, orderNumber: 1 })
		const letters = (await findOutbox(producerId)).filter((mail) => mail.template === "order-received")
		expect(letters.map((mail) => mail.recipient)).toEqual([shop.person.email])
	})

	test("asks beyond the free as a line to be shared out, and leaves out what is no longer sold", async () => {
		const { yard, shop, productId, producerId } = await openWithRound(2)
		const gone = await addProduct(yard, { code: "21", readyCases: 9 })
		const lines = [productId, gone].map((id) => ({ productId: id, cases: 3, leastCases: 0, substituteIds: [] }))
		await setStandingOrder(everyOtherTuesday(shop, productId, { lines }))
		await withProducer(producerId, (tx) =>
			tx
				.update(products)
				.set({ isActive: false })
				.where(and(eq(products.producerId, producerId), eq(products.id, gone))),
		)
		await makeDueOrders({ producerId, now: FRIDAY_NOON })
		const made = await readProducer(producerId, (tx) =>
			tx
				.select({ productId: orderLines.productId, asked: orderLines.askedCases, isToShare: orderLines.isToShare })
				.from(orderLines)
				.where(eq(orderLines.producerId, producerId)),
		)
		expect(made).toEqual([{ productId, asked: 3, isToShare: true }])
	})

	test("leaves a product that does not reach for all of one cut-off to be shared out, whoever comes first", async () => {
		const { yard, shop, productId, producerId } = await openWithRound(8)
		const stand = async (one: Shop, cases: number) => {
			const lines = [{ productId, cases, leastCases: 0, substituteIds: [] }]
			expect(await setStandingOrder(everyOtherTuesday(one, productId, { lines }))).toEqual({ ok: true })
		}
		const made = () =>
			readProducer(producerId, (tx) =>
				tx
					.select({ asked: orderLines.askedCases, sure: orderLines.promisedCases, waits: orderLines.isToShare })
					.from(orderLines)
					.where(eq(orderLines.producerId, producerId))
					.orderBy(orderLines.askedCases),
			)
		const waiting = (...asked: number[]) => asked.map((cases) => ({ asked: cases, sure: 0, waits: true }))
		await stand(shop, 5)
		await stand(await openStore(yard), 6)
		expect(await makeDueOrders({ producerId, now: FRIDAY_NOON })).toEqual({ made: 2 })
		expect(await made()).toEqual(waiting(5, 6))

		// As a run that was cut short after two of three is finished: the third alone could be met, and waits with the others.
		await stand(await openStore(yard), 2)
		expect(await makeDueOrders({ producerId, now: HOURS_LATE })).toEqual({ made: 1 })
		expect(await made()).toEqual(waiting(2, 5, 6))
	})

	test("promises at once what reaches for all of one cut-off", async () => {
		const { yard, shop, productId, producerId } = await openWithRound(6)
		for (const one of [shop, await openStore(yard)]) await setStandingOrder(everyOtherTuesday(one, productId))
		await makeDueOrders({ producerId, now: FRIDAY_NOON })
		const lines = await readProducer(producerId, (tx) =>
			tx.select({ waits: orderLines.isToShare }).from(orderLines).where(eq(orderLines.producerId, producerId)),
		)
		expect(lines).toEqual([{ waits: false }, { waits: false }])
	})

	test("makes none for a skipped date, and a date that is put back again", async () => {
		const { shop, productId, producerId } = await openWithRound()
		await setStandingOrder(everyOtherTuesday(shop, productId))
		const skip = { producerId, storeId: shop.storeId, personId: shop.person.id, now: THURSDAY, zone: ZONE }
		expect(await skipDate({ ...skip, ruleOn: "2026-08-18", isSkipped: true })).toMatchObject({ ok: true })
		expect(await skipDate({ ...skip, ruleOn: "2026-08-18", isSkipped: true })).toMatchObject({ ok: true })
		expect(await makeDueOrders({ producerId, now: FRIDAY_NOON })).toEqual({ made: 0 })
		const late = { ...skip, now: FRIDAY_NOON, isSkipped: false }
		expect(await skipDate({ ...late, ruleOn: "2026-08-18" })).toEqual({ ok: false, reason: "closed" })
		expect(await skipDate({ ...late, ruleOn: "2026-08-25" })).toEqual({ ok: false, reason: "no-such-date" })
		await skipDate({ ...skip, ruleOn: "2026-09-01", isSkipped: true })
		await skipDate({ ...skip, ruleOn: "2026-09-01", isSkipped: false })
		expect(await makeDueOrders({ producerId, now: new Date("2026-08-28T16:00:00Z") })).toEqual({ made: 1 })
		expect(await ordersOf(producerId)).toMatchObject([{ deliveryOn: "2026-09-01" }])
	})

	test("makes what had closed before the end, and nothing after it", async () => {
		const { shop, productId, producerId } = await openWithRound()
		await setStandingOrder(everyOtherTuesday(shop, productId))
		await endStandingOrder({ producerId, storeId: shop.storeId, personId: shop.person.id, now: HOURS_LATE })
		expect(await makeDueOrders({ producerId, now: HOURS_LATE })).toEqual({ made: 1 })
		expect(await makeDueOrders({ producerId, now: new Date("2026-08-29T16:00:00Z") })).toEqual({ made: 0 })
		expect((await pageOf(shop, HOURS_LATE)).standing).toBeNull()
	})

	test("makes none for a date that had closed before it was set", async () => {
		const { shop, productId, producerId } = await openWithRound()
		await setStandingOrder(everyOtherTuesday(shop, productId, { now: FRIDAY_NOON }))
		expect(await makeDueOrders({ producerId, now: HOURS_LATE })).toEqual({ made: 0 })
		expect((await pageOf(shop, FRIDAY_NOON)).dates[0]?.deliveryOn).toBe("2026-09-01")
	})

	test("moves a shut day to the store's next delivery day, and closes by that day's cut-off", async () => {
		const { shop, productId, producerId } = await openWithRound()
		await withProducer(producerId, (tx) => tx.insert(shutDays).values({ producerId, shutOn: "2026-08-18" }))
		await setStandingOrder(everyOtherTuesday(shop, productId))
		expect(await makeDueOrders({ producerId, now: FRIDAY_NOON })).toEqual({ made: 0 })
		expect(await makeDueOrders({ producerId, now: new Date("2026-08-19T16:00:00Z") })).toEqual({ made: 1 })
		expect(await ordersOf(producerId)).toMatchObject([{ deliveryOn: "2026-08-21", standingOn: "2026-08-18" }])
	})
})

describe("bending single dates", () => {
	const linesMade = (producerId: string) =>
		readProducer(producerId, (tx) =>
			tx
				.select({
					asked: orderLines.askedCases,
					least: orderLines.leastCases,
					instead: orderLines.substituteIds,
				})
				.from(orderLines)
				.where(eq(orderLines.producerId, producerId)),
		)

	test("makes a date with the cases of that date, the least it can still have, and what may stand in", async () => {
		const { yard, shop, productId, producerId } = await openWithRound()
		const other = await addProduct(yard, { code: "41", readyCases: 9 })
		const lines = [{ productId, cases: 5, leastCases: 3, substituteIds: [other] }]
		await setStandingOrder(everyOtherTuesday(shop, productId, { lines }))
		const one = { producerId, storeId: shop.storeId, personId: shop.person.id, now: THURSDAY, zone: ZONE }
		const cases = [{ productId, cases: 2 }]
		expect(await changeDate({ ...one, ruleOn: "2026-08-18", cases })).toMatchObject({ ok: true })
		await makeDueOrders({ producerId, now: FRIDAY_NOON })
		expect(await linesMade(producerId)).toEqual([{ asked: 2, least: 2, instead: [other] }])
		expect(await changeDate({ ...one, now: FRIDAY_NOON, ruleOn: "2026-08-18", cases })).toEqual({
			ok: false,
			reason: "closed",
		})
		await makeDueOrders({ producerId, now: new Date("2026-08-28T16:00:00Z") })
		expect((await linesMade(producerId)).map((line) => line.asked).toSorted()).toEqual([2, 5])
	})

	test("makes nothing within a pause, and resuming brings back no date that closed in it", async () => {
		const { shop, productId, producerId } = await openWithRound()
		await setStandingOrder(everyOtherTuesday(shop, productId))
		const pausing = { producerId, storeId: shop.storeId, personId: shop.person.id, now: THURSDAY, zone: ZONE }
		const pause = { from: "2026-08-18", until: "2026-09-01" }
		expect(await pauseStandingOrder({ ...pausing, pause: { from: "2026-08-18", until: "2026-08-17" } })).toEqual({
			ok: false,
			reason: "ends-before-start",
		})
		expect(await pauseStandingOrder({ ...pausing, pause })).toEqual({ ok: true })
		expect((await pageOf(shop)).dates.map((date) => date.isSkipped)).toEqual([true, true, false, false, false, false])
		expect(await pauseStandingOrder({ ...pausing, now: FRIDAY_NOON, pause: null })).toEqual({ ok: true })
		expect(await makeDueOrders({ producerId, now: HOURS_LATE })).toEqual({ made: 0 })
		expect((await pageOf(shop, HOURS_LATE)).dates.map((date) => date.isSkipped)).toEqual([
			true,
			false,
			false,
			false,
			false,
			false,
		])
	})

	test("cannot be paused over a date whose last orders have passed", async () => {
		const { shop, productId, producerId } = await openWithRound()
		await setStandingOrder(everyOtherTuesday(shop, productId))
		const late = { producerId, storeId: shop.storeId, personId: shop.person.id, now: HOURS_LATE, zone: ZONE }
		expect(await pauseStandingOrder({ ...late, pause: { from: "2026-08-17", until: null } })).toEqual({
			ok: false,
			reason: "closed",
		})
		expect(await makeDueOrders({ producerId, now: HOURS_LATE })).toEqual({ made: 1 })
	})

	test("closes at noon in the producer's zone on either side of the end of daylight-saving time", async () => {
		// Daylight-saving time ends in the zone of the yard on November 1, 2026: noon goes from 16:00 to 17:00 UTC.
		const { shop, productId, producerId } = await openWithRound(40)
		const cadence = { every: "week", interval: 1, weekday: 2, months: [] } as const
		const now = new Date("2026-10-20T16:00:00Z")
		await setStandingOrder(everyOtherTuesday(shop, productId, { cadence, startsOn: "2026-11-03", now }))
		expect(await makeDueOrders({ producerId, now: new Date("2026-10-30T15:59:00Z") })).toEqual({ made: 0 })
		expect(await makeDueOrders({ producerId, now: new Date("2026-10-30T16:00:00Z") })).toEqual({ made: 1 })
		expect(await makeDueOrders({ producerId, now: new Date("2026-11-06T16:59:00Z") })).toEqual({ made: 0 })
		expect(await makeDueOrders({ producerId, now: new Date("2026-11-06T17:00:00Z") })).toEqual({ made: 1 })
	})
})

describe("two people of one store", () => {
	test("the second to save sees what changed meanwhile, and can save over it", async () => {
		const { shop, productId } = await openWithRound()
		const lines = (cases: number) => [{ productId, cases, leastCases: 0, substituteIds: [] }]
		const set = (cases: number, drawnFrom: string | null) =>
			setStandingOrder(everyOtherTuesday(shop, productId, { lines: lines(cases), drawnFrom }))
		expect(await set(3, null)).toEqual({ ok: true })
		const seen = (await pageOf(shop)).standing?.id ?? null
		expect(await set(4, seen)).toEqual({ ok: true })
		const answer = await set(5, seen)
		expect(answer).toMatchObject({ ok: false, reason: "changed-meanwhile", theirs: { lines: lines(4) } })
		const theirs = (await pageOf(shop)).standing
		expect(theirs?.lines).toEqual(lines(4))
		expect(await set(5, theirs?.id ?? null)).toEqual({ ok: true })
		expect((await pageOf(shop)).standing?.lines).toEqual(lines(5))
	})
})

describe("reminding before last orders", () => {
	test("writes once for a date, a day before, with a link that opens it", async () => {
		const { shop, productId, producerId } = await openWithRound()
		await setStandingOrder(everyOtherTuesday(shop, productId, { now: new Date("2026-08-11T16:00:00Z") }))
		expect(await remindDates({ producerId, now: new Date("2026-08-13T15:59:00Z") })).toEqual({ reminded: 0 })
		expect(await remindDates({ producerId, now: new Date("2026-08-13T16:00:00Z") })).toEqual({ reminded: 1 })
		expect(await remindDates({ producerId, now: new Date("2026-08-13T17:00:00Z") })).toEqual({ reminded: 0 })
		const letters = (await findOutbox(producerId)).filter((mail) => mail.template === "standing-order-reminder")
		expect(letters).toHaveLength(1)
		const letter = await renderMail(letters[0]?.template ?? "", letters[0]?.props)
		expect(letter.text).toContain("noon on Friday, August 14")
		expect(letter.text).toContain("/standing?date=2026-08-18")
	})
})
