import { eq } from "drizzle-orm"
import Stripe from "stripe"
import { afterAll, afterEach, describe, expect, test } from "vitest"
import { credits, invoices, onlinePayments, settlements, stripeEvents } from "~/db/schema"
import { withPlatform, withProducer } from "~/db/transaction.server"
import { findInvoice } from "~/services/invoicing/find-invoice.server"
import { applyStripeEvent } from "~/services/payments/apply-stripe-event.server"
import { receiveStripeEvent } from "~/services/payments/receive-stripe-event.server"
import { renderMail } from "~emails/render"
import { findOutbox, openStore, openYard } from "../orders/place-yard"
import {
	addInvoice,
	applyAll,
	DECLINED_CARD,
	GOOD_CARD,
	openCardPage,
	readAccount,
	readBooks,
	startPaying,
	startPayingParts,
	startPaymentService,
	typeCard,
} from "./paying"

const service = await startPaymentService()
const { fake } = service
afterAll(service.close)
afterEach(() => {
	fake.reset()
	service.taken.length = 0
})

async function openInvoice(totalCents = 92_990) {
	const yard = await openYard()
	const shop = await openStore(yard)
	const number = await addInvoice(yard, shop, { sequence: 1, totalCents })
	return { yard, shop, number }
}

const eventsStored = () =>
	withPlatform((tx) =>
		tx
			.select({ id: stripeEvents.id, appliedAt: stripeEvents.appliedAt, deliveries: stripeEvents.deliveries })
			.from(stripeEvents),
	)

