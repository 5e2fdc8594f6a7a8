import { readdirSync, readFileSync } from "node:fs"
import { dirname, join } from "node:path"
import { expect, type Page, type Request, test } from "@playwright/test"
import { e2eAddresses } from "../setup/e2e-addresses"
import { type CaughtMail, openInbox } from "./auth-mails"
import {
	askDatabase,
	DESK,
	expectNoFindings,
	IDA,
	STORE,
	switchPayments,
	TOBIAS,
	typeCard,
	untilHydrated,
	visitAs,
	watchFaults,
} from "./desk-visits"

const CARD = "4242424242424242"
const EMPTY_ACCOUNT = "000222222227"
const GOOD_ACCOUNT = "000123456789"
/** Of a year in which nothing else is invoiced, so that no other test's numbers move. */
const FIRST = "2002-0001"
const SECOND = "2002-0002"

const LARKMOOR = "(select id from producers where slug = 'larkmoor')"
const SHOP = `(select id from stores where producer_id = ${LARKMOOR} and slug = 'pantry-and-plume')`

test.beforeAll(async () => {
	await askDatabase(
		`insert into invoices (producer_id, year, sequence, store_id, issued_on, due_on, lines_cents, delivery_cents, tax_cents,
			total_cents)
		select ${LARKMOOR}, 2002, n, ${SHOP}, current_date, current_date + 14, cents, 0, 0, cents
		from (values (1, 90000), (2, 30000)) as given (n, cents)`,
	)
})

test.afterEach(() => switchPayments({ repeatEvents: 0, slowMs: 0, failNext: null, dropNext: null }))

/** Has the payer's bank do something, as its page does. */
async function bank(step: Record<string, string>): Promise<void> {
	const answer = await fetch(`${e2eAddresses().stripe}/_bank`, { method: "POST", body: JSON.stringify(step) })
	expect(answer.status, await answer.text()).toBe(200)
}

/** The payment at Stripe that a store made last. */
async function lastIntent(): Promise<string> {
	const [row] = await askDatabase<{ id: string }>(
		`select stripe_payment_intent_id as id from payments where store_id = ${SHOP} and stripe_payment_intent_id is not null
		order by received_at desc limit 1`,
	)
	return row?.id ?? ""
}

async function typeAccount(page: Page, number: string): Promise<void> {
	await page.getByLabel("Account number").fill(number)
	await page.getByLabel("Name on account").fill("Tobias Amory")
	await page.getByRole("button", { name: /^Pay/ }).click()
}

async function nextAbout(next: () => Promise<CaughtMail>, subject: RegExp): Promise<CaughtMail> {
	for (;;) {
		const mail = await next()
		if (subject.test(mail.subject)) return mail
	}
}

/** Ticks these invoices and no other, with so much of each. */
async function choose(page: Page, amounts: Record<string, string>): Promise<void> {
	for (const box of await page.getByRole("checkbox").all()) await box.uncheck()
	for (const [number, amount] of Object.entries(amounts)) {
		await page.getByRole("checkbox", { name: number }).check()
		await page.getByLabel(`Pay now of invoice ${number}`).fill(amount)
	}
}

const goOn = (page: Page) => page.getByRole("button", { name: "Go on to the payment page" }).click()

/** Looks again until the page shows what an event brings. */
async function untilShown(page: Page, words: RegExp): Promise<void> {
	await expect(async () => {
		await page.reload()
		await expect(page.getByText(words).first()).toBeVisible({ timeout: 1_000 })
	}).toPass({ timeout: 30_000 })
}

