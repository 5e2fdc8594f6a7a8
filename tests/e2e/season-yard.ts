import { createHash, randomUUID } from "node:crypto"
import pg from "pg"
import { e2eAddresses } from "../setup/e2e-addresses"

const A_DAY = 86_400_000
const dayAt = (moment: number) => new Date(moment).toISOString().slice(0, 10)
const isoWeekday = (day: string) => new Date(`${day}T12:00:00Z`).getUTCDay() || 7

type Store = { id: string; slug: string; name: string; email: string }

/**
 * A producer of its own with one product and 21 cases of it on the shelf, one round a week that closes two days before at
 * noon, and three stores: Pantry & Plume, which has no standing order yet, and two that take six and two cases each week.
 * The first of its delivery days is five days ahead.
 */
export async function openSeasonYard() {
	const tag = randomUUID().slice(0, 6)
	const slug = `season-${tag}`
	const producerId = randomUUID()
	const ask = askAs(producerId)
	const first = Date.now() + 5 * A_DAY
	const days = [0, 7, 14].map((later) => dayAt(first + later * A_DAY))
	const owner = { id: randomUUID(), email: `ida-${tag}@larkmoor.example.test` }
	const productId = randomUUID()
	const tierId = randomUUID()
	const roundId = randomUUID()

	await ask("insert into users (id, name, email) values ($1, 'Ida', $2)", [owner.id, owner.email])
	await ask(
		"insert into producers (id, slug, name, time_zone) values ($1, $2, 'Saltmarsh Bee Yard', 'America/New_York')",
		[producerId, slug],
	)
	await ask(
		"insert into producer_settings (producer_id, email, contact_name, address) values ($1, $2, 'Ida', 'Weld Lane, Teasel County')",
		[producerId, owner.email],
	)
	await ask("insert into memberships (producer_id, user_id, role) values ($1, $2, 'owner')", [producerId, owner.id])
	await ask("insert into price_tiers (producer_id, id, name) values ($1, $2, 'Shops')", [producerId, tierId])
	await ask(
		`insert into delivery_rounds (producer_id, id, name, weekday, cutoff_days_before, cutoff_time)
		values ($1, $2, 'Town', $3, 2, '12:00')`,
		[producerId, roundId, isoWeekday(days[0] ?? "")],
	)
	await ask(
		`insert into products (producer_id, id, code, name, form, colour, detail, piece_net_grams, pieces_per_case, break_family)
		values ($1, $2, '11', 'Basswood section', 'basswood', 'light', 'Fancy, 13 oz', 368, 12, 'sections')`,
		[producerId, productId],
	)
	await ask(
		`insert into prices (producer_id, tier_id, product_id, min_cases, case_cents, valid_from)
		values ($1, $2, $3, 1, 14250, '2020-01-01')`,
		[producerId, tierId, productId],
	)
	await addLot("R1", 21)
	const ours = await addStore("Pantry & Plume", "rosa")
	const others = [await addStore("Mill Lane Co-op", "mill"), await addStore("Corner Larder", "larder")]
	for (const [index, store] of others.entries()) await addStanding(store, index === 0 ? 6 : 2)

	/** So many cases come off and are released. */
	async function addLot(code: string, cases: number, ofProduct = productId): Promise<void> {
		const lotId = randomUUID()
		await ask(
			`insert into lots (producer_id, id, code, product_id, state, harvested_on, expected_release_on, best_before_on, pieces_harvested)
			values ($1, $2, $3, $4, 'released', current_date - 30, current_date - 20, current_date + 300, $5)`,
			[producerId, lotId, code, ofProduct, cases * 12],
		)
		await ask(
			"insert into stock_moves (producer_id, lot_id, to_place, pieces, reason) values ($1, $2, 'ready', $3, 'harvest')",
			[producerId, lotId, cases * 12],
		)
	}

	async function addStore(name: string, person: string): Promise<Store> {
		const store = { id: randomUUID(), slug: person, name, email: `${person}-${tag}@stores.example.test` }
		const userId = randomUUID()
		await ask("insert into users (id, name, email) values ($1, $2, $3)", [userId, person, store.email])
		await ask("insert into stores (producer_id, id, slug, name, tier_id) values ($1, $2, $3, $4, $5)", [
			producerId,
			store.id,
			store.slug,
			name,
			tierId,
		])
		await ask("insert into store_rounds (producer_id, store_id, round_id) values ($1, $2, $3)", [
			producerId,
			store.id,
			roundId,
		])
		await ask("insert into memberships (producer_id, user_id, role, store_id) values ($1, $2, 'buyer', $3)", [
			producerId,
			userId,
			store.id,
		])
		return store
	}

	/** So many signed-in buyers, ten to a store: where each orders for a day, and with which cookie. */
	async function addBuyers(count: number, day: string): Promise<{ path: string; cookie: string }[]> {
		const stores: Store[] = []
		while (stores.length * 10 < count)
			stores.push(await addStore(`Store ${stores.length + 1}`, `racer-${stores.length}`))
		const buyers = Array.from({ length: count }, (_, index) => ({
			id: randomUUID(),
			token: randomUUID(),
			store: stores[Math.floor(index / 10)] as Store,
		}))
		const columns = [
			buyers.map(({ id }) => id),
			buyers.map(({ token }) => createHash("sha256").update(token).digest("hex")),
			buyers.map(({ store }) => store.id),
		]
		const rows = "unnest($1::uuid[], $2::text[], $3::uuid[]) as buyer(id, hash, store_id)"
		await ask(
			`insert into users (id, name, email) select id, 'Buyer', id || '@stores.example.test' from ${rows}`,
			columns,
		)
		await ask(
			`insert into sessions (user_id, token_hash, expires_at) select id, hash, now() + interval '1 day' from ${rows}`,
			columns,
		)
		await ask(
			`insert into memberships (producer_id, user_id, role, store_id) select $4, id, 'buyer', store_id from ${rows}`,
			[...columns, producerId],
		)
		return buyers.map(({ token, store }) => ({
			path: `/buy/${slug}/${store.slug}/sheet/${day}`,
			cookie: `waxbill-session=${token}`,
		}))
	}

	/** Comb that is sold by weight, ten cases of it on the shelf: a case of 12 pieces of 340 g, at 16.00 a lb. */
	async function addCombByWeight(): Promise<void> {
		const id = randomUUID()
		await ask(
			`insert into products (producer_id, id, code, name, form, colour, detail, piece_net_grams, pieces_per_case,
				break_family, priced_by)
			values ($1, $2, '61', 'Cut comb', 'cut-comb', 'light', 'by weight', 340, 12, 'sections', 'weight')`,
			[producerId, id],
		)
		await ask(
			`insert into prices (producer_id, tier_id, product_id, min_cases, case_cents, pound_cents, valid_from)
			values ($1, $2, $3, 1, 14392, 1600, '2020-01-01')`,
			[producerId, tierId, id],
		)
		await addLot("W1", 10, id)
	}

	async function addStanding(store: Store, cases: number): Promise<void> {
		const weekday = ["MO", "TU", "WE", "TH", "FR", "SA", "SU"][isoWeekday(days[0] ?? "") - 1]
		const id = randomUUID()
		await ask(
			`insert into standing_orders (producer_id, id, store_id, rule, starts_on, created_by, created_at)
			select $1, $2, $3, $4, $5, id, now() - interval '1 minute' from users where email = $6`,
			[producerId, id, store.id, `FREQ=WEEKLY;BYDAY=${weekday}`, days[0], store.email],
		)
		await ask(
			"insert into standing_order_lines (producer_id, standing_order_id, product_id, cases, least_cases) values ($1, $2, $3, $4, 1)",
			[producerId, id, productId, cases],
		)
	}

	return {
		desk: `/desk/${slug}`,
		buy: `/buy/${slug}/${ours.slug}`,
		owner: owner.email,
		ours,
		others,
		days: days as [string, string, string],
		addLot,
		addBuyers,
		addCombByWeight,
		productId,
		/** So many hours after last orders for a day, which are at noon two days before, in summer an hour earlier than here. */
		afterLastOrders: (day: string, hours: number) =>
			new Date(new Date(`${day}T17:00:00Z`).getTime() - 2 * A_DAY + hours * 3_600_000),
		/** Queues what the worker does each minute, at once. */
		runCutOff: () =>
			ask(
				"select jobs.enqueue('make-standing-orders', json_build_object('producerId', $1::text), null, 'standing-orders:' || $1)",
				[producerId],
			),
		/** What each store asked and was given for a day, by its name. */
		orders: (day: string) =>
			ask<{ name: string; asked: number; given: number | null; state: string }>(
				`select s.name, l.asked_cases as asked, l.given_cases as given, o.state
				from orders o
				join stores s on s.producer_id = o.producer_id and s.id = o.store_id
				join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
				where o.producer_id = $1 and o.delivery_on = $2 order by s.name desc`,
				[producerId, day],
			).then((rows) => rows.map(({ name, asked, given, state }) => `${name} ${given ?? "?"} of ${asked}, ${state}`)),
	}
}

/** Asks the product's database with the rows of one producer in sight. */
function askAs(producerId: string) {
	return async <Row extends pg.QueryResultRow>(text: string, values: unknown[] = []): Promise<Row[]> => {
		const client = new pg.Client({ connectionString: e2eAddresses().databaseUrl })
		await client.connect()
		try {
			await client.query("begin")
			await client.query("select set_config('waxbill.producer_id', $1, true)", [producerId])
			const { rows } = await client.query<Row>(text, values)
			await client.query("commit")
			return rows
		} finally {
			await client.end()
		}
	}
}
