import { randomUUID } from "node:crypto"
import { describe, expect, test } from "vitest"
import { withProducer } from "~/db/transaction.server"
import { findToDo } from "~/services/desk/find-to-do.server"
import { cancelFromDesk } from "~/services/orders/cancel-from-desk.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { undoConfirmation } from "~/services/orders/undo-confirmation.server"
import { findOutlooks } from "~/services/promise/find-outlooks.server"
import { findOrderShares } from "~/services/sharing/find-order-shares.server"
import { listSharings } from "~/services/sharing/list-sharings.server"
import { setWeights } from "~/services/sharing/set-weights.server"
import { undoSharing } from "~/services/sharing/undo-sharing.server"
import { renderMail } from "~emails/render"
import { addHand, orderAt, producerOf, sendLetters, standOnThursday } from "../desk/desk-steps"
import { addProduct, findOutbox, openStore, openYard, THURSDAY, TUESDAY_18, ZONE } from "../orders/place-yard"
import { ask, givenOf, linesOf, runsOf, shareOutNow, sharingOf, TODAY } from "./sharing-steps"

standOnThursday()

/** A yard with so many cases of product 21, and stores that ask for them. */
async function shortYard(readyCases: number, asked: readonly number[]) {
	const yard = await openYard()
	const personId = await addHand()
	const productId = await addProduct(yard, { code: "21", readyCases })
	const shops = await Promise.all(asked.map(() => openStore(yard)))
	const numbers: number[] = []
	for (const [index, shop] of shops.entries())
		numbers.push(await ask(shop, { productId, askedCases: asked[index] ?? 0 }))
	return { yard, personId, productId, shops, numbers }
}

async function promisedPieces(producerId: string, productId: string): Promise<number> {
	const outlooks = await withProducer(producerId, (tx) => findOutlooks(tx, { producerId, today: TODAY }))
	return (outlooks.get(productId)?.promises ?? []).reduce((sum, one) => sum + one.quantity, 0)
}

