import { randomUUID } from "node:crypto"
import { AxeBuilder } from "@axe-core/playwright"
import { type BrowserContext, expect, type Page, test } from "@playwright/test"
import { e2eAddresses } from "../setup/e2e-addresses"
import { codeIn, linkIn, openInbox } from "./auth-mails"
import { addPerson } from "./auth-people"

const PEOPLE = "/desk/larkmoor/people"

test.use({ baseURL: e2eAddresses().web })
// Each waits for mails and looks over several pages with axe.
test.describe.configure({ timeout: 120_000 })

async function signIn(page: Page, email: string, to = "/account"): Promise<void> {
	const nextMail = await openInbox(email)
	await page.goto(`/sign-in?${new URLSearchParams({ to })}`)
	await page.getByLabel("E-mail address").fill(email)
	await page.getByRole("button", { name: "Send me a code" }).click()
	await expect(page.getByRole("heading", { name: "Type the code" })).toBeVisible()
	await page.getByLabel("Six-digit code").fill(codeIn(await nextMail()))
	await page.getByRole("button", { name: "Sign in" }).click()
	await expect(page).toHaveURL(to)
}

async function forgetSession(context: BrowserContext): Promise<void> {
	await context.clearCookies({ name: /session$/ })
}

async function expectNoAxeFindings(page: Page): Promise<void> {
	expect((await new AxeBuilder({ page }).analyze()).violations).toEqual([])
}

test("a person signs in by the mailed code, and signs out", async ({ page }) => {
	const { name, email } = await addPerson("Wren Alder", "owner")
	await page.goto("/sign-in")
	await expectNoAxeFindings(page)
	await signIn(page, email)
	await expect(page.getByRole("heading", { name })).toBeVisible()
	await expect(page.getByRole("link", { name: "Larkmoor Bee Yard, the desk" })).toBeVisible()
	await expectNoAxeFindings(page)
	await page.getByRole("button", { name: "Sign out" }).click()
	await expect(page).toHaveURL("/sign-in")
	await page.goto("/account")
	await expect(page).toHaveURL("/sign-in?to=%2Faccount")
})

test("the link in the mail signs in on another device, by a button and once", async ({ page, browser }) => {
	const { email } = await addPerson("Wren Alder", "packer")
	const nextMail = await openInbox(email)
	await page.goto("/sign-in?to=%2Faccount")
	await page.getByLabel("E-mail address").fill(email)
	await page.getByRole("button", { name: "Send me a code" }).click()
	const link = linkIn(await nextMail(), "/sign-in/link/")
	// A program that scans the mail opens the link first; that must use nothing up.
	expect((await fetch(link)).status).toBe(200)

	const elsewhere = await browser.newContext({ viewport: { width: 390, height: 844 }, baseURL: e2eAddresses().web })
	const phone = await elsewhere.newPage()
	await phone.goto(link)
	await expect(phone.getByText(email)).toBeVisible()
	await expectNoAxeFindings(phone)
	await phone.getByRole("button", { name: "Sign in" }).click()
	await expect(phone).toHaveURL("/account")
	await phone.goto(link)
	await expect(phone.getByRole("heading", { name: "This link works no more" })).toBeVisible()
	await elsewhere.close()
})

test.describe("without JavaScript", () => {
	test.use({ javaScriptEnabled: false })

	test("a wrong address and a wrong code are said at the field, and what was typed stays", async ({ page }) => {
		await page.goto("/sign-in?to=%2Faccount")
		await page.getByLabel("E-mail address").fill("ida at larkmoor")
		await page.getByRole("button", { name: "Send me a code" }).click()
		await expect(page.getByRole("alert")).toContainText("This does not look like an e-mail address.")
		const address = page.getByLabel("E-mail address")
		await expect(address).toHaveValue("ida at larkmoor")
		await expect(address).toHaveAccessibleDescription(/does not look like an e-mail address/)

		const { email } = await addPerson("Wren Alder", "packer")
		const nextMail = await openInbox(email)
		await address.fill(email)
		await page.getByRole("button", { name: "Send me a code" }).click()
		const code = codeIn(await nextMail())
		const wrong = code === "111111" ? "222222" : "111111"
		await page.getByLabel("Six-digit code").fill(wrong)
		await page.getByRole("button", { name: "Sign in" }).click()
		await expect(page.getByRole("alert")).toContainText("4 more tries")
		await expect(page.getByLabel("Six-digit code")).toHaveValue(wrong)
		await page.getByLabel("Six-digit code").fill(`${code.slice(0, 3)} ${code.slice(3)}`)
		await page.getByRole("button", { name: "Sign in" }).click()
		await expect(page).toHaveURL("/account")
	})

	test("what was typed before the session ended is sent after signing in again", async ({ page, context }) => {
		await inviteAfterTheSessionEnded(page, context)
	})
})