describe("paying an invoice by card", () => {
	test("settles it once, with one receipt, when every event comes three times", async () => {
		const { yard, shop, number } = await openInvoice()
		fake.switch({ repeatEvents: 2 })
		expect(await typeCard(await openCardPage(yard, shop, number), GOOD_CARD)).toBe(303)
		await applyAll(service)
		expect(await readBooks(yard)).toEqual({
			paid: [92_990],
			payments: ["card 92990"],
			settledCents: 92_990,
			visits: ["paid"],
		})
		const receipts = (await findOutbox(yard.producerId)).filter(({ template }) => template === "payment-received")
		expect(receipts).toHaveLength(1)
		const letter = await renderMail("payment-received", receipts[0]?.props)
		expect(receipts[0]?.recipient).toBe(shop.person.email)
		expect(letter.text).toContain("$929.90")
		const stored = await eventsStored()
		expect(stored.length).toBeGreaterThan(1)
		expect(stored.every(({ appliedAt, deliveries }) => appliedAt !== null && deliveries === 3)).toBe(true)
	})

	test("settles it once when the events come in the opposite order", async () => {
		const { yard, shop, number } = await openInvoice()
		await typeCard(await openCardPage(yard, shop, number), GOOD_CARD)
		await applyAll(service, "reverse")
		expect(await readBooks(yard)).toMatchObject({ paid: [92_990], payments: ["card 92990"], visits: ["paid"] })
	})

	test("settles it once when all its events are applied at the same moment", async () => {
		const { yard, shop, number } = await openInvoice()
		await typeCard(await openCardPage(yard, shop, number), GOOD_CARD)
		await fake.idle()
		await Promise.all(
			service.taken.flatMap((eventId) => [applyStripeEvent({ eventId }), applyStripeEvent({ eventId })]),
		)
		expect(await readBooks(yard)).toMatchObject({ paid: [92_990], payments: ["card 92990"], settledCents: 92_990 })
	})

	test("settles it also when the event comes before we have written down which page was opened", async () => {
		const { yard, shop, number } = await openInvoice()
		await typeCard(await openCardPage(yard, shop, number), GOOD_CARD)
		await withProducer(yard.producerId, (tx) =>
			tx.update(onlinePayments).set({ stripeSessionId: null }).where(eq(onlinePayments.producerId, yard.producerId)),
		)
		await applyAll(service)
		expect(await readBooks(yard)).toMatchObject({ paid: [92_990], visits: ["paid"] })
	})

	test("leaves it open when the card is declined, says so in words, and takes another card on the same page", async () => {
		const { yard, shop, number } = await openInvoice()
		const url = await openCardPage(yard, shop, number)
		expect(await typeCard(url, DECLINED_CARD)).toBe(402)
		await applyAll(service)
		expect(await readBooks(yard)).toMatchObject({ paid: [0], payments: [], visits: ["declined"] })
		const page = await findInvoice({ producerId: yard.producerId, storeId: shop.storeId, number })
		expect(page).toMatchObject({ openCents: 92_990, declineMessage: "Your card was declined." })

		expect(await openCardPage(yard, shop, number)).toBe(url)
		expect(await typeCard(url, GOOD_CARD)).toBe(303)
		await applyAll(service)
		expect(await readBooks(yard)).toMatchObject({ paid: [92_990], payments: ["card 92990"], visits: ["paid"] })
		expect(await findInvoice({ producerId: yard.producerId, number })).toMatchObject({
			openCents: 0,
			declineMessage: "",
		})
	})

	test("a double click opens one page", async () => {
		const { yard, shop, number } = await openInvoice()
		const urls = await Promise.all([1, 2, 3].map(() => openCardPage(yard, shop, number)))
		expect(new Set(urls).size).toBe(1)
		expect(await readBooks(yard)).toMatchObject({ visits: ["open"] })
		expect(fake.state.sessions.size).toBe(1)
	})

	test("a page that has expired is not opened again: the next click has a new one", async () => {
		const { yard, shop, number } = await openInvoice()
		const first = await openCardPage(yard, shop, number)
		// The event about it is never delivered, so that the visit still stands as open here.
		fake.switch({ muteEvents: true })
		const [session] = fake.state.sessions.values()
		if (session) session.expires_at = 0
		const second = await openCardPage(yard, shop, number)
		expect(second).not.toBe(first)
		expect(await readBooks(yard)).toMatchObject({ visits: ["expired", "open"] })
		fake.switch({ muteEvents: false })
		expect(await typeCard(second, GOOD_CARD)).toBe(303)
		await applyAll(service)
		expect(await readBooks(yard)).toMatchObject({ paid: [92_990], visits: ["expired", "paid"] })
	})

	test("what is paid and whose event has not come is not paid a second time", async () => {
		const { yard, shop, number } = await openInvoice()
		await typeCard(await openCardPage(yard, shop, number), GOOD_CARD)
		expect(await startPaying(yard, shop, number)).toEqual({ ok: false, reason: "under-way" })
		await applyAll(service)
		expect(await startPaying(yard, shop, number)).toEqual({ ok: false, reason: "nothing-open" })
	})

	test("paid from two pages, the second payment stays on the store's account", async () => {
		const { yard, shop, number } = await openInvoice()
		const first = await openCardPage(yard, shop, number)
		// A visit given up here, while its page still stands open in another tab.
		await withProducer(yard.producerId, (tx) =>
			tx.update(onlinePayments).set({ state: "expired" }).where(eq(onlinePayments.producerId, yard.producerId)),
		)
		const second = await openCardPage(yard, shop, number)
		expect(await typeCard(second, GOOD_CARD)).toBe(303)
		expect(await typeCard(first, GOOD_CARD)).toBe(303)
		await applyAll(service)
		expect(await readBooks(yard)).toEqual({
			paid: [92_990],
			payments: ["card 92990", "card 92990"],
			settledCents: 92_990,
			visits: ["paid", "paid"],
		})
	})

	test("a second tab that pays another part closes the page of the first", async () => {
		const { yard, shop, number } = await openInvoice()
		const whole = await openCardPage(yard, shop, number)
		const part = await startPayingParts(yard, shop, [{ number, cents: 10_000 }])
		expect(await typeCard(whole, GOOD_CARD)).toBe(410)
		expect(await typeCard(part.ok ? part.url : "", GOOD_CARD)).toBe(303)
		await applyAll(service)
		expect(await readBooks(yard)).toMatchObject({
			paid: [10_000],
			payments: ["card 10000"],
			visits: ["expired", "paid"],
		})
	})

	test("of an invoice that was credited while its page stood open, what is over stays on the store's account", async () => {
		const { yard, shop, number } = await openInvoice()
		const { producerId } = yard
		const url = await openCardPage(yard, shop, number)
		await withProducer(producerId, async (tx) => {
			const [invoice] = await tx.select().from(invoices).where(eq(invoices.producerId, producerId))
			const [credit] = await tx
				.insert(credits)
				.values({
					...{ producerId, year: 2026, sequence: 1, storeId: shop.storeId, issuedOn: "2026-08-13", kind: "goodwill" },
					...{
						reason: "Six combs weep.",
						linesCents: 12_990,
						taxCents: 0,
						totalCents: 12_990,
						issuedBy: shop.person.id,
					},
				})
				.returning()
			await tx.insert(settlements).values({
				...{ producerId, invoiceId: invoice?.id ?? "", kind: "credit", creditId: credit?.id ?? "" },
				...{ amountCents: 12_990, settledOn: "2026-08-13" },
			})
		})
		expect(await typeCard(url, GOOD_CARD)).toBe(303)
		await applyAll(service)
		expect(await readAccount(yard)).toMatchObject({
			open: [0],
			payments: ["card 92990 settled settled 80000 returned 0"],
			onAccountCents: 12_990,
		})
	})

	test("another store's invoice cannot be paid, nor one that is none", async () => {
		const { yard, number } = await openInvoice()
		const stranger = await openStore(yard)
		for (const name of [number, "2026-0002", "nonsense"]) {
			expect(await startPaying(yard, stranger, name)).toEqual({ ok: false, reason: "no-such-invoice" })
		}
	})
})

