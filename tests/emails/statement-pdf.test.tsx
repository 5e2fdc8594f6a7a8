import { describe, expect, it } from "vitest"
import { renderStatementPdf } from "~emails/documents/statement"
import { sampleStatement } from "~emails/documents/statement-props"
import { readPdf } from "./pdf-text"

const pagesOf = async (statement: Parameters<typeof renderStatementPdf>[0]) =>
	readPdf(await renderStatementPdf(statement))

describe("the printed statement", () => {
	it("says whom it is to, every line with its balance, what is owed and how long, in text that can be read back", async () => {
		const { pages, info } = await pagesOf(sampleStatement)
		expect(pages).toHaveLength(1)
		for (const words of [
			"Larkmoor Bee Yard",
			"Pantry & Plume",
			"Brought forward",
			"Invoice 2026-0203",
			"-684.00",
			"$918.02",
			"Over 90 days late",
		]) {
			expect(pages[0]).toContain(words)
		}
		expect(info).toContain("Statement of Pantry & Plume")
	})

	it("goes over many pages with the heads on each, every line once, and what is owed on the last alone", async () => {
		const lines = Array.from({ length: 200 }, (_, index) => ({
			on: "2026-08-18",
			name: `Invoice 2026-${String(index + 1).padStart(4, "0")}`,
			note:
				index % 7 === 0
					? "A long reason that goes on and on, so that it needs a second line under the first. ".repeat(2)
					: "",
			amountCents: 100,
			balanceCents: 100 * (index + 1),
		}))
		const { pages } = await pagesOf({ ...sampleStatement, lines })
		expect(pages.length).toBeGreaterThan(5)
		for (const [index, page] of pages.entries()) {
			expect(page).toContain("Balance")
			expect(page).toContain(`Page ${index + 1} of ${pages.length}`)
			expect(page.includes("Owed")).toBe(index === pages.length - 1)
		}
		const whole = pages.join("\n")
		for (const { name } of lines) expect(whole.split(name)).toHaveLength(2)
	})

	it("stays whole with names that no typeface has, and with nothing to say", async () => {
		const odd = { ...sampleStatement, store: { name: `${"Very long name ".repeat(6)}🐝`, address: null }, lines: [] }
		const { pages } = await pagesOf(odd)
		expect(pages).toHaveLength(1)
		expect(pages[0]).toContain("Brought forward")
	})
})