test("a store pays a part by card, then by a debit that is returned, then by one that clears; no number reaches us", async ({
	browser,
}) => {
	test.setTimeout(240_000)
	const nextForTobias = await openInbox(TOBIAS)
	const tobias = await visitAs(browser, TOBIAS)
	const ida = await visitAs(browser, IDA)
	const faults = [watchFaults(tobias), watchFaults(ida)]
	const posts: string[] = []
	const note = (request: Request) => {
		if (request.url().startsWith(e2eAddresses().web)) posts.push(`${request.url()} ${request.postData() ?? ""}`)
	}
	tobias.on("request", note)

	await test.step("a part by card, while Stripe is slow and loses a line", async () => {
		await tobias.goto(`${STORE}/invoices/${FIRST}`)
		await untilHydrated(tobias)
		await tobias.getByRole("link", { name: "Pay a part, or by bank debit" }).click()
		await expect(tobias.getByRole("heading", { level: 1 })).toHaveText("Pay invoices")
		await expect(tobias.getByRole("checkbox", { name: FIRST })).toBeChecked()
		await expectNoFindings(tobias)
		await choose(tobias, { [FIRST]: "900.01" })
		await goOn(tobias)
		const field = tobias.getByLabel(`Pay now of invoice ${FIRST}`)
		await expect(field).toHaveAccessibleDescription(`No more than $900.00 is to be paid of invoice ${FIRST}.`)
		await expect(field).toHaveValue("900.01")
		faults[0]?.splice(0)
		await switchPayments({ slowMs: 400, dropNext: { count: 1, when: "after", path: "/v1/checkout/sessions" } })
		await field.fill("400")
		await goOn(tobias)
		await tobias.waitForURL(`${e2eAddresses().stripe}/**`)
		await switchPayments({ slowMs: 0 })
		await expect(tobias.getByText("$400.00").first()).toBeVisible()
		await typeCard(tobias, CARD)
		await tobias.waitForURL(/\?paid=/)
		await expect(tobias.getByRole("status")).toContainText("Paid, thank you.", { timeout: 30_000 })
		await expect(tobias.getByText("$500.00 to pay by")).toBeVisible()
		await expectNoFindings(tobias)
		expect((await nextAbout(nextForTobias, /has your payment of \$400\.00/)).text).toContain(
			"On invoice 2002-0001 there is $500.00 left to pay.",
		)
	})

	await test.step("two invoices by a debit that is on its way", async () => {
		await tobias.goto(`${STORE}/pay`)
		await choose(tobias, { [FIRST]: "500", [SECOND]: "300" })
		await tobias.getByLabel(/^bank debit/).check()
		await goOn(tobias)
		await tobias.waitForURL(`${e2eAddresses().stripe}/**`)
		await typeAccount(tobias, EMPTY_ACCOUNT)
		await tobias.waitForURL(/\/invoices\?paid=/)
		await expect(tobias.getByRole("status")).toContainText("Your bank debit of $800.00 is on its way.", {
			timeout: 30_000,
		})
		await tobias.goto(`${STORE}/invoices/${SECOND}`)
		await expect(tobias.getByText("$300.00 of it is on its way")).toBeVisible()
		await expect(tobias.getByRole("button", { name: /^Pay/ })).toHaveCount(0)
		await ida.goto(`${DESK}/invoices/${FIRST}`)
		await expect(ida.getByText("$500.00 of it is on its way")).toBeVisible()
		await ida.getByRole("link", { name: /^Bank debit of .*on its way$/ }).click()
		await expect(ida.getByRole("heading", { level: 1 })).toHaveText("$800.00 by bank debit")
		await expectNoFindings(ida)
	})

	await test.step("the bank returns it: a letter says so, and the invoices are open", async () => {
		await bank({ step: "settle-debit", intent: await lastIntent() })
		const letter = await nextAbout(nextForTobias, /your bank returned the payment of \$800\.00/)
		expect(letter.text).toContain("insufficient funds")
		await untilShown(ida, /Came back/)
		await ida.goto(`${DESK}/payments`)
		await expect(ida.getByRole("row").filter({ hasText: "$800.00" })).toContainText("came back")
		await expectNoFindings(ida)
		await tobias.goto(`${STORE}/invoices/${SECOND}`)
		await expect(tobias.getByText("$300.00 to pay by")).toBeVisible()
	})

	await test.step("another debit clears, and both are paid", async () => {
		await tobias.goto(`${STORE}/pay`)
		await choose(tobias, { [FIRST]: "500", [SECOND]: "300" })
		await tobias.getByLabel(/^bank debit/).check()
		await goOn(tobias)
		await tobias.waitForURL(`${e2eAddresses().stripe}/**`)
		await typeAccount(tobias, GOOD_ACCOUNT)
		await tobias.waitForURL(/\/invoices\?paid=/)
		await expect(tobias.getByRole("status")).toContainText("Your bank debit of $800.00 is on its way.", {
			timeout: 30_000,
		})
		await switchPayments({ repeatEvents: 1 })
		await bank({ step: "settle-debit", intent: await lastIntent(), outcome: "clear" })
		await nextAbout(nextForTobias, /has your payment of \$800\.00/)
		const paid = await askDatabase(
			"select open_cents as open, paid_cents as paid from invoices where year = 2002 order by sequence",
		)
		expect(paid).toEqual([
			{ open: 0, paid: 90_000 },
			{ open: 0, paid: 30_000 },
		])
	})

	await test.step("the desk gives part of it back, and never more than was paid", async () => {
		await ida.goto(`${DESK}/invoices/${FIRST}`)
		await ida.getByRole("link", { name: /^Card of/ }).click()
		await untilHydrated(ida)
		const amount = ida.getByLabel("How much goes back")
		await amount.fill("400.01")
		await ida.getByLabel("Why").fill("Two cases came late.")
		await ida.getByRole("button", { name: "Refund through Stripe" }).click()
		await expect(amount).toHaveAccessibleDescription(/No more than \$400\.00 of it can go back/)
		await expect(ida.getByLabel("Why")).toHaveValue("Two cases came late.")
		faults[1]?.splice(0)
		await amount.fill("100")
		await ida.getByRole("button", { name: "Refund through Stripe" }).click()
		await expect(ida.getByRole("status")).toContainText("The refund is made.")
		await expect(ida.getByText("Two cases came late.")).toBeVisible()
		await expectNoFindings(ida)
		await nextAbout(nextForTobias, /has refunded \$100\.00/)
		await ida.goto(`${DESK}/invoices/${FIRST}`)
		await expect(ida.getByText("$100.00 to be paid by")).toBeVisible()
	})

	await test.step("a check for several invoices goes where it is told", async () => {
		await ida.getByRole("link", { name: "Payment for several" }).click()
		await untilHydrated(ida)
		await expectNoFindings(ida)
		await ida.getByLabel("How much").fill("150")
		await ida.getByLabel("Number or words").fill("1207")
		await ida.getByLabel("as told here").check()
		await ida.getByLabel(`Of it to invoice ${FIRST}`).fill("100.01")
		await ida.getByRole("button", { name: "Note the payment" }).click()
		await expect(ida.getByLabel(`Of it to invoice ${FIRST}`)).toHaveAccessibleDescription(
			/more than invoice .* has open/,
		)
		faults[1]?.splice(0)
		await ida.getByLabel(`Of it to invoice ${FIRST}`).fill("100")
		await ida.getByRole("button", { name: "Note the payment" }).click()
		await expect(ida.getByRole("status")).toContainText(
			`It settles $100.00 of invoice ${FIRST}; $50.00 stays on the store’s account.`,
		)
		await expect(ida.getByText("is on the store’s account")).toBeVisible()
	})

	await test.step("a card is kept, offered, and taken from by itself only while the store agrees", async () => {
		await tobias.goto(`${STORE}/payment-method`)
		await untilHydrated(tobias)
		await expectNoFindings(tobias)
		await tobias.getByRole("button", { name: "Keep a card" }).click()
		await tobias.waitForURL(`${e2eAddresses().stripe}/**`)
		await tobias.getByLabel("Card number").fill(CARD)
		await tobias.getByLabel("Expiry").fill("12/34")
		await tobias.getByLabel("CVC").fill("123")
		await tobias.getByLabel("Name on").fill("Tobias Amory")
		await tobias.getByRole("button", { name: "Keep this card" }).click()
		await tobias.waitForURL(/\?kept=/)
		await expect(tobias.getByRole("status")).toContainText("Your card ending in 4242 is kept.", { timeout: 30_000 })
		await untilHydrated(tobias)
		await tobias.getByRole("checkbox").check()
		await tobias.getByRole("button", { name: "Save" }).click()
		await expect(tobias.getByRole("status")).toContainText("What falls due from today on is taken by itself.")
		await expect(tobias.getByText("Tobias Amory agreed to it on")).toBeVisible()
		await expectNoFindings(tobias)
		await tobias.getByRole("button", { name: "Forget the card ending in 4242" }).click()
		await expect(tobias.getByRole("status")).toContainText("It is forgotten.")
		await expect(tobias.getByRole("checkbox")).toHaveCount(0)
	})

	await test.step("nothing differs from Stripe, and no number of a card or account has reached us", async () => {
		await ida.goto(`${DESK}/stripe-differences`)
		await expectNoFindings(ida)
		const numbers = [CARD, EMPTY_ACCOUNT, GOOD_ACCOUNT]
		expect(posts.length).toBeGreaterThan(10)
		for (const number of numbers) {
			const spaced = number.replace(/(\d{4})(?=\d)/g, "$1 ")
			for (const post of posts) expect(post).not.toContain(number)
			for (const post of posts) expect(decodeURIComponent(post.replaceAll("+", " "))).not.toContain(spaced)
			expect(await logsWith(number), number).toEqual([])
			expect(await tablesWith(number), number).toEqual([])
		}
		// The looking itself works: what is there is found.
		expect(await tablesWith("card ending in 4242")).toContain("audit_entries")
	})
	expect(faults.flat()).toEqual([])
})

