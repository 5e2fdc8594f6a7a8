import { describe, expect, it } from "vitest"
import { renderInvoicePdf } from "~emails/documents/invoice"
import { type InvoiceProps, sampleInvoice } from "~emails/documents/invoice-props"
import { readPdf } from "./pdf-text"

const flat = (text: string | undefined) => (text ?? "").replace(/\s+/g, " ")

function invoiceOf(lineCount: number): InvoiceProps {
	return {
		...sampleInvoice,
		lines: Array.from({ length: lineCount }, (_, index) => ({
			sheetNumber: `${index + 1}`,
			productName: `Comb number ${index + 1}`,
			lots: ["R09"],
			casesAsked: index % 25,
			casesSent: index % 25,
			priceCents: 100,
			amountCents: 100,
		})),
		charges: [],
		totalCents: lineCount * 100,
	}
}

describe("the printed invoice", () => {
	it("is one page that says who pays whom how much by when, and for what", async () => {
		const { pages } = readPdf(await renderInvoicePdf(sampleInvoice))

		expect(pages).toHaveLength(1)
		const page = flat(pages[0])
		expect(page).toContain("Larkmoor Bee Yard Invoice 1203")
		expect(page).toContain("Pantry & Plume Rosa Quill 12 Carder Street, Teasel County Your order of August 13")
		expect(page).toContain("Tuesday, September 1 14 days Card or check Quote 1203")
		expect(page).toContain(
			"21 Basswood section, clover Fancy, 13 oz, case of 12 B11 19 lb 10 oz 2 sent of 4 asked 142.50 285.00",
		)
		expect(page).toContain("To pay $929.90")
		expect(page).toContain("Basswood was short: nine stores asked for 31 cases")
		expect(page).toContain("Honey must not be fed to infants under one year.")
		expect(page).toContain("Tear here and send with a check.")
	})

	it("names itself and its author in the file, and is dated by the day of issue", async () => {
		const { info } = readPdf(await renderInvoicePdf(sampleInvoice))

		expect(info).toContain("/Title (Invoice 1203)")
		expect(info).toContain("/Author (Larkmoor Bee Yard)")
		expect(info).toContain("/CreationDate (D:20260818120000Z)")
	})

	it("repeats the column heads on every page of 200 lines, and loses none of them", async () => {
		const { pages } = readPdf(await renderInvoicePdf(invoiceOf(200)))

		expect(pages.length).toBeGreaterThan(5)
		const withLines = pages.filter((page) => page.includes("Comb number"))
		for (const page of withLines) expect(flat(page)).toContain("No. Product Lot Net weight Cases A case Amount")
		const numbers = [...pages.join("\n").matchAll(/Comb number (\d+)/g)].map((match) => Number(match[1]))
		expect(numbers).toEqual(Array.from({ length: 200 }, (_, index) => index + 1))
		for (const [index, page] of pages.entries()) expect(page).toContain(`Page ${index + 1} of ${pages.length}`)
		expect(flat(pages.at(-1))).toContain("Tear here and send with a check.")
		expect(pages.filter((page) => page.includes("Tear here"))).toHaveLength(1)
	}, 60_000)

	it("writes long names and letters beyond English whole", async () => {
		const name = "Łódź Street Cooperative for Cheese, Comb, Crème and Everything Else from Teasel Co"
		const store = { name, contactName: "Žofie Ångström", address: null }
		const { pages } = readPdf(await renderInvoicePdf({ ...sampleInvoice, store }))

		// A letter from the second typeface is a run of its own, so the blanks between runs say nothing.
		const letters = pages.join("").replace(/\s+/g, "")
		expect(letters).toContain(name.replaceAll(" ", ""))
		expect(letters).toContain("ŽofieÅngström")
	})

	it("writes Greek, Cyrillic and Vietnamese, and a question mark for what no typeface here has", async () => {
		const store = { name: "Μέλι Мёд Nguyễn \u0007蜂🐝 Shop", contactName: null, address: null }
		const { pages } = readPdf(await renderInvoicePdf({ ...sampleInvoice, store }))

		expect(pages.join("").replace(/\s+/g, "")).toContain("ΜέλιМёдNguyễn??Shop")
	})

	it("asks for nothing and has no slip once it is paid", async () => {
		const { pages } = readPdf(await renderInvoicePdf({ ...sampleInvoice, paidCents: 92990 }))

		const page = flat(pages[0])
		expect(page).toContain("To pay Nothing This invoice is paid.")
		expect(page).toContain("Paid, thank you -929.90 To pay $0.00")
		expect(page).not.toContain("Tear here")
	})

	it("shows what was weighed at the price of the pound, the store's number, and the discount with its day", async () => {
		const [first, ...others] = sampleInvoice.lines
		const weighed = { ...first, productName: "Bulk frame", netWeight: "9.751 lb (4,423 g)", poundCents: 1_250 } as const
		const { pages } = readPdf(
			await renderInvoicePdf({
				...sampleInvoice,
				lines: [weighed, ...others] as InvoiceProps["lines"],
				poNumbers: "4471",
				discount: { basisPoints: 200, cents: 1860, untilOn: "2026-08-28" },
			}),
		)

		const page = flat(pages[0])
		expect(page).toContain("Your number: 4471")
		expect(page).toContain("2 % off, $18.60, if paid by August 28")
		expect(page).toContain("9.751 lb (4,423 g) 3 sent 12.50 a lb 324.90")
		expect(page).toContain("By August 28 $911.30 By September 1 $929.90")
	})

	it("puts a line of words above the lines of each order, and takes off what was settled in each way", async () => {
		const orders = [
			{ number: "318", placedOn: "2026-08-01", deliveredOn: "2026-08-04", poNumber: "4471" },
			{ number: "325", placedOn: "2026-08-08", deliveredOn: "2026-08-11" },
		]
		const lines = sampleInvoice.lines.map((line, index) => ({ ...line, orderNumber: index < 2 ? "318" : "325" }))
		const { pages } = readPdf(
			await renderInvoicePdf({
				...sampleInvoice,
				lines,
				orders,
				delivered: { from: "2026-08-04", on: "2026-08-11" },
				creditedCents: 2_990,
				paidCents: 50_000,
			}),
		)

		const page = flat(pages.join(" "))
		expect(page).toContain("August 4 to August 11 2 orders, 8 cases")
		expect(page).toMatch(/Order 318, delivered Tuesday, August 4, your number 4471 11 Round.*Order 325, delivered/)
		expect(page).toContain("Credited -29.90 Paid, thank you -500.00 To pay $400.00")
	})

	it("draws a charge that is no product without cases, weight or care of comb", async () => {
		const charge = {
			productName: "Charge for paying late",
			lots: [],
			casesAsked: 0,
			casesSent: 0,
			priceCents: 0,
			amountCents: 1_500,
		}
		const { pages } = readPdf(
			await renderInvoicePdf({
				...sampleInvoice,
				lines: [charge],
				charges: [],
				totalCents: 1_500,
				order: null,
				delivered: null,
				notes: [],
			}),
		)

		const page = flat(pages[0])
		expect(page).toContain("Charge for paying late 15.00 To pay $15.00")
		expect(page).not.toMatch(/sent|infants|Delivered/)
	})

	it("asks for the rest when a part is paid", async () => {
		const { pages } = readPdf(await renderInvoicePdf({ ...sampleInvoice, paidCents: 90000 }))

		expect(flat(pages[0])).toContain("Paid, thank you -900.00 To pay $29.90")
		expect(flat(pages[0])).toContain("By September 1 $29.90")
	})
})
