import { describe, expect, test } from "vitest"
import { answerProposal, takeBackProposal } from "~/services/orders/answer-proposal.server"
import { cancelFromDesk } from "~/services/orders/cancel-from-desk.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { findProposal } from "~/services/orders/find-proposal.server"
import { packOrder } from "~/services/orders/pack-order.server"
import { proposeChange } from "~/services/orders/propose-change.server"
import { undoConfirmation } from "~/services/orders/undo-confirmation.server"
import { addHand, orderAt, place, producerOf, sendLetters, standOnThursday } from "../desk/desk-steps"
import { addProduct, findOutbox, openStore, openYard, type Shop, type Yard } from "./place-yard"

standOnThursday()

async function confirmed(yard: Yard, shop: Shop, productId: string, cases: number, givenCases = cases) {
	const personId = await addHand()
	const producer = producerOf(yard)
	const number = await place(shop, [productId, cases])
	const lineId = (await orderAt(yard, number)).lines[0]?.id ?? ""
	const given = [{ lineId, cases: givenCases, reason: "" }]
	expect(await confirmOrder({ producer, number, personId, given })).toEqual({ ok: true })
	const about = { producer, number, personId }
	return { ...about, lineId, person: { id: shop.person.id, name: "Rosa Quill" }, storeId: shop.storeId }
}

async function told(cases: number, givenCases = cases, readyCases = 9) {
	const yard = await openYard()
	const shop = await openStore(yard)
	const round = await addProduct(yard, { code: "11", readyCases })
	const order = await confirmed(yard, shop, round, cases, givenCases)
	await sendLetters(yard)
	const change = (to: number, caseCents?: number, reason = "A super was lost.") =>
		proposeChange({
			...order,
			reason,
			changes: [{ lineId: order.lineId, cases: to, ...(caseCents ? { caseCents } : {}) }],
		})
	const open = async () => (await findProposal({ producerId: yard.producerId, number: order.number })).open
	const lineNow = async () => (await orderAt(yard, order.number)).lines[0]
	const lettersOf = async (template: string) =>
		(await findOutbox(yard.producerId)).filter((m) => m.template === template)
	return { yard, shop, round, order, change, open, lineNow, lettersOf }
}