describe("sharing out a product", () => {
	test("gives each line its share, writes the run whole and notes it on every order", async () => {
		const { yard, personId, productId, numbers } = await shortYard(6, [8, 4, 1])
		const answer = await shareOutNow(yard, "21", { personId })
		expect(answer.ok).toBe(true)
		expect(await givenOf(yard, numbers)).toEqual([3, 2, 1])
		expect(await promisedPieces(yard.producerId, productId)).toBe(72)
		expect((await orderAt(yard, numbers[0] ?? 0)).events.map(({ kind }) => kind)).toContain("shared")

		const { facts, run } = await sharingOf(yard, "21")
		expect(facts.rows).toEqual([])
		expect(run).toMatchObject({ rule: "equal-shares", supplyCases: 6, canUndo: true })
		expect(run?.shares.map(({ sentence }) => sentence)).toEqual([
			"You asked 8 and get 3. We gave one case each until the 6 were gone.",
			"You asked 4 and get 2. We gave one case each until the 6 were gone.",
			"You asked 1 and get it.",
		])
	})

	test("writes one letter a store, however many of its orders share", async () => {
		const { yard, personId, productId, shops } = await shortYard(4, [4, 4])
		const [shop] = shops
		if (!shop) throw new Error("two stores")
		await ask(shop, { productId, askedCases: 2 })
		await shareOutNow(yard, "21", { personId })
		const letters = (await findOutbox(yard.producerId)).filter(({ template }) => template === "order-shared")
		expect(letters.map(({ recipient }) => recipient).sort()).toEqual(shops.map(({ person }) => person.email).sort())
		const own = letters.find(({ recipient }) => recipient === shop.person.email)
		const letter = own && (await renderMail(own.template, own.props))
		expect(letter?.subject).toBe("Less than you asked: Round section 21 for Tuesday, August 18")
		const text = letter?.text.replace(/\s+/g, " ")
		expect(text).toContain("You asked 4 and get 2. We gave one case each until the 4 were gone.")
		expect(text).toContain("You asked 2 and get 1. We gave one case each until the 4 were gone.")
	})

	test("is done once however often the form is sent, and at the same moment", async () => {
		const { yard, personId, numbers } = await shortYard(3, [4, 4])
		const { facts } = await sharingOf(yard, "21")
		const form = { personId, seen: facts.seen, idempotencyKey: randomUUID() }
		const answers = await Promise.all([shareOutNow(yard, "21", form), shareOutNow(yard, "21", form)])
		expect(answers[0]).toEqual(answers[1])
		expect(await shareOutNow(yard, "21", form)).toEqual(answers[0])
		expect(await runsOf(yard)).toHaveLength(1)
		expect(await givenOf(yard, numbers)).toEqual([2, 1])
	})

	test("by two hands at once is done by one of them", async () => {
		const { yard, personId } = await shortYard(3, [4, 4])
		const { facts } = await sharingOf(yard, "21")
		const answers = await Promise.all(
			(["equal-shares", "equal-shortfall"] as const).map((rule) =>
				shareOutNow(yard, "21", { personId, seen: facts.seen, rule }),
			),
		)
		expect(answers.filter(({ ok }) => ok)).toHaveLength(1)
		expect(answers.find(({ ok }) => !ok)).toEqual({ ok: false, reason: "nothing-to-share" })
		expect(await runsOf(yard)).toHaveLength(1)
	})

	test("writes nothing when a claim or the supply has changed since the page was drawn", async () => {
		const { yard, personId, productId, numbers } = await shortYard(3, [4, 4])
		const { facts } = await sharingOf(yard, "21")
		await ask(await openStore(yard), { productId, askedCases: 1, isToShare: false })
		expect(await shareOutNow(yard, "21", { personId, seen: facts.seen })).toEqual({ ok: false, reason: "changed" })
		expect(await runsOf(yard)).toEqual([])
		expect(await givenOf(yard, numbers)).toEqual([null, null])
		const other = await sharingOf(yard, "21")
		await cancelFromDesk({ producerId: yard.producerId, number: numbers[0] ?? 0, personId })
		expect(await shareOutNow(yard, "21", { personId, seen: other.facts.seen })).toEqual({
			ok: false,
			reason: "changed",
		})
	})

	test("of two producers at once touches only the own orders of each", async () => {
		const [one, other] = [await shortYard(3, [4, 4]), await shortYard(5, [4, 4])]
		const answers = await Promise.all([one, other].map(({ yard, personId }) => shareOutNow(yard, "21", { personId })))
		expect(answers.map(({ ok }) => ok)).toEqual([true, true])
		expect(await givenOf(one.yard, one.numbers)).toEqual([2, 1])
		expect(await givenOf(other.yard, other.numbers)).toEqual([3, 2])
		expect(await runsOf(one.yard)).toHaveLength(1)
		expect(await sharingOf(one.yard, "21").then(({ run }) => run?.shares)).toHaveLength(2)
	})

	test("leaves what is sure and shares the rest", async () => {
		const yard = await openYard()
		const personId = await addHand()
		const productId = await addProduct(yard, { code: "21", readyCases: 5 })
		const first = await ask(await openStore(yard), { productId, askedCases: 4, promisedCases: 3, leastCases: 2 })
		const second = await ask(await openStore(yard), { productId, askedCases: 4 })
		const { facts } = await sharingOf(yard, "21")
		expect(facts.supply).toBe(2)
		await shareOutNow(yard, "21", { personId })
		expect(await givenOf(yard, [first, second])).toEqual([4, 1])
	})

	test("shares all that is not decided when more has been promised than will be there", async () => {
		const yard = await openYard()
		const personId = await addHand()
		const productId = await addProduct(yard, { code: "21", readyCases: 4 })
		const numbers = [
			await ask(await openStore(yard), { productId, askedCases: 6, isToShare: false }),
			await ask(await openStore(yard), { productId, askedCases: 2, isToShare: false }),
		]
		const { facts } = await sharingOf(yard, "21")
		expect(facts).toMatchObject({ isOverPromised: true, supply: 4 })
		await shareOutNow(yard, "21", { personId })
		expect(await givenOf(yard, numbers)).toEqual([2, 2])
	})

	test("counts a store by its weight, and remembers who had less when last short", async () => {
		const { yard, personId, productId, shops, numbers } = await shortYard(3, [6, 6])
		const weights = shops.map(({ storeId }, index) => ({ storeId, percent: index === 0 ? 200 : 100 }))
		await setWeights({ producerId: yard.producerId, personId, weights })
		await shareOutNow(yard, "21", { personId })
		expect(await givenOf(yard, numbers)).toEqual([2, 1])
		await ask(shops[0] as (typeof shops)[number], { productId, askedCases: 3 })
		const { facts } = await sharingOf(yard, "21")
		expect(facts.rows).toMatchObject([{ weightPercent: 200, last: { asked: 6, given: 2, on: TUESDAY_18 } }])
	})
})

