import { randomUUID } from "node:crypto"
import { eq, sql } from "drizzle-orm"
import { expect, test } from "vitest"
import { memberships, stockMoves, stores, withdrawalNotices } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { packOrder } from "~/services/orders/pack-order.server"
import { sendOrder } from "~/services/orders/send-order.server"
import { answerNotice } from "~/services/withdrawals/answer-notice.server"
import { findNotice } from "~/services/withdrawals/find-notice.server"
import { findWithdrawal } from "~/services/withdrawals/find-withdrawal.server"
import { findWithdrawalPlan } from "~/services/withdrawals/find-withdrawal-plan.server"
import { listWithdrawals } from "~/services/withdrawals/list-withdrawals.server"
import { markOpened } from "~/services/withdrawals/mark-opened.server"
import { startWithdrawal } from "~/services/withdrawals/start-withdrawal.server"
import { addHand, addLot, packed, place, producerOf, standOnThursday, whereIs } from "../desk/desk-steps"
import { addProduct, findOutbox, openStore, openYard, type Yard } from "../orders/place-yard"

standOnThursday()

const NETWORK = "198.51.100.7"

/** A lot of 72: two cases sent to one store, one packed for another, the rest on the ready shelf. */
async function sellSome() {
	const yard = await openYard()
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const lotId = await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2027-01-01", ready: 72 })
	const [had, waits] = [await openStore(yard), await openStore(yard)]
	const sent = await packed(yard, had, personId, [round, 2])
	await sendOrder({ producer: producerOf(yard), number: sent, personId })
	const inCases = await packed(yard, waits, personId, [round, 1])
	return { yard, personId, round, lotId, had, waits, sent, inCases }
}

const withdraw = (yard: Yard, personId: string, more: Partial<Parameters<typeof startWithdrawal>[0]> = {}) =>
	startWithdrawal({
		producer: producerOf(yard),
		personId,
		codes: ["R1"],
		reason: "Ants in some boxes.",
		instructions: "Take them off the shelf and keep them apart.",
		idempotencyKey: randomUUID(),
		...more,
	})

/** The secret of the only notice that was mailed. */
async function mailedToken(yard: Yard): Promise<string> {
	const letters = (await findOutbox(yard.producerId)).filter(({ template }) => template === "withdrawal")
	return String(letters[0]?.props.noticeUrl).split("/").at(-1) ?? ""
}

test("a withdrawal tells exactly those who were sent pieces, once, and names the orders that still stand packed", async () => {
	const { yard, personId, had, inCases } = await sellSome()
	expect(await findWithdrawalPlan({ producerId: yard.producerId, code: "R1" })).toMatchObject({
		lots: [{ code: "R1", inHand: 48, out: 24, isAsked: true }],
		isWithdrawn: false,
		storeCount: 1,
		storePieces: 24,
		packedOrders: [{ number: inCases, pieces: 12 }],
	})
	expect(await withdraw(yard, personId)).toEqual({ ok: true, number: 1 })
	const letters = (await findOutbox(yard.producerId)).filter(({ template }) => template === "withdrawal")
	expect(letters.map(({ recipient }) => recipient)).toEqual([had.person.email])
	expect(letters[0]?.props).toMatchObject({
		lots: [{ code: "R1", productName: "Round section 11", pieces: 24 }],
		number: 1,
	})
	const found = await findWithdrawal({ producerId: yard.producerId, number: 1, filter: "all", after: null })
	expect(found).toMatchObject({
		lots: [{ code: "R1", piecesOut: 24, inHand: 48 }],
		totals: {
			stores: 1,
			pieces: 24,
			mailed: 0,
			toCall: 0,
			opened: 0,
			answered: 0,
			heldPieces: 0,
			unansweredPieces: 24,
		},
		packedOrders: [{ number: inCases, lot: "R1", pieces: 12 }],
		notices: [{ storeName: "Pantry & Plume", pieces: 24, letters: 1, sent: 0 }],
		next: null,
	})
	expect(await findWithdrawal({ producerId: yard.producerId, number: 2, filter: "all", after: null })).toBeNull()
})

test("the same form sent twice at once begins one withdrawal, and another one of the lot is refused", async () => {
	const { yard, personId } = await sellSome()
	const idempotencyKey = randomUUID()
	const answers = await Promise.all([
		withdraw(yard, personId, { idempotencyKey }),
		withdraw(yard, personId, { idempotencyKey }),
	])
	expect(answers).toEqual([
		{ ok: true, number: 1 },
		{ ok: true, number: 1 },
	])
	expect(await withdraw(yard, personId)).toEqual({ ok: false, reason: "withdrawn-before", codes: ["R1"] })
	expect(await withdraw(yard, personId, { codes: ["R9"] })).toEqual({ ok: false, reason: "no-such-lot", code: "R9" })
	expect((await findOutbox(yard.producerId)).filter(({ template }) => template === "withdrawal")).toHaveLength(1)
	expect((await listWithdrawals({ producerId: yard.producerId, after: null })).withdrawals).toMatchObject([
		{ number: 1, lots: ["R1"], stores: 1, opened: 0, answered: 0 },
	])
})

