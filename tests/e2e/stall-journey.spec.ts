import { expect, type Page, test } from "@playwright/test"
import { e2eAddresses } from "../setup/e2e-addresses"
import { codeIn, openInbox } from "./auth-mails"
import {
	ask,
	expectNoFaults,
	marketDay,
	presentCard,
	READER,
	salesOf,
	signIn,
	stockOf,
	turn,
	untilHydrated,
} from "./stall-market"

const JUNE = "june@larkmoor.example.test"

test.use({ viewport: { width: 390, height: 844 }, hasTouch: true })

const more = (page: Page, name: string) => page.getByRole("button", { name: `One more ${name}`, exact: true })
const fewer = (page: Page, name: string) => page.getByRole("button", { name: `One fewer ${name}`, exact: true })
const total = (page: Page) => page.getByRole("region", { name: "Total and payment" })

/** Opens the sale at Coopers Green as the volunteer; answers the day's id. */
async function openStall(page: Page): Promise<string> {
	const dayId = await marketDay("Coopers Green Market")
	await signIn(page, JUNE)
	await page.goto(`${e2eAddresses().web}/stall/larkmoor/${dayId}`)
	return dayId
}

/** The totals page's table by product: brought, sold, left. */
async function shownPieces(page: Page): Promise<Record<string, number[]>> {
	const rows = await page
		.getByRole("row")
		.filter({ has: page.getByRole("rowheader") })
		.all()
	const pairs = rows.map(async (row) => {
		const figures = await row.getByRole("cell").allTextContents()
		return [await row.getByRole("rowheader").textContent(), figures.map(Number)] as const
	})
	return Object.fromEntries(await Promise.all(pairs))
}

const sum = (page: Page, label: string) =>
	page
		.locator(".totals-row")
		.filter({ has: page.getByText(label, { exact: false }) })
		.locator("dd")

test("a volunteer signs in by the mailed code, sees their own market days only, sells by card and for cash, and the totals agree with the stock", async ({
	page,
}) => {
	const faults: string[] = []
	page.on("pageerror", (error) => faults.push(error.message))
	page.on("console", (message) => message.type() === "error" && faults.push(message.text()))
	const { web } = e2eAddresses()
	const [dayId, otherDay] = [await marketDay("Coopers Green Market"), await marketDay("Lantern Wharf Market")]

	const nextMail = await openInbox(JUNE)
	await page.goto(`${web}/stall/larkmoor`)
	await page.getByLabel("E-mail address").fill(JUNE)
	await page.getByRole("button", { name: /code/i }).click()
	await page.getByLabel("Six-digit code").fill(codeIn(await nextMail()))
	await page.getByRole("button", { name: "Sign in" }).click()
	await expect(page.getByRole("heading", { level: 1 })).toHaveText("Market days of Larkmoor Bee Yard")
	await untilHydrated(page)
	await expect(page.getByRole("main")).toContainText("Coopers Green Market")
	await expect(page.getByRole("main")).not.toContainText("Lantern Wharf")

	const before = await stockOf(dayId)
	await page.getByRole("link", { name: /^Today/ }).click()
	await expect(page.getByRole("heading", { level: 1 })).toHaveText("Coopers Green Market")
	await expect(page.getByRole("button", { name: "Take card" })).toBeDisabled()
	await more(page, "Round").click()
	await more(page, "Basswood").click()
	await more(page, "Basswood").click()
	await fewer(page, "Basswood").click()
	await expect(total(page)).toContainText("2 pieces")
	await expect(total(page)).toContainText("$32.50")
	await page.getByRole("button", { name: "Take card" }).click()
	await expect(page.getByRole("status")).toContainText("Hold out the reader. It asks for")
	await presentCard(page, "good")
	await expect(page.getByRole("status")).toContainText("Paid by card")
	await expect(page.getByRole("status")).toContainText("$32.50")

	await page.getByRole("link", { name: "Next sale" }).click()
	await more(page, "Cut comb").click()
	await page.getByRole("button", { name: "Take cash" }).click()
	await page.getByRole("button", { name: "$20", exact: true }).click()
	const giveBack = page.locator(".give-back")
	await expect(giveBack).toContainText("$3.00")
	await expect(giveBack.getByRole("listitem")).toHaveText([/three \$1 bills\s*3\.00/])
	await page.getByRole("button", { name: "Given back, next sale" }).click()
	await expect(page.getByRole("status")).toContainText("Sold for $17.00 in cash.")

	await page.getByRole("link", { name: "The day's totals" }).click()
	await expect(page.getByText("Brought, sold and left agree, piece by piece.")).toBeVisible()
	const after = await stockOf(dayId)
	const sold = { Round: 1, Basswood: 1, "Cut comb": 1 } as Record<string, number>
	for (const [name, { left, gone }] of Object.entries(before)) {
		const pieces = sold[name] ?? 0
		expect(after[name], name).toEqual({ left: left - pieces, gone: gone + pieces })
	}
	const shown = Object.entries(after).map(([name, { left, gone }]) => [name, [left + gone, gone, left]])
	expect(await shownPieces(page)).toEqual(Object.fromEntries(shown))
	const sales = await salesOf(dayId)
	const taken = (method: string) =>
		sales.filter((sale) => sale.method === method && sale.state === "paid").reduce((all, s) => all + s.total_cents, 0)
	const dollars = (cents: number) => `$${(cents / 100).toFixed(2)}`
	await expect(sum(page, "By card")).toHaveText(dollars(taken("card")))
	await expect(sum(page, "In cash")).toHaveText(dollars(taken("cash")))
	await expect(sum(page, "In the cash box")).toHaveText(dollars(8_000 + taken("cash")))
	expect(faults).toEqual([])

	// The other market's day, and a day that is none, tell nothing.
	for (const day of [otherDay, "7b0b6f3e-58a5-4c5e-9d3e-0f6c1a2b3c4d", "tomorrow"]) {
		for (const part of ["", "/cash", "/totals", "/card/7b0b6f3e-58a5-4c5e-9d3e-0f6c1a2b3c4d", "/card/last"]) {
			expect((await page.goto(`${web}/stall/larkmoor/${day}${part}`))?.status(), `${day}${part}`).toBe(404)
		}
	}
})