test("what was typed before the session ended is sent after signing in again", async ({ page, context }) => {
	await inviteAfterTheSessionEnded(page, context)
})

/** Fills in the invitation, loses the session, presses the button, signs in, and sends what was kept. */
async function inviteAfterTheSessionEnded(page: Page, context: BrowserContext): Promise<void> {
	const owner = await addPerson("Hazel Marl", "owner")
	const email = `${randomUUID()}@larkmoor.example.test`
	await signIn(page, owner.email, PEOPLE)
	await page.getByLabel("Name").fill("Wren Alder")
	await page.getByLabel("E-mail address").fill(email)
	await page.getByLabel("What they are to do").selectOption("packer")
	await forgetSession(context)
	await page.getByRole("button", { name: "Send the invitation" }).click()
	await expect(page.getByText("What you typed is kept for an hour")).toBeVisible()

	const nextMail = await openInbox(owner.email)
	await page.getByLabel("E-mail address").fill(owner.email)
	await page.getByRole("button", { name: "Send me a code" }).click()
	await expect(page.getByRole("heading", { name: "Type the code" })).toBeVisible()
	await page.getByLabel("Six-digit code").fill(codeIn(await nextMail()))
	await page.getByRole("button", { name: "Sign in" }).click()
	await expect(page.getByRole("heading", { name: "Go on where you were" })).toBeVisible()
	await expect(page.getByText("Wren Alder")).toBeVisible()
	await expect(page.getByText(email)).toBeVisible()
	await page.getByRole("button", { name: "Send it now" }).click()
	await expect(page).toHaveURL(`${PEOPLE}?${new URLSearchParams({ invited: email })}`)
	await expect(page.getByRole("status")).toContainText(`The invitation to ${email} is on its way.`)
}

test("an invited person accepts after a code to their own address", async ({ page, browser }) => {
	const owner = await addPerson("Hazel Marl", "owner")
	const email = `${randomUUID()}@larkmoor.example.test`
	const nextMail = await openInbox(email)
	await signIn(page, owner.email, PEOPLE)
	await page.getByRole("button", { name: "Send the invitation" }).click()
	await expect(page.getByRole("alert")).toContainText("Write the person's name.")
	await expectNoAxeFindings(page)
	await page.getByLabel("Name").fill("Tilda Broom")
	await page.getByLabel("E-mail address").fill(email)
	await page.getByLabel("What they are to do").selectOption("buyer")
	await page.getByRole("button", { name: "Send the invitation" }).click()
	await expect(page.getByRole("alert")).toContainText("Choose the store the person buys for.")
	await expect(page.getByLabel("Name")).toHaveValue("Tilda Broom")
	await page.getByLabel("Store").selectOption({ index: 1 })
	await page.getByRole("button", { name: "Send the invitation" }).click()
	await expect(page.getByRole("status")).toContainText("is on its way")

	const elsewhere = await browser.newContext({ baseURL: e2eAddresses().web })
	const theirs = await elsewhere.newPage()
	await theirs.goto(linkIn(await nextMail(), "/invitation/"))
	await expect(theirs.getByRole("heading", { name: "Larkmoor Bee Yard invites you" })).toBeVisible()
	await expectNoAxeFindings(theirs)
	await theirs.getByRole("button", { name: "Send me a code" }).click()
	await expect(theirs.getByRole("heading", { name: "Type the code" })).toBeVisible()
	await theirs.getByLabel("Six-digit code").fill(codeIn(await nextMail()))
	await theirs.getByRole("button", { name: "Sign in" }).click()
	await theirs.getByRole("button", { name: "Accept" }).click()
	await expect(theirs).toHaveURL(/\/buy\/larkmoor\//)
	await elsewhere.close()
})

test("a person ends a session of theirs, and it opens nothing any more", async ({ page, browser }) => {
	const { email } = await addPerson("Wren Alder", "packer")
	const phone = await browser.newPage({ baseURL: e2eAddresses().web })
	await signIn(phone, email)
	await signIn(page, email)
	await page.goto("/account/sessions")
	await expectNoAxeFindings(page)
	const others = page.getByRole("button", { name: /^End / }).filter({ hasText: "End it" })
	await others.first().click()
	await expect(others).toHaveCount(0)
	await phone.goto("/account")
	await expect(phone).toHaveURL("/sign-in?to=%2Faccount")
	await phone.close()
})
