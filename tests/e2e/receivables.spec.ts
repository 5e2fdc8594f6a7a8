import { randomUUID } from "node:crypto"
import { expect, type Page, test } from "@playwright/test"
import { openInbox } from "./auth-mails"
import { DESK, expectNoFindings, IDA, untilHydrated, visitAs, watchFaults } from "./desk-visits"
import { chase, fillAccount } from "./receivables-yard"
import { resetClock, setClock } from "./test-clock"

test.afterEach(resetClock)

const tag = randomUUID().slice(0, 6)
const NAME = `Lantern Street Larder ${tag}`
const SLUG = `lantern-street-larder-${tag}`
const EMAIL = `wren-${tag}@stores.example.test`

/** Noon of tomorrow in the yard's zone, at which reminders have gone. */
function tomorrowNoon(): Date {
	return new Date(`${new Date(Date.now() + 86_400_000).toISOString().slice(0, 10)}T17:00:00Z`)
}

async function addStore(ida: Page): Promise<void> {
	await ida.goto(`${DESK}/stores`)
	await untilHydrated(ida)
	await ida.getByRole("link", { name: "A new store" }).click()
	await ida.getByRole("button", { name: "Add the store" }).click()
	await expect(ida.getByRole("alert")).toContainText("Write the store’s name.")
	await ida.getByLabel("Name", { exact: true }).fill(NAME)
	await ida.getByLabel("Price tier").selectOption({ index: 1 })
	await ida.getByLabel("Credit limit, $").fill("900.00")
	await expectNoFindings(ida)
	await ida.getByRole("button", { name: "Add the store" }).click()
	await expect(ida.getByRole("status")).toContainText("The store is there.")
	await expect(ida.getByRole("heading", { level: 1 })).toHaveText(NAME)
}

async function readReminder(ida: Page, number: string): Promise<void> {
	await ida.goto(`${DESK}/reminders`)
	await untilHydrated(ida)
	await expectNoFindings(ida)
	const begin = ida.getByRole("button", { name: "Begin with three steps" })
	if (await begin.isVisible()) await begin.click()
	await expect(ida.getByRole("heading", { name: "7 days after it fell due" })).toBeVisible()
	const letters = await openInbox(EMAIL)
	await chase()
	const letter = await letters()
	// The words are the producer's own; whatever they are, the letter says which invoice and how much.
	expect(letter.text).toContain(number)
	expect(letter.text).toContain("$929.90")
	await ida.goto(`${DESK}/stores/${SLUG}`)
	await expect(ida.getByText(`7 days after it fell due, for ${number}`)).toBeVisible()
	await chase()
	await ida.goto(`${DESK}/receivables`)
	await untilHydrated(ida)
	await expectNoFindings(ida)
}