describe("a late change by the producer", () => {
	test("that gives less waits for the store, which is asked by letter, and holds once it accepts", async () => {
		const { order, change, open, lineNow, lettersOf, yard } = await told(4)
		expect(await change(2)).toEqual({ ok: true, outcome: "asked" })
		expect(await lineNow()).toMatchObject({ givenCases: 4 })
		expect(await lettersOf("order-proposal")).toHaveLength(1)
		const proposal = await open()
		expect(proposal).toMatchObject({ reason: "A super was lost.", lines: [{ fromCases: 4, toCases: 2 }] })

		const yes = { ...order, proposalId: proposal?.id ?? "", answer: "accepted" as const }
		expect(await answerProposal(yes)).toEqual({ ok: true })
		expect(await answerProposal(yes)).toEqual({ ok: true })
		expect(await lineNow()).toMatchObject({ givenCases: 2 })
		expect(await open()).toBeNull()
		const kinds = (await orderAt(yard, order.number)).events.map(({ kind }) => kind)
		expect(kinds.filter((kind) => kind === "answered")).toHaveLength(1)
		expect(kinds).toContain("proposed")
	})

	test("that costs more is asked too, and declining it leaves the order as it was confirmed", async () => {
		const { order, change, open, lineNow } = await told(3)
		const before = await lineNow()
		expect(await change(3, (before?.caseCents ?? 0) + 100)).toEqual({ ok: true, outcome: "asked" })
		const proposalId = (await open())?.id ?? ""
		expect(await answerProposal({ ...order, proposalId, answer: "declined" })).toEqual({ ok: true })
		expect(await lineNow()).toMatchObject({ givenCases: 3, caseCents: before?.caseCents })
		const late = { ...order, proposalId, answer: "accepted" as const }
		expect(await answerProposal(late)).toEqual({ ok: false, reason: "answered-already", state: "declined" })
	})

	test("that gives more or costs less holds at once, with a letter", async () => {
		const { change, lineNow, lettersOf, open } = await told(4, 2)
		expect(await change(4)).toEqual({ ok: true, outcome: "applied" })
		expect(await lineNow()).toMatchObject({ givenCases: 4 })
		expect(await change(4, 9_900)).toEqual({ ok: true, outcome: "applied" })
		expect(await lineNow()).toMatchObject({ caseCents: 9_900 })
		expect(await open()).toBeNull()
		expect(await lettersOf("order-changed")).toHaveLength(2)
	})

	test("never gives more than was asked, or than is free beside other promises", async () => {
		const { change, lineNow, order, yard, round } = await told(4, 2, 5)
		await place(await openStore(yard), [round, 3])
		const tooMany = { lineId: order.lineId, reason: "more-than-asked", mostCases: 4 }
		expect(await change(5)).toEqual({ ok: false, reason: "change-lines", refused: [tooMany] })
		const notFree = { lineId: order.lineId, reason: "more-than-free", mostCases: 2 }
		expect(await change(3)).toEqual({ ok: false, reason: "change-lines", refused: [notFree] })
		expect(await change(2)).toEqual({ ok: false, reason: "nothing-changed" })
		expect(await change(0)).toEqual({ ok: false, reason: "nothing-given" })
		expect(await lineNow()).toMatchObject({ givenCases: 2 })
	})

	test("is one at a time, and can be taken back; a letter that has not gone goes with it", async () => {
		const { order, change, open, lettersOf, yard } = await told(4)
		await change(2)
		expect(await change(1)).toEqual({ ok: false, reason: "open-already" })
		const first = (await open())?.id ?? ""
		expect(await takeBackProposal({ ...order, proposalId: first })).toEqual({ ok: true })
		expect(await lettersOf("order-proposal")).toEqual([])
		expect(await lettersOf("order-changed")).toEqual([])

		await change(1)
		await sendLetters(yard)
		const second = (await open())?.id ?? ""
		expect(await takeBackProposal({ ...order, proposalId: second })).toEqual({ ok: true })
		expect(await lettersOf("order-changed")).toHaveLength(1)
	})

	test("is refused while the confirmation can still be undone, and once the order is packed", async () => {
		const yard = await openYard()
		const round = await addProduct(yard, { code: "11", readyCases: 9 })
		const order = await confirmed(yard, await openStore(yard), round, 4)
		const changes = [{ lineId: order.lineId, cases: 2 }]
		const ask = () => proposeChange({ ...order, reason: "A super was lost.", changes })
		expect(await ask()).toEqual({ ok: false, reason: "not-told" })
		await sendLetters(yard)
		expect(await ask()).toEqual({ ok: true, outcome: "asked" })
		expect(await undoConfirmation(order)).toEqual({ ok: false, reason: "already-told" })
		const proposalId = (await findProposal({ producerId: yard.producerId, number: order.number })).open?.id ?? ""
		const packing = { producerId: yard.producerId, number: order.number, personId: order.personId }
		expect(await packOrder(packing)).toMatchObject({ ok: true })
		const yes = { ...order, proposalId, answer: "accepted" as const }
		expect(await answerProposal(yes)).toEqual({ ok: false, reason: "not-confirmed", state: "packed" })
		expect(await ask()).toEqual({ ok: false, reason: "not-confirmed", state: "packed" })
		expect((await orderAt(yard, order.number)).lines[0]).toMatchObject({ givenCases: 4 })
	})

	test("is answered by the store it was put to and by no other", async () => {
		const { order, change, open, yard, lineNow } = await told(4)
		await change(2)
		const proposalId = (await open())?.id ?? ""
		const other = await openStore(yard)
		const theirs = { ...order, storeId: other.storeId, proposalId, answer: "accepted" as const }
		expect(await answerProposal(theirs)).toEqual({ ok: false, reason: "no-such-order" })
		expect(await lineNow()).toMatchObject({ givenCases: 4 })
	})

	test("accepted and taken back at the same moment, it is one or the other", async () => {
		const { order, change, open, lineNow } = await told(4)
		await change(2)
		const proposalId = (await open())?.id ?? ""
		const [yes, back] = await Promise.all([
			answerProposal({ ...order, proposalId, answer: "accepted" }),
			takeBackProposal({ ...order, proposalId }),
		])
		expect([yes.ok, back.ok].filter(Boolean)).toHaveLength(1)
		expect(await lineNow()).toMatchObject({ givenCases: yes.ok ? 2 : 4 })
	})

	test("of a cancelled order is no question any more", async () => {
		const { order, change, open, yard } = await told(4)
		await change(2)
		const proposalId = (await open())?.id ?? ""
		await cancelFromDesk({ producerId: yard.producerId, number: order.number, personId: order.personId })
		expect(await open()).toBeNull()
		const yes = { ...order, proposalId, answer: "accepted" as const }
		expect(await answerProposal(yes)).toMatchObject({ ok: false, reason: "not-confirmed" })
	})
})
