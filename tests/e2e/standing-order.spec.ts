import { expect, type Page, test } from "@playwright/test"
import { openInbox } from "./auth-mails"
import { expectNoFindings, hurryLetters, untilHydrated, visitAs, watchFaults } from "./desk-visits"
import { openSeasonYard } from "./season-yard"
import { resetClock, setClock } from "./test-clock"

type Yard = Awaited<ReturnType<typeof openSeasonYard>>

test.afterEach(resetClock)

/** Moves the clock past last orders for a day, and waits until the worker has made its orders. */
async function passLastOrders(yard: Yard, day: string, stores: number): Promise<void> {
	setClock(yard.afterLastOrders(day, 2))
	await yard.runCutOff()
	await expect.poll(async () => (await yard.orders(day)).length, { timeout: 20_000 }).toBe(stores)
}

async function setStandingOrder(rosa: Page): Promise<void> {
	await untilHydrated(rosa)
	await rosa.getByLabel("How often").selectOption({ label: "every" })
	await rosa.getByLabel("Usual cases of Basswood section, Fancy, 13 oz").fill("5")
	await rosa.getByLabel("Least you would take of Basswood section, Fancy, 13 oz").fill("2")
	await rosa.getByRole("button", { name: "Set standing order" }).click()
	await expect(rosa.getByRole("status")).toContainText("Your standing order is set.")
	await rosa.getByRole("button", { name: /^Skip/ }).nth(2).click()
	await expect(rosa.getByRole("button", { name: /^Put back/ })).toHaveCount(1)
}

test("a standing order runs through three cut-offs: met, shared out when short, and skipped", async ({ browser }) => {
	test.slow()
	const yard = await openSeasonYard()
	const [first, second, third] = yard.days
	const rosa = await visitAs(browser, yard.ours.email)
	const ida = await visitAs(browser, yard.owner)
	const faults = [rosa, ida].map(watchFaults)
	const rosasMail = await openInbox(yard.ours.email)

	await test.step("a buyer sets it with the least that is of use, and skips the third date", async () => {
		await rosa.goto(`${yard.buy}/standing`)
		await setStandingOrder(rosa)
		expect((await rosasMail()).subject).toContain("Your standing order with Saltmarsh Bee Yard: every")
		await expectNoFindings(rosa)
	})

	await test.step("the day before last orders a letter says what will come", async () => {
		setClock(yard.afterLastOrders(first, -12))
		await yard.runCutOff()
		const reminder = await rosasMail()
		expect(reminder.subject).toMatch(/^Your delivery from Saltmarsh Bee Yard on .*: still right\?$/)
		expect(reminder.text).toContain("5 cases")
	})

	await test.step("at the first cut-off all three are made, and all can be met", async () => {
		await passLastOrders(yard, first, 3)
		expect((await rosasMail()).text).toContain("Basswood section")
		await ida.goto(yard.desk)
		await untilHydrated(ida)
		await ida.getByRole("button", { name: "Confirm all three" }).click()
		await expect(ida.getByRole("status")).toContainText("Three orders are confirmed.")
		expect(await yard.orders(first)).toEqual([
			"Pantry & Plume 5 of 5, confirmed",
			"Mill Lane Co-op 6 of 6, confirmed",
			"Corner Larder 2 of 2, confirmed",
		])
		await hurryLetters()
		expect((await rosasMail()).subject).toMatch(/confirmed|comes|all you asked/i)
	})

	await test.step("at the second, 8 cases are left of 13 asked: the season says so, and so does sharing", async () => {
		await passLastOrders(yard, second, 3)
		await ida.goto(`${yard.desk}/season`)
		await untilHydrated(ida)
		await expect(ida.getByRole("heading", { name: "11 Basswood section" })).toBeVisible()
		await expect(ida.getByText(/^Basswood section is short by 5 cases in the week of/)).toBeVisible()
		await ida.locator("summary", { hasText: "week by week" }).click()
		const row = ida.getByRole("row").filter({ hasText: "5 short" })
		// Nothing has left yet: 13 of each delivery are wanted, and 21 are there.
		await expect(row.first()).toContainText("02602121")
		await expectNoFindings(ida)
	})

	await test.step("the producer compares the rules and commits equal shares", async () => {
		await ida.goto(`${yard.desk}/sharing/11/${second}`)
		await untilHydrated(ida)
		for (const rule of [/^In proportion/, /^Equal shortfall/, /^Equal shares/]) {
			await ida.getByRole("radio", { name: rule }).check()
		}
		await expect(ida.getByText("Why, with equal shares")).toBeVisible()
		await expectNoFindings(ida)
		await ida.getByRole("button", { name: "Promise 8 cases and tell three stores" }).click()
		await expect(ida.getByText("It is shared out, and the stores are told.")).toBeVisible()
		expect((await yard.orders(second)).map((one) => one.replace(/,.*/, ""))).toEqual([
			"Pantry & Plume 3 of 5",
			"Mill Lane Co-op 3 of 6",
			"Corner Larder 2 of 2",
		])
	})

	await test.step("each store is told once, in its own figures", async () => {
		await rosasMail() // What the standing order has made of the second date.
		await hurryLetters()
		const letter = await rosasMail()
		expect(letter.subject).toMatch(/^Less than you asked: Basswood section for /)
		expect(letter.text).toContain("You asked 5 and get 3.")
		for (const { name } of yard.others) expect(letter.text).not.toContain(name)
	})

	await test.step("at the third, the date that was skipped makes no order; a harvest covers the others", async () => {
		await yard.addLot("R2", 8)
		await passLastOrders(yard, third, 2)
		expect(await yard.orders(third)).toEqual(["Mill Lane Co-op ? of 6, placed", "Corner Larder ? of 2, placed"])
		await ida.goto(`${yard.desk}/season`)
		await expect(ida.getByText(/^Basswood section is short by \d+ cases? in the week of/)).toBeVisible()
		await ida.locator("summary", { hasText: "week by week" }).click()
		// 13, the 8 that were given, and 8; and so many are there.
		await expect(ida.getByRole("row").filter({ hasText: "none" }).first()).toContainText("02902929")
		await rosa.goto(`${yard.buy}/deliveries`)
		await expect(rosa.getByRole("row").filter({ hasText: /Order \d/ })).toHaveCount(2)
	})
	expect(faults.flat()).toEqual([])
})
