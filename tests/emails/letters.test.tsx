import { describe, expect, it } from "vitest"
import { invoiceProps, sampleInvoice } from "~emails/documents/invoice-props"
import { stripCells } from "~emails/parts/strip-cells"
import { renderMail, UnwritableMailError } from "~emails/render"
import { type Template, templates } from "~emails/templates"

const names = Object.keys(templates) as (keyof typeof templates)[]
const sampleOf = (name: keyof typeof templates) => structuredClone(templates[name].sample) as Record<string, unknown>

const drawn = new Map<string, ReturnType<typeof renderMail>>()

/** The letter with its made-up data, drawn once for all tests that only look at it. */
function sampleMail(name: keyof typeof templates) {
	const mail = drawn.get(name) ?? renderMail(name, sampleOf(name))
	drawn.set(name, mail)
	return mail
}

describe.each(names)("the letter %s", (name) => {
	it("is written from its made-up data as HTML and as text, to the person it names", async () => {
		const { subject, html, text } = await sampleMail(name)

		expect(subject).toMatch(/^\S.{8,}/)
		expect(html).toContain("<title>")
		expect(html).toContain('<meta name="color-scheme" content="light only"/>')
		expect(html).toContain("max-width:600px")
		expect(text).toMatch(/Sent with Waxbill to \S+@\S+\.example\.test\.$/)
		expect(text).not.toContain("undefined")
		expect(html).not.toMatch(/undefined|NaN|\[object/)
	})

	it("asks for nothing from elsewhere: no pictures, style sheets, typefaces or scripts", async () => {
		const { html } = await sampleMail(name)

		expect(html).not.toMatch(/<(img|link|script|style|iframe|object)\b|url\(|@import|@font-face/i)
	})

	it("survives being stored as JSON in the outbox", async () => {
		const stored = JSON.parse(JSON.stringify(sampleOf(name)))

		expect((await renderMail(name, stored)).html).toBe((await sampleMail(name)).html)
	})

	it("is refused plainly, without its values, when a fact is missing as in a row of another version", async () => {
		for (const key of Object.keys(sampleOf(name))) {
			const { [key]: taken, ...rest } = sampleOf(name)
			const isOptional = (templates[name] as Template<unknown>).schema.safeParse(rest).success
			if (isOptional) continue
			const refusal = await renderMail(name, rest).catch((error: unknown) => error)
			expect(refusal).toBeInstanceOf(UnwritableMailError)
			expect(String(refusal)).toContain(key)
			expect(String(refusal)).not.toContain(String(rest.sentTo ?? taken))
		}
		expect((templates[name] as Template<unknown>).schema.safeParse({}).success).toBe(false)
	})
})

describe("what goes into a letter", () => {
	it("cannot become markup: names are escaped in HTML and plain in text", async () => {
		const storeName = `<img src=x onerror="alert(1)"> & Söhne`
		const { html, text } = await renderMail("order-confirmed", { ...sampleOf("order-confirmed"), storeName })

		expect(html).not.toContain("<img")
		expect(html).toContain("&lt;img src=x onerror=&quot;alert(1)&quot;&gt; &amp; Söhne")
		expect(text).toContain(storeName)
	})

	it("takes only web addresses as links", async () => {
		const mail = renderMail("order-confirmed", { ...sampleOf("order-confirmed"), orderUrl: "javascript:alert(1)" })

		await expect(mail).rejects.toThrow(/orderUrl/)
	})

	it("keeps a subject on one line, whatever the names hold", async () => {
		const yard = { ...sampleInvoice.yard, name: "Larkmoor\r\nBcc: all@list.example.test" }
		const { subject } = await renderMail("invitation", { ...sampleOf("invitation"), yard })

		expect(subject).toBe("Order comb from Larkmoor Bcc: all@list.example.test for Pantry & Plume")
	})

	it("leaves a store name of 80 letters whole", async () => {
		const storeName = "The Upper Teasel County Cooperative for Natural Food, Cheese, Comb and Gift Wares"
		const { html, text } = await renderMail("order-received", { ...sampleOf("order-received"), storeName })

		expect(storeName.length).toBeGreaterThanOrEqual(80)
		expect(html).toContain(storeName)
		expect(text).toContain(`For ${storeName}.`)
	})

	it("is no letter when nobody knows its name, also not one that every object has", async () => {
		await expect(renderMail("order-eaten", {})).rejects.toThrow('There is no letter named "order-eaten".')
		await expect(renderMail("toString", {})).rejects.toBeInstanceOf(UnwritableMailError)
	})

	it("answers to the producer it speaks for, and the sign-in letters to nobody", async () => {
		expect((await sampleMail("order-confirmed")).replyTo).toBe("orders@larkmoor.example.test")
		expect((await sampleMail("sign-in-code")).replyTo).toBeUndefined()
	})
})

describe("the sign-in letter", () => {
	it("carries the code and the link, and keeps the code out of the subject and the first line", async () => {
		const { subject, html, text } = await sampleMail("sign-in-code")

		expect(text).toContain("\n407193\n")
		expect(text).toContain("https://waxbill.example.test/sign-in/link?t=sample")
		expect(text).toContain("within 10 minutes")
		expect(text).toContain("If you did not ask for this, do nothing")
		expect(subject).not.toMatch(/\d/)
		expect(html.slice(0, html.indexOf("<h1"))).not.toContain("407193")
	})
})

describe("letters about an order", () => {
	it("say in one sentence why a line is short, or how much of it was given", async () => {
		const order = sampleOf("order-confirmed") as (typeof templates)["order-confirmed"]["sample"]
		const withReason = await renderMail("order-confirmed", order)
		expect(withReason.subject).toBe("Confirmed, but short: your order for Tuesday, August 18")
		expect(withReason.text).toContain("2 of 4 asked")
		expect(withReason.text).toContain("Basswood was short: nine stores asked for 31 cases and we had 18")

		const bare = { ...order, lines: order.lines.map((line) => ({ ...line, reason: null })) }
		const { text } = await renderMail("order-confirmed", bare)
		expect(text).toContain("Basswood section, clover is short: two of the four cases you asked for are yours.")
	})

	it("say that all was given when all was given", async () => {
		const order = sampleOf("order-confirmed") as (typeof templates)["order-confirmed"]["sample"]
		const full = { ...order, lines: order.lines.map((line) => ({ ...line, casesAsked: line.casesGiven })) }
		const { subject, text } = await renderMail("order-confirmed", full)

		expect(subject).toBe("Confirmed: your order for Tuesday, August 18")
		expect(text).not.toMatch(/short|asked for/)
	})

	it("keep what is to be shared out outside the sure total, and refuse a sum for it", async () => {
		const order = sampleOf("order-received") as (typeof templates)["order-received"]["sample"]
		const { text } = await renderMail("order-received", order)
		expect(text).toMatch(/Basswood section, clover +up to 4 +142\.50 +to be shared out/)
		expect(text).toMatch(/Sure total +\$527\.90/)

		const lines = order.lines.map((line) => ({ ...line, amountCents: line.toBeShared ? 57000 : line.amountCents }))
		await expect(renderMail("order-received", { ...order, lines, totalCents: 109790 })).rejects.toThrow(/lines/)
	})

	it("are refused when their parts do not add up to the sum they name", async () => {
		for (const name of ["order-received", "order-confirmed"]) {
			const order = sampleOf(name as "order-confirmed") as { totalCents: number }
			const off = renderMail(name, { ...order, totalCents: order.totalCents + 1 })
			await expect(off).rejects.toThrow(/totalCents/)
		}
		expect(invoiceProps.safeParse({ ...sampleInvoice, totalCents: 92991 }).success).toBe(false)
	})
})

describe("the invoice letter", () => {
	it("asks for the sum by the day, shows each line, and brings the printed page", async () => {
		const { subject, text, attachments } = await sampleMail("invoice")

		expect(subject).toBe("Larkmoor Bee Yard: invoice 1203, $929.90 by Tuesday, September 1")
		expect(text).toContain("Please pay $929.90 by Tuesday, September 1.")
		expect(text).toMatch(/Round section, clover +3 +108\.30 +324\.90\nFancy, 8 oz, case of 12; lot R09/)
		expect(text).toContain("Honey must not be fed to infants under one year.")
		expect(text).toContain("A mistake? Reply to this letter or call Ida at (555) 010-0142.")
		expect(attachments.map(({ filename, contentType }) => [filename, contentType])).toEqual([
			["invoice-1203.pdf", "application/pdf"],
		])
		expect(attachments[0]?.content.toString("latin1", 0, 5)).toBe("%PDF-")
	})

	it("asks only for what is open, and for nothing once it is paid", async () => {
		const letter = sampleOf("invoice") as typeof templates.invoice.sample
		const part = await renderMail("invoice", { ...letter, invoice: { ...letter.invoice, paidCents: 90000 } })
		expect(part.text).toContain("Please pay $29.90 by")
		expect(part.text).toMatch(/Paid, thank you +-900\.00/)

		const all = await renderMail("invoice", { ...letter, invoice: { ...letter.invoice, paidCents: 92990 } })
		expect(all.text).toContain("There is nothing to pay.")
		expect(all.text).not.toContain("Please pay")
	})
})

describe("the strip of a line", () => {
	it("has one cell for each case, the short ones last, in rows of ten", () => {
		expect(stripCells(2, 4).rows).toEqual([["given", "given", "short", "short"]])
		expect(stripCells(2, 4).label).toBe("2 of 4 cases")
		expect(stripCells(23, 23).rows.map((row) => row.length)).toEqual([10, 10, 3])
		expect(stripCells(0, 0).rows).toEqual([])
	})

	it("breaks at twenty over 40 cases, and over 120 draws one cell for five", () => {
		expect(stripCells(41, 41).rows.map((row) => row.length)).toEqual([20, 20, 1])
		const many = stripCells(121, 130)
		expect(many.casesPerCell).toBe(5)
		expect(many.rows.flat().filter((cell) => cell === "given")).toHaveLength(25)
		expect(many.rows.flat().filter((cell) => cell === "short")).toHaveLength(2)
	})

	it("is drawn as coloured cells with its words for those who do not see it", async () => {
		const { html, text } = await sampleMail("invoice")

		expect(html).toContain('aria-label="2 of 4 cases"')
		expect(html.match(/background:#b0660f/g)).toHaveLength(8)
		expect(html.match(/border-bottom:2px solid #952e19/g)).toHaveLength(2)
		expect(text).not.toContain("\u00a0")
	})
})
