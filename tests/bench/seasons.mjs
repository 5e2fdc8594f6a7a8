/** The full size: ten seasons of a producer with 40 products. One line of an order makes five moves. */
const FULL = { supers: 2000, lotsOfAProduct: 75, orders: 20_000, stores: 200 }
const PRODUCTS = 40
const LINES_OF_AN_ORDER = 10
const CHECKS_OF_A_SUPER = 20
const SIXTEENTHS = 16
const DAYS = 3650
/** Of the orders so many are still to be delivered, and of the supers so many stand on hives. */
const OPEN_SHARE = 0.01
const ON_HIVES_SHARE = 0.2

/**
 * Writes a producer with so many sixteenths of the full size (2,000 supers, 40,000 checks, 3,000 lots, 1,000,000 moves and
 * 200,000 order lines) and its owner, in one transaction. Triggers and foreign keys are off meanwhile, so that it takes a
 * minute and not an hour: balances are what the moves sum to. Answers `{ slug, producerId, personId, lot, load, counts }`, the lot being the latest of which something went out.
 */
export async function writeSeasons({ client }, { sixteenths, ownerEmail }) {
	const slug = `ten-seasons-${sixteenths}`
	const of = (whole) => Math.max(1, Math.round((whole * sixteenths) / SIXTEENTHS))
	const size = {
		supers: of(FULL.supers),
		lots: of(FULL.lotsOfAProduct) * PRODUCTS,
		orders: of(FULL.orders),
		stores: of(FULL.stores),
	}
	await client.query("begin")
	await client.query("set local session_replication_role = replica")
	await client.query("select set_config('bench.slug', $1, true)", [slug])
	for (const statement of statementsOf(size, ownerEmail)) await client.query(statement)
	await client.query("commit")
	const { rows } = await client.query(
		`select p.id as "producerId", u.id as "personId", (
			select l.code from lots l where l.producer_id = p.id and exists (
				select from order_line_lots x where x.producer_id = l.producer_id and x.lot_id = l.id)
			order by l.harvested_on desc, l.code desc limit 1) as lot
		from producers p, users u where p.slug = $1 and u.email = $2`,
		[slug, ownerEmail],
	)
	return { slug, load: 1, ...rows[0], counts: { ...size, moves: size.orders * LINES_OF_AN_ORDER * 5 } }
}

/** An id is made from what it is of and its number, so that rows name one another without being looked up. */
const ID = `create or replace function pg_temp.id(kind text, number bigint default 0) returns uuid language sql as $$
	select md5(current_setting('bench.slug') || ' ' || kind || ' ' || number)::uuid $$`

const NOWHERE = "'00000000-0000-0000-0000-000000000000'::uuid"
const PIECES = 12