describe("while the payment service is away", () => {
	test("nothing is charged, and trying again works", async () => {
		const { yard, shop, number } = await openInvoice()
		fake.switch({ failNext: { count: 3, status: 500, path: "/v1/checkout/sessions" } })
		expect(await startPaying(yard, shop, number)).toEqual({ ok: false, reason: "no-answer" })
		expect(await readBooks(yard)).toMatchObject({ paid: [0], visits: ["expired"] })
		expect(await typeCard(await openCardPage(yard, shop, number), GOOD_CARD)).toBe(303)
		await applyAll(service)
		expect(await readBooks(yard)).toMatchObject({ paid: [92_990], payments: ["card 92990"] })
	})

	test("a page whose opening was answered into a broken line is opened once", async () => {
		const { yard, shop, number } = await openInvoice()
		fake.switch({ dropNext: { count: 1, when: "after", path: "/v1/checkout/sessions" } })
		await openCardPage(yard, shop, number)
		expect(fake.state.sessions.size).toBe(1)
	})

	test("an event is applied later, and once", async () => {
		const { yard, shop, number } = await openInvoice()
		await typeCard(await openCardPage(yard, shop, number), GOOD_CARD)
		await fake.idle()
		const [eventId = ""] = service.taken
		fake.switch({ failNext: { count: 3, status: 500 } })
		await expect(applyStripeEvent({ eventId })).rejects.toThrow()
		expect(await readBooks(yard)).toMatchObject({ paid: [0], payments: [] })
		await applyStripeEvent({ eventId })
		await applyAll(service)
		expect(await readBooks(yard)).toMatchObject({ paid: [92_990], payments: ["card 92990"] })
	})
})

describe("an event at the door", () => {
	const payload = JSON.stringify({ id: "evt_forged", object: "event", type: "checkout.session.completed" })
	const header = (more: Partial<Parameters<typeof Stripe.webhooks.generateTestHeaderString>[0]>) =>
		Stripe.webhooks.generateTestHeaderString({ payload, secret: process.env.STRIPE_WEBHOOK_SECRET ?? "", ...more })
	const isStored = async () => (await eventsStored()).some(({ id }) => id === "evt_forged")

	test("with another secret's signature, none, or one of other words is turned away, and nothing is stored", async () => {
		expect(await receiveStripeEvent(payload, header({ secret: "whsec_another" }))).toBe(false)
		expect(await receiveStripeEvent(payload, null)).toBe(false)
		expect(await receiveStripeEvent(`${payload} `, header({}))).toBe(false)
		expect(await isStored()).toBe(false)
	})

	test("with a signature of six minutes ago is turned away, and nothing is stored", async () => {
		const timestamp = Math.floor(Date.now() / 1000) - 360
		expect(await receiveStripeEvent(payload, header({ timestamp }))).toBe(false)
		expect(await isStored()).toBe(false)
	})

	test("about something that is not ours is marked and left", async () => {
		const foreign = JSON.stringify({
			id: "evt_foreign",
			object: "event",
			type: "charge.refunded",
			livemode: false,
			data: { object: { id: "ch_1", object: "charge", metadata: {} } },
		})
		const signature = Stripe.webhooks.generateTestHeaderString({
			payload: foreign,
			secret: process.env.STRIPE_WEBHOOK_SECRET ?? "",
		})
		expect(await receiveStripeEvent(foreign, signature)).toBe(true)
		await applyStripeEvent({ eventId: "evt_foreign" })
		expect((await eventsStored()).find(({ id }) => id === "evt_foreign")?.appliedAt).toBeInstanceOf(Date)
	})
})
