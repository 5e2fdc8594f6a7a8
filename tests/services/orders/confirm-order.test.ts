import { describe, expect, test } from "vitest"
import { cancelFromDesk } from "~/services/orders/cancel-from-desk.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { undoConfirmation } from "~/services/orders/undo-confirmation.server"
import { renderMail } from "~emails/render"
import {
	addHand,
	addLot,
	orderAt,
	packed,
	place,
	producerOf,
	sendLetters,
	standOnThursday,
	whereIs,
} from "../desk/desk-steps"
import { addProduct, findOutbox, openStore, openYard } from "./place-yard"

standOnThursday()

async function confirmedLetter(producerId: string) {
	const mail = (await findOutbox(producerId)).find(({ template }) => template === "order-confirmed")
	return mail && renderMail(mail.template, mail.props)
}

describe("confirming an order", () => {
	test("tells the store in a sentence what is short and that it keeps its price", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const personId = await addHand()
		const round = await addProduct(yard, { code: "11", readyCases: 2 })
		const number = await place(shop, [round, 4])
		const [line] = (await orderAt(yard, number)).lines
		expect(line).toMatchObject({ askedCases: 4, mostCases: 2, isToShare: true })

		const given = [{ lineId: line?.id ?? "", cases: 2, reason: "" }]
		expect(await confirmOrder({ producer: producerOf(yard), number, personId, given })).toEqual({ ok: true })
		expect(await orderAt(yard, number)).toMatchObject({ state: "confirmed", canUndo: true })
		const letter = await confirmedLetter(yard.producerId)
		expect(letter?.subject).toBe("Confirmed, but short: your order for Tuesday, August 18")
		expect(letter?.text.replace(/\s+/g, " ")).toContain(
			"You asked for 4 cases of Round section 11, and get 2. That is all that can be ready for Tuesday, August 18. You keep the price for 4 cases.",
		)
	})

	test("gives the producer's own reason in place of the plain one", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const personId = await addHand()
		const round = await addProduct(yard, { code: "11", readyCases: 9 })
		const number = await place(shop, [round, 2])
		const [line] = (await orderAt(yard, number)).lines
		const given = [{ lineId: line?.id ?? "", cases: 1, reason: "A case was dropped" }]
		expect(await confirmOrder({ producer: producerOf(yard), number, personId, given })).toEqual({ ok: true })
		expect((await confirmedLetter(yard.producerId))?.text.replace(/\s+/g, " ")).toContain("A case was dropped.")
	})

	test("refuses every line that is given more than is free or was asked, and writes nothing", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const personId = await addHand()
		const scarce = await addProduct(yard, { code: "11", readyCases: 3 })
		const plenty = await addProduct(yard, { code: "21", readyCases: 9 })
		await place(await openStore(yard), [scarce, 2])
		const number = await place(shop, [scarce, 5], [plenty, 1])
		const [first, second] = (await orderAt(yard, number)).lines
		const answer = await confirmOrder({
			producer: producerOf(yard),
			number,
			personId,
			given: [
				{ lineId: first?.id ?? "", cases: 2, reason: "" },
				{ lineId: second?.id ?? "", cases: 2, reason: "" },
			],
		})
		expect(answer).toEqual({
			ok: false,
			reason: "lines",
			refused: [
				{ lineId: first?.id, reason: "more-than-free", mostCases: 1 },
				{ lineId: second?.id, reason: "more-than-asked", mostCases: 1 },
			],
		})
		expect(await orderAt(yard, number)).toMatchObject({ state: "placed" })
		expect(await confirmedLetter(yard.producerId)).toBeUndefined()
	})

	test("refuses to confirm an order that gives nothing", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const personId = await addHand()
		const round = await addProduct(yard, { code: "11", readyCases: 3 })
		const number = await place(shop, [round, 2])
		const [line] = (await orderAt(yard, number)).lines
		const given = [{ lineId: line?.id ?? "", cases: 0, reason: "" }]
		expect(await confirmOrder({ producer: producerOf(yard), number, personId, given })).toEqual({
			ok: false,
			reason: "nothing-given",
		})
	})

	test("is done once when two hands confirm at the same moment", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const [one, two] = [await addHand(), await addHand()]
		const round = await addProduct(yard, { code: "11", readyCases: 3 })
		const number = await place(shop, [round, 2])
		const answers = await Promise.all(
			[one, two].map((personId) => confirmOrder({ producer: producerOf(yard), number, personId, given: [] })),
		)
		expect(answers.filter(({ ok }) => ok)).toHaveLength(1)
		expect(answers).toContainEqual({ ok: false, reason: "not-placed", state: "confirmed" })
		const letters = (await findOutbox(yard.producerId)).filter(({ template }) => template === "order-confirmed")
		expect(letters).toHaveLength(1)
	})
})

describe("taking a confirmation back", () => {
	test("is possible while no letter has gone: the order waits again and the letter is taken out", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const personId = await addHand()
		const round = await addProduct(yard, { code: "11", readyCases: 3 })
		const number = await place(shop, [round, 2])
		const producer = producerOf(yard)
		await confirmOrder({ producer, number, personId, given: [] })
		expect(await undoConfirmation({ producer, number, personId })).toEqual({ ok: true })
		const order = await orderAt(yard, number)
		expect(order.state).toBe("placed")
		expect(order.lines).toMatchObject([{ givenCases: null, isToShare: false }])
		expect(await confirmedLetter(yard.producerId)).toBeUndefined()
		// And it can be confirmed anew, with a letter of its own.
		expect(await confirmOrder({ producer, number, personId, given: [] })).toEqual({ ok: true })
		expect(await confirmedLetter(yard.producerId)).toBeDefined()
	})

	test("is refused once a letter has gone", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const personId = await addHand()
		const round = await addProduct(yard, { code: "11", readyCases: 3 })
		const number = await place(shop, [round, 2])
		const producer = producerOf(yard)
		await confirmOrder({ producer, number, personId, given: [] })
		await sendLetters(yard)
		expect(await undoConfirmation({ producer, number, personId })).toEqual({ ok: false, reason: "already-told" })
		expect(await orderAt(yard, number)).toMatchObject({ state: "confirmed", canUndo: false })
	})

	test("promises nothing twice when others have had the cases meanwhile", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const personId = await addHand()
		const round = await addProduct(yard, { code: "11", readyCases: 4 })
		const number = await place(shop, [round, 4])
		const producer = producerOf(yard)
		const [line] = (await orderAt(yard, number)).lines
		await confirmOrder({ producer, number, personId, given: [{ lineId: line?.id ?? "", cases: 1, reason: "" }] })
		await place(await openStore(yard), [round, 3])
		await undoConfirmation({ producer, number, personId })
		expect((await orderAt(yard, number)).lines).toMatchObject([{ isToShare: true, mostCases: 1 }])
	})
})

test("an order cancelled at the desk after packing puts its pieces back and sends no confirmation", async () => {
	const yard = await openYard()
	const shop = await openStore(yard)
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const lotId = await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2027-01-01", ready: 30 })
	const number = await packed(yard, shop, personId, [round, 2])
	expect(await whereIs(yard, lotId)).toBe("packed 24, ready 6")
	const cancel = { producerId: yard.producerId, number, personId }
	expect(await cancelFromDesk(cancel)).toEqual({ ok: true })
	expect(await cancelFromDesk(cancel)).toEqual({ ok: true })
	expect(await whereIs(yard, lotId)).toBe("ready 30")
	expect((await orderAt(yard, number)).lines).toMatchObject([{ lots: [] }])
	expect(await confirmedLetter(yard.producerId)).toBeUndefined()
})
