import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { describe, expect, test, vi } from "vitest"
import { bookClosings } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { issueMonthEnds, issueWaitingNow } from "~/services/invoicing/issue-together.server"
import { listWaiting } from "~/services/invoicing/list-waiting.server"
import { sendOrder } from "~/services/orders/send-order.server"
import { renderMail } from "~emails/render"
import { addHand, packed, producerOf, standOnThursday } from "../desk/desk-steps"
import { addProduct, findOutbox, openStore, openYard } from "../orders/place-yard"
import { agree, invoiceAt, issued } from "./invoicing-steps"

standOnThursday()

const september = new Date("2026-09-01T08:17:00Z")

/** A store with one invoice a month and two orders that were sent on Tuesday, August 18. */
async function monthlyYard() {
	const yard = await openYard()
	const shop = await openStore(yard)
	await agree(yard, shop, { invoicing: "month-end" })
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 40 })
	const producer = producerOf(yard)
	const sendOne = async (cases: number) => {
		const number = await packed(yard, shop, personId, [round, cases])
		expect(await sendOrder({ producer, number, personId })).toEqual({ ok: true, invoiceNumber: null })
		return number
	}
	const numbers = [await sendOne(1), await sendOne(2)]
	return { yard, shop, personId, round, producer, numbers, sendOne }
}

describe("one invoice for a month", () => {
	test("sending issues nothing; the night after the month issues one, dated its last day, with every order on it", async () => {
		const { yard, numbers } = await monthlyYard()
		expect(await issued(yard)).toEqual([])
		vi.setSystemTime(september)
		await issueMonthEnds({ producerId: yard.producerId })
		// 3 × 114.00 and twice 18.00 for the way.
		expect(await issued(yard)).toEqual([{ sequence: 1, issuedOn: "2026-08-31", totalCents: 37_800, orders: numbers }])
		const { document, orderNumbers } = await invoiceAt(yard, "2026-0001")
		expect(orderNumbers).toEqual(numbers)
		expect(document.lines.map(({ orderNumber, amountCents }) => [orderNumber, amountCents])).toEqual([
			[String(numbers[0]), 11_400],
			[String(numbers[1]), 22_800],
		])
		const mails = (await findOutbox(yard.producerId)).filter(({ template }) => template === "invoice")
		expect(mails).toHaveLength(1)
	})

	test("goes by mail also with the store's own numbers of many orders", async () => {
		const { yard } = await monthlyYard()
		await withProducer(yard.producerId, (tx) =>
			tx.execute(sql`update orders set po_number = number::text || ${"4471".repeat(50)}::text`),
		)
		vi.setSystemTime(september)
		await issueMonthEnds({ producerId: yard.producerId })
		const [mail] = (await findOutbox(yard.producerId)).filter(({ template }) => template === "invoice")
		const letter = await renderMail("invoice", mail?.props)
		expect(letter.attachments).toMatchObject([{ filename: "invoice-2026-0001.pdf" }])
	})

	test("is made once, however often and by however many the job runs", async () => {
		const { yard } = await monthlyYard()
		vi.setSystemTime(september)
		await Promise.all(Array.from({ length: 4 }, () => issueMonthEnds({ producerId: yard.producerId })))
		await issueMonthEnds({ producerId: yard.producerId })
		expect(await issued(yard)).toHaveLength(1)
	})

	test("is not made while the month still runs, and what is delivered after it waits for the next", async () => {
		const { yard } = await monthlyYard()
		vi.setSystemTime(new Date("2026-08-31T08:17:00Z"))
		await issueMonthEnds({ producerId: yard.producerId })
		expect(await issued(yard)).toEqual([])
		await withProducer(yard.producerId, (tx) =>
			tx.execute("update orders set delivery_on = '2026-09-01' where number = (select max(number) from orders)"),
		)
		vi.setSystemTime(new Date("2026-09-03T08:17:00Z"))
		await issueMonthEnds({ producerId: yard.producerId })
		expect(await issued(yard)).toMatchObject([{ orders: [expect.any(Number)], issuedOn: "2026-08-31" }])
		vi.setSystemTime(new Date("2026-10-01T08:17:00Z"))
		await issueMonthEnds({ producerId: yard.producerId })
		expect(await issued(yard)).toHaveLength(2)
	})

	test("is dated the day it is made where the books of the month are closed", async () => {
		const { yard, personId } = await monthlyYard()
		const closing = { producerId: yard.producerId, closedUntil: "2026-08-31", totals: {}, closedBy: personId }
		// biome-ignore lint/suspicious/noExplicitAny: the totals of a closing say nothing here
		await withProducer(yard.producerId, (tx) => tx.insert(bookClosings).values(closing as any))
		vi.setSystemTime(september)
		await issueMonthEnds({ producerId: yard.producerId })
		expect(await issued(yard)).toMatchObject([{ issuedOn: "2026-09-01" }])
	})

	test("can be issued by the desk at once, once for each form, and leaves the rest to the month", async () => {
		const { yard, shop, personId, producer, numbers, sendOne } = await monthlyYard()
		const waiting = await listWaiting({ producerId: yard.producerId, today: "2026-08-13" })
		expect(waiting).toMatchObject([
			{ storeName: "Pantry & Plume", isMonthly: true, orderNumbers: numbers, aboutCents: 37_800 },
		])
		const ask = { producer, storeId: shop.storeId, personId, formId: randomUUID() }
		const answers = await Promise.all([issueWaitingNow(ask), issueWaitingNow(ask)])
		expect(answers).toContainEqual({ ok: true, invoiceNumber: "2026-0001", orderCount: 2 })
		expect(answers).toContainEqual({ ok: false, reason: "nothing-waits" })
		const later = await sendOne(1)
		vi.setSystemTime(september)
		await issueMonthEnds({ producerId: yard.producerId })
		expect(await issued(yard)).toMatchObject([
			{ issuedOn: "2026-08-13", orders: numbers },
			{ issuedOn: "2026-08-31", orders: [later] },
		])
		expect(await listWaiting({ producerId: yard.producerId, today: "2026-09-01" })).toEqual([])
	})
})
