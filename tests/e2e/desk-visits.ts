import { createHash, randomUUID } from "node:crypto"
import AxeBuilder from "@axe-core/playwright"
import { type Browser, type BrowserContextOptions, expect, type Page } from "@playwright/test"
import pg from "pg"
import { e2eAddresses } from "../setup/e2e-addresses"

export const IDA = "ida@larkmoor.example.test"
export const ROSA = "rosa@pantryandplume.example.test"
export const TOBIAS = "tobias@pantryandplume.example.test"
export const DESK = "/desk/larkmoor"
export const STORE = "/buy/larkmoor/pantry-and-plume"

/** Asks the product's database, as the login that owns the schema, with the rows of Larkmoor in sight. */
export async function askDatabase<Row extends pg.QueryResultRow>(text: string, values: unknown[] = []): Promise<Row[]> {
	const client = new pg.Client({ connectionString: e2eAddresses().databaseUrl })
	await client.connect()
	try {
		await client.query("begin")
		await client.query(
			"select set_config('waxbill.producer_id', (select id::text from producers where slug = 'larkmoor'), true)",
		)
		const { rows } = await client.query<Row>(text, values)
		await client.query("commit")
		return rows
	} finally {
		await client.end()
	}
}

/** A page of someone who has signed in before, in a browser of their own: with a session's row and its cookie. */
export async function visitAs(browser: Browser, email: string, options: BrowserContextOptions = {}): Promise<Page> {
	const { web } = e2eAddresses()
	const token = randomUUID()
	await askDatabase(
		`insert into sessions (user_id, token_hash, expires_at)
		select id, $2, now() + interval '1 day' from users where email = $1`,
		[email, createHash("sha256").update(token).digest("hex")],
	)
	const context = await browser.newContext({ baseURL: web, viewport: { width: 1440, height: 900 }, ...options })
	await context.addCookies([{ name: "waxbill-session", value: token, url: web }])
	return context.newPage()
}

/** Collects what went wrong on a page of the product; a declined card is a 402 of the payment fake's own page. */
export function watchFaults(page: Page): string[] {
	const faults: string[] = []
	page.on("pageerror", (error) => faults.push(error.message))
	page.on("console", (message) => {
		const isDecline = message.location().url.startsWith(e2eAddresses().stripe) && message.text().includes("402")
		if (message.type() === "error" && !isDecline) faults.push(`${page.url()}: ${message.text()}`)
	})
	return faults
}

export const untilHydrated = (page: Page) => page.waitForSelector("html[data-hydrated]")

/** What axe finds on the page, which is nothing. */
export async function expectNoFindings(page: Page): Promise<void> {
	const { violations } = await new AxeBuilder({ page }).analyze()
	expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(" ")}`)).toEqual([])
}

/** Turns switches of the payment fake. */
export async function switchPayments(changes: Record<string, unknown>): Promise<void> {
	const answer = await fetch(`${e2eAddresses().stripe}/_switches`, { method: "POST", body: JSON.stringify(changes) })
	expect(answer.status).toBe(200)
}

/** Types a card on the hosted page. */
export async function typeCard(page: Page, number: string): Promise<void> {
	await page.getByLabel("Card number").fill(number)
	await page.getByLabel("Expiry").fill("12/34")
	await page.getByLabel("CVC").fill("123")
	await page.getByLabel("Name on").fill("Tobias Amory")
	await page.getByRole("button", { name: /^Pay/ }).click()
}

/** Lets letters that wait for the time in which they can be taken back go now. */
export async function hurryLetters(): Promise<void> {
	await askDatabase(
		"update graphile_worker._private_jobs set run_at = now() where run_at > now() and locked_at is null",
	)
}
