import { createHash, randomUUID } from "node:crypto"
import AxeBuilder from "@axe-core/playwright"
import { expect, type Page } from "@playwright/test"
import pg from "pg"
import { e2eAddresses } from "../setup/e2e-addresses"

export const READER = "tmr_demo_stall"

/** Asks the product's database for a producer, as the login that owns the schema; row security binds that one too. */
export async function ask<Row extends pg.QueryResultRow>(
	text: string,
	values: unknown[] = [],
	producer = "larkmoor",
): Promise<Row[]> {
	const client = new pg.Client({ connectionString: e2eAddresses().databaseUrl })
	await client.connect()
	try {
		await client.query(
			"select set_config('waxbill.producer_id', (select id::text from producers where slug = $1), false)",
			[producer],
		)
		return (await client.query<Row>(text, values)).rows
	} finally {
		await client.end()
	}
}

/** Signs in someone who has been here before: with a session's row and its cookie. */
export async function signIn(page: Page, email: string): Promise<void> {
	const token = randomUUID()
	await ask(
		`insert into sessions (user_id, token_hash, expires_at)
		select id, $2, now() + interval '1 day' from users where email = $1`,
		[email, createHash("sha256").update(token).digest("hex")],
	)
	await page.context().addCookies([{ name: "waxbill-session", value: token, url: e2eAddresses().web }])
}

/** A market day of Larkmoor: today's at Coopers Green, which is open, or the next at Lantern Wharf. */
export async function marketDay(market: "Coopers Green Market" | "Lantern Wharf Market"): Promise<string> {
	const [day] = await ask<{ id: string }>(
		`select d.id from market_days d join markets m on m.producer_id = d.producer_id and m.id = d.market_id
		where m.name = $1 and d.state <> 'closed' order by d.market_on limit 1`,
		[market],
	)
	if (!day) throw new Error(`no day of ${market}`)
	return day.id
}

export type ByName<Figures> = Record<string, Figures>

const NAMES: Record<string, string> = {
	"11": "Round",
	"21": "Basswood",
	"31": "Clear-box",
	"41": "Cut comb",
	"42": "Half piece",
	"51": "Chunk jar",
}

/** What the stock ledger says of a market day: pieces on the table and gone from it, by the names of the stall. */
export async function stockOf(dayId: string): Promise<ByName<{ left: number; gone: number }>> {
	const rows = await ask<{ code: string; left: number; gone: number }>(
		`select p.code, coalesce(sum(b.pieces) filter (where b.place = 'market'), 0)::int as "left",
			coalesce(sum(b.pieces) filter (where b.place = 'sold'), 0)::int as gone
		from stock_balances b
		join lots l on l.producer_id = b.producer_id and l.id = b.lot_id
		join products p on p.producer_id = l.producer_id and p.id = l.product_id
		where b.place_ref = $1 group by p.code`,
		[dayId],
	)
	return Object.fromEntries(rows.map(({ code, left, gone }) => [NAMES[code] ?? code, { left, gone }]))
}

/** The sales of a market day, in the order they were begun. */
export function salesOf(dayId: string) {
	return ask<{ id: string; method: string; state: string; total_cents: number; given_cents: number | null }>(
		"select id, method, state, total_cents, given_cents from sales where market_day_id = $1 order by sold_at, id",
		[dayId],
	)
}

const CARDS = {
	good: "Present a good card",
	declined: "Present a declined card",
	insufficient: "Present a card without funds",
}

/** Holds a card to the stall's reader, by the form on the stand-in's page of readers; the phone's own page stays in front. */
export async function presentCard(page: Page, card: keyof typeof CARDS): Promise<void> {
	const readers = `${e2eAddresses().stripe}/readers`
	await expect.poll(async () => (await page.request.get(readers)).text()).toContain(CARDS[card])
	const answer = await page.request.post(`${readers}/${READER}/present`, { form: { card } })
	expect(answer.ok()).toBe(true)
}

/** Turns switches of the payment fake. */
export async function turn(page: Page, switches: object): Promise<void> {
	const answer = await page.request.post(`${e2eAddresses().stripe}/_switches`, { data: switches })
	expect(answer.ok()).toBe(true)
}

export const untilHydrated = (page: Page) => page.waitForSelector("html[data-hydrated]")

/** Nothing on the page is wider than the screen. */
export async function expectFits(page: Page): Promise<void> {
	expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBe(page.viewportSize()?.width)
}

/** The page fits its screen, and axe finds nothing on it. */
export async function expectNoFaults(page: Page): Promise<void> {
	await expectFits(page)
	const { violations } = await new AxeBuilder({ page }).analyze()
	expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(" ")}`)).toEqual([])
}
