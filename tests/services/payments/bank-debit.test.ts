import { afterAll, afterEach, expect, test } from "vitest"
import { findPayment } from "~/services/payments/find-payment.server"
import { renderMail } from "~emails/render"
import { findOutbox, openStore, openYard } from "../orders/place-yard"
import {
	addInvoice,
	applyAll,
	bankSays,
	debit,
	EMPTY_ACCOUNT,
	GOOD_ACCOUNT,
	readAccount,
	readBooks,
	startPayingParts,
	startPaymentService,
} from "./paying"

const service = await startPaymentService()
afterAll(service.close)
afterEach(() => {
	service.fake.reset()
	service.taken.length = 0
})

async function twoInvoices() {
	const yard = await openYard()
	const shop = await openStore(yard)
	const first = await addInvoice(yard, shop, { sequence: 1, totalCents: 30_000, dueOn: "2026-08-20" })
	const second = await addInvoice(yard, shop, { sequence: 2, totalCents: 50_000, dueOn: "2026-08-27" })
	const wishes = [
		{ number: first, cents: 30_000 },
		{ number: second, cents: 20_000 },
	]
	return { yard, shop, first, second, wishes }
}

test("a debit settles nothing until it has cleared, and then both invoices", async () => {
	const { yard, shop, wishes } = await twoInvoices()
	const intent = await debit(service, yard, shop, { wishes, account: GOOD_ACCOUNT })
	await applyAll(service)
	expect(await readAccount(yard)).toEqual({
		open: [30_000, 50_000],
		discount: [0, 0],
		payments: ["bank-debit 50000 on-its-way settled 0 returned 0"],
		onAccountCents: 0,
		returns: [],
	})
	bankSays(service, { step: "settle-debit", intent, outcome: "clear" })
	await applyAll(service)
	expect(await readAccount(yard)).toMatchObject({
		open: [0, 30_000],
		payments: ["bank-debit 50000 settled settled 50000 returned 0"],
	})
	const receipts = (await findOutbox(yard.producerId)).filter(({ template }) => template === "payment-received")
	expect(receipts).toHaveLength(1)
	const letter = await renderMail("payment-received", receipts[0]?.props)
	expect(letter.text).toContain("from your bank")
	expect(letter.text).toContain("Invoice 2026-0002")
})

test("what is on its way is not paid a second time meanwhile", async () => {
	const { yard, shop, first, wishes } = await twoInvoices()
	await debit(service, yard, shop, { wishes, account: GOOD_ACCOUNT })
	await applyAll(service)
	expect(await startPayingParts(yard, shop, [{ number: first, cents: 30_000 }])).toEqual({
		ok: false,
		reason: "too-much",
		number: first,
		payableCents: 0,
	})
})

test("a debit that came back before anything of it was known here leaves the invoices open, with one letter", async () => {
	const { yard, shop, wishes } = await twoInvoices()
	const intent = await debit(service, yard, shop, { wishes, account: EMPTY_ACCOUNT })
	bankSays(service, { step: "settle-debit", intent })
	await applyAll(service, "reverse")
	expect(await readAccount(yard)).toMatchObject({
		open: [30_000, 50_000],
		payments: ["bank-debit 50000 returned settled 0 returned 0"],
		onAccountCents: 0,
	})
	const letters = (await findOutbox(yard.producerId)).filter(({ template }) => template === "payment-failed")
	expect(letters.map(({ recipient }) => recipient)).toEqual([shop.person.email])
})

test("one that was known to be on its way and comes back is returned, with one letter", async () => {
	const { yard, shop, wishes } = await twoInvoices()
	const intent = await debit(service, yard, shop, { wishes, account: EMPTY_ACCOUNT })
	await applyAll(service)
	bankSays(service, { step: "settle-debit", intent })
	await applyAll(service)
	expect(await readAccount(yard)).toMatchObject({
		open: [30_000, 50_000],
		payments: ["bank-debit 50000 returned settled 0 returned 0"],
	})
	const letters = (await findOutbox(yard.producerId)).filter(({ template }) => template === "payment-failed")
	expect(letters).toHaveLength(1)
	expect(letters[0]?.recipient).toBe(shop.person.email)
	const letter = await renderMail("payment-failed", letters[0]?.props)
	expect(letter.subject).toContain("your bank returned the payment of $500.00")
	expect(letter.text).toContain("insufficient funds")
	expect(await readBooks(yard)).toMatchObject({ visits: ["declined"] })
})

test("a bank that takes a debit back after it cleared opens the invoices again", async () => {
	const { yard, shop, wishes } = await twoInvoices()
	const intent = await debit(service, yard, shop, { wishes, account: GOOD_ACCOUNT })
	bankSays(service, { step: "settle-debit", intent, outcome: "clear" })
	await applyAll(service)
	expect(await readAccount(yard)).toMatchObject({ open: [0, 30_000] })
	const charge = String(service.fake.state.intents.get(intent)?.latest_charge)
	bankSays(service, { step: "open-dispute", charge, reason: "insufficient_funds" })
	await applyAll(service)
	const account = await readAccount(yard)
	expect(account).toMatchObject({
		open: [30_000, 50_000],
		payments: ["bank-debit 50000 settled settled 0 returned 50000"],
		returns: ["bank-return done 50000"],
	})
	const letters = (await findOutbox(yard.producerId)).filter(({ template }) => template === "payment-failed")
	expect(letters).toHaveLength(1)
})

test("the discount of a debit is decided on the day it was started", async () => {
	const yard = await openYard()
	const shop = await openStore(yard)
	const today = new Date().toISOString().slice(0, 10)
	const number = await addInvoice(yard, shop, {
		sequence: 1,
		totalCents: 100_000,
		dueOn: "2036-01-01",
		// Two days of grace for the zones: what counts is that the clearing below comes later than this day.
		discountUntil: new Date(Date.parse(today) + 86_400_000).toISOString().slice(0, 10),
		discountBasisPoints: 200,
	})
	expect(await startPayingParts(yard, shop, [{ number, cents: 100_000 }], "bank-debit")).toMatchObject({
		reason: "too-much",
		payableCents: 98_000,
	})
	const intent = await debit(service, yard, shop, { wishes: [{ number, cents: 98_000 }], account: GOOD_ACCOUNT })
	bankSays(service, { step: "settle-debit", intent, outcome: "clear" })
	await applyAll(service)
	expect(await readAccount(yard)).toMatchObject({ open: [0], discount: [2_000], onAccountCents: 0 })
	const charge = String(service.fake.state.intents.get(intent)?.latest_charge)
	bankSays(service, { step: "open-dispute", charge, reason: "debit_not_authorized" })
	await applyAll(service)
	expect(await readAccount(yard)).toMatchObject({ open: [100_000], discount: [0] })
	const paymentId = (await readAccount(yard, "ids")).payments[0] ?? ""
	const page = await findPayment({ producerId: yard.producerId, paymentId })
	expect(page?.settled.map(({ kind, cents }) => [kind, cents])).toEqual([
		["payment", 98_000],
		["discount", 2_000],
		["payment", -98_000],
		["discount", -2_000],
	])
	expect(page?.returns).toMatchObject([{ kind: "bank-return", state: "done", amountCents: 98_000 }])
})
