import { expect, type Page, test } from "@playwright/test"
import { expectNoFindings, untilHydrated, visitAs, watchFaults } from "./desk-visits"
import { openSeasonYard } from "./season-yard"

/** The field for cases of the product with that number. */
const casesOf = (page: Page, code: string) =>
	page
		.getByRole("row")
		.filter({ hasText: new RegExp(`^${code}`) })
		.getByRole("textbox", { name: /^Cases of/ })

const LIST = `code,tier,min cases,case price
11,Shops,1,150.00
11,Shops,3,144.00
99,Shops,1,10.00
`

test("a price list is looked through before it is set, and a price that changed under an open sheet is asked about", async ({
	browser,
}) => {
	test.slow()
	const yard = await openSeasonYard()
	const [day] = yard.days
	const rosa = await visitAs(browser, yard.ours.email)
	const ida = await visitAs(browser, yard.owner)
	const faults = [rosa, ida].map(watchFaults)
	await rosa.goto(`${yard.buy}/sheet/${day}`)
	await untilHydrated(rosa)
	await casesOf(rosa, "11").fill("2")
	await expect(rosa.getByText("$285.00").first()).toBeVisible()

	await test.step("every change is shown, and what was not understood", async () => {
		await ida.goto(`${yard.desk}/prices/upload`)
		await untilHydrated(ida)
		await ida
			.getByLabel("The list, as CSV")
			.setInputFiles({ name: "prices.csv", mimeType: "text/csv", buffer: Buffer.from(LIST) })
		await ida.getByRole("button", { name: "Read it and show what changes" }).click()
		await expect(ida.getByText("2 to set, 0 as they are, 1 not understood.")).toBeVisible()
		await expect(ida.getByRole("row").filter({ hasText: "142.50" })).toContainText("+7.50")
		await expect(ida.getByText("No product has the code “99”.")).toBeVisible()
		await expectNoFindings(ida)
		await ida.getByRole("button", { name: "Set these 2 prices" }).click()
		await expect(ida.getByRole("status")).toContainText("Kept.")
		await expect(ida.getByRole("row").filter({ hasText: "Basswood section" })).toContainText("150.00")
		await expectNoFindings(ida)
	})

	await test.step("the buyer is told the new price and takes it", async () => {
		await casesOf(rosa, "11").press("Control+Enter")
		await expect(rosa.getByRole("alert")).toContainText(
			"A case is now $150.00; it was $142.50 when you opened this sheet.",
		)
		await expect(casesOf(rosa, "11")).toHaveValue("2")
		await casesOf(rosa, "11").press("Control+Enter")
		await expect(rosa.getByRole("status")).toContainText("has your order")
		await expect(rosa.getByRole("row", { name: /Basswood section/ })).toContainText("300.00")
	})

	await test.step("a promotion takes its part off, and none once it is taken off again", async () => {
		await ida.goto(`${yard.desk}/prices/special`)
		await untilHydrated(ida)
		await ida.getByLabel("Name", { exact: true }).fill("First harvest")
		await ida.getByLabel("Percent off").fill("10")
		await ida.getByLabel("Last day", { exact: true }).fill(yard.days[2])
		await ida.getByRole("button", { name: "Add this promotion" }).click()
		await expect(ida.getByRole("row").filter({ hasText: "First harvest" })).toContainText("10 %")
		await expectNoFindings(ida)
		await rosa.goto(`${yard.buy}/sheet/${yard.days[1]}`)
		await expect(rosa.getByRole("row").filter({ hasText: "Basswood section" })).toContainText("135.00")
		await ida.getByRole("button", { name: /^Take it off: First harvest/ }).click()
		await expect(ida.getByText("None runs or is to come.")).toBeVisible()
		await rosa.reload()
		await expect(rosa.getByRole("row").filter({ hasText: "Basswood section" })).toContainText("150.00")
	})

	await test.step("on a phone the list stands in rows, and nothing is cut off", async () => {
		await ida.setViewportSize({ width: 390, height: 844 })
		await ida.goto(`${yard.desk}/prices`)
		await expect(ida.getByText("One piece, to the public").last()).toBeVisible()
		const wider = await ida.evaluate(() => {
			const list = document.querySelector("[aria-label='Price list']")
			return [document.documentElement.scrollWidth - 390, (list?.scrollWidth ?? 0) - (list?.clientWidth ?? 0)]
		})
		expect(wider).toEqual([0, 0])
		await expectNoFindings(ida)
	})
	expect(faults.flat().filter((fault) => !fault.includes("422"))).toEqual([])
})

test("comb priced by weight is ordered at about its price, weighed as it is packed, and then costs what it weighs", async ({
	browser,
}) => {
	test.slow()
	const yard = await openSeasonYard()
	await yard.addCombByWeight()
	const [day] = yard.days
	const rosa = await visitAs(browser, yard.ours.email)
	const ida = await visitAs(browser, yard.owner)
	await rosa.goto(`${yard.buy}/sheet/${day}`)
	await untilHydrated(rosa)
	await expect(rosa.getByText("about; 16.00 a lb as weighed")).toBeVisible()
	await casesOf(rosa, "61").fill("1")
	await casesOf(rosa, "61").press("Control+Enter")
	await expect(rosa.getByRole("row", { name: /Cut comb/ })).toContainText("about 143.92")
	const order = new URL(rosa.url()).pathname
	await ida.goto(yard.desk)
	await ida.getByRole("button", { name: /^Confirm order/ }).click()
	await expect(ida.getByRole("status")).toContainText("One order is confirmed.")

	await ida.goto(`${yard.desk}/packing?day=${day}`)
	await untilHydrated(ida)
	const weight = ida.getByLabel("Net weight of 61 Cut comb")
	await ida.getByRole("button", { name: /^Packed: order/ }).click()
	await expect(ida.getByRole("alert")).toContainText("Weigh it and write its net weight")
	await weight.fill("2 lb")
	await expect(ida.getByText("2 lb (907 g) at 16.00 a lb is $31.99.")).toBeVisible()
	await ida.getByRole("button", { name: /^Packed: order/ }).click()
	await expect(ida.getByRole("alert")).toContainText("2 lb is 78 % less than 12 pieces usually weigh, 9 lb.")
	await expect(weight).toHaveValue("2 lb")
	await expectNoFindings(ida)
	await weight.fill("9 lb 12 oz")
	await ida.getByRole("button", { name: /^Packed: order/ }).click()
	await expect(ida.getByText("weighed 9 lb 12 oz (4,422 g) at 16.00 a lb,")).toContainText("$155.98")
	await expectNoFindings(ida)
	await rosa.goto(order)
	const row = rosa.getByRole("row", { name: /Cut comb/ })
	await expect(row).toContainText("weighed 9 lb 12 oz (4,422 g)")
	await expect(row).toContainText("155.98")
	await expect(row).not.toContainText("about")
	await expectNoFindings(rosa)
})
