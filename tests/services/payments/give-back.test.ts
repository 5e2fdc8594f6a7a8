import { randomUUID } from "node:crypto"
import { eq } from "drizzle-orm"
import { afterAll, afterEach, describe, expect, test } from "vitest"
import { bookClosings, payments } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { bouncePayment } from "~/services/payments/bounce-payment.server"
import { findPayment } from "~/services/payments/find-payment.server"
import { layOnAccount } from "~/services/payments/lay-on-account.server"
import { reconcileStripe } from "~/services/payments/reconcile-stripe.server"
import { recordPayment } from "~/services/payments/record-payment.server"
import { refundPayment } from "~/services/payments/refund-payment.server"
import { addHand } from "../desk/desk-steps"
import { findOutbox, openStore, openYard, type Yard } from "../orders/place-yard"
import {
	addInvoice,
	applyAll,
	bankSays,
	GOOD_CARD,
	openCardPage,
	readAccount,
	startPaymentService,
	typeCard,
} from "./paying"

const service = await startPaymentService()
afterAll(service.close)
afterEach(() => {
	service.fake.reset()
	service.taken.length = 0
})

async function paidByCard(totalCents = 40_000) {
	const yard = await openYard()
	const shop = await openStore(yard)
	const number = await addInvoice(yard, shop, { sequence: 1, totalCents })
	await typeCard(await openCardPage(yard, shop, number), GOOD_CARD)
	await applyAll(service)
	const [payment] = await paymentsOf(yard)
	if (!payment) throw new Error("nothing was paid")
	const personId = await addHand()
	const refund = (amountCents: number, returnId: string = randomUUID()) =>
		refundPayment({
			...{ producerId: yard.producerId, paymentId: payment.id, returnId, amountCents, personId },
			reason: "Two cases were not as ordered.",
			today: "2026-08-13",
		})
	return { yard, shop, number, payment, refund, personId }
}

const paymentsOf = (yard: Yard) =>
	readProducer(yard.producerId, (tx) => tx.select().from(payments).where(eq(payments.producerId, yard.producerId)))

describe("a refund through Stripe", () => {
	test("opens the invoice again by so much, tells who paid, and never gives back more than was paid", async () => {
		const { yard, shop, refund } = await paidByCard()
		expect(await refund(15_000)).toEqual({ ok: true, state: "answered" })
		await applyAll(service)
		expect(await readAccount(yard)).toEqual({
			open: [15_000],
			discount: [0],
			payments: ["card 40000 settled settled 25000 returned 15000"],
			onAccountCents: 0,
			returns: ["refund done 15000"],
		})
		const letters = (await findOutbox(yard.producerId)).filter(({ template }) => template === "payment-refunded")
		expect(letters.map(({ recipient }) => recipient)).toEqual([shop.person.email])
		expect(await refund(25_001)).toEqual({ ok: false, reason: "too-much", leftCents: 25_000 })
		expect(await refund(25_000)).toMatchObject({ ok: true })
		expect(await refund(1)).toEqual({ ok: false, reason: "too-much", leftCents: 0 })
		expect(await readAccount(yard)).toMatchObject({
			open: [40_000],
			returns: ["refund done 15000", "refund done 25000"],
		})
	})

	test("sent three times at once by the same form is one refund", async () => {
		const { yard, refund } = await paidByCard()
		const returnId = randomUUID()
		await Promise.all([refund(10_000, returnId), refund(10_000, returnId), refund(10_000, returnId)])
		await applyAll(service)
		expect(await readAccount(yard)).toMatchObject({ open: [10_000], returns: ["refund done 10000"] })
		expect(service.fake.state.refunds.size).toBe(1)
	})

	test("of two desks at once gives back no more than was paid", async () => {
		const { yard, refund } = await paidByCard()
		const answers = await Promise.all([refund(30_000), refund(30_000)])
		expect(answers.filter(({ ok }) => ok)).toHaveLength(1)
		await applyAll(service)
		expect(await readAccount(yard)).toMatchObject({ open: [30_000] })
	})

	test("into a broken line is made once; one that never reached Stripe is asked for again at night", async () => {
		const { yard, refund } = await paidByCard()
		service.fake.switch({ dropNext: { count: 1, when: "after", path: "/v1/refunds" } })
		expect(await refund(5_000)).toMatchObject({ ok: true, state: "answered" })
		service.fake.switch({ failNext: { count: 3, status: 500, path: "/v1/refunds" } })
		expect(await refund(7_000)).toEqual({ ok: true, state: "no-answer" })
		expect(await readAccount(yard)).toMatchObject({ open: [5_000], returns: ["refund done 5000", "refund asked 7000"] })
		expect(await refund(30_000)).toEqual({ ok: false, reason: "too-much", leftCents: 28_000 })
		await reconcileStripe()
		expect(await readAccount(yard)).toMatchObject({ open: [12_000], returns: ["refund done 5000", "refund done 7000"] })
		expect(service.fake.state.refunds.size).toBe(2)
	})

	test("that does not arrive settles the invoice again", async () => {
		const { yard, refund } = await paidByCard()
		await refund(15_000)
		const [made] = service.fake.state.refunds.keys()
		bankSays(service, { step: "settle-refund", refund: made ?? "", outcome: "failed" })
		await applyAll(service, "reverse")
		expect(await readAccount(yard)).toMatchObject({
			open: [0],
			payments: ["card 40000 settled settled 40000 returned 0"],
			returns: ["refund failed 15000"],
		})
	})
})

