import { randomUUID } from "node:crypto"
import { expect, test } from "vitest"
import type { WantedCredit } from "~/domain/credits/plan-credit"
import { type CreditByHand, creditByHand } from "~/services/credits/credit-by-hand.server"
import { drawCredit } from "~/services/credits/draw-credit.server"
import { findCredit } from "~/services/credits/find-credit.server"
import { listCredits } from "~/services/credits/list-credits.server"
import { answer, type Delivery, openDelivery, piecesAt, readAccounts, reported } from "../breakage/broken-steps"
import { producerOf, standOnThursday } from "../desk/desk-steps"
import { findOutbox, openStore } from "../orders/place-yard"

standOnThursday()

const credit = (delivery: Delivery, wanted: WantedCredit[], more: Partial<CreditByHand> = {}) =>
	creditByHand({
		producer: producerOf(delivery.yard),
		invoiceNumber: delivery.invoiceNumber,
		creditId: randomUUID(),
		kind: "price",
		reason: "The break for three was promised.",
		wanted,
		wholeCents: 0,
		personId: delivery.handId,
		...more,
	})

test("a price is put right by an amount off its line, once however often the form is sent, and the store is told", async () => {
	const delivery = await openDelivery()
	const { lineId, yard, shop } = delivery
	const creditId = randomUUID()
	const answers = await Promise.all([1, 2, 3].map(() => credit(delivery, [{ lineId, cents: 1_140 }], { creditId })))
	expect(new Set(answers.map((one) => JSON.stringify(one)))).toEqual(new Set(['{"ok":true,"number":"C2026-0001"}']))
	const { credits, invoices } = await readAccounts(yard)
	expect(credits).toEqual([{ number: 1, total: 1_140, settled: 1_140, kind: "price" }])
	expect(invoices).toMatchObject([{ credited: 1_140 }])
	expect(await piecesAt(yard, "waste")).toBe(0)
	const letters = (await findOutbox(yard.producerId)).filter(({ template }) => template === "credit-issued")
	expect(letters.map(({ recipient }) => recipient)).toEqual([shop.person.email])

	const number = "C2026-0001"
	const { producerId } = yard
	expect(await findCredit({ producerId, storeId: shop.storeId, number })).toMatchObject({
		totalCents: 1_140,
		settled: [{ invoiceNumber: delivery.invoiceNumber, cents: 1_140 }],
		lines: [{ pieces: 0, amountCents: 1_140 }],
	})
	const other = await openStore(yard)
	expect(await findCredit({ producerId, storeId: other.storeId, number })).toBeNull()
	expect((await listCredits({ producerId, storeId: shop.storeId, after: null })).credits).toMatchObject([{ number }])
	expect((await listCredits({ producerId, storeId: other.storeId, after: null })).credits).toEqual([])
	const pdf = await drawCredit({ producerId, storeId: shop.storeId, number })
	expect(
		Buffer.from(pdf ?? [])
			.subarray(0, 5)
			.toString(),
	).toBe("%PDF-")
})

test("credits never come to more than the invoice, by line and in all, whoever asks at once", async () => {
	const delivery = await openDelivery()
	const { lineId, yard } = delivery
	const [invoice] = (await readAccounts(yard)).invoices
	const total = invoice?.total ?? 0
	expect(await credit(delivery, [{ lineId, pieces: 25 }])).toEqual({
		ok: false,
		reason: "line-exceeded",
		lines: [{ lineId, leftPieces: 24, leftCents: 22_800 }],
	})
	const many = await Promise.all(
		[1, 2, 3, 4].map(() => credit(delivery, [{ lineId, pieces: 10 }], { kind: "quantity" })),
	)
	expect(many.filter(({ ok }) => ok)).toHaveLength(2)
	expect(await credit(delivery, [], { kind: "goodwill", wholeCents: total - 19_000 + 1 })).toEqual({
		ok: false,
		reason: "invoice-exceeded",
		leftCents: total - 19_000,
		askedCents: total - 19_000 + 1,
	})
	expect(await credit(delivery, [], { kind: "goodwill", wholeCents: total - 19_000 })).toMatchObject({ ok: true })
	expect(await credit(delivery, [{ lineId, pieces: 1 }])).toMatchObject({ reason: "invoice-exceeded", leftCents: 0 })
	expect(await credit(delivery, [])).toEqual({ ok: false, reason: "nothing-to-credit" })
	const { invoices, credits } = await readAccounts(yard)
	expect(invoices).toEqual([{ total, open: 0, credited: total }])
	expect(credits.map(({ number }) => number)).toEqual([1, 2, 3])
})

test("broken comb is credited at the price that was put right before", async () => {
	const delivery = await openDelivery()
	await credit(delivery, [{ lineId: delivery.lineId, cents: 2_400 }])
	await answer(delivery, await reported(delivery, 6), 6)
	const { credits } = await readAccounts(delivery.yard)
	// $228.00 less $24.00 is $8.50 for each of 24 pieces.
	expect(credits.map(({ total }) => total)).toEqual([2_400, 5_100])
})

test("an invoice of another producer is as good as none", async () => {
	const delivery = await openDelivery()
	expect(await credit(delivery, [], { invoiceNumber: "2026-0999", wholeCents: 100 })).toEqual({
		ok: false,
		reason: "no-such-invoice",
	})
})
