import { type Browser, expect, type Page, test } from "@playwright/test"
import { askDatabase, expectNoFindings, IDA, untilHydrated, visitAs } from "./desk-visits"
import { noteShares, openBeeYard, openForm, PHONE, takePhoto, untilKept } from "./yard-round"

const WILF = "wilf@larkmoor.example.test"

let yard: Awaited<ReturnType<typeof openBeeYard>>
test.beforeEach(async () => {
	yard = await openBeeYard()
})
test.afterEach(async () => {
	await yard.clear()
})

async function openRound(browser: Browser, email = WILF, options = {}): Promise<Page> {
	const page = await visitAs(browser, email, { ...PHONE, ...options })
	await page.goto(yard.address)
	if (!("javaScriptEnabled" in options)) await untilHydrated(page)
	return page
}

const notSent = (page: Page, words: string | RegExp) => expect(page.locator(".kept-checks")).toContainText(words)

test("a packer looks into a super by phone: rows, a note, a photo", async ({ browser }) => {
	const page = await openRound(browser)
	await expect(page.getByRole("heading", { level: 1 })).toHaveText("Barley Mow")
	const form = await openForm(page, "Hive B1, super 2")
	await expectNoFindings(page)
	for (const row of ["Row 1", "Row 2"]) {
		const taps = form.getByRole("group", { name: row, exact: true })
		for (const code of ["capped", "full", "filling", "begun", "bare"])
			await taps.getByRole("button", { name: code }).tap()
		await expect(taps.getByRole("button", { name: "capped" })).toBeDisabled()
	}
	await form.getByRole("button", { name: "Take back the last tap of row 2" }).tap()
	await form.getByLabel("Note", { exact: true }).fill("Lids white as milk")
	await form.getByLabel("Photo").setInputFiles(await takePhoto())
	await form.getByRole("button", { name: "Record the check" }).tap()
	await expect(page.getByRole("status").filter({ hasText: "Hive B1, super 2 is recorded" })).toBeVisible()
	expect(await yard.checks()).toMatchObject([
		{
			superId: yard.supers.top,
			sections: `01234432100123443210${"0".repeat(20)}`,
			filled: 25,
			capped: 10,
			note: "Lids white as milk",
			who: "Wilf Tarrow",
		},
	])
	await page.goto(yard.address.replace(/yards\/.*/, `supers/${yard.supers.top}`))
	const photo = page.getByRole("img", { name: /^Hive B1, super 2 on/ })
	await expect(photo).toBeVisible()
	await expect.poll(() => photo.evaluate((img: HTMLImageElement) => img.naturalWidth)).toBe(1600)
	await untilHydrated(page)
	await expectNoFindings(page)
	const file = await page.request.get((await photo.getAttribute("src")) ?? "")
	expect(file.headers()).toMatchObject({
		"content-type": "image/jpeg",
		"cache-control": "private, no-cache",
		"x-content-type-options": "nosniff",
	})
	await page.context().close()
})

test("whatever is pressed in the yard is 44 pixels high or more, and nothing hangs over the edge", async ({
	browser,
}) => {
	const page = await openRound(browser)
	const form = await openForm(page, "Hive B1, super 1")
	for (const by of ["By rows", "By shares"]) {
		await form.getByLabel(by).check()
		const small = await page
			.locator(".yard")
			.evaluate((sheet) =>
				[...sheet.querySelectorAll<HTMLElement>("button, summary, .input, .check-by label")]
					.filter((one) => one.checkVisibility() && one.getBoundingClientRect().height < 44)
					.map((one) => one.outerHTML),
			)
		expect(small).toEqual([])
		expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBe(390)
	}
	await page.context().close()
})

