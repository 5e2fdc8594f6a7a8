import { eq } from "drizzle-orm"
import { describe, expect, test } from "vitest"
import { bookClosings, invoices, orders, producerSettings } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { sendOrder } from "~/services/orders/send-order.server"
import { addHand, packed, producerOf, standOnThursday, whereIs } from "../desk/desk-steps"
import { addProduct, openStore, openYard, type Shop, type Yard } from "../orders/place-yard"
import { addRate, agree, invoiceAt, issued, priceByWeight, taxAll } from "./invoicing-steps"

standOnThursday()

async function yardWithOrder(cases = 2) {
	const yard = await openYard()
	const shop = await openStore(yard)
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 20 })
	const number = await packed(yard, shop, personId, [round, cases])
	return {
		yard,
		shop,
		personId,
		round,
		number,
		send: () => sendOrder({ producer: producerOf(yard), number, personId }),
	}
}

describe("comb sold by weight", () => {
	test("is invoiced by what was weighed at the price of the pound, rounded once", async () => {
		const { yard, round, send } = await yardWithOrder()
		await priceByWeight(yard, round, { poundCents: 1_450, weighedGrams: 5_443 })
		expect(await send()).toEqual({ ok: true, invoiceNumber: "2026-0001" })
		const { document } = await invoiceAt(yard, "2026-0001")
		// 5,443 g ÷ 453.59237 × 14.50 = 173.9971…
		expect(document.lines[0]).toMatchObject({
			amountCents: 17_400,
			poundCents: 1_450,
			netWeight: "12.000 lb (5,443 g)",
		})
		expect(document.totalCents).toBe(17_400 + 1_800)
		expect(document.delivered?.netWeight).toBe("12 lb")
	})

	test("is not sent before it was weighed, and nothing moves", async () => {
		const { yard, round, number, send } = await yardWithOrder()
		await priceByWeight(yard, round, { poundCents: 1_450, weighedGrams: null })
		expect(await send()).toEqual({
			ok: false,
			reason: "not-weighed",
			orderNumber: number,
			productName: "Round section 11",
		})
		expect(await issued(yard)).toEqual([])
	})
})

describe("what an invoice keeps as it stood", () => {
	test("the discount with its last day, the store's own number and the terms in words", async () => {
		const { yard, shop, number, send } = await yardWithOrder()
		const terms = { termsKind: "net" as const, termsDays: 30, termsDiscountBasisPoints: 200, termsDiscountDays: 10 }
		await agree(yard, shop, terms)
		await withProducer(yard.producerId, (tx) => tx.update(orders).set({ poNumber: "4471" }))
		await send()
		await agree(yard, shop, { ...terms, termsDays: 7, termsDiscountBasisPoints: 0, termsDiscountDays: 0 })
		const { document } = await invoiceAt(yard, "2026-0001")
		expect(document).toMatchObject({
			poNumbers: "4471",
			due: { on: "2026-09-12", termsWords: "2 % off within 10 days, net 30 days" },
			// 2 % of 228.00 and 18.00 for the way.
			discount: { basisPoints: 200, cents: 492, untilOn: "2026-08-23" },
			orders: [{ number: String(number), poNumber: "4471", deliveredOn: "2026-08-18" }],
		})
	})

	test("it cannot be altered by the product, whatever it tries", async () => {
		const { yard, send } = await yardWithOrder()
		await send()
		const alter = withProducer(yard.producerId, (tx) => tx.update(invoices).set({ totalCents: 1 }))
		await expect(alter).rejects.toThrow()
		expect(await issued(yard)).toMatchObject([{ totalCents: 24_600 }])
	})
})

describe("sales tax", () => {
	const taxOf = async (yard: Yard) => {
		const { document } = await invoiceAt(yard, "2026-0001")
		return document.charges.at(-1)
	}
	const taxed = async (prepare: (yard: Yard, shop: Shop) => Promise<void>) => {
		const order = await yardWithOrder()
		await taxAll(order.yard)
		await prepare(order.yard, order.shop)
		return { ...order, answer: await order.send() }
	}

	test("goes by the producer's own rate where the store names no place", async () => {
		const { yard } = await taxed(async ({ producerId }) => {
			await withProducer(producerId, (tx) =>
				tx
					.update(producerSettings)
					.set({ salesTaxBasisPoints: 600 })
					.where(eq(producerSettings.producerId, producerId)),
			)
		})
		expect(await taxOf(yard)).toEqual({ label: "Sales tax, 6 %", cents: 1_368 })
	})

	test("goes by the latest rate of the store's place that has begun", async () => {
		const { yard } = await taxed(async (open, shop) => {
			await addRate(open, "Teasel County", "2026-01-01", 700)
			await addRate(open, "Teasel County", "2026-08-13", 725)
			await addRate(open, "Teasel County", "2026-08-14", 900)
			await agree(open, shop, { taxPlace: "Teasel County" })
		})
		expect(await taxOf(yard)).toEqual({ label: "Sales tax, Teasel County, 7.25 %", cents: 1_653 })
	})

	test("is not guessed where the place has no rate: the order stays", async () => {
		const { yard, answer } = await taxed((open, shop) => agree(open, shop, { taxPlace: "Weld Town" }))
		expect(answer).toEqual({ ok: false, reason: "no-tax-rate", place: "Weld Town" })
		expect(await issued(yard)).toEqual([])
	})

	test("is not charged on the last day of a resale certificate, and is on the next", async () => {
		const holding = await taxed(async (open, shop) => {
			await addRate(open, "Teasel County", "2026-01-01", 725)
			await agree(open, shop, { taxPlace: "Teasel County", resaleCertificateUntil: "2026-08-13" })
		})
		expect(await taxOf(holding.yard)).toEqual({ label: "Bought for resale: no sales tax", cents: 0 })
		const expired = await taxed(async (open, shop) => {
			await addRate(open, "Teasel County", "2026-01-01", 725)
			await agree(open, shop, { taxPlace: "Teasel County", resaleCertificateUntil: "2026-08-12" })
		})
		expect(await taxOf(expired.yard)).toMatchObject({ cents: 1_653 })
	})
})

test("nothing is invoiced on a day whose books are closed, and the pieces stay packed", async () => {
	const { yard, personId, send } = await yardWithOrder()
	const closing = { producerId: yard.producerId, closedUntil: "2026-08-31", totals: {}, closedBy: personId }
	// biome-ignore lint/suspicious/noExplicitAny: the totals of a closing say nothing here
	await withProducer(yard.producerId, (tx) => tx.insert(bookClosings).values(closing as any))
	expect(await send()).toEqual({ ok: false, reason: "books-closed", until: "2026-08-31" })
	const { rows } = await withProducer(yard.producerId, (tx) =>
		tx.execute<{ id: string }>("select id from lots order by id"),
	)
	expect(await whereIs(yard, rows[0]?.id ?? "")).toContain("packed 24")
})
