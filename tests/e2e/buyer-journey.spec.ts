import { createHash, randomUUID } from "node:crypto"
import AxeBuilder from "@axe-core/playwright"
import { type APIRequestContext, expect, type Page, test } from "@playwright/test"
import pg from "pg"
import { e2eAddresses } from "../setup/e2e-addresses"

const ROSA = "rosa@pantryandplume.example.test"
const STORE = "/buy/larkmoor/pantry-and-plume"

type CaughtMail = { id: string; subject: string; text: string; to: { address: string }[] }

/** The newest letter to `to` whose subject matches; waits until the worker has sent it. */
async function letterTo(request: APIRequestContext, to: string, subject: RegExp): Promise<CaughtMail> {
	const found: CaughtMail[] = []
	await expect
		.poll(
			async () => {
				const mails: CaughtMail[] = await (await request.get(`${e2eAddresses().mail}/api/email`)).json()
				found.splice(
					0,
					found.length,
					...mails.filter((mail) => mail.to.some(({ address }) => address === to) && subject.test(mail.subject)),
				)
				return found.length
			},
			{ message: `a letter to ${to} about ${subject}`, timeout: 30_000 },
		)
		.toBeGreaterThan(0)
	const newest = found.at(-1)
	if (!newest) throw new Error("a letter has been found")
	return newest
}

/** Signs in as the product does it: by the code in the letter. */
async function signInByCode(page: Page, email: string): Promise<void> {
	const { web } = e2eAddresses()
	await page.request.delete(`${e2eAddresses().mail}/api/email/all`)
	await page.goto(`${web}/sign-in?to=${encodeURIComponent(`${STORE}/sheet`)}`)
	await page.getByLabel("E-mail address").fill(email)
	await page.getByRole("button", { name: /code/i }).click()
	const letter = await letterTo(page.request, email, /code/i)
	const code = /\b\d{6}\b/.exec(letter.text)?.[0]
	if (!code) throw new Error("the letter names the six-digit code")
	await page.getByLabel("Six-digit code").fill(code)
	await page.getByRole("button", { name: "Sign in" }).click()
	await expect(page.getByRole("heading", { level: 1, name: /^Order for/ })).toBeVisible()
}

/** Opens a page of the store's book as someone who has signed in before: with a session's row and its cookie. */
async function openAs(page: Page, email: string, path: string): Promise<void> {
	const { web, databaseUrl } = e2eAddresses()
	const token = randomUUID()
	const client = new pg.Client({ connectionString: databaseUrl })
	await client.connect()
	try {
		await client.query(
			`insert into sessions (user_id, token_hash, expires_at)
			select id, $2, now() + interval '1 day' from users where email = $1`,
			[email, createHash("sha256").update(token).digest("hex")],
		)
	} finally {
		await client.end()
	}
	await page.context().addCookies([{ name: "waxbill-session", value: token, url: web }])
	await page.goto(`${web}${STORE}${path}`)
}

const untilHydrated = (page: Page) => page.waitForSelector("html[data-hydrated]")

