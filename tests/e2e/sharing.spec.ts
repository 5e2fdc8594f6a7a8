import { expect, test } from "@playwright/test"
import { expectNoFindings, IDA, untilHydrated, visitAs, watchFaults } from "./desk-visits"
import { openShortProduct } from "./short-product"

let short: Awaited<ReturnType<typeof openShortProduct>>
test.beforeEach(async () => {
	short = await openShortProduct()
})
test.afterEach(async () => {
	await short.clear()
})

test("the producer compares the rules, shares a short product out, takes it back and shares it anew", async ({
	browser,
}) => {
	test.slow()
	const ida = await visitAs(browser, IDA)
	const faults = watchFaults(ida)
	await ida.goto(short.list)
	await expect(ida.getByRole("heading", { name: "Basswood sections" })).toBeVisible()
	await expectNoFindings(ida)
	await ida.goto(short.address)
	await untilHydrated(ida)
	await expect(ida.getByText("18 cases can be ready for")).toBeVisible()
	await expect(ida.getByText("The 18th case: without it, under its least.")).toBeVisible()
	await expect(ida.getByText("All nine reach their least.").first()).toBeVisible()
	await expect(ida.getByText("Two are set aside: under their least.").first()).toBeVisible()
	await expectNoFindings(ida)

	// Another rule, and another supply, live; nothing is promised on a supposition.
	await ida.getByRole("radio", { name: /^Equal shortfall/ }).check()
	await expect(ida.getByText("Why, with equal shortfall")).toBeVisible()
	await ida.getByLabel("What if so many cases were ready").fill("31")
	await expect(ida.getByText("31 of 31 cases given.").first()).toBeVisible()
	await expect(ida.getByRole("button", { name: /^Promise/ })).toBeDisabled()
	await ida.getByLabel("What if so many cases were ready").fill("")
	await ida.getByRole("radio", { name: /^Equal shares/ }).check()

	// By hand: too many in all is said, and what was typed stays.
	await ida.locator("summary", { hasText: "Change by hand" }).click()
	await ida.getByLabel("Cases for Mill Lane Co-op").fill("4")
	await expect(ida.getByText("2 too many")).toBeVisible()
	await ida.getByRole("button", { name: "Promise 20 cases and tell nine stores" }).click()
	await expect(ida.getByRole("alert")).toContainText("only 18 can be ready")
	await expect(ida.getByLabel("Cases for Mill Lane Co-op")).toHaveValue("4")
	expect(await short.given()).toEqual(Array.from({ length: 9 }, () => null))
	await expectNoFindings(ida)
	await ida.getByLabel("Cases for Mill Lane Co-op").fill("")
	await ida.getByRole("checkbox", { name: "Mill Lane Co-op takes Basswood No. 1 instead" }).check()
	await ida.getByRole("button", { name: "Promise 18 cases and tell nine stores" }).click()
	await expect(ida.getByText("It is shared out, and the stores are told.")).toBeVisible()
	expect(await short.given()).toEqual([2, 3, 2, 2, 2, 2, 2, 2, 1])
	expect(await short.letters()).toHaveLength(1)
	await expectNoFindings(ida)

	await ida.getByRole("button", { name: "Take it back" }).click()
	await expect(ida.getByText("It waits again; no letter went out.")).toBeVisible()
	expect(await short.letters()).toEqual([])
	await ida.getByRole("button", { name: "Promise 18 cases and tell nine stores" }).click()
	await expect(ida.getByText("It is shared out, and the stores are told.")).toBeVisible()

	const quill = await visitAs(browser, short.buyer.email)
	await quill.goto(short.storeOrder)
	await untilHydrated(quill)
	await expect(quill.getByText("You asked 4 and get 2. We gave one case each until the 18 were gone.")).toBeVisible()
	await expectNoFindings(quill)
	// Neither the page nor the data that comes with it holds another store's name.
	const html = await (await quill.request.get(short.storeOrder)).text()
	const plain = await (await quill.request.get(`${short.storeOrder}.data`)).text()
	for (const name of short.otherNames) {
		expect(html).not.toContain(name)
		expect(plain).not.toContain(name)
	}
	expect(faults.filter((fault) => !fault.includes("422"))).toEqual([])
})

test.describe("without JavaScript", () => {
	test.use({ javaScriptEnabled: false })

	test("a supply is supposed by address, and another rule is committed with a figure by hand", async ({ browser }) => {
		const ida = await visitAs(browser, IDA, { javaScriptEnabled: false })
		await ida.goto(short.address)
		await ida.getByLabel("What if so many cases were ready").fill("31")
		await ida.getByRole("button", { name: "Look" }).click()
		await expect(ida.getByText("31 of 31 cases given.").first()).toBeVisible()
		await expect(ida.getByRole("button", { name: /^Promise/ })).toBeDisabled()
		await ida.getByRole("link", { name: "Back to what is there" }).click()
		await ida.getByRole("radio", { name: /^In proportion/ }).check()
		await ida.locator("summary", { hasText: "Change by hand" }).click()
		await ida.getByLabel("Cases for Green Ladle Grocers").fill("2")
		await ida.getByRole("button", { name: /^Promise/ }).click()
		await expect(ida.getByRole("alert")).toContainText("Green Ladle Grocers: It takes 3 or more.")
		await expect(ida.getByRole("radio", { name: /^In proportion/ })).toBeChecked()
		await ida.getByLabel("Why", { exact: true }).fill("It has a pallet of its own coming")
		await ida.getByRole("button", { name: /^Promise/ }).click()
		await expect(ida.getByText("It is shared out, and the stores are told.")).toBeVisible()
		expect((await short.given())[1]).toBe(2)
		await expect(ida.getByText("We set this by hand: It has a pallet of its own coming.")).toBeVisible()
	})
})
