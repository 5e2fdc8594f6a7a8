import { z } from "zod"
import { sampleGivenLines, sumsUp } from "../order-props"
import { cases, cents, charge, day, sampleYard, sentence, words, yard } from "../props"

/**
 * One line of an invoice. Cases are what left the yard; the price is of one case, at the break that was agreed, or with
 * `poundCents` of a pound of what was weighed. `sheetNumber` is the product's number on the order sheet, `reason` why the
 * line is short, where there is one, `orderNumber` the order it fills. A charge that is no product has no cases.
 */
const invoiceLine = z.object({
	sheetNumber: words.nullish(),
	productName: words,
	productNote: words.nullish(),
	lots: z.array(words).max(50),
	netWeight: words.nullish(),
	casesAsked: cases,
	casesSent: cases,
	priceCents: cents,
	poundCents: cents.nullish(),
	amountCents: cents,
	reason: sentence.nullish(),
	orderNumber: words.nullish(),
})

/** An order that an invoice is about; `poNumber` is the store's own number for it. */
const invoicedOrder = z.object({ number: words, placedOn: day, deliveredOn: day, poNumber: words.nullish() })

/**
 * Everything an invoice says. The letter, its PDF and the page in the portal are drawn from this one shape, so that they
 * cannot differ. Days are ISO days, money is cents; `delivered.at`, weights and terms are words from the domain, in the
 * producer's time zone. What has been settled so far is told apart by how; `discount` is there while it may still be
 * taken. `orders` are named where there are several; `order` and `delivered` are missing on a charge. Refused when the
 * parts do not sum to `totalCents`.
 */
export const invoiceProps = z
	.object({
		yard,
		number: words,
		issuedOn: day,
		store: z.object({ name: words, contactName: words.nullish(), address: words.nullish() }),
		order: z.object({ number: words, placedOn: day }).nullish(),
		orders: z.array(invoicedOrder).max(500).optional(),
		// Those of all orders of a month in a row.
		poNumbers: z.string().trim().min(1).max(20_000).nullish(),
		delivered: z
			.object({
				from: day.nullish(),
				on: day,
				at: words.nullish(),
				place: words.nullish(),
				netWeight: words.nullish(),
				signedBy: words.nullish(),
			})
			.nullish(),
		due: z.object({ on: day, termsWords: words }),
		discount: z.object({ basisPoints: cents, cents, untilOn: day }).nullish(),
		waysToPay: words,
		lines: z.array(invoiceLine).min(1).max(5000),
		charges: z.array(charge).max(20),
		totalCents: cents.nonnegative(),
		paidCents: cents.nonnegative(),
		creditedCents: cents.nonnegative().optional(),
		discountTakenCents: cents.nonnegative().optional(),
		writtenOffCents: cents.nonnegative().optional(),
		notes: z.array(sentence).max(5),
	})
	.refine(sumsUp, { path: ["totalCents"], message: "is not the sum of the lines and charges" })
export type InvoiceProps = z.infer<typeof invoiceProps>

/** The lines in the shape of an order's given lines: what was sent is what was given. */
export function sentLines(invoice: Pick<InvoiceProps, "lines">) {
	return invoice.lines.map(({ casesSent, ...line }) => ({ ...line, casesGiven: casesSent }))
}

const sampleLots = ["R09", "B11", "C14", "K05"]
const sampleWeights = ["18 lb 3 oz", "19 lb 10 oz", "7 lb 11 oz", "12 lb 1 oz"]

export const sampleInvoice = {
	yard: sampleYard,
	number: "1203",
	issuedOn: "2026-08-18",
	store: { name: "Pantry & Plume", contactName: "Rosa Quill", address: "12 Carder Street, Teasel County" },
	order: { number: "318", placedOn: "2026-08-13" },
	delivered: {
		on: "2026-08-18",
		at: "8:40 am",
		place: "back door",
		netWeight: "57 lb 9 oz",
		signedBy: "Rosa Quill",
	},
	due: { on: "2026-09-01", termsWords: "14 days" },
	waysToPay: "Card or check",
	lines: sampleGivenLines.lines.map(({ casesGiven, ...line }, index) => ({
		...line,
		casesSent: casesGiven,
		sheetNumber: `${index + 1}1`,
		lots: sampleLots.slice(index, index + 1),
		netWeight: sampleWeights[index],
	})),
	charges: [
		{ label: "Delivery, over the $600 minimum", cents: 0 },
		{ label: "Bought for resale: no sales tax", cents: 0 },
	],
	totalCents: 92990,
	paidCents: 0,
	notes: [
		"Every section was frozen 48 hours at 0 °F before packing. Tell us within two days of any that arrived broken; we replace it or take it off this invoice.",
	],
} satisfies InvoiceProps
