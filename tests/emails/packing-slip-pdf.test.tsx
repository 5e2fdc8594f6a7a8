import { describe, expect, it } from "vitest"
import type { PackingSlip } from "~/domain/orders/packing-slip"
import { renderPackingSlipPdf } from "~emails/documents/packing-slip"
import { readPdf } from "./pdf-text"

const flat = (text: string | undefined) => (text ?? "").replace(/\s+/g, " ")

function slipOf(lineCount: number): PackingSlip {
	return {
		yard: {
			name: "Larkmoor Bee Yard",
			address: "Weld Lane, Teasel County",
			email: "orders@larkmoor.example.test",
			phone: null,
		},
		orderNumber: 318,
		placedOn: "2026-08-13",
		poNumber: "4471",
		deliveryOn: "2026-08-18",
		store: {
			name: "Pantry & Plume",
			address: "12 Carder Street",
			contactName: "Rosa Quill",
			receivingNote: "Back door, before 10 am",
		},
		lines: Array.from({ length: lineCount }, (_, index) => ({
			code: `${index + 1}`,
			name: `Comb number ${index + 1}`,
			detail: "Fancy, 8 oz",
			lots: [{ code: "R09", pieces: 24, bestBeforeOn: "2027-01-12" }],
			cases: 2,
			pieces: 24,
			netWeight: "12 lb",
		})),
		netWeight: `${lineCount * 12} lb`,
		note: "Leave it on the bench.",
		care: "Honey must not be fed to infants under one year.",
	}
}

describe("the printed packing slip", () => {
	it("says for whom it is, what is in it from which lot, and nothing of money", async () => {
		const { pages, info } = readPdf(await renderPackingSlipPdf(slipOf(1)))

		expect(pages).toHaveLength(1)
		const page = flat(pages[0])
		expect(page).toContain("Larkmoor Bee Yard Packing slip 318")
		expect(page).toContain("Pantry & Plume Rosa Quill 12 Carder Street Your number: 4471")
		expect(page).toContain("Your order of August 13 Back door, before 10 am")
		expect(page).toContain("2 cases 24 pieces 12 lb of comb, net")
		expect(page).toContain("1 Comb number 1 Fancy, 8 oz R09, 24 pieces, best before Jan 12 12 lb 2 cases")
		expect(page).toContain("Leave it on the bench. Honey must not be fed to infants under one year.")
		expect(page).toContain("Taken in by Day and time Broken pieces")
		expect(page).not.toContain("$")
		expect(info).toContain("/Title (Packing slip 318)")
	})

	it("repeats the column heads on every page, loses no line, and has one place to sign", async () => {
		const { pages } = readPdf(await renderPackingSlipPdf(slipOf(60)))

		expect(pages.length).toBeGreaterThan(2)
		for (const page of pages.filter((one) => one.includes("Comb number")))
			expect(flat(page)).toContain("No. Product Lot Net weight Cases")
		const numbers = [...pages.join("\n").matchAll(/Comb number (\d+)/g)].map((match) => Number(match[1]))
		expect(numbers).toEqual(Array.from({ length: 60 }, (_, index) => index + 1))
		expect(pages.filter((page) => page.includes("Taken in by"))).toHaveLength(1)
	}, 30_000)
})