test("axe finds nothing on any page of the stall, and each fits the phone", async ({ page }) => {
	const dayId = await openStall(page)
	await untilHydrated(page)
	const base = `${e2eAddresses().web}/stall/larkmoor`
	await more(page, "Round").click()
	await expectNoFaults(page)
	await page.getByRole("button", { name: "Take card" }).click()
	await expect(page.getByRole("status")).toContainText("Hold out the reader")
	await expectNoFaults(page)
	await presentCard(page, "good")
	await expect(page.getByRole("status")).toContainText("Paid by card")
	await expectNoFaults(page)
	await page.getByRole("link", { name: "Next sale" }).click()
	await more(page, "Round").click()
	await page.getByRole("button", { name: "Take cash" }).click()
	await page.getByRole("button", { name: "$20", exact: true }).click()
	await expect(page.locator(".give-back")).toBeVisible()
	await expectNoFaults(page)
	for (const path of ["", `/${dayId}/totals`]) {
		await page.goto(`${base}${path}`)
		await untilHydrated(page)
		await expectNoFaults(page)
	}
})

test("a declined card is said in words and the sale stays open; another card pays it", async ({ page }) => {
	const dayId = await openStall(page)
	await untilHydrated(page)
	await more(page, "Chunk jar").click()
	await page.getByRole("button", { name: "Take card" }).click()
	await expect(page.getByRole("status")).toContainText("Hold out the reader")
	await presentCard(page, "insufficient")
	await expect(page.getByRole("alert")).toContainText("The card was refused.")
	await expect(page.getByRole("alert")).toContainText("Your card has insufficient funds.")
	await expect(page.getByRole("alert")).toContainText("Nothing was charged; the sale is still open.")
	await expectNoFaults(page)

	// It is found again from the totals, and its pieces wait.
	await page.goto(`${e2eAddresses().web}/stall/larkmoor/${dayId}/totals`)
	await expect(page.getByRole("columnheader", { name: "At card" })).toBeVisible()
	await page.getByRole("link", { name: "A card sale of $19.00 is still open, 1 piece" }).click()
	await untilHydrated(page)
	await page.getByRole("button", { name: "Try the card again" }).dblclick()
	await expect(page.getByRole("status")).toContainText("Hold out the reader")
	await presentCard(page, "good")
	await expect(page.getByRole("status")).toContainText("Paid by card")
	expect((await salesOf(dayId)).at(-1)).toMatchObject({ method: "card", state: "paid", total_cents: 1_900 })
})

test("a declined card can be followed by cash: the card's sale is given up and its pieces are sold once", async ({
	page,
}) => {
	const dayId = await openStall(page)
	await untilHydrated(page)
	const before = await stockOf(dayId)
	await more(page, "Half piece").click()
	await page.getByRole("button", { name: "Take card" }).click()
	await presentCard(page, "declined")
	await expect(page.getByRole("alert")).toContainText("The card was refused.")
	await page.getByRole("button", { name: "Take cash instead" }).click()
	await page.getByRole("button", { name: /exact/ }).click()
	await expect(page.getByText("Nothing to give back.")).toBeVisible()
	await page.getByRole("button", { name: "Paid, next sale" }).click()
	await expect(page.getByRole("status")).toContainText("Sold for $9.50 in cash.")
	expect((await salesOf(dayId)).slice(-2)).toMatchObject([
		{ method: "card", state: "given-up" },
		{ method: "cash", state: "paid", total_cents: 950 },
	])
	expect((await stockOf(dayId))["Half piece"]?.left).toBe((before["Half piece"]?.left ?? 0) - 1)
})

