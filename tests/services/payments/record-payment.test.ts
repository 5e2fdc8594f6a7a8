import { randomUUID } from "node:crypto"
import { expect, test } from "vitest"
import { recordPayment } from "~/services/payments/record-payment.server"
import { addHand } from "../desk/desk-steps"
import { openStore, openYard } from "../orders/place-yard"
import { addInvoice, readBooks } from "./paying"

async function openInvoices() {
	const yard = await openYard()
	const shop = await openStore(yard)
	const personId = await addHand()
	const oldest = await addInvoice(yard, shop, { sequence: 1, totalCents: 10_000, dueOn: "2026-08-20" })
	const later = await addInvoice(yard, shop, { sequence: 2, totalCents: 20_000, dueOn: "2026-09-20" })
	const named = await addInvoice(yard, shop, { sequence: 3, totalCents: 30_000, dueOn: "2026-10-20" })
	await addInvoice(yard, await openStore(yard), { sequence: 4, totalCents: 99_000 })
	const note = (amountCents: number, paymentId: string = randomUUID(), invoiceNumber = named) =>
		recordPayment({
			receivedOn: "2026-08-13",
			producerId: yard.producerId,
			aim: { invoiceNumber },
			reference: "",
			method: "cheque",
			amountCents,
			personId,
			paymentId,
		})
	return { yard, note, oldest, later, named }
}

test("a check settles the invoice it names, then the store's others, the one due first before the later", async () => {
	const { yard, note, named, oldest, later } = await openInvoices()
	expect(await note(45_000)).toEqual({
		ok: true,
		settledInvoices: [
			{ number: oldest, cents: 10_000, discountCents: 0 },
			{ number: later, cents: 5_000, discountCents: 0 },
			{ number: named, cents: 30_000, discountCents: 0 },
		],
		onAccountCents: 0,
	})
	expect(await readBooks(yard)).toMatchObject({ paid: [10_000, 5_000, 30_000, 0], payments: ["cheque 45000"] })
})

test("a part payment leaves the rest open", async () => {
	const { yard, note, named } = await openInvoices()
	expect(await note(12_345)).toEqual({
		ok: true,
		settledInvoices: [{ number: named, cents: 12_345, discountCents: 0 }],
		onAccountCents: 0,
	})
	expect(await readBooks(yard)).toMatchObject({ paid: [0, 0, 12_345, 0] })
})

test("what is over when all is settled stays on the store's account, and another store's invoice is left alone", async () => {
	const { yard, note } = await openInvoices()
	expect(await note(61_500)).toMatchObject({ ok: true, onAccountCents: 1_500 })
	expect(await readBooks(yard)).toMatchObject({ paid: [10_000, 20_000, 30_000, 0], settledCents: 60_000 })
})

test("the same form sent three times at once is one payment", async () => {
	const { yard, note } = await openInvoices()
	const paymentId = randomUUID()
	const answers = await Promise.all([note(5_000, paymentId), note(5_000, paymentId), note(5_000, paymentId)])
	expect(new Set(answers.map((answer) => JSON.stringify(answer))).size).toBe(1)
	expect(await readBooks(yard)).toMatchObject({ paid: [0, 0, 5_000, 0], payments: ["cheque 5000"] })
})

test("two payments at the same moment settle an invoice together and never more than it owes", async () => {
	const { yard, note } = await openInvoices()
	await Promise.all([note(20_000), note(20_000), note(20_000), note(20_000)])
	expect(await readBooks(yard)).toMatchObject({ paid: [10_000, 20_000, 30_000, 0], settledCents: 60_000 })
})

test("an invoice of another producer, or one that is none, is refused", async () => {
	const { note } = await openInvoices()
	const elsewhere = await openInvoices()
	for (const number of ["2026-0009", "nonsense"]) {
		expect(await note(100, randomUUID(), number)).toEqual({ ok: false, reason: "no-such-invoice" })
	}
	expect(await readBooks(elsewhere.yard)).toMatchObject({ payments: [] })
})