test("without signal the page opens, keeps a check, and sends it once when there is signal", async ({ browser }) => {
	const page = await openRound(browser)
	await untilKept(page)
	await page.context().setOffline(true)
	await page.reload()
	await untilHydrated(page)
	await expect(page.getByRole("heading", { level: 1 })).toHaveText("Barley Mow")
	await noteShares(await openForm(page, "Hive B1, super 1"), "60", "20")
	await notSent(page, "1 check waits for signal")
	const form = await openForm(page, "Hive B2, super 1")
	await form.getByLabel("Photo").setInputFiles(await takePhoto())
	await noteShares(form, "30", "0")
	await notSent(page, "2 checks wait for signal")
	await expectNoFindings(page)
	// Closed and opened again, still without signal: the phone has them.
	await page.reload()
	await untilHydrated(page)
	await notSent(page, "2 checks wait for signal")
	await page.getByRole("button", { name: "Send now" }).click()
	await notSent(page, "2 checks wait for signal")
	expect(await yard.checks()).toEqual([])

	await page.context().setOffline(false)
	await expect(page.getByText("2 checks are recorded.")).toBeVisible()
	await page.reload()
	await untilHydrated(page)
	await expect(page.getByText(/60% filled, 20% capped/)).toBeVisible()
	await expect(page.locator(".kept-list")).toHaveCount(0)
	const checks = await yard.checks()
	expect(checks).toMatchObject([
		{ superId: yard.supers.low, filled: 60, capped: 20, sections: "", photoId: null },
		{ superId: yard.supers.other, filled: 30, capped: 0 },
	])
	expect(checks[1]?.photoId).not.toBeNull()
	await page.context().close()
})

test("a check whose answer was lost is sent again and is one check", async ({ browser }) => {
	const page = await openRound(browser)
	let lost = 0
	await page.route("**/crop/checks", async (route) => {
		if (route.request().method() !== "POST" || lost > 0) return route.continue()
		lost += 1
		await route.fetch()
		await route.abort("connectionreset")
	})
	await noteShares(await openForm(page, "Hive B1, super 1"), "60", "20")
	await notSent(page, "1 check waits for signal")
	expect(await yard.checks()).toHaveLength(1)
	await page.getByRole("button", { name: "Send now" }).click()
	await expect(page.getByText("The check of Hive B1, super 1 is recorded.")).toBeVisible()
	expect(await yard.checks()).toHaveLength(1)
	await page.context().close()
})

test("what the server would not take is kept with its reason, can be mended, and can be thrown away", async ({
	browser,
}) => {
	const page = await openRound(browser)
	await page.context().setOffline(true)
	await noteShares(await openForm(page, "Hive B1, super 1"), "60", "20")
	await noteShares(await openForm(page, "Hive B1, super 2"), "50", "0")
	await notSent(page, "2 checks wait for signal")
	await yard.takeOff(yard.supers.low)
	// Somebody sets the other one on later than the phone knows.
	await askDatabase("update supers set set_on = current_date - 1 where id = $1", [yard.supers.top])
	await page.evaluate(() => {
		// The phone's copy of the second check is of a day before that.
		return new Promise<void>((resolve, reject) => {
			const opening = indexedDB.open("waxbill-yard")
			opening.onerror = () => reject(opening.error)
			opening.onsuccess = () => {
				const store = opening.result.transaction("checks", "readwrite").objectStore("checks")
				const all = store.getAll()
				all.onsuccess = () => {
					const check = all.result.find(({ about }) => about.name === "Hive B1, super 2")
					const day = new Date(Date.now() - 5 * 86_400_000).toISOString().slice(0, 10)
					check.fields.checkedOn = day
					check.seen.checkedOn = day
					store.put(check).onsuccess = () => resolve()
				}
			}
		})
	})
	await page.context().setOffline(false)
	await notSent(page, "2 checks were not taken")
	await notSent(page, /The super came off the hive on/)
	await notSent(page, /The super was set on .*; choose that day or a later one/)
	await expectNoFindings(page)

	const list = page.getByRole("list", { name: "Checks kept on this phone" })
	const second = list.getByRole("listitem").filter({ hasText: "super 2" })
	await second.getByRole("button", { name: /Mend it/ }).click()
	await expect(second.getByLabel("Share filled", { exact: true })).toHaveValue("50")
	await second.getByLabel("Day of the check").fill(new Date(Date.now() - 86_400_000 / 2).toISOString().slice(0, 10))
	await second.getByRole("button", { name: "Record it so" }).click()
	await notSent(page, "1 check was not taken")
	await expect.poll(yard.checks).toMatchObject([{ superId: yard.supers.top, filled: 50 }])
	await list.getByRole("button", { name: /Throw it away/ }).click()
	await expect(list).toHaveCount(0)
	await page.reload()
	await untilHydrated(page)
	await expect(page.locator(".kept-list")).toHaveCount(0)
	await page.context().close()
})

