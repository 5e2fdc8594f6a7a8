import { expect, type Page, test } from "@playwright/test"
import { readPdf } from "../emails/pdf-text"
import { openInbox } from "./auth-mails"
import {
	askDatabase,
	DESK,
	expectNoFindings,
	IDA,
	ROSA,
	STORE,
	untilHydrated,
	visitAs,
	watchFaults,
} from "./desk-visits"

/** Days on which the demo has nothing, so that what is sent here is all there is. */
const SENT_DAY = "2031-03-04"
const MONTH_DAY = "2031-04-08"

/** Orders of Pantry & Plume for a day, of two cases of round sections each; the last may be priced by weight. */
async function addOrders(
	day: string,
	state: "packed" | "sent",
	orders: { number: number; poNumber?: string; poundCents?: number }[],
): Promise<void> {
	for (const { number, poNumber = "", poundCents = null } of orders) {
		await askDatabase(
			`with o as (
				insert into orders (producer_id, number, store_id, delivery_on, state, po_number, placed_by)
				select s.producer_id, $1, s.id, $2, $3, $4, (select id from users where email = $5)
				from stores s where s.slug = 'pantry-and-plume' returning producer_id, id)
			insert into order_lines
				(producer_id, order_id, product_id, asked_cases, given_cases, case_cents, pieces_per_case, pound_cents)
			select o.producer_id, o.id, p.id, 2, 2, 10830, p.pieces_per_case, $6 from o
			join products p on p.producer_id = o.producer_id and p.code = '11'`,
			[number, day, state, poNumber, ROSA, poundCents],
		)
	}
}

const fileOf = async (page: Page, address: string) => {
	const answer = await page.request.get(address)
	expect(answer.status()).toBe(200)
	return { type: answer.headers()["content-type"], body: await answer.body() }
}
const textOf = (pdf: Buffer) => readPdf(pdf).pages.join(" ").replace(/\s+/g, " ")

test("the desk sends all that is packed for a day, reads what was refused, and has every document of what was sent", async ({
	browser,
}) => {
	test.setTimeout(180_000)
	await addOrders(SENT_DAY, "packed", [
		{ number: 990_001, poNumber: "PO 4471" },
		{ number: 990_002 },
		{ number: 990_003, poundCents: 1_250 },
	])
	const nextForRosa = await openInbox(ROSA)
	const ida = await visitAs(browser, IDA)
	const faults = watchFaults(ida)

	await test.step("one press sends them, and a page says how far it is and what stays", async () => {
		await ida.goto(`${DESK}/packing?day=${SENT_DAY}`)
		await untilHydrated(ida)
		await expectNoFindings(ida)
		await ida.getByRole("button", { name: "Send all 3 packed, with their invoices" }).click()
		await expect(ida.getByRole("heading", { level: 1 })).toHaveText(/^Sending for /)
		await expect(ida.getByText("Two orders were sent; one order could not be")).toBeVisible({ timeout: 60_000 })
		await expect(ida.getByRole("status").filter({ hasText: "of them refused" })).toContainText("3 of 3 orders, 1")
		await expect(ida.getByRole("row", { name: /990003/ })).toContainText("sold by weight and was not weighed")
		await expectNoFindings(ida)
	})

	const invoice = ida.getByRole("row", { name: /990001/ }).getByRole("link", { name: /^\d{4}-\d{4,}$/ })
	const number = (await invoice.textContent()) ?? ""
	await test.step("its invoice is there as page, as PDF and as UBL, and has gone to the store", async () => {
		await invoice.click()
		await expect(ida.getByRole("heading", { level: 1, name: `Invoice ${number}` })).toBeVisible()
		await expect(ida.getByText("Your number: PO 4471")).toBeVisible()
		await expectNoFindings(ida)
		const xml = await fileOf(ida, `${DESK}/invoices/${number}.xml`)
		expect(xml.type).toContain("application/xml")
		expect(xml.body.toString()).toContain(`<cbc:ID>${number}</cbc:ID>`)
		expect(xml.body.toString()).toContain("<cbc:ID>PO 4471</cbc:ID>")
		expect(textOf((await fileOf(ida, `${DESK}/invoices/${number}.pdf`)).body)).toContain(`Invoice ${number}`)
		const numbers = [(await nextForRosa()).subject, (await nextForRosa()).subject]
		expect(numbers.filter((subject) => subject.includes(`invoice ${number},`))).toHaveLength(1)
	})

	await test.step("its packing slip says what is in which case, and no price", async () => {
		await ida.goto(`${DESK}/orders/990001/packing-slip`)
		await expect(ida.getByRole("heading", { level: 1, name: "Packing slip 990001" })).toBeVisible()
		await expect(ida.getByRole("main")).not.toContainText("$")
		await expectNoFindings(ida)
		const slip = textOf((await fileOf(ida, `${DESK}/orders/990001/packing-slip.pdf`)).body)
		expect(slip).toContain("Packing slip 990001")
		expect(slip).toContain("2 cases")
	})

	await test.step("the store has the same files, and only its own", async () => {
		const rosa = await visitAs(browser, ROSA)
		const xml = await fileOf(rosa, `${STORE}/invoices/${number}.xml`)
		expect(xml.body.toString()).toContain("Pantry &amp; Plume")
		const other = await rosa.request.get(`${STORE}/invoices/2001-9999.xml`)
		expect(other.status()).toBe(404)
	})
	expect(faults).toEqual([])
})