test("nothing of a withdrawn lot is packed, sent or moved off the shelves any more", async () => {
	const { yard, personId, round, lotId, inCases } = await sellSome()
	const store = await openStore(yard)
	const waiting = await place(store, [round, 1])
	await confirmOrder({ producer: producerOf(yard), number: waiting, personId, given: [] })
	await withdraw(yard, personId)
	expect(await packOrder({ producerId: yard.producerId, number: waiting, personId })).toMatchObject({
		ok: false,
		reason: "lots-too-few",
	})
	expect(await sendOrder({ producer: producerOf(yard), number: inCases, personId })).toEqual({
		ok: false,
		reason: "lot-withdrawn",
		lotCode: "R1",
	})
	const move = { producerId: yard.producerId, lotId, fromPlace: "ready" as const, pieces: 1, reason: "tried" }
	await expect(
		withProducer(yard.producerId, (tx) => tx.insert(stockMoves).values({ ...move, toPlace: "sold" })),
	).rejects.toMatchObject({ cause: { constraint: "stock_moves_only_released" } })
	expect(await whereIs(yard, lotId)).toBe("packed 12, ready 36, sold 24")
})

test("a packing or sending of the same moment is either told or refused, never both passed by", async () => {
	for (let round = 0; round < 6; round += 1) {
		const { yard, personId, lotId, had, waits, inCases } = await sellSome()
		const [started, sending] = await Promise.all([
			withdraw(yard, personId),
			sendOrder({ producer: producerOf(yard), number: inCases, personId }),
		])
		expect(started.ok).toBe(true)
		const notices = await withProducer(yard.producerId, (tx) => tx.select().from(withdrawalNotices))
		const told = notices.map(({ storeId }) => storeId).toSorted()
		expect(told).toEqual((sending.ok ? [had.storeId, waits.storeId] : [had.storeId]).toSorted())
		expect(await whereIs(yard, lotId)).toBe(sending.ok ? "ready 36, sold 36" : "packed 12, ready 36, sold 24")
	}
})

test("a store without people is written to at its own address, and one without that is to be called", async () => {
	const { yard, personId, had } = await sellSome()
	await withProducer(yard.producerId, async (tx) => {
		await tx.update(memberships).set({ endedAt: sql`now()` })
		await tx.update(stores).set({ phone: "(555) 010-0177" }).where(eq(stores.id, had.storeId))
	})
	await withdraw(yard, personId)
	const found = await findWithdrawal({ producerId: yard.producerId, number: 1, filter: "no-letter", after: null })
	expect(found?.totals).toMatchObject({ stores: 1, toCall: 1 })
	expect(found?.notices).toMatchObject([{ phone: "(555) 010-0177", letters: 0 }])

	const second = await sellSome()
	await withProducer(second.yard.producerId, async (tx) => {
		await tx.update(memberships).set({ endedAt: sql`now()` })
		await tx.update(stores).set({ email: "office@plume.example.test" }).where(eq(stores.id, second.had.storeId))
	})
	await withdraw(second.yard, second.personId)
	const letters = (await findOutbox(second.yard.producerId)).filter(({ template }) => template === "withdrawal")
	expect(letters.map(({ recipient }) => recipient)).toEqual(["office@plume.example.test"])
})

test("a notice is read without signing in, is opened by a person once, and takes an answer that can be mended", async () => {
	const { yard, personId } = await sellSome()
	await withdraw(yard, personId)
	const token = await mailedToken(yard)
	const { producerId } = yard
	expect(await findNotice({ producerId, token })).toMatchObject({
		storeName: "Pantry & Plume",
		pieces: 24,
		lots: [{ code: "R1", pieces: 24 }],
		answeredAt: null,
	})
	expect(await findNotice({ producerId, token: "x".repeat(43) })).toBeNull()
	expect(await findNotice({ producerId: (await openYard()).producerId, token })).toBeNull()
	const totals = async () => (await findWithdrawal({ producerId, number: 1, filter: "all", after: null }))?.totals
	// Reading alone marks nothing.
	expect(await totals()).toMatchObject({ opened: 0, answered: 0 })
	await markOpened({ producerId, token, network: NETWORK })
	expect(await totals()).toMatchObject({ opened: 1, answered: 0 })
	const answer = { producerId, token, network: NETWORK, note: "" }
	expect(await answerNotice({ ...answer, heldPieces: 25 })).toEqual({ ok: false, reason: "more-than-had", pieces: 24 })
	expect(await answerNotice({ ...answer, heldPieces: 9 })).toEqual({ ok: true })
	expect(await answerNotice({ ...answer, heldPieces: 7, note: "two more were sold" })).toEqual({ ok: true })
	expect(await answerNotice({ ...answer, token: "x".repeat(43), heldPieces: 1 })).toEqual({
		ok: false,
		reason: "no-such-notice",
	})
	expect(await totals()).toMatchObject({ opened: 1, answered: 1, heldPieces: 7, unansweredPieces: 0 })
	const [kept] = await withProducer(producerId, (tx) => tx.select().from(withdrawalNotices))
	expect(kept?.tokenHash).not.toContain(token)
	expect(kept?.answerNote).toBe("two more were sold")
})
