import { randomUUID } from "node:crypto"
import { expect, type Page, test } from "@playwright/test"
import { e2eAddresses } from "../setup/e2e-addresses"
import { ask, expectFits, expectNoFaults, marketDay, signIn, stockOf, untilHydrated } from "./stall-market"

const SHOP = "/shop/larkmoor"
const row = (page: Page, name: string) => page.getByRole("listitem").filter({ hasText: name })

/** What a browser that keeps nothing gets of the shop. */
async function answerOf(path: string, headers: Record<string, string> = {}) {
	const answer = await fetch(`${e2eAddresses().web}${path}`, { headers })
	return { status: answer.status, tag: answer.headers.get("etag"), html: await answer.text(), headers: answer.headers }
}

/** Sells one piece for cash as the volunteer's phone does. */
async function sellOne(page: Page, dayId: string, productId: string): Promise<void> {
	const { web } = e2eAddresses()
	const answer = await page.request.post(`${web}/stall/larkmoor/${dayId}/cash`, {
		form: { sale: randomUUID(), [`n-${productId}`]: "1", given: "100.00" },
		headers: { Origin: web },
		maxRedirects: 0,
	})
	expect(answer.status()).toBe(302)
}

async function productOf(code: string): Promise<string> {
	const [product] = await ask<{ id: string }>(
		"select p.id from products p join producers y on y.id = p.producer_id where y.slug = 'larkmoor' and p.code = $1",
		[code],
	)
	return product?.id ?? ""
}

test("the shop lists what is in season with what is left, for the day that is chosen", async ({ page }) => {
	const faults: string[] = []
	page.on("pageerror", (error) => faults.push(error.message))
	page.on("console", (message) => message.type() === "error" && faults.push(message.text()))
	const stock = await stockOf(await marketDay("Coopers Green Market"))
	await page.goto(`${e2eAddresses().web}${SHOP}`)
	await untilHydrated(page)
	await expect(page.getByRole("heading", { level: 1 })).toHaveText("The clover comb is off the hives.")
	const { left = 0, gone = 0 } = stock.Round ?? {}
	await expect(row(page, "Round section, clover")).toContainText(
		gone > 0 ? `${left} of ${left + gone} left` : `${left} left`,
	)
	await expect(row(page, "Round section, clover")).toContainText("$14.00")
	await expect(page.getByText("Honey must not be given to infants under one year.")).toBeVisible()

	await page
		.getByRole("navigation", { name: "At market" })
		.getByRole("link", { name: /Lantern Wharf/ })
		.click()
	await expect(row(page, "Round section, clover")).toContainText("24 left")
	await expect(page).toHaveURL(/\?day=/)
	expect(faults).toEqual([])
})

test("the shop is never stale: each sale and each price shows in the very next answer, under another tag", async ({
	page,
}) => {
	const dayId = await marketDay("Coopers Green Market")
	const productId = await productOf("42")
	await signIn(page, "june@larkmoor.example.test")
	const tags = new Set([(await answerOf(SHOP)).tag])
	for (let sale = 0; sale < 3; sale += 1) {
		await sellOne(page, dayId, productId)
		const { left = 0, gone = 0 } = (await stockOf(dayId))["Half piece"] ?? {}
		const { tag, html } = await answerOf(SHOP)
		expect(html).toContain(`${left} of ${left + gone} left`)
		tags.add(tag)
	}
	expect(tags.size).toBe(4)

	const price = "update products set piece_cents = $2 where id = $1"
	try {
		await ask(price, [productId, 1_155])
		expect((await answerOf(SHOP)).html).toContain("$11.55")
	} finally {
		await ask(price, [productId, 950])
	}
	expect((await answerOf(SHOP)).html).not.toContain("$11.55")
})

