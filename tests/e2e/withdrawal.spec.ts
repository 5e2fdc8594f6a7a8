import { expect, type Page, test } from "@playwright/test"
import { e2eAddresses } from "../setup/e2e-addresses"
import {
	askDatabase,
	DESK,
	expectNoFindings,
	hurryLetters,
	IDA,
	untilHydrated,
	visitAs,
	watchFaults,
} from "./desk-visits"

/** A sold-out lot of Larkmoor that went to the fewest stores with people to write to. */
async function someLot(): Promise<{ code: string }> {
	const [lot] = await askDatabase<{ code: string; stores: number }>(`
		select l.code, count(distinct o.store_id)::int as stores
		from lots l
		join order_line_lots x on x.producer_id = l.producer_id and x.lot_id = l.id
		join order_lines e on e.producer_id = x.producer_id and e.id = x.order_line_id
		join orders o on o.producer_id = e.producer_id and o.id = e.order_id and o.state in ('sent', 'received')
		where l.state = 'released' and exists (select from memberships m
			where m.producer_id = o.producer_id and m.store_id = o.store_id and m.role in ('buyer', 'payer') and m.ended_at is null)
			and not exists (select from stock_balances b
			where b.producer_id = l.producer_id and b.lot_id = l.id and b.place in ('ready', 'market', 'packed') and b.pieces > 0)
		group by l.id, l.code order by stores, l.code limit 1`)
	if (!lot) throw new Error("the demo has no lot that is sold out and went to stores")
	return lot
}

/** The secret link of the first notice that was mailed for the lot. */
async function mailedLink(): Promise<string> {
	const [mail] = await askDatabase<{ link: string }>(
		"select props->>'noticeUrl' as link from outbox_mails where template = 'withdrawal' order by created_at desc, id limit 1",
	)
	return new URL(mail?.link ?? "").pathname
}

const numberCell = (page: Page) => page.locator("dl.lot-facts").getByText(/answered and still hold/)

test("a lot is traced, withdrawn and answered for, and its public page says so", async ({ browser }) => {
	test.slow()
	const { code } = await someLot()
	const ida = await visitAs(browser, IDA)
	const faults = watchFaults(ida)
	await ida.goto(`${DESK}/lots/${code}`)
	await untilHydrated(ida)
	await expect(ida.getByRole("heading", { level: 1 })).toHaveText(`Lot ${code}`)
	await expect(ida.getByText("and all of it is somewhere above")).toBeVisible()
	await expectNoFindings(ida)

	await ida.getByRole("link", { name: "Who had it, where it is from" }).click()
	await expect(ida.getByText(/^(one store|\w+ stores)$/).first()).toBeVisible()
	await expectNoFindings(ida)
	await ida.getByRole("link", { name: "As a drill, with a balance" }).click()
	await expect(ida.getByText("The pieces balance.")).toBeVisible()
	await expectNoFindings(ida)

	const visitor = await (await browser.newContext({ baseURL: e2eAddresses().web })).newPage()
	await visitor.goto(`/shop/larkmoor/lots/${code}`)
	await expect(visitor.getByText("Honey must not be given to infants under one year.").first()).toBeVisible()
	await expect(visitor.getByText("called back")).toHaveCount(0)
	await untilHydrated(visitor)
	await expectNoFindings(visitor)

	await ida.goto(`${DESK}/withdrawals/new?lot=${code}`)
	await untilHydrated(ida)
	await ida.getByRole("button", { name: /^Withdraw/ }).click()
	await expect(ida.getByRole("alert")).toContainText("Write why the lot is called back.")
	// The refusal is noted by the browser itself.
	expect(faults.splice(0).filter((fault) => !fault.includes("422"))).toEqual([])
	await ida.getByLabel("Why").fill("Some lids were cracked.")
	await ida.getByLabel("What to do with the pieces").fill("Take them off the shelf and keep them apart.")
	await expectNoFindings(ida)
	await ida.getByRole("button", { name: /^Withdraw/ }).click()
	await expect(ida.getByText("has begun.")).toBeVisible()
	await expect(numberCell(ida)).toContainText("0 answered")
	await expectNoFindings(ida)
	await hurryLetters()

	await visitor.reload()
	await expect(visitor.getByRole("heading", { name: /This lot is called back/ })).toBeVisible()
	await expect(visitor.getByText("Some lids were cracked.")).toBeVisible()

	// A program that only fetches the address opens nothing.
	const link = await mailedLink()
	expect((await fetch(`${e2eAddresses().web}${link}`)).status).toBe(200)
	await ida.reload()
	await expect(numberCell(ida)).toContainText("0 opened")
	const opening = visitor.waitForResponse((response) => response.request().method() === "POST")
	await visitor.goto(link)
	await opening
	await untilHydrated(visitor)
	await expectNoFindings(visitor)
	await ida.reload()
	await expect(numberCell(ida)).toContainText("1 opened, 0 answered")
	await visitor.getByLabel(/do you still hold/).fill("lots")
	await visitor.getByRole("button", { name: "Send the answer" }).click()
	await expect(visitor.getByRole("alert")).toContainText("in figures")
	await expect(visitor.getByLabel(/do you still hold/)).toHaveValue("lots")
	await visitor.getByLabel(/do you still hold/).fill("2")
	await visitor.getByRole("button", { name: "Send the answer" }).click()
	await expect(visitor.getByText("Thank you, your answer is noted.")).toBeVisible()
	await ida.reload()
	await expect(numberCell(ida)).toContainText("1 answered and still hold 2")
	expect(faults).toEqual([])
})

test.describe("without JavaScript", () => {
	test.use({ javaScriptEnabled: false })

	test("the records come as a file that names the fields, and wrong days come back with a reason", async ({
		browser,
	}) => {
		const ida = await visitAs(browser, IDA, { javaScriptEnabled: false })
		await ida.goto(`${DESK}/records`)
		const download = ida.waitForEvent("download")
		await ida.getByRole("button", { name: "Download the file" }).click()
		expect((await download).suggestedFilename()).toMatch(/^released-[\d-]+-to-[\d-]+\.csv$/)
		await ida.goto(`${DESK}/records?from=2026-08-20&to=2026-08-01`)
		await expect(ida.getByRole("alert")).toContainText("The first day is after the last.")
	})

	test("the label of a lot carries its code as a drawing", async ({ browser }) => {
		const { code } = await someLot()
		const ida = await visitAs(browser, IDA, { javaScriptEnabled: false })
		const answer = await ida.goto(`${DESK}/lots/${code}/qr.svg`)
		expect(answer?.headers()["content-type"]).toContain("image/svg+xml")
		await ida.goto(`${DESK}/lots/${code}/label`)
		await expect(ida.getByRole("img", { name: `The address of the page of lot ${code}` })).toBeVisible()
	})
})