describe("changing it by hand", () => {
	test("cannot give more in all than can be ready, nor more than asked, nor what is sure to others", async () => {
		const yard = await openYard()
		const personId = await addHand()
		const productId = await addProduct(yard, { code: "21", readyCases: 5 })
		const number = await ask(await openStore(yard), { productId, askedCases: 4, promisedCases: 2 })
		const other = await ask(await openStore(yard), { productId, askedCases: 4 })
		const [line] = await linesOf(yard, number)
		const [second] = await linesOf(yard, other)
		const byHand = (given: number, more?: number) =>
			new Map([[line?.id ?? "", given], ...(more === undefined ? [] : [[second?.id ?? "", more] as const])])
		expect(await shareOutNow(yard, "21", { personId, byHand: byHand(4, 2) })).toEqual({
			ok: false,
			reason: "more-than-free",
			supply: 3,
			given: 4,
		})
		expect(await shareOutNow(yard, "21", { personId, byHand: byHand(5) })).toMatchObject({
			reason: "lines",
			refused: [{ lineId: line?.id, reason: "more-than-asked", bound: 4 }],
		})
		expect(await shareOutNow(yard, "21", { personId, byHand: byHand(1) })).toMatchObject({
			reason: "lines",
			refused: [{ lineId: line?.id, reason: "sure-already", bound: 2 }],
		})
		expect(await runsOf(yard)).toEqual([])
	})

	test("gives less than the least only with a note, which the store reads", async () => {
		const yard = await openYard()
		const personId = await addHand()
		const productId = await addProduct(yard, { code: "21", readyCases: 3 })
		const number = await ask(await openStore(yard), { productId, askedCases: 4, leastCases: 2 })
		const [line] = await linesOf(yard, number)
		const byHand = new Map([[line?.id ?? "", 1]])
		expect(await shareOutNow(yard, "21", { personId, byHand })).toMatchObject({
			reason: "lines",
			refused: [{ reason: "under-least-without-note", bound: 2 }],
		})
		await shareOutNow(yard, "21", { personId, byHand, note: "One case was dropped" })
		const { run } = await sharingOf(yard, "21")
		expect(run?.shares).toMatchObject([
			{ ruleCases: 3, givenCases: 1, sentence: "You asked 4 and get 1. We set this by hand: One case was dropped." },
		])
	})
})

describe("what stands in", () => {
	test("is added to the order at the store's price of today, never more than is over", async () => {
		const yard = await openYard()
		const personId = await addHand()
		const productId = await addProduct(yard, { code: "21", readyCases: 2 })
		const otherId = await addProduct(yard, { code: "22", readyCases: 3 })
		const substituteIds = [otherId]
		const numbers = [
			await ask(await openStore(yard), { productId, askedCases: 3, substituteIds }),
			await ask(await openStore(yard), { productId, askedCases: 3, substituteIds }),
		]
		const { facts } = await sharingOf(yard, "21")
		expect(facts.substitutes).toMatchObject([{ code: "22", overCases: 3 }])
		const instead = new Map(facts.rows.map(({ lineId }) => [lineId, otherId]))
		const answer = await shareOutNow(yard, "21", { personId, instead })
		const added = await Promise.all(numbers.map((number) => linesOf(yard, number)))
		expect(added.map((lines) => lines.find((line) => line.productId === otherId)?.asked)).toEqual([2, 1])
		// Three cases asked and two more are five: the break at three cases is reached.
		expect(added[0]?.find((line) => line.productId === otherId)?.caseCents).toBe(10_830)

		if (!answer.ok) throw new Error(answer.reason)
		await undoSharing({ producerId: yard.producerId, runId: answer.runId, personId })
		expect(await linesOf(yard, numbers[0] ?? 0)).toHaveLength(1)
	})
})