test("the same shop is the same bytes under the same strong tag, and 304 for who has them", async () => {
	const [first, second] = [await answerOf(SHOP), await answerOf(SHOP)]
	expect(first.tag).toMatch(/^"[^"]+"$/)
	expect(second.tag).toBe(first.tag)
	expect(second.html).toBe(first.html)
	const again = await answerOf(SHOP, { "If-None-Match": first.tag ?? "" })
	expect(again).toMatchObject({ status: 304, html: "", tag: first.tag })
	const policy = first.headers.get("content-security-policy") ?? ""
	expect(policy).toMatch(/script-src 'self' 'sha256-/)
	expect(`${policy}${first.html}`).not.toContain("nonce")
	expect(first.headers.get("set-cookie")).toBeNull()
	for (const unknown of ["/shop/nobody-here", `${SHOP}/anything`, "/shop/Larkmoor%20"])
		expect((await answerOf(unknown)).status, unknown).toBe(404)
	for (const odd of [`${SHOP}?day=${randomUUID()}`, `${SHOP}?day=tomorrow`, `${SHOP}?x=1`])
		expect((await answerOf(odd)).status, odd).toBe(200)
})

for (const width of [1440, 390]) {
	test(`the public pages fit a screen of ${width} px and axe finds nothing on them`, async ({ page }) => {
		await page.setViewportSize({ width, height: 844 })
		const { web } = e2eAddresses()
		for (const path of ["/", SHOP]) {
			await page.goto(`${web}${path}`)
			await untilHydrated(page)
			await expectNoFaults(page)
		}
		await signIn(page, "kit@nettleandquince.example.test")
		await page.goto(`${web}/open-a-desk`)
		await untilHydrated(page)
		await expectNoFaults(page)
	})
}

test("long names, nothing left and nothing in season leave a page that fits and says so", async ({ page }) => {
	await page.setViewportSize({ width: 390, height: 844 })
	const shop = `${e2eAddresses().web}/shop/tansy-knoll`
	const askTheirs = <Row extends Record<string, unknown>>(text: string, values: unknown[]) =>
		ask<Row>(text, values, "tansy-knoll")
	const [yard] = await ask<{ id: string; name: string }>("select id, name from producers where slug = 'tansy-knoll'")
	const before = await askTheirs<{ id: string; name: string; reserve_pieces: number }>(
		"select id, name, reserve_pieces from products where producer_id = $1",
		[yard?.id],
	)
	const long = "Zwischenwabenhonigrundscheibe".repeat(3).slice(0, 80)
	try {
		await askTheirs("update producers set name = $2 where id = $1", [yard?.id, long])
		await askTheirs("update products set name = $2, reserve_pieces = 0 where producer_id = $1", [yard?.id, long])
		await page.goto(shop)
		await untilHydrated(page)
		await expect(page.getByText("none for this day").first()).toBeVisible()
		await expectNoFaults(page)
		await page.setViewportSize({ width: 1440, height: 900 })
		await expectFits(page)
		await askTheirs("update products set is_active = false where producer_id = $1", [yard?.id])
		await page.reload()
		await untilHydrated(page)
		await expect(page.getByText("Nothing is in season just now.")).toBeVisible()
		await expectFits(page)
	} finally {
		await askTheirs("update producers set name = $2 where id = $1", [yard?.id, yard?.name])
		for (const { id, name, reserve_pieces } of before)
			await askTheirs("update products set name = $2, reserve_pieces = $3, is_active = true where id = $1", [
				id,
				name,
				reserve_pieces,
			])
	}
})

test.describe("without JavaScript", () => {
	test.use({ javaScriptEnabled: false })

	test("the shop shows another day, and leads stores to their own door", async ({ page }) => {
		await page.goto(`${e2eAddresses().web}${SHOP}`)
		await page.getByRole("link", { name: /Lantern Wharf/ }).click()
		await expect(row(page, "Round section, clover")).toContainText("24 left")
		await page.getByRole("link", { name: "For stores" }).click()
		await expect(page.getByLabel("E-mail address")).toBeVisible()
	})

	test("a yard opens a desk; wrong names come back with their reasons and all that was typed", async ({ page }) => {
		const { web } = e2eAddresses()
		const email = `${randomUUID()}@fallowhill.example.test`
		await ask("insert into users (email, name) values ($1, 'Hilde Marsh')", [email])
		await signIn(page, email)
		await page.goto(`${web}/`)
		await expect(page.getByRole("heading", { name: "Hilde Marsh, you are at home here" })).toBeVisible()
		await page.getByRole("link", { name: "Open a desk for your yard" }).click()
		await page.getByLabel("Name of the yard").fill("F")
		await page.getByLabel("Its name in addresses").fill("Fallow Hill!")
		await page.getByLabel("Town or county").fill("Fallow County")
		await page.getByLabel("Time zone").selectOption({ label: "Central" })
		await page.getByRole("button", { name: "Open the desk" }).click()
		await expect(page.getByRole("alert").getByRole("link")).toHaveText([
			"Write the name of your yard.",
			"Small letters, digits and single dashes only, such as larkmoor.",
		])
		await expect(page.getByLabel("Its name in addresses")).toHaveValue("Fallow Hill!")
		await expect(page.getByLabel("Town or county")).toHaveValue("Fallow County")
		await expect(page.getByLabel("Time zone")).toHaveValue("America/Chicago")
		await page.getByLabel("Name of the yard").fill("Fallow Hill Bees")
		await page.getByLabel("Its name in addresses").fill("larkmoor")
		await page.getByRole("button", { name: "Open the desk" }).click()
		await expect(page.getByRole("alert")).toContainText("Another yard has this address. Choose another one.")
		const slug = `fallow-${randomUUID().slice(0, 8)}`
		await page.getByLabel("Its name in addresses").fill(slug)
		await page.getByRole("button", { name: "Open the desk" }).click()
		await expect(page).toHaveURL(`${web}/desk/${slug}`)
		await page.goto(`${web}/shop/${slug}`)
		await expect(page.getByRole("heading", { level: 1 })).toHaveText("Fallow Hill Bees")
		await expect(page.getByText("Nothing is in season just now.")).toBeVisible()
	})
})