test("what is owed is chased by a letter, stands on a statement, and a certificate goes from store to desk", async ({
	browser,
}) => {
	test.slow()
	const today = tomorrowNoon()
	const ida = await visitAs(browser, IDA)
	await addStore(ida)
	const { numbers } = await fillAccount(SLUG, EMAIL, today)
	setClock(today)

	await test.step("a reminder goes once, and is seen on the store's page", async () => {
		await readReminder(ida, numbers[0])
		await ida.goto(`${DESK}/stores/${SLUG}`)
		await untilHydrated(ida)
		await expect(ida.getByText("$1,330.00 is open, $929.90 of it late.")).toBeVisible()
		await expect(ida.getByText("It owes more than its limit of $900.00")).toBeVisible()
		await ida.getByLabel("How much they will pay, $").fill("929.90")
		await ida.getByLabel("By which day").fill(today.toISOString().slice(0, 10))
		await ida.getByRole("button", { name: "Note the promise" }).click()
		await expect(ida.getByRole("status")).toContainText("The promise is noted.")
		await expectNoFindings(ida)
	})

	await test.step("two hands set the terms: the second is told what holds now", async () => {
		const other = await visitAs(browser, IDA)
		await other.goto(`${DESK}/stores/${SLUG}`)
		await untilHydrated(other)
		await ida.goto(`${DESK}/stores/${SLUG}`)
		await untilHydrated(ida)
		await ida.getByLabel("Days", { exact: true }).fill("30")
		await ida.getByRole("button", { name: "Save what holds for this store" }).click()
		await expect(ida.getByRole("status")).toContainText("It holds from the next order")
		await other.getByLabel("Days", { exact: true }).fill("21")
		await other.getByRole("button", { name: "Save what holds for this store" }).click()
		await expect(other.getByRole("alert")).toContainText("Somebody has changed this store meanwhile.")
		await expect(other.getByText("It is now 30.")).toBeVisible()
		await expect(other.getByLabel("Days", { exact: true })).toHaveValue("21")
	})

	await test.step("the statement is mailed with its pages, and the store opens the same", async () => {
		await ida.goto(`${DESK}/stores/${SLUG}/statement`)
		await untilHydrated(ida)
		await expect(ida.getByRole("row", { name: /Owed/ })).toContainText("$1,330.00")
		await expectNoFindings(ida)
		const letters = await openInbox(EMAIL)
		await ida.getByRole("button", { name: "Mail this statement to the store" }).click()
		await expect(ida.getByRole("status")).toContainText("The statement is on its way.")
		const letter = await letters()
		expect(letter.subject).toContain("$1,330.00 owed")
		expect((letter as { attachments?: { contentType: string }[] }).attachments?.[0]?.contentType).toBe(
			"application/pdf",
		)
	})

	const wren = await visitAs(browser, EMAIL)
	const faults = watchFaults(wren)
	const store = `/buy/larkmoor/${SLUG}`
	await test.step("a file that is no certificate is refused beside the field, and what was typed stays", async () => {
		await wren.goto(`${store}/statement`)
		await untilHydrated(wren)
		await expect(wren.getByRole("row", { name: new RegExp(`Invoice ${numbers[0]}`) })).toBeVisible()
		await expectNoFindings(wren)
		await wren.goto(`${store}/certificate`)
		await untilHydrated(wren)
		await wren.getByLabel("Its number").fill("R-204-118")
		await wren.getByLabel("The last day it is good").fill("2001-01-01")
		const page = {
			name: "certificate.pdf",
			mimeType: "application/pdf",
			buffer: Buffer.from("<script>alert(1)</script>"),
		}
		await wren.getByLabel("The certificate").setInputFiles(page)
		await wren.getByRole("button", { name: "Hand it in" }).click()
		await expect(wren.getByRole("alert")).toContainText("This certificate has run out already.")
		await expect(wren.getByLabel("Its number")).toHaveValue("R-204-118")
		await wren.getByLabel("The last day it is good").fill("2099-06-30")
		await wren.getByLabel("The certificate").setInputFiles(page)
		await wren.getByRole("button", { name: "Hand it in" }).click()
		await expect(wren.getByRole("alert")).toContainText(
			"The file is no PDF, JPEG, PNG or WebP, whatever its name says.",
		)
		await expectNoFindings(wren)
		await wren.getByLabel("The certificate").setInputFiles({
			name: "our certificate.pdf",
			mimeType: "application/pdf",
			buffer: Buffer.from("%PDF-1.7\n%%EOF\n"),
		})
		await wren.getByRole("button", { name: "Hand it in" }).click()
		await expect(wren.getByRole("status")).toContainText("The certificate is handed in.")
		// The refusals are noted by the browser itself.
		expect(faults.splice(0).filter((fault) => !fault.includes("422"))).toEqual([])
	})

	await test.step("the desk saves the file, accepts it until a day, and the store reads it", async () => {
		await ida.goto(`${DESK}/stores/${SLUG}/certificate`)
		await untilHydrated(ida)
		await expectNoFindings(ida)
		const download = ida.waitForEvent("download")
		await ida.getByRole("link", { name: "Save the file and look at it" }).click()
		expect((await download).suggestedFilename()).toBe("R-204-118.pdf")
		const href = await ida.getByRole("link", { name: "Save the file and look at it" }).getAttribute("href")
		const answer = await ida.request.get(href ?? "")
		expect(answer.headers()).toMatchObject({
			"content-disposition": 'attachment; filename="R-204-118.pdf"',
			"content-type": "application/pdf",
			"x-content-type-options": "nosniff",
		})
		const letters = await openInbox(EMAIL)
		await ida.getByLabel("Good until").fill("2098-12-31")
		await ida.getByRole("button", { name: "Accept it until that day" }).click()
		await expect(ida.getByRole("status")).toContainText("Answered.")
		expect((await letters()).subject).toContain("on file until December 31, 2098")
		await wren.goto(`${store}/details`)
		await expect(wren.getByText("on file, good until December 31, 2098")).toBeVisible()
	})
})
