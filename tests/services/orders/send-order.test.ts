import { eq } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { invoices, orders } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { findInvoice } from "~/services/invoicing/find-invoice.server"
import { issueInvoice } from "~/services/invoicing/issue-invoice.server"
import { planInvoice } from "~/services/invoicing/plan-invoice.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { lockOrder } from "~/services/orders/lock-order.server"
import { markReceived } from "~/services/orders/mark-received.server"
import { packOrder } from "~/services/orders/pack-order.server"
import { sendOrder } from "~/services/orders/send-order.server"
import { renderMail } from "~emails/render"
import { addHand, addLot, orderAt, packed, place, producerOf, standOnThursday, whereIs } from "../desk/desk-steps"
import { addProduct, findOutbox, openStore, openYard } from "./place-yard"

standOnThursday()

const sequencesOf = (producerId: string) =>
	readProducer(producerId, (tx) =>
		tx
			.select({ sequence: invoices.sequence })
			.from(invoices)
			.where(eq(invoices.producerId, producerId))
			.orderBy(invoices.sequence),
	).then((rows) => rows.map(({ sequence }) => sequence))

describe("sending an order", () => {
	test("sells its pieces and issues one invoice from what was packed, with its PDF in the mail", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const personId = await addHand()
		const round = await addProduct(yard, { code: "11", readyCases: 0 })
		const lotId = await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2027-01-01", ready: 24 })
		const number = await place(shop, [round, 4])
		const [line] = (await orderAt(yard, number)).lines
		const producer = producerOf(yard)
		await confirmOrder({ producer, number, personId, given: [{ lineId: line?.id ?? "", cases: 2, reason: "" }] })
		await packOrder({ producerId: yard.producerId, number, personId })
		expect(await sendOrder({ producer, number, personId })).toEqual({ ok: true, invoiceNumber: "2026-0001" })
		expect(await sendOrder({ producer, number, personId })).toEqual({
			ok: false,
			reason: "not-packed",
			state: "sent",
		})
		expect(await whereIs(yard, lotId)).toBe("sold 24")
		expect(await sequencesOf(yard.producerId)).toEqual([1])

		const page = await findInvoice({ producerId: yard.producerId, storeId: shop.storeId, number: "2026-0001" })
		// Two cases at the price for four: 2 × 108.30, and 18.00 for the way.
		expect(page?.openCents).toBe(23_460)
		expect(page?.document).toMatchObject({
			issuedOn: "2026-08-13",
			due: { on: "2026-08-27", termsWords: "net 14 days" },
			lines: [{ lots: ["R1"], casesAsked: 4, casesSent: 2, amountCents: 21_660 }],
		})
		expect(page?.document.lines[0]?.reason).toContain("You asked for 4 cases of Round section 11, and get 2.")

		const mail = (await findOutbox(yard.producerId)).find(({ template }) => template === "invoice")
		const letter = await renderMail(mail?.template ?? "", mail?.props)
		expect(letter.subject).toBe("Larkmoor Bee Yard: invoice 2026-0001, $234.60 by Thursday, August 27")
		expect(letter.text.replace(/\s+/g, " ").match(/You asked for 4 cases/g)).toHaveLength(1)
		expect(letter.attachments).toMatchObject([{ filename: "invoice-2026-0001.pdf", contentType: "application/pdf" }])
		expect(letter.attachments[0]?.content.subarray(0, 5).toString()).toBe("%PDF-")
	})

	test("is one invoice when two hands send at the same moment", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const personId = await addHand()
		const round = await addProduct(yard, { code: "11", readyCases: 4 })
		const number = await packed(yard, shop, personId, [round, 2])
		const send = { producer: producerOf(yard), number, personId }
		const answers = await Promise.all([sendOrder(send), sendOrder(send), sendOrder(send)])
		expect(answers.filter(({ ok }) => ok)).toEqual([{ ok: true, invoiceNumber: "2026-0001" }])
		expect(await sequencesOf(yard.producerId)).toEqual([1])
	})

	test("is received once, and only by its own store", async () => {
		const yard = await openYard()
		const shop = await openStore(yard)
		const other = await openStore(yard)
		const personId = await addHand()
		const round = await addProduct(yard, { code: "11", readyCases: 4 })
		const number = await packed(yard, shop, personId, [round, 2])
		await sendOrder({ producer: producerOf(yard), number, personId })
		const receive = { producerId: yard.producerId, number, personId }
		expect(await markReceived({ ...receive, storeId: other.storeId })).toBe(false)
		expect(await markReceived({ ...receive, storeId: shop.storeId })).toBe(true)
		expect(await markReceived(receive)).toBe(false)
	})
})

test("invoice numbers have no gap when twenty are issued at once and half of them fail at the last moment", async () => {
	const yard = await openYard()
	const shop = await openStore(yard)
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 40 })
	const producer = producerOf(yard)
	const numbers: number[] = []
	for (let count = 0; count < 20; count += 1) numbers.push(await packed(yard, shop, personId, [round, 1]))
	const failure = new Error("the line broke")
	/** Issues as sending does, and breaks off after the number was taken where `fails`. */
	const issue = (number: number, fails: boolean) =>
		withProducer(producer.id, async (tx) => {
			const order = await lockOrder(tx, { producerId: producer.id, number })
			if (!order) throw new Error("the order is there")
			const planned = await planInvoice(tx, { producerId: producer.id, orders: [order], issuedOn: "2026-08-13" })
			if (!planned.ok) throw new Error(planned.reason)
			await issueInvoice(tx, { producer, plan: planned.plan, personId })
			if (fails) throw failure
		})
	const outcomes = await Promise.allSettled(numbers.map((number, index) => issue(number, index % 2 === 0)))
	expect(outcomes.filter(({ status }) => status === "rejected")).toEqual(
		Array(10).fill({ status: "rejected", reason: failure }),
	)
	expect(await sequencesOf(yard.producerId)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10])
	// The failed ones are issued after all: the row goes on where it stopped.
	const sent = await Promise.all(
		numbers.filter((_, index) => index % 2 === 0).map((number) => sendOrder({ producer, number, personId })),
	)
	expect(sent.every(({ ok }) => ok)).toBe(true)
	expect(await sequencesOf(yard.producerId)).toEqual(Array.from({ length: 20 }, (_, index) => index + 1))
	const states = await readProducer(producer.id, (tx) =>
		tx.select({ state: orders.state }).from(orders).where(eq(orders.producerId, producer.id)),
	)
	expect(states.filter(({ state }) => state === "sent")).toHaveLength(10)
})