function statementsOf(size, ownerEmail) {
	const { supers, lots, orders, stores } = size
	const onHives = Math.ceil(supers * ON_HIVES_SHARE)
	const open = Math.ceil(orders * OPEN_SHARE)
	const producer = "pg_temp.id('producer')"
	// Lot number n is of product n modulo 40; a line takes the lot of its product that its order's place in time gives.
	const productOfLine = `(o + 4 * k) % ${PRODUCTS}`
	const lotOfLine = `${productOfLine} + ${PRODUCTS} * (o::bigint * ${lots / PRODUCTS} / ${orders})`
	const deliveryOn = `case when o >= ${orders - open} then current_date + 1 + o % 180
		else current_date - 1 - (${DAYS} * (${orders}::bigint - o) / ${orders})::int end`
	const eachLine = `generate_series(0, ${orders - 1}) o, generate_series(0, ${LINES_OF_AN_ORDER - 1}) k`
	const lineNumber = `o * ${LINES_OF_AN_ORDER} + k`
	const harvestedOn = `current_date - 20 - (${DAYS} * (${lots} - 1 - n) / ${lots})::int`
	const isNew = `n >= ${Math.floor(lots * 0.93)}`
	const move = (from, fromRef, to, toRef, step, source, where = "") => `
		insert into stock_moves (producer_id, id, lot_id, from_place, from_ref, to_place, to_ref, pieces, reason, moved_at)
		select ${producer}, gen_random_uuid(), pg_temp.id('lot', ${lotOfLine}), ${from}, ${fromRef}, '${to}', ${toRef}, ${PIECES},
			'bench', ${deliveryOn} - 6 + interval '${step} hours'
		from ${source} ${where}`
	const order = "pg_temp.id('order', o)"
	const closed = `where o < ${orders - open}`
	return [
		ID,
		`insert into producers (id, slug, name, time_zone)
			values (${producer}, current_setting('bench.slug'), 'Ten seasons', 'America/Chicago')`,
		`insert into producer_settings (producer_id, email) values (${producer}, 'desk@ten-seasons.example.test')`,
		`insert into memberships (producer_id, user_id, role) select ${producer}, id, 'owner' from users where email = '${ownerEmail}'`,
		`insert into freezer_loads (producer_id, number, freezer, loaded_at)
			values (${producer}, 1, 'Chest 1', now() - interval '3 years')`,
		`insert into price_tiers (producer_id, id, name) values (${producer}, pg_temp.id('tier'), 'Stores')`,
		`insert into products (producer_id, id, code, name, form, colour, piece_net_grams, pieces_per_case, break_family)
			select ${producer}, pg_temp.id('product', n), n::text, 'Comb ' || n, 'round', 'straw', 227, ${PIECES}, 'rounds'
			from generate_series(0, ${PRODUCTS - 1}) n`,
		`insert into stores (producer_id, id, slug, name, tier_id)
			select ${producer}, pg_temp.id('store', n), 'store-' || n, 'Store ' || n, pg_temp.id('tier')
			from generate_series(0, ${stores - 1}) n`,
		`insert into yards (producer_id, id, name, flora)
			select ${producer}, pg_temp.id('yard', n), 'Yard ' || n, 'white clover' from generate_series(0, 9) n`,
		`insert into hives (producer_id, id, yard_id, label)
			select ${producer}, pg_temp.id('hive', n), pg_temp.id('yard', n % 10), n::text
			from generate_series(0, ${Math.ceil(supers / 10) - 1}) n`,
		`insert into supers (producer_id, id, hive_id, product_id, set_on, level, state, off_on, finished_pieces, harvest_id)
			select ${producer}, pg_temp.id('super', n), pg_temp.id('hive', n / 10), pg_temp.id('product', n % ${PRODUCTS}),
				coalesce(off_on, current_date) - 40, 1 + n % 10, case when off_on is null then 'on' else 'off' end,
				off_on, case when off_on is not null then 36 end,
				case when off_on is not null then pg_temp.id('harvest', n % ${lots}) end
			from generate_series(0, ${supers - 1}) n,
				lateral (select case when n >= ${onHives} then current_date - 20 - n % ${DAYS - 90} end as off_on) s`,
		`insert into super_checks (producer_id, id, super_id, checked_on, filled_percent, capped_percent, sections)
			select ${producer}, pg_temp.id('check', n * ${CHECKS_OF_A_SUPER} + c), pg_temp.id('super', n),
				s.set_on + 2 * c, 5 * c, 4 * c, repeat('3', 40)
			from generate_series(0, ${supers - 1}) n, generate_series(0, ${CHECKS_OF_A_SUPER - 1}) c,
				lateral (select set_on from supers where producer_id = ${producer} and id = pg_temp.id('super', n)) s`,
		`insert into harvests (producer_id, id, harvested_on)
			select ${producer}, pg_temp.id('harvest', n), ${harvestedOn} from generate_series(0, ${lots - 1}) n`,
		`insert into lots (producer_id, id, code, product_id, state, harvested_on, expected_release_on, best_before_on,
				pieces_harvested, yard, harvest_id)
			select ${producer}, pg_temp.id('lot', n), 'L' || lpad(n::text, 5, '0'), pg_temp.id('product', n % ${PRODUCTS}),
				case when ${isNew} and n % 3 = 0 then 'held' else 'released' end, ${harvestedOn}, ${harvestedOn} + 14,
				${harvestedOn} + 300, 1, 'Yard ' || n % 10, pg_temp.id('harvest', n)
			from generate_series(0, ${lots - 1}) n`,
		`insert into expected_supplies (producer_id, product_id, expected_on, low_pieces, likely_pieces, high_pieces)
			select ${producer}, pg_temp.id('product', n), current_date + 7 * w, 24, 36, 48
			from generate_series(0, ${PRODUCTS - 1}) n, generate_series(1, 8) w`,
		`insert into orders (producer_id, id, number, store_id, delivery_on, state, placed_at)
			select ${producer}, ${order}, o + 1, pg_temp.id('store', o % ${stores}), ${deliveryOn},
				case when o >= ${orders - open} then 'placed' else 'received' end, ${deliveryOn} - 7
			from generate_series(0, ${orders - 1}) o`,
		`insert into order_lines (producer_id, id, order_id, product_id, asked_cases, given_cases, case_cents, pieces_per_case)
			select ${producer}, pg_temp.id('line', ${lineNumber}), ${order}, pg_temp.id('product', ${productOfLine}), 1,
				case when o < ${orders - open} then 1 end, 11400, ${PIECES}
			from ${eachLine}`,
		`insert into order_line_lots (producer_id, order_line_id, lot_id, pieces)
			select ${producer}, pg_temp.id('line', ${lineNumber}), pg_temp.id('lot', ${lotOfLine}), ${PIECES}
			from ${eachLine} ${closed}`,
		move("null", NOWHERE, "cold-room", NOWHERE, 0, eachLine),
		move("'cold-room'", NOWHERE, "ready", NOWHERE, 1, eachLine),
		move("'ready'", NOWHERE, "packed", order, 2, eachLine, closed),
		move("'packed'", order, "van", order, 3, eachLine, closed),
		move("'van'", order, "sold", order, 4, eachLine, closed),
		`insert into stock_balances (producer_id, lot_id, place, place_ref, pieces)
			select producer_id, lot_id, place, ref, sum(pieces)
			from (
				select producer_id, lot_id, to_place as place, to_ref as ref, pieces from stock_moves where producer_id = ${producer}
				union all
				select producer_id, lot_id, from_place, from_ref, -pieces from stock_moves
				where producer_id = ${producer} and from_place is not null
			) m group by 1, 2, 3, 4`,
		`update lots l set pieces_harvested = b.pieces
			from (select lot_id, sum(pieces) as pieces from stock_balances where producer_id = ${producer} group by 1) b
			where l.producer_id = ${producer} and l.id = b.lot_id and b.pieces > 0`,
	]
}
