import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { expect, test } from "vitest"
import { withProducer } from "~/db/transaction.server"
import { findReport } from "~/services/breakage/find-report.server"
import { findWhereBroken } from "~/services/breakage/find-where-broken.server"
import { recordPayment } from "~/services/payments/record-payment.server"
import { standOnThursday } from "../desk/desk-steps"
import { findOutbox } from "../orders/place-yard"
import { answer, type Delivery, openDelivery, piecesAt, readAccounts, reported } from "./broken-steps"

standOnThursday()

const lettersOf = async ({ yard }: Delivery, template: string) =>
	(await findOutbox(yard.producerId)).filter((letter) => letter.template === template)

async function expectBooksHold(delivery: Delivery) {
	const { lots, invoices, credits } = await readAccounts(delivery.yard)
	for (const lot of lots) expect(lot).toMatchObject({ placed: lot.harvested, least: expect.any(Number) })
	expect(lots.every(({ least }) => least >= 0)).toBe(true)
	const credited = credits.reduce((sum, { total }) => sum + total, 0)
	expect(credited).toBeLessThanOrEqual(invoices.reduce((sum, { total }) => sum + total, 0))
	return { invoices, credits }
}

test("accepting all issues a credit at the price of a piece, takes it off the invoice and writes the pieces off", async () => {
	const delivery = await openDelivery()
	const reportId = await reported(delivery, 5)
	const [before] = (await readAccounts(delivery.yard)).invoices
	expect(await answer(delivery, reportId, 5, "")).toEqual({ ok: true, creditNumber: "C2026-0001", missingPieces: 0 })

	// $114.00 a case of twelve is $9.50 a piece.
	const { invoices, credits } = await expectBooksHold(delivery)
	expect(credits).toEqual([{ number: 1, total: 4_750, settled: 4_750, kind: "breakage" }])
	expect(invoices).toEqual([{ total: before?.total, open: (before?.total ?? 0) - 4_750, credited: 4_750 }])
	expect([await piecesAt(delivery.yard, "sold"), await piecesAt(delivery.yard, "waste")]).toEqual([19, 5])
	const { producerId } = delivery.yard
	expect(await findReport({ producerId, reportId })).toMatchObject({
		state: "accepted",
		creditNumber: "C2026-0001",
		answeredBy: "Ida",
		lines: [{ acceptedPieces: 5 }],
	})
	const [letter] = await lettersOf(delivery, "credit-issued")
	expect(letter?.recipient).toBe(delivery.shop.person.email)
	expect(letter?.props).toMatchObject({ credit: { number: "C2026-0001", totalCents: 4_750, onAccountCents: 0 } })
	const days = { producerId, from: "2026-08-01", to: "2026-08-31" }
	const broken = { sentPieces: 24, brokenPieces: 5 }
	expect(await findWhereBroken({ ...days, by: "lot" })).toMatchObject([{ key: delivery.lotCode, ...broken }])
	expect(await findWhereBroken({ ...days, by: "round" })).toEqual([{ key: "Town", of: "", ...broken }])
	expect(await findWhereBroken({ ...days, by: "product" })).toMatchObject([broken])
	expect(await findWhereBroken({ ...days, to: "2026-08-17", by: "round" })).toEqual([])
})

test("a part is credited with the sentence, and a report is declined only with one", async () => {
	const delivery = await openDelivery()
	const part = await reported(delivery, 5)
	expect(await answer(delivery, part, 3, "")).toEqual({ ok: false, reason: "no-sentence" })
	expect(await answer(delivery, part, 3, "Two were scratched before.")).toMatchObject({ ok: true })
	const [letter] = await lettersOf(delivery, "credit-issued")
	expect(letter?.props).toMatchObject({
		breakage: { answer: "Two were scratched before.", lines: [{ reported: 5, accepted: 3 }] },
	})
	const declined = await reported(delivery, 2)
	expect(await answer(delivery, declined, 0, "")).toEqual({ ok: false, reason: "no-sentence" })
	expect(await answer(delivery, declined, 0, "That is weeping comb.")).toEqual({
		ok: true,
		creditNumber: null,
		missingPieces: 0,
	})
	expect((await lettersOf(delivery, "breakage-declined"))[0]?.props).toMatchObject({ answer: "That is weeping comb." })
	expect(await piecesAt(delivery.yard, "waste")).toBe(3)
	await expectBooksHold(delivery)
})

test("of two people who answer at once one wins, and the other is told who did", async () => {
	const delivery = await openDelivery()
	const reportId = await reported(delivery, 5)
	const answers = await Promise.all([
		answer(delivery, reportId, 5),
		answer(delivery, reportId, 2),
		answer(delivery, reportId, 0),
	])
	expect(answers.filter(({ ok }) => ok)).toHaveLength(1)
	for (const refused of answers.filter(({ ok }) => !ok))
		expect(refused).toMatchObject({ reason: "answered-already", by: "Ida" })
	const { credits } = await expectBooksHold(delivery)
	expect(credits.length).toBeLessThanOrEqual(1)
})