test("a kept check is sent only under the account that made it, and signing out clears the kept pages", async ({
	browser,
}) => {
	const page = await openRound(browser)
	await untilKept(page)
	await page.context().setOffline(true)
	await noteShares(await openForm(page, "Hive B1, super 1"), "60", "20")
	await notSent(page, "1 check waits for signal")
	// The session ends while the phone is in the yard.
	const [cookie] = (await page.context().cookies()).filter(({ name }) => name === "waxbill-session")
	await page.context().clearCookies()
	await page.context().setOffline(false)
	await notSent(page, "1 check waits: sign in to send")
	await expect(page.locator(".kept-checks").getByRole("link", { name: "Sign in" })).toBeVisible()

	// Ida takes the phone.
	const ida = await visitAs(browser, IDA)
	const [hers] = (await ida.context().cookies()).filter(({ name }) => name === "waxbill-session")
	if (!cookie || !hers) throw new Error("a session has no cookie")
	await page.context().addCookies([hers])
	await page.goto(yard.address)
	await untilHydrated(page)
	await notSent(page, /1 check waits that Wilf Tarrow made/)
	expect(await yard.checks()).toEqual([])
	await page.goto("/account")
	await page.getByRole("button", { name: "Sign out" }).first().click()
	await page.waitForURL("**/sign-in")
	await untilHydrated(page)
	await expect.poll(() => page.evaluate(async () => (await caches.keys()).join())).toBe("")

	// Wilf has it back.
	await page.context().addCookies([cookie])
	await page.goto(yard.address)
	await untilHydrated(page)
	await expect(page.getByText("The check of Hive B1, super 1 is recorded.")).toBeVisible()
	expect(await yard.checks()).toMatchObject([{ filled: 60, capped: 20, who: "Wilf Tarrow" }])
	await ida.context().close()
	await page.context().close()
})

test("the bee escape is marked on the super’s page, and taken out again", async ({ browser }) => {
	const page = await openRound(browser)
	await page.goto(yard.address.replace(/yards\/.*/, `supers/${yard.supers.low}`))
	await page.getByRole("button", { name: "The bee escape went in today" }).click()
	await expect(page.getByText(/the bee escape is in since/)).toBeVisible()
	await page.getByRole("button", { name: "The bee escape is out again" }).click()
	await expect(page.getByText(/the bee escape is in since/)).toHaveCount(0)
	await page.context().close()
})

test("without script each super has a plain form that keeps what was typed when it is refused", async ({ browser }) => {
	const page = await openRound(browser, WILF, { javaScriptEnabled: false })
	const form = await openForm(page, "Hive B1, super 1")
	await form.getByLabel("Row 1", { exact: true }).last().fill("4x")
	await form.getByLabel("Note", { exact: true }).fill("Bees calm")
	await form.getByLabel("Day of the check").fill("2031-01-01")
	await form
		.getByLabel("Photo")
		.setInputFiles({ name: "super.jpg", mimeType: "image/jpeg", buffer: Buffer.from("no photo") })
	await form.getByRole("button", { name: "Record the check" }).click()
	const summary = page.getByRole("alert")
	await expect(summary).toContainText("This file is no JPEG, PNG or WebP photo")
	await expect(form.getByLabel("Note", { exact: true })).toHaveValue("Bees calm")
	await form.getByRole("button", { name: "Record the check" }).click()
	await expect(summary).toContainText("That day is still to come")
	await expect(summary).toContainText("A row takes at most 5 digits from 0 to 4")
	await expect(form.getByLabel("Row 1", { exact: true }).last()).toHaveValue("4x")
	await expect(form.getByLabel("Day of the check")).toHaveValue("2031-01-01")
	await form.getByLabel("By shares").check()
	await form.getByLabel("Share filled", { exact: true }).fill("20")
	await form.getByLabel("Share capped", { exact: true }).fill("30")
	const today = new Intl.DateTimeFormat("en-CA", { timeZone: "America/New_York" }).format(new Date())
	await form.getByLabel("Day of the check").fill(today)
	await form.getByRole("button", { name: "Record the check" }).click()
	await expect(summary).toContainText("More is capped than filled")
	expect(await yard.checks()).toEqual([])
	await form.getByLabel("Share capped", { exact: true }).fill("10")
	await form.getByLabel("Photo").setInputFiles(await takePhoto())
	await form.getByRole("button", { name: "Record the check" }).click()
	await expect(page.getByText("The check of Hive B1, super 1 is recorded.")).toBeVisible()
	const [check] = await yard.checks()
	expect(check).toMatchObject({ superId: yard.supers.low, filled: 20, capped: 10, sections: "", note: "Bees calm" })
	expect(check?.photoId).not.toBeNull()
	await page.context().close()
})