async function expectNoFaults(page: Page): Promise<void> {
	const { violations } = await new AxeBuilder({ page }).analyze()
	expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(" ")}`)).toEqual([])
}

/** The field of the product with that number. */
const casesOf = (page: Page, code: string) =>
	page
		.getByRole("row")
		.filter({ hasText: new RegExp(`^${code}`) })
		.getByRole("textbox")

test("a buyer signs in by the mailed code, orders by keyboard, and reads the acknowledgement", async ({ page }) => {
	const faults: string[] = []
	page.on("pageerror", (error) => faults.push(error.message))
	page.on("console", (message) => message.type() === "error" && faults.push(message.text()))
	await signInByCode(page, ROSA)
	await untilHydrated(page)
	const title = (await page.getByRole("heading", { level: 1 }).textContent()) ?? ""
	const day = title.replace("Order for ", "")

	// The first field has the focus; digits replace, arrows and Enter walk, L is last time, B goes up to the next break.
	await expect(casesOf(page, "11")).toBeFocused()
	await page.keyboard.type("1")
	await page.keyboard.type("2")
	await expect(casesOf(page, "11")).toHaveValue("12")
	await page.keyboard.press("ArrowDown")
	await page.keyboard.press("ArrowUp")
	await page.keyboard.type("2")
	await expect(casesOf(page, "11")).toHaveValue("2")
	await expect(page.getByText("One more case makes each $108.30")).toBeVisible()
	await page.keyboard.press("b")
	await expect(casesOf(page, "11")).toHaveValue("3")
	await page.keyboard.press("ArrowDown")
	await page.keyboard.press("ArrowDown")
	await page.keyboard.press("Enter")
	await expect(casesOf(page, "31")).toBeFocused()
	await page.keyboard.type("1")
	await page.keyboard.press("ArrowDown")
	await page.keyboard.press("l")
	await expect(casesOf(page, "41")).toHaveValue("2")
	// 3 × 108.30 + 132.00 + 2 × 94.00, and the way is free only from $600 on.
	await expect(page.getByText("$644.90")).toHaveCount(2)
	await expect(page.getByText("free", { exact: true }).last()).toBeVisible()
	await page.keyboard.press("Control+Enter")

	await expect(page.getByRole("status")).toContainText(`Larkmoor Bee Yard has your order`)
	await expect(page.getByRole("row", { name: /Round section, clover/ })).toContainText("324.90")
	await expect(page.getByRole("main")).toContainText(`For ${day}, waiting for Larkmoor Bee Yard to confirm.`)
	const number = /Order (\d+)/.exec((await page.getByRole("heading", { level: 1 }).textContent()) ?? "")?.[1]
	const letter = await letterTo(page.request, ROSA, /We have your order/)
	expect(letter.subject).toBe(`We have your order ${number} for ${day}`)
	expect(letter.text).toContain("$644.90")

	// It can be cancelled until the cut-off, and stands among the deliveries.
	await page.getByRole("button", { name: "Cancel this order" }).click()
	await expect(page.getByRole("status")).toContainText(`Order ${number} is cancelled.`)
	await page.getByRole("link", { name: "Deliveries", exact: true }).first().click()
	await expect(page.getByRole("row").filter({ hasText: `Order ${number}` })).toContainText("cancelled")
	expect(faults).toEqual([])
})

test("a buyer sets a standing order every other week, sees its dates, skips one and reads the letter", async ({
	page,
}) => {
	await page.request.delete(`${e2eAddresses().mail}/api/email/all`)
	await openAs(page, ROSA, "/standing")
	await untilHydrated(page)
	await page.getByLabel("How often").selectOption({ label: "every other" })
	await page.getByLabel("On which weekday").selectOption({ label: "Tuesday" })
	await page.getByLabel("Usual cases of Round section, clover, Fancy, 8 oz").fill("3")
	await page.getByLabel("Least you would take of Round section, clover, Fancy, 8 oz").fill("4")
	await page.getByLabel("Usual cases of Cut comb, clover, 4 × 4 in, 12 oz").fill("2")
	await page.getByRole("button", { name: "Set standing order" }).click()
	await expect(page.getByRole("alert")).toContainText("The least cannot be more than what is usual.")
	await page.getByLabel("Least you would take of Round section, clover, Fancy, 8 oz").fill("1")
	await page.getByRole("button", { name: "Show the dates" }).click()
	const dates = page.locator("thead th.date b")
	await expect(dates).toHaveCount(6)
	await page.getByRole("button", { name: "Set standing order" }).click()
	await expect(page.getByRole("status")).toContainText("Your standing order is set.")
	await expect(dates).toHaveCount(6)
	const shown = await dates.allTextContents()
	for (const [index, text] of shown.entries()) {
		const [at, before] = [new Date(`${text} 2001 UTC`), new Date(`${shown[index - 1] ?? ""} 2001 UTC`)]
		// A year of 365 days that is no leap year; dates over New Year come out negative by it.
		if (index > 0) expect((((at.getTime() - before.getTime()) / 86_400_000 + 365) % 365) % 14).toBe(0)
	}
	await expectNoFaults(page)

	await page.getByRole("button", { name: /^Skip/ }).nth(1).click()
	await expect(page.getByRole("button", { name: /^Put back/ })).toHaveCount(1)
	await page.getByRole("button", { name: /^Put back/ }).click()
	await expect(page.getByRole("button", { name: /^Put back/ })).toHaveCount(0)

	const letter = await letterTo(page.request, ROSA, /Your standing order/)
	expect(letter.subject).toBe("Your standing order with Larkmoor Bee Yard: every other Tuesday")
	for (const text of shown) {
		const [month = "", date = ""] = text.split(" ")
		expect(letter.text).toMatch(new RegExp(`Tuesday, ${month}[a-z]* ${date}\\b`))
	}
})

for (const width of [1440, 390]) {
	for (const part of ["sheet", "standing?add", "deliveries", "details"]) {
		test(`${part} fits a screen of ${width} px and axe finds nothing on it`, async ({ page }) => {
			await page.setViewportSize({ width, height: 844 })
			await openAs(page, ROSA, `/${part}`)
			await untilHydrated(page)
			expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBe(width)
			await expectNoFaults(page)
		})
	}
}

test("axe finds nothing on the page of an order", async ({ page }) => {
	await openAs(page, ROSA, "/deliveries")
	await page
		.getByRole("link", { name: /^Order \d+/ })
		.first()
		.click()
	await expect(page.getByRole("heading", { level: 1, name: /^Order \d+/ })).toBeVisible()
	await untilHydrated(page)
	await expectNoFaults(page)
})

test.describe("without JavaScript", () => {
	test.use({ javaScriptEnabled: false })

	test("wrong figures come back with their reasons and all that was typed; mended, they become one order", async ({
		page,
	}) => {
		await openAs(page, ROSA, "/sheet")
		const typed = { "11": "-2", "21": "1.5", "31": "1000000000", "41": "two", "42": "", "51": "2" }
		for (const [code, text] of Object.entries(typed)) await casesOf(page, code).fill(text)
		await page.getByRole("button", { name: "Send order" }).click()
		const summary = page.getByRole("alert")
		await expect(summary).toContainText("The order was not sent")
		await expect(summary.getByRole("listitem")).toHaveText([
			"11 Round section, clover: Cases cannot be less than none. Write 0 to take this line off.",
			"21 Basswood section, clover: Only whole cases are sold. Write a whole number, such as 3.",
			"31 Clear-box section, sainfoin: One line takes at most 999 cases. For more, call or write.",
			"41 Cut comb, clover: Write the number of cases in figures, such as 3.",
		])
		for (const [code, text] of Object.entries(typed)) await expect(casesOf(page, code)).toHaveValue(text)
		await expect(casesOf(page, "11")).toHaveAccessibleDescription(/Cases cannot be less than none/)

		// More than is free: said with the figure, and nothing is placed until the buyer has chosen.
		for (const code of ["11", "21", "31"]) await casesOf(page, code).fill("")
		await casesOf(page, "41").fill("900")
		await page.getByRole("button", { name: "Send order" }).click()
		await expect(summary).toContainText(
			/41 Cut comb, clover: \d+ are free\. Take \d+, wait on the list for the other \d+, or take another day\./,
		)
		await expect(casesOf(page, "51")).toHaveValue("2")
		await page.getByLabel(/^Take \d+, wait for \d+ more$/).check()
		await page.getByRole("button", { name: "Send order" }).click()
		await expect(page.getByRole("status")).toContainText("has your order")
		await expect(page.getByRole("row", { name: /Cut comb, clover/ })).toContainText("to be shared out")

		// Back and once more: the form is the same, so it is the same order.
		const address = page.url()
		await page.goBack()
		await page.getByRole("button", { name: "Send order" }).click()
		await expect(page).toHaveURL(address)
		await page.getByRole("button", { name: "Cancel this order" }).click()
		await expect(page.getByRole("status")).toContainText("is cancelled")
	})

	test("a stranger's order and a day without a delivery are not found", async ({ page }) => {
		await openAs(page, ROSA, "/details")
		const { web } = e2eAddresses()
		for (const path of ["/orders/1000000", "/orders/0", "/orders/one", "/sheet/2026-02-31", "/sheet/tomorrow"]) {
			expect((await page.goto(`${web}${STORE}${path}`))?.status(), path).toBe(404)
		}
		expect((await page.goto(`${web}/buy/larkmoor/mossgate-grocers/sheet`))?.status()).toBe(404)
	})
})
