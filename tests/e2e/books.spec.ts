import { readFile } from "node:fs/promises"
import { expect, type Page, test } from "@playwright/test"
import Papa from "papaparse"
import { askDatabase, DESK, expectNoFindings, IDA, untilHydrated, visitAs, watchFaults } from "./desk-visits"

/** Saves what a link sends and answers its text. */
async function download(page: Page, name: string): Promise<string> {
	const [file] = await Promise.all([
		page.waitForEvent("download"),
		page.getByRole("link", { name, exact: true }).click(),
	])
	return readFile(await file.path(), "utf8")
}

/** Debits and credits of a file of entries, in cents, and how many lines it has. */
function sumsOf(file: string): { debits: number; credits: number; lines: number } {
	const { data } = Papa.parse<Record<string, string>>(file.replace("\uFEFF", "").trimEnd(), { header: true })
	const sum = (column: string) => data.reduce((all, row) => all + Math.round(Number(row[column]) * 100), 0)
	return { debits: sum("Debit"), credits: sum("Credit"), lines: data.length }
}

const money = (cents: number) => new Intl.NumberFormat("en-US", { minimumFractionDigits: 2 }).format(cents / 100)

const began = new Date()
let names: unknown

/** Other walks write into days long ago: what was closed here is opened again by the owner of the schema. */
test.beforeAll(async () => {
	const [row] = await askDatabase<{ names: unknown }>("select json_agg(a) as names from book_accounts a")
	names = row?.names ?? []
})
test.afterAll(async () => {
	await askDatabase("delete from book_closings where closed_at >= $1", [began])
	await askDatabase("delete from audit_entries where subject_type = 'book closing' and at >= $1", [began])
	await askDatabase("delete from book_accounts")
	await askDatabase("insert into book_accounts select * from json_populate_recordset(null::book_accounts, $1)", [
		JSON.stringify(names),
	])
})

test("the owner reads the books of a month, hands the bookkeeper a file that balances, names an account, and closes the first days for good", async ({
	browser,
}) => {
	const page = await visitAs(browser, IDA)
	const faults = watchFaults(page)
	const [first] = await askDatabase<{ on: string; month: string; until: string }>(
		`select min(issued_on)::text as on, to_char(min(issued_on), 'YYYY-MM-01') as month,
			(date_trunc('month', min(issued_on)) + interval '1 month - 1 day')::date::text as until from invoices`,
	)
	if (!first) throw new Error("the demo has no invoice")

	await page.goto(`${DESK}/books?from=${first.month}&to=${first.until}`)
	await untilHydrated(page)
	await expect(page.getByRole("heading", { level: 1 })).toHaveText("Books")
	await expect(page.getByText("balances", { exact: true })).toBeVisible()
	const checks = page.locator(".books-checks .verdict")
	await expect(checks.first()).toHaveText("agree")
	await expectNoFindings(page)

	const file = await download(page, "All entries (CSV)")
	const { debits, credits, lines } = sumsOf(file)
	expect(lines).toBeGreaterThan(0)
	expect(debits).toBe(credits)
	await expect(page.locator(".books-balance tfoot")).toContainText(money(debits))

	await page.getByRole("link", { name: "Names of accounts" }).click()
	await page.getByLabel("Name of Sales", { exact: true }).fill("Comb sold")
	await page.getByLabel("Number of Sales", { exact: true }).fill("8400")
	await page.getByRole("button", { name: "Save the names" }).click()
	await expect(page.getByRole("status")).toContainText("Saved.")
	await expectNoFindings(page)

	await page.getByRole("link", { name: "Back to the books" }).click()
	await page.getByRole("link", { name: "Close the books" }).click()
	await page.getByLabel("Close until").fill(first.on)
	await page.getByRole("button", { name: "See what is open until then" }).click()
	await expect(page).toHaveURL(new RegExp(`until=${first.on}`))
	await expectNoFindings(page)
	await page.getByRole("button", { name: /^Close the books until/ }).click()
	await expect(page.getByRole("status")).toContainText("Closed until")

	const closed = await download(page, "CSV")
	expect(sumsOf(closed).debits).toBe(sumsOf(closed).credits)
	expect(closed).toContain("8400,Comb sold")
	await askDatabase("update book_accounts set name = 'Renamed afterwards'")
	expect(await download(page, "CSV")).toBe(closed)
	await expect(
		askDatabase(
			`insert into payments (producer_id, store_id, method, amount_cents, received_on)
			select producer_id, id, 'cash', 100, $1 from stores limit 1`,
			[first.on],
		),
	).rejects.toThrow(/the books are closed/)

	expect(faults).toEqual([])
	await page.goto(`${DESK}/books/close?until=${first.on}`)
	await expect(page.getByRole("alert")).toContainText("already. Choose a later day.")
	await expect(page.getByRole("button", { name: /^Close the books until/ })).toHaveCount(0)
})

test("what was sold stands by week, product, place and store, and each figure is a file", async ({ browser }) => {
	const page = await visitAs(browser, IDA)
	const faults = watchFaults(page)
	await page.goto(`${DESK}/figures`)
	await untilHydrated(page)
	await expect(page.getByRole("heading", { level: 1 })).toHaveText("What was sold")
	await expectNoFindings(page)
	for (const title of ["By week", "By product", "Stores and stall", "By store", "The crop of these days"]) {
		const [file] = await Promise.all([
			page.waitForEvent("download"),
			page.getByRole("link", { name: `${title} as a CSV file` }).click(),
		])
		expect((await readFile(await file.path(), "utf8")).split("\r\n").length, title).toBeGreaterThan(2)
	}
	const [year] = await askDatabase<{ cents: string }>(
		`select sum(lines_cents)::text as cents from invoices where kind = 'goods' and issued_on >= date_trunc('year', (select max(issued_on) from invoices))`,
	)
	await page.getByText("Each place").click()
	await expect(page.getByRole("region", { name: "Sales by way of selling" })).toContainText(money(Number(year?.cents)))
	await page.getByRole("link", { name: "12 weeks" }).click()
	await expect(page).toHaveURL(/quiet=12/)
	expect(faults).toEqual([])
})