/** The logs of the product in which such words stand; the fake's own is none of the product's. */
function logsWith(words: string): Promise<string[]> {
	const folder = join(dirname(e2eAddresses().env.TEST_CLOCK_FILE ?? ""), "log")
	const logs = readdirSync(folder).filter((name) => /web|worker|server/.test(name))
	expect(logs.length).toBeGreaterThan(0)
	return Promise.resolve(logs.filter((name) => readFileSync(join(folder, name), "utf8").includes(words)))
}

/** The tables of the database in which such words stand anywhere in a row. */
async function tablesWith(words: string): Promise<string[]> {
	const tables = await askDatabase<{ name: string }>(
		`select format('%I.%I', schemaname, tablename) as name from pg_tables
		where schemaname not in ('pg_catalog', 'information_schema')`,
	)
	expect(tables.length).toBeGreaterThan(50)
	const found = await askDatabase<{ name: string }>(
		tables
			.map(
				({ name }) => `select '${name}' as name where exists (select from ${name} t where position($1 in t::text) > 0)`,
			)
			.join(" union all "),
		[words],
	)
	return found.map(({ name }) => name.replace("public.", ""))
}

test("with two tabs open on one invoice nobody pays it twice", async ({ browser }) => {
	await askDatabase(
		`insert into invoices (producer_id, year, sequence, store_id, issued_on, due_on, lines_cents, delivery_cents, tax_cents,
			total_cents) values (${LARKMOOR}, 2002, 3, ${SHOP}, current_date, current_date + 14, 2500, 0, 0, 2500)`,
	)
	const first = await visitAs(browser, TOBIAS, { javaScriptEnabled: false, viewport: { width: 390, height: 844 } })
	const second = await first.context().newPage()
	for (const page of [first, second]) {
		await page.goto(`${STORE}/invoices/2002-0003`)
		await page.getByRole("button", { name: "Pay $25.00 by card" }).click()
		await page.waitForURL(`${e2eAddresses().stripe}/**`)
	}
	expect(second.url()).toBe(first.url())
	await typeCard(first, CARD)
	await first.waitForURL(/\?paid=/)
	await typeCard(second, CARD)
	await second.waitForURL(/\?paid=/)
	await untilShown(second, /Paid, thank you\./)
	const paid = await askDatabase<{ payments: number; cents: number }>(
		`select count(*)::int as payments, sum(t.amount_cents)::int as cents from settlements t
		join invoices i on i.producer_id = t.producer_id and i.id = t.invoice_id where i.year = 2002 and i.sequence = 3`,
	)
	expect(paid).toEqual([{ payments: 1, cents: 2_500 }])
	await first.context().close()
})
