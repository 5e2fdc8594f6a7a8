import { expect, type Page, test } from "@playwright/test"
import { askDatabase, expectNoFindings, ROSA, STORE, TOBIAS, untilHydrated, visitAs, watchFaults } from "./desk-visits"

/** The row of the product with that number, and its field for cases. */
const rowOf = (page: Page, code: string) =>
	page
		.locator(".order-table")
		.getByRole("row")
		.filter({ hasText: new RegExp(`^${code}`) })
const casesOf = (page: Page, code: string) => rowOf(page, code).getByRole("textbox", { name: /^Cases of/ })

async function paste(page: Page, code: string, text: string): Promise<void> {
	await casesOf(page, code).evaluate((field, words) => {
		const clipboardData = new DataTransfer()
		clipboardData.setData("text/plain", words)
		field.dispatchEvent(new ClipboardEvent("paste", { clipboardData, bubbles: true, cancelable: true }))
	}, text)
}

const send = (page: Page) => page.getByRole("button", { name: "Send order" }).click()

async function cancel(page: Page): Promise<void> {
	await page.getByRole("button", { name: "Cancel this order" }).click()
	await expect(page.getByRole("status").first()).toContainText("is cancelled")
}

test("two columns pasted from a spreadsheet fill the sheet; the least is set by a key; the order is changed and cancelled", async ({
	browser,
}) => {
	const page = await visitAs(browser, ROSA)
	const faults = watchFaults(page)
	await page.goto(`${STORE}/sheet`)
	await untilHydrated(page)
	await paste(page, "11", "Code\tCases\r\n11\t2 cases\r\n\r\n31\t\r\n041\t3\r\n")
	await expect(casesOf(page, "11")).toHaveValue("2")
	await expect(casesOf(page, "31")).toHaveValue("")
	await expect(casesOf(page, "41")).toHaveValue("3")
	await casesOf(page, "11").focus()
	await page.keyboard.press("m")
	const least = rowOf(page, "11").getByRole("textbox", { name: /^Least you would take/ })
	await expect(least).toBeFocused()
	await page.keyboard.type("1")
	await page.keyboard.press("Enter")
	await expect(casesOf(page, "11")).toBeFocused()
	await page.keyboard.type("4")
	await expect(casesOf(page, "11")).toHaveValue("4")
	await page.keyboard.press("Control+Enter")
	await expect(page.getByRole("status").first()).toContainText("has your order")
	const number = /Order (\d+)/.exec((await page.getByRole("heading", { level: 1 }).textContent()) ?? "")?.[1]

	await page.getByRole("link", { name: "Change this order" }).click()
	await expect(page.getByText(`You are changing order ${number}.`)).toBeVisible()
	await expect(casesOf(page, "11")).toHaveValue("4")
	await expect(rowOf(page, "11").getByRole("textbox", { name: /^Least/ })).toHaveValue("1")
	await casesOf(page, "11").fill("3")
	await casesOf(page, "41").fill("")
	await page.getByRole("button", { name: "Save the change" }).click()
	await expect(page.getByRole("status").first()).toContainText(`Order ${number} is changed.`)
	await expect(page.getByRole("row", { name: /Round section, clover/ })).toContainText("324.90")
	await expect(page.getByRole("row", { name: /Cut comb/ })).toHaveCount(0)
	await expect(page.getByRole("main")).toContainText("Changed by Rosa Quill")
	await cancel(page)

	await page.getByRole("link", { name: "Order this again" }).click()
	await expect(page.getByText(`This is what you asked for in order ${number}.`)).toBeVisible()
	await expect(casesOf(page, "11")).toHaveValue("3")
	expect(faults).toEqual([])
	await page.context().close()
})