test("the rate of a place is written, corrected and taken back, with nothing typed lost", async ({ browser }) => {
	const ida = await visitAs(browser, IDA, { viewport: { width: 390, height: 844 } })
	await ida.goto(`${DESK}/tax-rates`)
	await untilHydrated(ida)
	await expect(ida.getByText("Local rules decide what is taxed")).toBeVisible()
	await ida.getByLabel("Place", { exact: true }).fill("Weld Town")
	await ida.getByLabel("Rate in percent", { exact: true }).fill("seven")
	await ida.getByLabel("From", { exact: true }).fill("2031-01-01")
	await ida.getByRole("button", { name: "Write the rate" }).click()
	await expect(ida.getByLabel("Rate in percent", { exact: true })).toHaveAccessibleDescription(/percentage up to 30/)
	await expect(ida.getByLabel("Place", { exact: true })).toHaveValue("Weld Town")
	await expectNoFindings(ida)
	await ida.getByLabel("Rate in percent", { exact: true }).fill("7.25")
	await ida.getByRole("button", { name: "Write the rate" }).click()
	const row = ida.getByRole("row", { name: /Weld Town/ })
	await expect(row).toContainText("7.25 %")
	await expect(row).toContainText("to come")
	await expectNoFindings(ida)
	await row.getByRole("button", { name: /^Take back the rate of Weld Town/ }).click()
	await expect(row).toHaveCount(0)
})

test("what waits for its month can be invoiced at once, without a script", async ({ browser }) => {
	await addOrders(MONTH_DAY, "sent", [{ number: 990_011 }, { number: 990_012 }])
	const ida = await visitAs(browser, IDA, { javaScriptEnabled: false })
	await ida.goto(`${DESK}/invoices/waiting`)
	const row = ida.getByRole("row", { name: /Pantry & Plume/ })
	await expect(row).toContainText("990011")
	await row.getByRole("button", { name: "Invoice Pantry & Plume now" }).click()
	await expect(ida.getByRole("heading", { level: 1, name: /^Invoice \d{4}-\d{4,}$/ })).toBeVisible()
	await expect(ida.getByText(/^Your \d+ orders$/)).toBeVisible()
	await expect(ida.getByRole("rowheader", { name: /^Order 990012, delivered / })).toBeVisible()
	await ida.goto(`${DESK}/invoices/waiting`)
	await expect(ida.getByRole("row", { name: /Pantry & Plume/ })).toHaveCount(0)
})
