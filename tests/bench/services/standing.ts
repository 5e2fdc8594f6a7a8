import { spawn } from "node:child_process"
import { randomUUID } from "node:crypto"
import { once } from "node:events"
import { sql } from "drizzle-orm"
import pg from "pg"
import { withPlatform, withProducer } from "~/db/transaction.server"
import { findSeason } from "~/services/desk/find-season.server"
import { findToDo } from "~/services/desk/find-to-do.server"
import { makeDueOrders } from "~/services/standing-orders/make-due-orders.server"
import { medianOfAsync } from "./timing"

const STORES = 2_000
const OPEN_ORDERS = 5_000
const RUNS = 5
/** Last orders for Tuesday, August 18, 2026, are on Friday at noon in New York; it is an hour later. */
const AFTER_LAST_ORDERS = "2026-08-14T17:00:00Z"

/**
 * A producer with `stores` stores, each with a standing order of three of twelve products for one delivery. Half of the
 * products reach for all who ask.
 */
async function openStores(stores: number): Promise<string> {
	const producerId = randomUUID()
	const email = `${producerId}@bench.example.test`
	await withPlatform((tx) => tx.execute(sql`insert into users (email, name) values (${email}, 'Buyer')`))
	await withProducer(producerId, async (tx) => {
		const buyer = sql`(select id from users where email = ${email})`
		for (const statement of [
			sql`insert into producers (id, slug, name, time_zone) values (${producerId}, ${producerId}, 'Two thousand stores', 'America/New_York')`,
			sql`insert into producer_settings (producer_id, email, address, contact_name) values (${producerId}, ${email}, 'Weld Lane', 'Ida')`,
			sql`insert into price_tiers (producer_id, name) values (${producerId}, 'Shops')`,
			sql`insert into delivery_rounds (producer_id, name, weekday, cutoff_days_before, cutoff_time)
				values (${producerId}, 'Town', 2, 4, '12:00')`,
			sql`insert into products (producer_id, code, name, form, colour, detail, piece_net_grams, pieces_per_case, break_family)
				select ${producerId}, (10 + n)::text, 'Section ' || n, 'round', 'light', 'Fancy', 226, 12, 'sections'
				from generate_series(1, 12) n`,
			sql`insert into prices (producer_id, tier_id, product_id, min_cases, case_cents, valid_from)
				select p.producer_id, t.id, p.id, m, 11400 - 100 * m, '2026-01-01'
				from products p join price_tiers t on t.producer_id = p.producer_id cross join (values (1), (3)) as breaks (m)
				where p.producer_id = ${producerId}`,
			sql`insert into lots (producer_id, code, product_id, state, harvested_on, expected_release_on, best_before_on, pieces_harvested)
				select producer_id, 'L' || code, id, 'released', '2026-07-01', '2026-07-10', '2027-07-01',
					case when code::int % 2 = 0 then ${stores * 40}::int else ${stores}::int end
				from products where producer_id = ${producerId}`,
			sql`insert into stock_moves (producer_id, lot_id, to_place, pieces, reason)
				select producer_id, id, 'ready', pieces_harvested, 'harvest' from lots where producer_id = ${producerId}`,
			sql`insert into stores (producer_id, slug, name, tier_id)
				select t.producer_id, 'store-' || n, 'Store ' || n, t.id from price_tiers t, generate_series(1, ${stores}::int) n
				where t.producer_id = ${producerId}`,
			sql`insert into store_rounds (producer_id, store_id, round_id)
				select s.producer_id, s.id, r.id from stores s join delivery_rounds r on r.producer_id = s.producer_id
				where s.producer_id = ${producerId}`,
			sql`insert into standing_orders (producer_id, store_id, rule, starts_on, created_by, created_at)
				select producer_id, id, 'FREQ=WEEKLY;BYDAY=TU', '2026-08-18', ${buyer}, '2026-08-01' from stores
				where producer_id = ${producerId}`,
			sql`insert into standing_order_lines (producer_id, standing_order_id, product_id, cases, least_cases)
				select o.producer_id, o.id, p.id, 3, 1
				from (select *, row_number() over (order by id) as place from standing_orders where producer_id = ${producerId}) o
				join products p on p.producer_id = o.producer_id and (p.code::int + o.place) % 4 = 0`,
		]) {
			await tx.execute(statement)
		}
	})
	await countAnew()
	return producerId
}

/** As the database does by itself within a minute: a plan made without knowing the new rows is another measure. */
async function countAnew(): Promise<void> {
	const client = new pg.Client({ connectionString: process.env.DATABASE_URL })
	await client.connect()
	await client.query("vacuum (analyze)")
	await client.end()
}

/** Makes the due orders of one producer: what a worker of its own does. */
export async function workAtCutOff({ producerId }: { producerId: string }): Promise<{ made: number }> {
	return makeDueOrders({ producerId, now: new Date(AFTER_LAST_ORDERS) })
}

/** How long the cut-off of 2,000 standing orders takes with one worker and with two, each a process of its own. */
export async function measureStanding(): Promise<{ stores: number; ms: { one: number; two: number } }> {
	const [one, two] = [await measureWorkers(STORES, 1), await measureWorkers(STORES, 2)]
	return { stores: STORES, ms: { one, two } }
}

/** Milliseconds at the median for the figures of To do and of the season, with 5,000 orders open and 5,000 standing. */
export async function measureDesk(): Promise<{ stores: number; toDo: number; season: number }> {
	const producerId = await openStores(OPEN_ORDERS)
	const now = new Date(AFTER_LAST_ORDERS)
	await makeDueOrders({ producerId, now })
	const query = { producerId, now, zone: "America/New_York" }
	return {
		stores: OPEN_ORDERS,
		toDo: await medianOfAsync(RUNS, () => findToDo(query)),
		season: await medianOfAsync(RUNS, () => findSeason(query)),
	}
}

async function measureWorkers(stores: number, workers: number): Promise<number> {
	const producerId = await openStores(stores)
	const began = performance.now()
	const made = await Promise.all(Array.from({ length: workers }, () => startWorker(producerId)))
	const took = performance.now() - began
	const all = made.reduce((sum, count) => sum + count, 0)
	if (all !== stores) throw new Error(`${all} orders were made of ${stores}`)
	return took
}

/** Another run of this very program, which makes what is due; answers how many orders it made. */
async function startWorker(producerId: string): Promise<number> {
	const [, program = ""] = process.argv
	const worker = spawn(process.execPath, [program, "cut-off", JSON.stringify({ producerId })], {
		stdio: ["ignore", "pipe", "inherit"],
	})
	let text = ""
	worker.stdout.on("data", (chunk) => {
		text += chunk
	})
	const [code] = await once(worker, "close")
	if (code !== 0) throw new Error("a worker of the cut-off failed")
	return (JSON.parse(text.trim().split("\n").at(-1) ?? "") as { made: number }).made
}