describe("a payment that the payer's bank disputes", () => {
	test("opens the invoice, and settles it again when it is won", async () => {
		const { yard, payment } = await paidByCard()
		const charge = String([...service.fake.state.charges.keys()].at(-1))
		bankSays(service, { step: "open-dispute", charge })
		await applyAll(service, "reverse")
		expect(await readAccount(yard)).toMatchObject({ open: [40_000], returns: ["dispute done 40000"] })
		const dispute = String([...service.fake.state.disputes.keys()].at(-1))
		bankSays(service, { step: "close-dispute", dispute, outcome: "won" })
		await applyAll(service, "reverse")
		expect(await readAccount(yard)).toMatchObject({
			open: [0],
			payments: ["card 40000 settled settled 40000 returned 0"],
			returns: ["dispute won 40000"],
		})
		expect(await findPayment({ producerId: yard.producerId, paymentId: payment.id })).toMatchObject({ feeCents: 1_190 })
	})

	test("stays gone when it is lost, and the page says so", async () => {
		const { yard, payment } = await paidByCard()
		bankSays(service, { step: "open-dispute", charge: String([...service.fake.state.charges.keys()].at(-1)) })
		const dispute = String([...service.fake.state.disputes.keys()].at(-1))
		bankSays(service, { step: "close-dispute", dispute, outcome: "lost" })
		await applyAll(service)
		const page = await findPayment({ producerId: yard.producerId, paymentId: payment.id })
		expect(page?.returns).toMatchObject([{ kind: "dispute", state: "done", isLost: true }])
		expect(await readAccount(yard)).toMatchObject({ open: [40_000] })
	})
})

describe("a check", () => {
	async function byCheck() {
		const yard = await openYard()
		const shop = await openStore(yard)
		const personId = await addHand()
		await addInvoice(yard, shop, { sequence: 1, totalCents: 10_000, dueOn: "2026-08-20" })
		await addInvoice(yard, shop, { sequence: 2, totalCents: 20_000, dueOn: "2026-09-20" })
		const note = (amountCents: number, told?: { number: string; cents: number }[], receivedOn = "2026-08-13") =>
			recordPayment({
				producerId: yard.producerId,
				aim: told ? { storeId: shop.storeId, told } : { storeId: shop.storeId },
				method: "cheque",
				amountCents,
				reference: "1207",
				personId,
				paymentId: randomUUID(),
				receivedOn,
			})
		return { yard, shop, personId, note }
	}

	test("for several invoices goes to each as told, and the rest to the account, from where a button lays it", async () => {
		const { yard, shop, personId, note } = await byCheck()
		expect(await note(15_000, [{ number: "2026-0002", cents: 12_000 }])).toEqual({
			ok: true,
			settledInvoices: [{ number: "2026-0002", cents: 12_000, discountCents: 0 }],
			onAccountCents: 3_000,
		})
		expect(await note(1_000, [{ number: "2026-0002", cents: 9_000 }])).toMatchObject({ reason: "told-more-than-open" })
		expect(await note(1_000, [{ number: "2026-0002", cents: 2_000 }])).toMatchObject({ reason: "told-more-than-paid" })
		const laid = await layOnAccount({ producerId: yard.producerId, storeId: shop.storeId, on: "2026-08-14", personId })
		expect(laid).toEqual({ ok: true, laidCents: 3_000 })
		expect(await readAccount(yard)).toMatchObject({ open: [7_000, 8_000], onAccountCents: 0 })
	})

	test("that bounces, or was noted wrong, opens again what it settled, once", async () => {
		const { yard, personId, note } = await byCheck()
		await note(25_000)
		const [payment] = await paymentsOf(yard)
		const bounce = (bouncedOn: string) =>
			bouncePayment({
				producerId: yard.producerId,
				paymentId: payment?.id ?? "",
				bouncedOn,
				note: "No funds",
				personId,
			})
		expect(await bounce("2026-08-12")).toEqual({ ok: false, reason: "before-it-came" })
		expect(await bounce("2026-08-20")).toEqual({ ok: true })
		expect(await bounce("2026-08-20")).toEqual({ ok: false, reason: "gone-already" })
		expect(await readAccount(yard)).toMatchObject({ open: [10_000, 20_000], returns: ["bounced done 25000"] })
	})

	test("is not noted into closed books", async () => {
		const { yard, personId, note } = await byCheck()
		await withProducer(yard.producerId, (tx) =>
			tx.insert(bookClosings).values({
				producerId: yard.producerId,
				closedUntil: "2026-07-31",
				totals: {},
				closedBy: personId,
			}),
		)
		expect(await note(1_000, undefined, "2026-07-31")).toEqual({ ok: false, reason: "books-closed" })
		expect(await note(1_000, undefined, "2026-08-01")).toMatchObject({ ok: true })
	})
})
