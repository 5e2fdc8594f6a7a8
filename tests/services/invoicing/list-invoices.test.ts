import { randomUUID } from "node:crypto"
import { expect, test } from "vitest"
import { type InvoiceFilter, listInvoices } from "~/services/invoicing/list-invoices.server"
import { recordPayment } from "~/services/payments/record-payment.server"
import { addHand } from "../desk/desk-steps"
import { openStore, openYard } from "../orders/place-yard"
import { addInvoice } from "../payments/paying"

const TODAY = "2026-08-28"

test("invoices come with what is owed first, the latest first, page by page, and none twice", async () => {
	const yard = await openYard()
	const shop = await openStore(yard)
	const personId = await addHand()
	const numbers: string[] = []
	for (let sequence = 1; sequence <= 35; sequence += 1)
		numbers.push(await addInvoice(yard, shop, { sequence, totalCents: 1_000 }))
	const paid = ["2026-0034", "2026-0002"]
	for (const invoiceNumber of paid) {
		await recordPayment({
			producerId: yard.producerId,
			aim: { invoiceNumber },
			reference: "",
			method: "cash",
			amountCents: 1_000,
			personId,
			paymentId: randomUUID(),
			receivedOn: "2026-08-13",
		})
	}
	const page = (after: string | null) =>
		listInvoices({ producerId: yard.producerId, storeId: shop.storeId, filter: "all", today: TODAY, after })
	const first = await page(null)
	expect(first.invoices).toHaveLength(30)
	const second = await page(first.next)
	expect(second.next).toBeNull()
	const open = numbers.filter((number) => !paid.includes(number)).toReversed()
	expect([...first.invoices, ...second.invoices].map(({ number }) => number)).toEqual([...open, ...paid])
	expect((await page("nonsense")).invoices).toEqual(first.invoices)
})

test("the list is narrowed to what is owed, late or paid, and to one store", async () => {
	const yard = await openYard()
	const shop = await openStore(yard)
	const late = await addInvoice(yard, shop, { sequence: 1, totalCents: 1_000, dueOn: "2026-08-27" })
	const due = await addInvoice(yard, shop, { sequence: 2, totalCents: 1_000, dueOn: TODAY })
	const others = await addInvoice(yard, await openStore(yard), { sequence: 3, totalCents: 1_000, dueOn: TODAY })
	const list = async (filter: InvoiceFilter, storeId: string | null) => {
		const page = await listInvoices({ producerId: yard.producerId, storeId, filter, today: TODAY, after: null })
		return page.invoices.map(({ number }) => number)
	}
	expect(await list("open", null)).toEqual([others, due, late])
	expect(await list("late", null)).toEqual([late])
	expect(await list("paid", null)).toEqual([])
	expect(await list("all", shop.storeId)).toEqual([due, late])
})