test("an uploaded list fills the sheet, and a row that names no product is given one", async ({ browser }) => {
	const page = await visitAs(browser, ROSA)
	await page.goto(`${STORE}/sheet`)
	await untilHydrated(page)
	await page.getByText("Fill it in from a list").click()
	const file = {
		name: "order.csv",
		mimeType: "text/csv",
		buffer: Buffer.from('code,cases\n11,2\nX-9,"1 case"\nX-8,4\n'),
	}
	await page.getByLabel("A CSV file of product codes and cases").setInputFiles(file)
	await page.getByRole("button", { name: "Put the list in" }).click()
	await expect(page.getByRole("heading", { name: "2 rows of the list name no product here" })).toBeVisible()
	await expect(casesOf(page, "11")).toHaveValue("2")
	await expectNoFindings(page)

	// It is not passed over in silence.
	await send(page)
	await expect(page.getByRole("alert")).toContainText("Rows of your list have no product yet.")
	await page.getByLabel("Product for row 3, X-9").selectOption({ label: "51 Chunk honey, sainfoin, 1 lb jar" })
	await page.getByLabel("Product for row 4, X-8").selectOption({ label: "Leave this row out" })
	await page.getByRole("button", { name: "Put these rows in" }).click()
	await expect(casesOf(page, "51")).toHaveValue("1")
	await expect(casesOf(page, "11")).toHaveValue("2")
	await expect(page.getByRole("heading", { name: /name no product here/ })).toHaveCount(0)
	await send(page)
	await expect(page.getByRole("status").first()).toContainText("has your order")
	await cancel(page)
	await page.context().close()
})

test("when less is free than asked, a buyer takes what is free, or waits for the rest, or takes another day", async ({
	browser,
}) => {
	test.slow()
	const page = await visitAs(browser, ROSA)
	await page.goto(`${STORE}/sheet`)
	await untilHydrated(page)
	await casesOf(page, "41").fill("900")
	await send(page)
	await expect(page.getByRole("alert")).toContainText("or take another day.")
	const free = Number(/(\d+) (?:is|are) free/.exec((await page.getByRole("alert").textContent()) ?? "")?.[1])
	expect(free).toBeGreaterThan(0)
	for (const width of [1440, 390]) {
		await page.setViewportSize({ width, height: 900 })
		expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBe(width)
		await expectNoFindings(page)
	}
	await page.setViewportSize({ width: 1440, height: 900 })
	await page.getByLabel(`Take ${free}`, { exact: true }).check()
	await send(page)
	const line = page.getByRole("row", { name: /Cut comb, clover/ })
	await expect(line.getByRole("cell").nth(2)).toHaveText(String(free))
	await cancel(page)

	await page.goto(`${STORE}/sheet`)
	await casesOf(page, "41").fill(String(free + 2))
	await page.getByLabel(`Take ${free}, wait for 2 more`).check()
	await send(page)
	await expect(line).toContainText(`${free} sure, the rest to be shared out`)
	await cancel(page)

	// Comb that comes on the day after is there for the deliveries after it, and not for this one.
	await page.goto(`${STORE}/sheet`)
	const opened = page.url().slice(-10)
	await askDatabase(
		`insert into expected_supplies (producer_id, product_id, expected_on, low_pieces, likely_pieces, high_pieces)
		select producer_id, id, $1::date + 1, 240, 240, 240 from products where code = '41'
		on conflict do nothing`,
		[opened],
	)
	await untilHydrated(page)
	// It also backs what is promised later, and so sets some of today's free: how much, the sheet says.
	await casesOf(page, "41").fill("900")
	await send(page)
	await expect(page.getByRole("alert")).toContainText("are free.")
	const now = Number(/(\d+) are free/.exec((await page.getByRole("alert").textContent()) ?? "")?.[1])
	await casesOf(page, "41").fill(String(now + 1))
	await casesOf(page, "11").fill("1")
	await send(page)
	const day = page.getByRole("button", { name: new RegExp(`has ${now + 1}$`) }).first()
	const words = ((await day.textContent()) ?? "").replace(/ has \d+$/, "")
	await day.click()
	await expect(page.getByRole("heading", { level: 1 })).toHaveText(`Order for ${words}`)
	await expect(casesOf(page, "41")).toHaveValue(String(now + 1))
	await expect(casesOf(page, "11")).toHaveValue("1")
	await send(page)
	await expect(line.getByRole("cell").nth(2)).toHaveText(String(now + 1))
	await cancel(page)
	await askDatabase(
		"delete from expected_supplies where expected_on = $1::date + 1 and low_pieces = 240 and high_pieces = 240",
		[opened],
	)
	await page.context().close()
})

