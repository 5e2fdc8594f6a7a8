import { expect, test } from "vitest"
import { renderCreditPdf } from "~emails/documents/credit"
import { type CreditProps, creditProps, sampleCredit } from "~emails/documents/credit-props"
import { readPdf } from "./pdf-text"

const flat = (text: string | undefined) => (text ?? "").replace(/\s+/g, " ")

test("the printed credit says what it takes off, what stays on the account, and why", async () => {
	const { pages, info } = readPdf(await renderCreditPdf(sampleCredit))
	expect(pages).toHaveLength(1)
	const page = flat(pages[0])
	expect(page).toContain("Larkmoor Bee Yard Credit C2026-0003")
	expect(page).toContain("Invoice 2026-0412 of August 18, 2026 For comb that arrived broken")
	expect(page).toContain("11 Round section, clover Fancy, 8 oz, case of 12 4 pieces 36.10")
	expect(page).toContain("Credited $47.98 Taken off invoice 2026-0412 40.00 On your account 7.98")
	expect(page).toContain("Comb that arrived broken on Tuesday, August 18.")
	expect(info).toContain("/Title (Credit C2026-0003)")
	expect(info).toContain("/CreationDate (D:20260820120000Z)")
})

test("a credit of 200 lines repeats the heads of its columns on every page, and loses none of them", async () => {
	const line = { productNote: "Fancy, 8 oz", pieces: 1, amountCents: 100 }
	const lines = Array.from({ length: 200 }, (_, index) => ({
		...line,
		sheetNumber: `${index + 1}`,
		productName: `Comb number ${index + 1}`,
	}))
	const credit: CreditProps = {
		...sampleCredit,
		lines,
		taxCents: 165,
		totalCents: 20_165,
		settled: [],
		onAccountCents: 20_165,
	}
	const { pages } = readPdf(await renderCreditPdf(credit))
	expect(pages.length).toBeGreaterThan(5)
	for (const page of pages.filter((one) => one.includes("Comb number")))
		expect(flat(page)).toContain("No. Product Pieces Amount")
	const numbers = [...pages.join("\n").matchAll(/Comb number (\d+)/g)].map((match) => Number(match[1]))
	expect(numbers).toEqual(lines.map((_, index) => index + 1))
	expect(flat(pages.at(-1))).toContain("Sales tax 1.65 Credited $201.65 On your account 201.65")
})

test("a credit whose parts do not sum is no credit", () => {
	expect(creditProps.safeParse(sampleCredit).success).toBe(true)
	expect(creditProps.safeParse({ ...sampleCredit, totalCents: 4_799 }).success).toBe(false)
	expect(creditProps.safeParse({ ...sampleCredit, onAccountCents: 797 }).success).toBe(false)
})
