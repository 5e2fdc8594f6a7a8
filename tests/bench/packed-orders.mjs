const PRODUCTS = 8
const LINES_OF_AN_ORDER = 5
const STORES = 100
const PIECES = 12

/**
 * Writes a producer with so many packed orders for today, of five lines each, over a hundred stores with one buyer each,
 * in one transaction. Triggers and foreign keys are off meanwhile. Answers the producer's id.
 */
export async function writePackedOrders({ client }, { count }) {
	const slug = `packed-${count}`
	await client.query("begin")
	await client.query("set local session_replication_role = replica")
	await client.query("select set_config('bench.slug', $1, true)", [slug])
	for (const statement of statementsOf(count)) await client.query(statement)
	await client.query("commit")
	const { rows } = await client.query("select id from producers where slug = $1", [slug])
	await client.query("select set_config('waxbill.producer_id', $1, false)", [rows[0].id])
	return { producerId: rows[0].id }
}

/** An id is made from what it is of and its number, so that rows name one another without being looked up; as a version 4. */
const ID = `create or replace function pg_temp.id(kind text, number bigint default 0) returns uuid language sql as $$
	select overlay(overlay(md5(current_setting('bench.slug') || ' ' || kind || ' ' || number)
		placing '4' from 13) placing '8' from 17)::uuid $$`

function statementsOf(count) {
	const producer = "pg_temp.id('producer')"
	const eachOrder = `generate_series(0, ${count - 1}) o`
	const eachLine = `${eachOrder}, generate_series(0, ${LINES_OF_AN_ORDER - 1}) k`
	const line = `o * ${LINES_OF_AN_ORDER} + k`
	const product = `(o + k) % ${PRODUCTS}`
	return [
		ID,
		`insert into producers (id, slug, name, time_zone)
			values (${producer}, current_setting('bench.slug'), 'Packed Bee Yard', 'America/Chicago')`,
		`insert into producer_settings (producer_id, email, address, invoice_note)
			values (${producer}, 'desk@packed.example.test', 'Weld Lane, Teasel County', 'Tell us within two days of any comb that arrived broken.')`,
		`insert into price_tiers (producer_id, id, name) values (${producer}, pg_temp.id('tier'), 'Stores')`,
		`insert into products (producer_id, id, code, name, form, colour, detail, piece_net_grams, pieces_per_case, break_family)
			select ${producer}, pg_temp.id('product', n), (n + 1) || '1', 'Round section, clover ' || n, 'round', 'straw',
				'Fancy, 8 oz', 227, ${PIECES}, 'rounds'
			from generate_series(0, ${PRODUCTS - 1}) n`,
		`insert into stores (producer_id, id, slug, name, tier_id, address)
			select ${producer}, pg_temp.id('store', n), 'store-' || n, 'Store ' || n, pg_temp.id('tier'), n || ' Carder Street'
			from generate_series(0, ${STORES - 1}) n`,
		`insert into users (id, name, email)
			select pg_temp.id('user', n), 'Buyer ' || n, 'buyer-' || n || '@' || current_setting('bench.slug') || '.example.test'
			from generate_series(0, ${STORES}) n`,
		`insert into memberships (producer_id, user_id, role, store_id)
			select ${producer}, pg_temp.id('user', n), 'buyer', pg_temp.id('store', n) from generate_series(0, ${STORES - 1}) n`,
		`insert into memberships (producer_id, user_id, role) values (${producer}, pg_temp.id('user', ${STORES}), 'owner')`,
		`insert into lots (producer_id, id, code, product_id, state, harvested_on, expected_release_on, best_before_on,
				pieces_harvested)
			select ${producer}, pg_temp.id('lot', n), 'L' || n, pg_temp.id('product', n), 'released', current_date - 30,
				current_date - 20, current_date + 200, 1
			from generate_series(0, ${PRODUCTS - 1}) n`,
		`insert into orders (producer_id, id, number, store_id, delivery_on, state, placed_by, po_number)
			select ${producer}, pg_temp.id('order', o), o + 1, pg_temp.id('store', o % ${STORES}), current_date, 'packed',
				pg_temp.id('user', o % ${STORES}), 'PO ' || o
			from ${eachOrder}`,
		`insert into order_lines (producer_id, id, order_id, product_id, asked_cases, given_cases, case_cents, pieces_per_case)
			select ${producer}, pg_temp.id('line', ${line}), pg_temp.id('order', o), pg_temp.id('product', ${product}),
				1 + (o + k) % 4, 1 + (o + k) % 3 % (1 + (o + k) % 4), 11400, ${PIECES}
			from ${eachLine}`,
		`insert into order_line_lots (producer_id, order_line_id, lot_id, pieces)
			select l.producer_id, l.id, t.id, l.given_cases * ${PIECES}
			from order_lines l join lots t on t.producer_id = l.producer_id and t.product_id = l.product_id
			where l.producer_id = ${producer} and l.given_cases > 0`,
		`insert into stock_balances (producer_id, lot_id, place, place_ref, pieces)
			select f.producer_id, f.lot_id, 'packed', l.order_id, sum(f.pieces)
			from order_line_lots f join order_lines l on l.producer_id = f.producer_id and l.id = f.order_line_id
			where f.producer_id = ${producer} group by 1, 2, 4`,
		`update lots l set pieces_harvested = b.pieces
			from (select lot_id, sum(pieces) as pieces from stock_balances where producer_id = ${producer} group by 1) b
			where l.producer_id = ${producer} and l.id = b.lot_id`,
	]
}
