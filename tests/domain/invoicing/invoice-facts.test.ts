import { describe, expect, test } from "vitest"
import {
	type InvoiceFacts,
	invoiceParties,
	invoiceSlip,
	linesByOrder,
	openCents,
	settledParts,
} from "~/domain/invoicing/invoice-facts"

const invoice: InvoiceFacts = {
	number: "2026-0012",
	store: { name: "Pantry & Plume", contactName: "Rosa Quill", address: "12 Carder Street" },
	order: { number: "318", placedOn: "2026-08-13" },
	poNumbers: "4471",
	delivered: { on: "2026-08-18", netWeight: "57 lb 9 oz" },
	due: { on: "2026-09-17", termsWords: "2 % off within 10 days, net 30 days" },
	discount: { basisPoints: 200, cents: 1860, untilOn: "2026-08-28" },
	waysToPay: "Card, bank or check",
	lines: [{ casesSent: 3 }, { casesSent: 5 }],
	totalCents: 93_000,
	paidCents: 0,
}

describe("what an invoice says", () => {
	test("names the store's own number, the discount and the day", () => {
		expect(invoiceParties(invoice).map(({ name }) => name)).toEqual([
			"Pantry & Plume",
			"Tuesday, August 18",
			"Thursday, September 17",
		])
		expect(invoiceParties(invoice)[0]?.facts).toContain("Your number: 4471")
		expect(invoiceParties(invoice)[1]?.facts).toEqual(["8 cases", "57 lb 9 oz of comb, net"])
		expect(invoiceParties(invoice)[2]?.facts).toContain("2 % off, $18.60, if paid by August 28")
	})

	test("the slip asks for less while the discount may be taken, and for the whole after it", () => {
		expect(invoiceSlip(invoice)?.slice(2)).toEqual([
			{ head: "By August 28", value: "$911.40" },
			{ head: "By September 17", value: "$930.00" },
		])
		expect(invoiceSlip({ ...invoice, discount: null })?.slice(2)).toEqual([
			{ head: "By September 17", value: "$930.00" },
		])
	})

	test("takes off what was credited, discounted, paid and written off, each on its own line", () => {
		const settled = {
			...invoice,
			paidCents: 50_000,
			creditedCents: 9_300,
			discountTakenCents: 1_674,
			writtenOffCents: 100,
		}
		expect(settledParts(settled)).toEqual([
			{ label: "Credited", cents: -9_300 },
			{ label: "Discount for paying early", cents: -1_674 },
			{ label: "Paid, thank you", cents: -50_000 },
			{ label: "Written off", cents: -100 },
		])
		expect(openCents(settled)).toBe(31_926)
	})

	test("asks for nothing and has no slip once it is settled, and says paid only of what was paid", () => {
		const paid = { ...invoice, paidCents: 93_000 }
		expect(invoiceSlip(paid)).toBeNull()
		expect(invoiceParties(paid)[2]?.facts).toEqual(["This invoice is paid."])
		expect(invoiceParties({ ...invoice, creditedCents: 93_000 })[2]?.facts).toEqual(["This invoice is settled."])
	})

	test("puts the lines of several orders under the order that each fills", () => {
		const orders = [
			{ number: "318", placedOn: "2026-08-13", deliveredOn: "2026-08-18", poNumber: "4471" },
			{ number: "325", placedOn: "2026-08-20", deliveredOn: "2026-08-25", poNumber: null },
		]
		const lines = [
			{ id: 1, orderNumber: "318" },
			{ id: 2, orderNumber: "318" },
			{ id: 3, orderNumber: "325" },
		]
		expect(linesByOrder(lines, orders).map(({ head, lines: of }) => [head, of.map(({ id }) => id)])).toEqual([
			["Order 318, delivered Tuesday, August 18, your number 4471", [1, 2]],
			["Order 325, delivered Tuesday, August 25", [3]],
		])
		expect(linesByOrder(lines, orders.slice(0, 1))).toEqual([{ head: null, lines }])
		expect(invoiceParties({ ...invoice, orders, delivered: { from: "2026-08-18", on: "2026-08-25" } })[1]).toEqual({
			group: "Delivered",
			name: "August 18 to August 25",
			facts: ["2 orders, 8 cases"],
		})
	})
})