test("what an invoice does not owe any more stays on the store's account", async () => {
	const delivery = await openDelivery()
	const [before] = (await readAccounts(delivery.yard)).invoices
	const paid = { method: "cheque" as const, personId: delivery.handId, paymentId: randomUUID() }
	await recordPayment({
		producerId: delivery.yard.producerId,
		aim: { invoiceNumber: delivery.invoiceNumber },
		reference: "",
		amountCents: (before?.total ?? 0) - 1_000,
		receivedOn: "2026-08-19",
		...paid,
	})
	await answer(delivery, await reported(delivery, 5), 5)
	const { invoices, credits } = await expectBooksHold(delivery)
	expect(invoices).toMatchObject([{ open: 0, credited: 1_000 }])
	expect(credits).toMatchObject([{ total: 4_750, settled: 1_000 }])
})

test("a payment at the same moment as an answer leaves the invoice settled to the cent", async () => {
	const delivery = await openDelivery()
	const [before] = (await readAccounts(delivery.yard)).invoices
	const reportId = await reported(delivery, 24)
	await Promise.all([
		answer(delivery, reportId, 24),
		recordPayment({
			producerId: delivery.yard.producerId,
			aim: { invoiceNumber: delivery.invoiceNumber },
			reference: "",
			method: "cash",
			amountCents: before?.total ?? 0,
			receivedOn: "2026-08-19",
			personId: delivery.handId,
			paymentId: randomUUID(),
		}),
	])
	const { invoices, credits } = await expectBooksHold(delivery)
	expect(invoices).toMatchObject([{ open: 0 }])
	expect(credits).toMatchObject([{ total: 22_800 }])
})

test("all pieces of a line, reported and accepted bit by bit, are credited with exactly the line", async () => {
	const delivery = await openDelivery()
	for (const pieces of [1, 7, 3, 13]) await answer(delivery, await reported(delivery, pieces), pieces)
	const { credits } = await expectBooksHold(delivery)
	expect(credits.map(({ number }) => number)).toEqual([1, 2, 3, 4])
	expect(credits.reduce((sum, { total }) => sum + total, 0)).toBe(22_800)
	expect([await piecesAt(delivery.yard, "sold"), await piecesAt(delivery.yard, "waste")]).toEqual([0, 24])
})

test("pieces that the ledger has no longer as sold are credited, said, and not written off below zero", async () => {
	const delivery = await openDelivery()
	const reportId = await reported(delivery, 5)
	const { producerId } = delivery.yard
	await withProducer(producerId, (tx) =>
		tx.execute(sql`
			insert into stock_moves (producer_id, lot_id, from_place, from_ref, to_place, pieces, reason)
			select producer_id, lot_id, 'sold', place_ref, 'ready', pieces - 3, 'came back' from stock_balances
			where producer_id = ${producerId} and place = 'sold' and pieces > 0`),
	)
	expect(await answer(delivery, reportId, 5)).toMatchObject({ ok: true, missingPieces: 2 })
	expect([await piecesAt(delivery.yard, "sold"), await piecesAt(delivery.yard, "waste")]).toEqual([0, 3])
	await expectBooksHold(delivery)
})

test("nothing of an answer is kept when it cannot be finished: no number, no credit, no piece moved, no letter", async () => {
	const delivery = await openDelivery()
	const reportId = await reported(delivery, 5)
	const { producerId } = delivery.yard
	await withProducer(producerId, (tx) =>
		tx.execute(
			sql`insert into book_closings (producer_id, closed_until, totals, closed_by) values (${producerId}, '2026-12-31', '{}', ${delivery.handId})`,
		),
	)
	expect(await answer(delivery, reportId, 5)).toEqual({ ok: false, reason: "books-closed" })
	expect(await piecesAt(delivery.yard, "waste")).toBe(0)
	expect((await readAccounts(delivery.yard)).credits).toEqual([])
	expect(await lettersOf(delivery, "credit-issued")).toEqual([])
	expect(await findReport({ producerId, reportId })).toMatchObject({ state: "open", lines: [{ acceptedPieces: null }] })
})

test("a report of another producer, and more pieces than were reported, are refused", async () => {
	const delivery = await openDelivery()
	const elsewhere = await openDelivery()
	const reportId = await reported(delivery, 5)
	expect(await answer({ ...elsewhere, yard: elsewhere.yard }, reportId, 5)).toEqual({
		ok: false,
		reason: "no-such-report",
	})
	expect(await answer(delivery, reportId, 6)).toMatchObject({ ok: false, reason: "too-many-pieces" })
})