test("a reader that is away charges nothing, and takes the sale when it is back", async ({ page }) => {
	const dayId = await openStall(page)
	await untilHydrated(page)
	await turn(page, { readerTrouble: { [READER]: "offline" } })
	await more(page, "Round").click()
	await page.getByRole("button", { name: "Take card" }).click()
	await expect(page.getByRole("alert")).toContainText("The card reader does not answer. Nothing was charged.")
	await expectNoFaults(page)
	await page.getByRole("button", { name: "Try the card again" }).click()
	await expect(page.getByRole("alert")).toContainText("The card reader does not answer.")
	await turn(page, { readerTrouble: {} })
	await page.getByRole("button", { name: "Try the card again" }).click()
	await expect(page.getByRole("status")).toContainText("Hold out the reader")
	await page.getByRole("button", { name: "Give up the card" }).click()
	// The pieces are back, and still in hand for another way to pay.
	await expect(total(page)).toContainText("$14.00")
	expect((await salesOf(dayId)).at(-1)).toMatchObject({ method: "card", state: "given-up" })
})

test("Back and reload keep the sale; after it is sold, Back begins a new one and sells nothing twice", async ({
	page,
}) => {
	const dayId = await openStall(page)
	await untilHydrated(page)
	await more(page, "Clear-box").click()
	await more(page, "Clear-box").click()
	await more(page, "Half piece").click()
	await page.reload()
	await untilHydrated(page)
	await expect(total(page)).toContainText("3 pieces")
	await page.getByRole("button", { name: "Take cash" }).click()
	await page.getByRole("button", { name: "$50", exact: true }).click()
	await expect(page.locator(".give-back")).toContainText("$8.50")
	await page.reload()
	await expect(page.locator(".give-back")).toContainText("$8.50")
	await page.goBack()
	await expect(total(page)).toContainText("$41.50")
	await page.goForward()
	await untilHydrated(page)
	const before = await salesOf(dayId)
	await page.getByRole("button", { name: "Given back, next sale" }).dblclick()
	await expect(page.getByRole("status")).toContainText("Sold for $41.50 in cash.")
	await page.goBack()
	await expect(page.getByRole("status")).toContainText("That sale of $41.50 is taken already, in cash.")
	await expect(total(page)).toContainText("0 pieces")
	const after = await salesOf(dayId)
	expect(after.slice(before.length)).toMatchObject([{ method: "cash", total_cents: 4_150, given_cents: 5_000 }])
})

test("a double click on the card sells once", async ({ page }) => {
	const dayId = await openStall(page)
	await untilHydrated(page)
	const before = await salesOf(dayId)
	await more(page, "Clear-box").click()
	await page.getByRole("button", { name: "Take card" }).dblclick()
	await expect(page.getByRole("status")).toContainText("Hold out the reader")
	await presentCard(page, "good")
	await expect(page.getByRole("status")).toContainText("Paid by card")
	expect((await salesOf(dayId)).slice(before.length)).toMatchObject([{ method: "card", state: "paid" }])
})

test("another amount is worked out, and a wrong one is told at its field", async ({ page }) => {
	await openStall(page)
	await untilHydrated(page)
	await more(page, "Basswood").click()
	await page.getByRole("button", { name: "Take cash" }).click()
	await page.getByRole("button", { name: "Other" }).click()
	const field = page.getByLabel("Other amount")
	await expect(field).toBeFocused()
	for (const wrong of ["two tens", "-20", "20.555", "1000000"]) {
		await field.fill(wrong)
		await field.press("Enter")
		await expect(field).toHaveAccessibleDescription("Write dollars and cents, such as 60 or 49.50.")
		await expect(field).toHaveValue(wrong)
		await expect(page.getByRole("button", { name: "Paid, next sale" })).toBeDisabled()
	}
	await expectNoFaults(page)
	await field.fill("16")
	await field.press("Enter")
	await expect(page.locator(".give-back")).toContainText("2.50 more")
	await expect(page.getByRole("button", { name: "Paid, next sale" })).toBeDisabled()
	await field.fill("18.75")
	await page.getByRole("button", { name: "Work out change" }).click()
	await expect(page.locator(".give-back").getByRole("listitem")).toHaveText([/one quarter\s*0\.25/])
})