test("a half-filled sheet is there on another device and for a colleague, and gone once it is started afresh", async ({
	browser,
}) => {
	const first = await visitAs(browser, ROSA)
	await first.goto(`${STORE}/sheet`)
	await untilHydrated(first)
	await casesOf(first, "31").fill("2")
	await expect(first.getByText("What you wrote is kept.")).toBeVisible()
	await first.context().close()

	const second = await visitAs(browser, ROSA)
	await second.goto(`${STORE}/sheet`)
	await expect(second.getByText("You had begun this sheet today.")).toBeVisible()
	await expect(casesOf(second, "31")).toHaveValue("2")
	const colleague = await visitAs(browser, TOBIAS)
	await colleague.goto(`${STORE}/sheet`)
	await expect(colleague.getByText("Rosa Quill wrote last on this sheet today.")).toBeVisible()
	await colleague.context().close()
	await expectNoFindings(second)
	await second.getByRole("button", { name: "Start afresh" }).click()
	await expect(casesOf(second, "31")).toHaveValue("")
	await second.reload()
	await expect(second.getByText("You had begun this sheet")).toHaveCount(0)
	await second.context().close()
})

test("without JavaScript a list is put in, the least is set, the sheet is kept for later, sent and changed", async ({
	browser,
}) => {
	const page = await visitAs(browser, ROSA, { javaScriptEnabled: false })
	await page.goto(`${STORE}/sheet`)
	await casesOf(page, "31").fill("1")
	await page.getByText("Fill it in from a list").click()
	const file = { name: "order.csv", mimeType: "text/csv", buffer: Buffer.from("11;2\n99;1\n") }
	await page.getByLabel("A CSV file of product codes and cases").setInputFiles(file)
	await page.getByRole("button", { name: "Put the list in" }).click()
	await expect(casesOf(page, "11")).toHaveValue("2")
	await expect(casesOf(page, "31")).toHaveValue("1")
	await page.getByLabel("Product for row 2, 99").selectOption({ label: "Leave this row out" })
	await page.getByRole("button", { name: "Put these rows in" }).click()
	await page.getByRole("button", { name: "Least you would take" }).click()
	await rowOf(page, "11")
		.getByRole("textbox", { name: /^Least/ })
		.fill("3")
	await page.getByRole("button", { name: "Keep for later" }).click()
	await page.goto(`${STORE}/sheet`)
	await expect(page.getByText("You had begun this sheet today.")).toBeVisible()
	await expect(casesOf(page, "11")).toHaveValue("2")
	await send(page)
	await expect(page.getByRole("alert")).toContainText("The least cannot be more than what you ask for.")
	await rowOf(page, "11")
		.getByRole("textbox", { name: /^Least/ })
		.fill("1")
	await casesOf(page, "11").press("Enter")
	await expect(page.getByRole("status").first()).toContainText("has your order")
	await page.getByRole("link", { name: "Change this order" }).click()
	await casesOf(page, "11").fill("1")
	await page.getByRole("button", { name: "Save the change" }).click()
	await expect(page.getByRole("status").first()).toContainText("is changed.")
	await cancel(page)
	await page.context().close()
})

test("amounts follow the typing hand; how fast, and how heavy the scripts are, is printed", async ({ browser }) => {
	const page = await visitAs(browser, ROSA)
	await page.goto(`${STORE}/sheet`)
	await untilHydrated(page)
	await casesOf(page, "11").focus()
	const times: number[] = []
	for (const digit of "123456789123456789") {
		const took = await page.evaluate(
			(key) =>
				new Promise<number>((answer) => {
					const field = document.activeElement
					if (!(field instanceof HTMLInputElement)) throw new Error("a field has the focus")
					const start = performance.now()
					field.value = key
					field.dispatchEvent(new Event("input", { bubbles: true }))
					requestAnimationFrame(() => setTimeout(() => answer(performance.now() - start)))
				}),
			digit,
		)
		times.push(took)
	}
	await expect(casesOf(page, "11")).toHaveValue("9")
	// Nine cases of the first product at the price from six on.
	await expect(rowOf(page, "11")).toContainText("923.40")
	const middle = times.toSorted((a, b) => a - b)[Math.floor(times.length / 2)] ?? 0
	const bytes = await page.evaluate(() =>
		performance
			.getEntriesByType("resource")
			.filter((entry): entry is PerformanceResourceTiming => entry instanceof PerformanceResourceTiming)
			.filter((entry) => entry.name.endsWith(".js"))
			.reduce((sum, entry) => sum + entry.encodedBodySize, 0),
	)
	console.log(
		`order sheet: a key is drawn in ${middle.toFixed(1)} ms at the median; scripts ${Math.round(bytes / 1000)} kB as sent`,
	)
	await page.context().close()
})
