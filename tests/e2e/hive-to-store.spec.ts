import { type Browser, expect, type Page, test } from "@playwright/test"
import { e2eAddresses } from "../setup/e2e-addresses"
import { linkIn, openInbox } from "./auth-mails"
import {
	askDatabase,
	DESK,
	expectNoFindings,
	hurryLetters,
	IDA,
	ROSA,
	STORE,
	untilHydrated,
	visitAs,
	watchFaults,
} from "./desk-visits"
import { noteShares, openForm, PHONE } from "./yard-round"

const WILF = "wilf@larkmoor.example.test"
const ZONE = "America/New_York"

/** Round sections, clover, Fancy: 12 pieces to the case, 8 oz (226 g) by the label. */
const PRODUCT = { code: "11", case: 12, labelGrams: 226.796 }

type Super = { id: string; name: string; yardId: string; productId: string }

/** A super of round sections at Larkmoor that is still on its hive and not yet ready. */
async function someSuper(): Promise<Super> {
	const [found] = await askDatabase<Super>(
		`select s.id, s.product_id as "productId", h.yard_id as "yardId", 'Hive ' || h.label || ', super ' || s.level as name
		from supers s
		join hives h on h.producer_id = s.producer_id and h.id = s.hive_id
		join products p on p.producer_id = s.producer_id and p.id = s.product_id
		cross join lateral (select c.capped_percent from super_checks c where c.producer_id = s.producer_id and c.super_id = s.id
			order by c.checked_on desc limit 1) seen
		where p.code = $1 and s.state = 'on' and seen.capped_percent between 1 and 80
		order by seen.capped_percent desc limit 1`,
		[PRODUCT.code],
	)
	if (!found) throw new Error("the demo has a super of round sections that is filling")
	return found
}

/** Cases on the sheet's strip for the product: released, and held until they are proven. */
async function promisedNow(rosa: Page): Promise<{ free: number; held: number; words: string }> {
	await rosa.reload()
	const row = rosa.getByRole("row").filter({ hasText: new RegExp(`^${PRODUCT.code}`) })
	const words = (await row.textContent()) ?? ""
	const cases = (of: string) => Number(new RegExp(`(\\d+) ${of}`).exec(words)?.[1] ?? 0)
	return { free: cases("free"), held: cases("held"), words }
}

/** A logger's file of 60 hours in the freezer, a reading every ten minutes, as a logger in the producer's zone writes it. */
function loggerFile(from: Date): string {
	const local = new Intl.DateTimeFormat("sv-SE", { timeZone: ZONE, dateStyle: "short", timeStyle: "medium" })
	const rows = Array.from({ length: 60 * 6 - 12 }, (_, index) => {
		const celsius = Math.max(-18.4, 21 - index * 0.9)
		return `${local.format(new Date(from.getTime() + index * 600_000))};${celsius.toFixed(1).replace(".", ",")}`
	})
	return ["Time;Temperature °C", ...rows].join("\r\n")
}

async function orderByRosa(browser: Browser, cases: number): Promise<string> {
	const rosa = await visitAs(browser, ROSA)
	await rosa.goto(`${STORE}/sheet`)
	await untilHydrated(rosa)
	await rosa
		.getByRole("row")
		.filter({ hasText: new RegExp(`^${PRODUCT.code}`) })
		.getByRole("textbox")
		.first()
		.fill(String(cases))
	await rosa.getByRole("button", { name: "Send order" }).click()
	await expect(rosa.getByRole("status")).toContainText("has your order")
	const number = /Order (\d+)/.exec((await rosa.getByRole("heading", { level: 1 }).textContent()) ?? "")?.[1]
	await rosa.context().close()
	if (!number) throw new Error("the page names the order")
	return number
}

