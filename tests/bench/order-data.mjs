/** A lot that no round of the bench can exhaust. */
const PIECES = 1_000_000

/** Gives every product of a producer a released lot on the shelf, so that each order can be promised. */
export async function addStock({ client }, producer) {
	await client.query(
		`with made as (
			insert into lots (producer_id, code, product_id, state, harvested_on, expected_release_on, best_before_on,
				pieces_harvested)
			select p.producer_id, 'bench ' || p.code, p.id, 'released', current_date - 2, current_date - 2,
				current_date + 300, $2
			from products p join producers on producers.id = p.producer_id where producers.slug = $1
			returning producer_id, id
		)
		insert into stock_moves (producer_id, lot_id, to_place, pieces, reason)
		select producer_id, id, 'ready', $2, 'bench' from made`,
		[producer, PIECES],
	)
}

/** Notes where a producer's orders stand, to come back to. */
export async function rememberOrders({ client }, producer) {
	const { rows } = await client.query(
		`select p.id as "producerId", c.last from producers p
		join counters c on c.producer_id = p.id and c.series = 'order' where p.slug = $1`,
		[producer],
	)
	return rows[0]
}

/** How many orders were placed since. */
export async function ordersSince({ client }, { producerId, last }) {
	const { rows } = await client.query("select count(*)::int from orders where producer_id = $1 and number > $2", [
		producerId,
		last,
	])
	return rows[0].count
}

/**
 * Takes away all orders placed since, with what came with them, and leaves the tables as a round should find them: no dead
 * rows, and the write-ahead log at its beginning.
 */
export async function putBack({ client }, { producerId, last }) {
	await client.query("begin")
	await client.query(
		"create temp table gone on commit drop as select id from orders where producer_id = $1 and number > $2",
		[producerId, last],
	)
	for (const table of ["order_events", "order_lines"])
		await client.query(`delete from ${table} where producer_id = $1 and order_id in (select id from gone)`, [
			producerId,
		])
	await client.query("delete from audit_entries where producer_id = $1 and subject_id in (select id from gone)", [
		producerId,
	])
	await client.query("delete from orders where producer_id = $1 and id in (select id from gone)", [producerId])
	await client.query("update counters set last = $2 where producer_id = $1 and series = 'order'", [producerId, last])
	await client.query("delete from outbox_mails where producer_id = $1 and sent_at is null", [producerId])
	await client.query("delete from graphile_worker._private_jobs")
	await client.query("commit")
	for (const table of [
		"orders",
		"order_lines",
		"order_events",
		"audit_entries",
		"outbox_mails",
		"counters",
		"shop_versions",
	])
		await client.query(`vacuum (analyze) ${table}`)
	await client.query("vacuum (analyze) graphile_worker._private_jobs")
	await client.query("checkpoint")
}