test("without signal the sale waits on the phone; with it, it goes on", async ({ page, context }) => {
	await openStall(page)
	await untilHydrated(page)
	await more(page, "Round").click()
	await context.setOffline(true)
	await expect(page.getByText("No signal: this sale waits here until it is back")).toBeVisible()
	await expect(page.getByRole("button", { name: "Take card" })).toBeDisabled()
	await expect(page.getByText("card needs signal")).toBeVisible()
	await more(page, "Round").click()
	await expect(total(page)).toContainText("$28.00")
	await expectNoFaults(page)
	await context.setOffline(false)
	await page.getByRole("button", { name: "Take cash" }).click()
	await expect(page.getByRole("heading", { level: 1 })).toHaveText("Cash")
})

test("a product that is sold out on another phone meanwhile is told, and the rest of the sale is kept", async ({
	page,
	browser,
}) => {
	const dayId = await openStall(page)
	await untilHydrated(page)
	const left = (await stockOf(dayId)).Basswood?.left ?? 0
	for (let piece = 0; piece < left; piece += 1) await more(page, "Basswood").click()
	await more(page, "Round").click()

	const other = await browser.newPage()
	await openStall(other)
	await untilHydrated(other)
	await more(other, "Basswood").click()
	await other.getByRole("button", { name: "Take cash" }).click()
	await other.getByRole("button", { name: /exact/ }).click()
	await other.getByRole("button", { name: "Paid, next sale" }).click()
	await expect(other.getByRole("status")).toContainText("Sold for $18.50 in cash.")
	await other.close()

	const before = await salesOf(dayId)
	await page.getByRole("button", { name: "Take card" }).click()
	await expect(page.getByRole("alert")).toContainText(
		left === 1 ? "No Basswood left: someone sold the rest just now." : `Only ${left - 1} of Basswood left`,
	)
	await expectNoFaults(page)
	await expect(fewer(page, "Round")).toBeVisible()
	expect(await salesOf(dayId)).toHaveLength(before.length)
})

test.describe("without JavaScript", () => {
	test.use({ javaScriptEnabled: false })

	test("a volunteer sells by card, also after a declined one, and for cash, and reads the totals", async ({ page }) => {
		const dayId = await openStall(page)
		const before = { stock: await stockOf(dayId), sales: await salesOf(dayId) }
		await more(page, "Round").click()
		await more(page, "Cut comb").click()
		await more(page, "Cut comb").click()
		await fewer(page, "Cut comb").click()
		await expect(total(page)).toContainText("2 pieces")
		await page.reload()
		await expect(total(page)).toContainText("$31.00")
		await page.getByRole("button", { name: "Take card" }).click()
		await expect(page.getByRole("status")).toContainText("Hold out the reader")
		await presentCard(page, "declined")
		await page.getByRole("button", { name: "Look whether it is paid" }).click()
		await expect(page.getByRole("alert")).toContainText("“Your card was declined.”")
		await page.getByRole("button", { name: "Try the card again" }).click()
		await page.getByRole("button", { name: "Look whether it is paid" }).click()
		await expect(page.getByRole("status")).toContainText("Hold out the reader")
		await presentCard(page, "good")
		await page.getByRole("button", { name: "Look whether it is paid" }).click()
		await expect(page.getByRole("status")).toContainText("Paid by card")

		await page.getByRole("link", { name: "Next sale" }).click()
		await more(page, "Half piece").click()
		await page.getByRole("button", { name: "Take cash" }).click()
		await page.getByRole("button", { name: "Other" }).click()
		await page.getByLabel("Other amount").fill("10.25")
		await page.getByRole("button", { name: "Work out change" }).click()
		await expect(page.locator(".give-back").getByRole("listitem")).toHaveText([/three quarters\s*0\.75/])
		await page.getByRole("button", { name: "Given back, next sale" }).click()
		await expect(page.getByRole("status")).toContainText("Sold for $9.50 in cash.")
		await page.getByRole("link", { name: "The day's totals" }).click()
		await expect(page.getByText("Brought, sold and left agree, piece by piece.")).toBeVisible()

		expect((await salesOf(dayId)).slice(before.sales.length)).toMatchObject([
			{ method: "card", state: "paid", total_cents: 3_100 },
			{ method: "cash", state: "paid", total_cents: 950, given_cents: 1_025 },
		])
		const stock = await stockOf(dayId)
		for (const name of ["Round", "Cut comb", "Half piece"])
			expect(stock[name]?.left, name).toBe((before.stock[name]?.left ?? 0) - 1)
		const lost = await ask(
			`select l.code from lots l join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
			group by l.producer_id, l.code, l.pieces_harvested having sum(b.pieces) <> l.pieces_harvested`,
		)
		expect(lost).toEqual([])
	})
})