describe("taking a sharing back", () => {
	test("lets the lines wait again and takes the letters out, and it can be shared anew", async () => {
		const { yard, personId, numbers } = await shortYard(3, [4, 4])
		const answer = await shareOutNow(yard, "21", { personId })
		if (!answer.ok) throw new Error(answer.reason)
		const undo = { producerId: yard.producerId, runId: answer.runId, personId }
		expect(await undoSharing(undo)).toEqual({ ok: true })
		expect(await givenOf(yard, numbers)).toEqual([null, null])
		expect(await findOutbox(yard.producerId)).toEqual([])
		expect(await runsOf(yard)).toMatchObject([{ state: "undone" }])
		expect(await undoSharing(undo)).toEqual({ ok: false, reason: "undone-already" })
		expect((await shareOutNow(yard, "21", { personId, rule: "in-proportion" })).ok).toBe(true)
	})

	test("is refused once a letter has gone or an order is confirmed", async () => {
		const { yard, personId, numbers } = await shortYard(3, [4, 4])
		const answer = await shareOutNow(yard, "21", { personId })
		if (!answer.ok) throw new Error(answer.reason)
		const undo = { producerId: yard.producerId, runId: answer.runId, personId }
		const number = numbers[1] ?? 0
		await confirmOrder({ producer: producerOf(yard), number, personId, given: [] })
		expect(await undoSharing(undo)).toEqual({ ok: false, reason: "order-decided", orderNumber: number })
		await undoConfirmation({ producer: producerOf(yard), number, personId })
		await sendLetters(yard)
		expect(await undoSharing(undo)).toEqual({ ok: false, reason: "already-told" })
		expect(await givenOf(yard, numbers)).toEqual([2, 1])
	})
})

describe("after the sharing", () => {
	test("an order is confirmed whole with what it got, and its letter says how", async () => {
		const { yard, personId, numbers } = await shortYard(3, [4, 4])
		const [number = 0] = numbers
		expect(await listSharings({ producerId: yard.producerId, now: THURSDAY, zone: ZONE })).toMatchObject([
			{ productCode: "21", askedCases: 8, orders: 2, supply: 3 },
		])
		await shareOutNow(yard, "21", { personId })
		expect(await listSharings({ producerId: yard.producerId, now: THURSDAY, zone: ZONE })).toEqual([])
		const { waiting } = await findToDo({ producerId: yard.producerId, now: THURSDAY, zone: ZONE })
		expect(waiting.flatMap(({ orders }) => orders.map(({ isWhole }) => isWhole))).toEqual([true, true])
		expect(await confirmOrder({ producer: producerOf(yard), number, personId, given: [] })).toEqual({ ok: true })
		expect(await givenOf(yard, [number])).toEqual([2])
		const letter = (await findOutbox(yard.producerId)).find(({ template }) => template === "order-confirmed")
		const text = letter && (await renderMail(letter.template, letter.props)).text.replace(/\s+/g, " ")
		expect(text).toContain("get 2. We gave one case each until the 3 were gone.")
	})

	test("a store reads its own result and the rule, and no name or figure of another store", async () => {
		const { yard, personId, shops, numbers } = await shortYard(9, [7, 5, 3])
		await shareOutNow(yard, "21", { personId })
		const [shop, other] = shops
		const [number = 0] = numbers
		const own = await findOrderShares({ producerId: yard.producerId, storeId: shop?.storeId ?? "", number })
		expect(own).toEqual([
			{
				productCode: "21",
				productName: "Round section 21",
				askedCases: 7,
				givenCases: 3,
				rule: "equal-shares",
				sentence: "You asked 7 and get 3. We gave one case each until the 9 were gone.",
			},
		])
		expect(await findOrderShares({ producerId: yard.producerId, storeId: other?.storeId ?? "", number })).toEqual([])
	})
})