test("a super becomes a lot that is frozen, weighed, released, sold to a store, traced and called back", async ({
	browser,
}) => {
	test.setTimeout(300_000)
	const found = await someSuper()
	const rosa = await visitAs(browser, ROSA)
	await rosa.goto(`${STORE}/sheet`)
	const deliveryOn = rosa.url().slice(-10)
	const atFirst = await promisedNow(rosa)

	await test.step("in the yard, by phone: it is capped all over", async () => {
		const wilf = await visitAs(browser, WILF, PHONE)
		await wilf.goto(`${DESK}/crop/yards/${found.yardId}`)
		await untilHydrated(wilf)
		const form = await openForm(wilf, found.name)
		await noteShares(form, "100", "100")
		await expect(wilf.getByRole("status").filter({ hasText: "is recorded" })).toBeVisible()
		await expectNoFindings(wilf)
		await wilf.context().close()
	})

	const ida = await visitAs(browser, IDA)
	const faults = watchFaults(ida)
	let code = ""
	await test.step("the board says take it off, and it becomes a lot of 36 pieces", async () => {
		await ida.goto(`${DESK}/crop`)
		await untilHydrated(ida)
		await expect(ida.getByText("take off").first()).toBeVisible()
		await expectNoFindings(ida)
		await ida.goto(`${DESK}/crop/harvest?super=${found.id}`)
		await untilHydrated(ida)
		await ida.getByLabel(/^Fancy, Or all of them together/).fill("41")
		await ida.getByRole("button", { name: "See the lots" }).click()
		await expect(ida.getByRole("alert")).toContainText("41")
		await ida.getByLabel(/^Fancy, Or all of them together/).fill("36")
		await ida.getByLabel("Water, %").fill("17.4")
		await ida.getByLabel("Pfund, mm").fill("24")
		await ida.getByLabel("Released likely on").fill(deliveryOn)
		// Sooner than all others, so that it is the first to be packed.
		await ida.getByLabel("Best before").fill(`${Number(deliveryOn.slice(0, 4))}-12-31`)
		await expectNoFindings(ida)
		await ida.getByRole("button", { name: "See the lots" }).click()
		await expect(ida.getByRole("heading", { level: 1 })).toHaveText("Look before they are lots")
		await expectNoFindings(ida)
		await ida.getByRole("button", { name: /^Bring/ }).click()
		await expect(ida.getByText("The lot is in the cold room.")).toBeVisible()
		await expectNoFindings(ida)
		code = (await ida.getByRole("table").getByRole("link").first().textContent()) ?? ""
		// The refusal is noted by the browser itself.
		expect(faults.splice(0).filter((fault) => !fault.includes("422"))).toEqual([])
	})

	const held = await promisedNow(rosa)
	await test.step("the store sees it held until it is released", async () => {
		expect(held.free).toBe(atFirst.free)
		expect(held.held).toBe(atFirst.held + 36 / PRODUCT.case)
	})

	await test.step("it cannot be released before it is frozen and weighed", async () => {
		await ida.goto(`${DESK}/lots/${code}/release`)
		await expect(ida.getByText("Still missing:").first()).toBeVisible()
		await expect(ida.getByRole("button", { name: "Release it", exact: true })).toHaveCount(0)
		await untilHydrated(ida)
		await expectNoFindings(ida)
	})

	await test.step("its load is proven by a logger's file", async () => {
		const from = new Date(Date.now() - 60 * 3_600_000)
		const local = new Intl.DateTimeFormat("sv-SE", { timeZone: ZONE, dateStyle: "short", timeStyle: "short" })
		await ida.goto(`${DESK}/cold-room`)
		await untilHydrated(ida)
		await ida.getByLabel("Freezer").fill("Chest freezer")
		await ida.getByLabel("It went in").fill(local.format(from).replace(" ", "T"))
		await ida.getByLabel(`Pieces of lot ${code}`).fill("36")
		await expectNoFindings(ida)
		await ida.getByRole("button", { name: "Start the load" }).click()
		await expect(ida.getByRole("heading", { level: 1 })).toHaveText(/^Load \d+$/)
		await ida.getByRole("link", { name: "Read a logger's file" }).click()
		await untilHydrated(ida)
		await expectNoFindings(ida)
		await ida.getByLabel("Where the").selectOption("comb")
		await ida
			.locator('input[type="file"]')
			.setInputFiles({ name: "log.csv", mimeType: "text/csv", buffer: Buffer.from(loggerFile(from)) })
		await ida.getByRole("button", { name: /^Read/ }).click()
		await expect(ida.getByText("The freezing is proven.")).toBeVisible()
		await expectNoFindings(ida)
	})

	await test.step("the scale passes it", async () => {
		await ida.goto(`${DESK}/lots/${code}/scale`)
		await untilHydrated(ida)
		await ida.getByLabel("Or the known tare").fill("28")
		const gross = [256, 255, 257, 254, 256, 258, 255, 256, 257, 255, 256, 254]
		await ida.locator('textarea[name="pasted"]').fill(gross.join("\n"))
		await expectNoFindings(ida)
		await ida.getByRole("button", { name: "Judge the lot" }).click()
		await expect(ida.getByText(/^The lot passes/)).toBeVisible()
		await untilHydrated(ida)
		await expectNoFindings(ida)
	})

	await test.step("released, it is free for the store", async () => {
		await ida.goto(`${DESK}/lots/${code}/release`)
		await ida.getByRole("button", { name: "Release it", exact: true }).click()
		await expect(ida.getByText(`Lot ${code} is released.`)).toBeVisible()
		const released = await promisedNow(rosa)
		expect(released.free).toBe(held.free + 36 / PRODUCT.case)
		expect(released.held).toBe(atFirst.held)
	})

	const number = await orderByRosa(browser, 2)
	const nextForRosa = await openInbox(ROSA)
	await test.step("an order is packed from it and sent", async () => {
		await ida.goto(`${DESK}/orders/${number}`)
		await untilHydrated(ida)
		await ida.getByRole("button", { name: "Confirm and tell Pantry & Plume" }).click()
		await expect(ida.getByRole("status")).toContainText(`Order ${number} is confirmed.`)
		await ida.getByRole("button", { name: "Packed", exact: true }).click()
		await expect(ida.getByRole("status")).toContainText(`Order ${number} is packed.`)
		await expect(ida.getByRole("main").getByText(code).first()).toBeVisible()
		await ida.goto(`${DESK}/packing?day=${deliveryOn}`)
		await ida.getByRole("button", { name: `Sent, issue the invoice: order ${number} of Pantry & Plume` }).click()
		await expect(ida.getByRole("status")).toContainText(`Order ${number} is sent`)
	})

	await test.step("the trace finds the store", async () => {
		await ida.goto(`${DESK}/lots/${code}/trace`)
		await untilHydrated(ida)
		const row = ida.getByRole("row").filter({ hasText: "Pantry & Plume" })
		await expect(row).toContainText(number)
		await expect(row).toContainText("24")
		await expectNoFindings(ida)
	})

	await test.step("a withdrawal writes to it, and it answers", async () => {
		await ida.goto(`${DESK}/withdrawals/new?lot=${code}`)
		await untilHydrated(ida)
		await ida.getByLabel("Why").fill("A lid was cracked.")
		await ida.getByLabel("What to do with the pieces").fill("Take them off the shelf and keep them apart.")
		await ida.getByRole("button", { name: /^Withdraw/ }).click()
		await expect(ida.getByText("has begun.")).toBeVisible()
		await hurryLetters()
		let letter = await nextForRosa()
		while (!letter.html.includes("/notices/")) letter = await nextForRosa()
		expect(letter.text).toContain(code)
		const store = await (await browser.newContext({ baseURL: e2eAddresses().web, ...PHONE })).newPage()
		await store.goto(new URL(linkIn(letter, "/notices/")).pathname)
		await untilHydrated(store)
		await expectNoFindings(store)
		await store.getByLabel(/do you still hold/).fill("20")
		await store.getByRole("button", { name: "Send the answer" }).click()
		await expect(store.getByText("Thank you, your answer is noted.")).toBeVisible()
		await ida.reload()
		await expect(ida.locator("dl.lot-facts").getByText(/answered and still hold 20/)).toBeVisible()
		await store.context().close()
	})

	await test.step("what is left of it is promised to nobody", async () => {
		const after = await promisedNow(rosa)
		expect(after.free).toBe(atFirst.free)
		expect(faults).toEqual([])
	})
})
