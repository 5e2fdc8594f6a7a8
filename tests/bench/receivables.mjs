const FULL = { stores: 2000, invoices: 1_000_000, statement: 5000 }
const DAYS = 3650
const LOOKS = 25
const WARM_UP = 5
const AIMS = { receivablesMs: 100, statementMs: 150, fileMs: 1000 }
const SLUG = "million-invoices"

/**
 * What a producer with a million invoices waits for: who owes what, over HTTP on one connection, the most owing first and by
 * name; and the statement of a store with 5,000 invoices and as many payments, its first page, its last day long ago, and
 * whole as a file. Each is the median of its looks.
 */
export async function measureReceivables({ database, web, cookie, ownerEmail, say }) {
	const counts = await writeInvoices(database, ownerEmail)
	await database.client.query("vacuum (analyze)")
	say(`A producer with ${counts.invoices} invoices of ${counts.stores} stores, ${counts.open} of them open`)
	const desk = `${web}/desk/${SLUG}`
	const statement = `${desk}/stores/store-0/statement`
	const looks = [
		["Receivables with 1,000,000 invoices, page", `${desk}/receivables`, AIMS.receivablesMs],
		["Receivables by name, page", `${desk}/receivables?by=name`, AIMS.receivablesMs],
		["Statement of a store with 5,000 invoices, page", `${statement}?from=2000-01-01`, AIMS.statementMs],
		["Statement until a day long past, page", `${statement}?from=2000-01-01&until=${counts.longAgo}`, AIMS.statementMs],
		["Statement of a store with 5,000 invoices, whole as CSV", `${statement}.csv?from=2000-01-01`, AIMS.fileMs],
	]
	const rows = []
	for (const [name, url, aim] of looks) rows.push(aimRow(name, await medianOf(url, cookie), aim))
	return rows
}

/** Against an aim and not a reference: a ratio of 1 or more is within it. */
function aimRow(name, measured, aim) {
	const ours = Number(measured.toPrecision(4))
	return { name, unit: "ms, median", ours, reference: aim, ratio: Math.round((aim / measured) * 1000) / 1000, floor: 1 }
}

async function medianOf(url, cookie) {
	const times = []
	for (let look = 0; look < WARM_UP + LOOKS; look += 1) {
		const began = performance.now()
		const response = await fetch(url, { headers: { cookie }, redirect: "manual" })
		await response.arrayBuffer()
		if (response.status !== 200) throw new Error(`${url} answers ${response.status}.`)
		if (look >= WARM_UP) times.push(performance.now() - began)
	}
	return times.toSorted((a, b) => a - b)[Math.floor(times.length / 2)]
}

/** Triggers and foreign keys are off meanwhile, so that it takes a minute and not an hour: sums are what the ledger says. */
async function writeInvoices({ client }, ownerEmail) {
	await client.query("begin")
	await client.query("set local session_replication_role = replica")
	for (const statement of statementsOf(ownerEmail)) await client.query(statement)
	await client.query("commit")
	const { rows } = await client.query(
		`select count(*)::int as invoices, count(*) filter (where open_cents > 0)::int as open,
			(current_date - 700)::text as "longAgo"
		from invoices where producer_id = (select id from producers where slug = $1)`,
		[SLUG],
	)
	return { ...rows[0], stores: FULL.stores }
}

function statementsOf(ownerEmail) {
	const { stores, invoices, statement } = FULL
	const producer = "pg_temp.id('producer')"
	// All of the last weeks is open, and of what is older up to a year every fifth.
	const age = `(${DAYS} * (${invoices}::bigint - n) / ${invoices})::int`
	const isOpen = `(${age} < 45 or (${age} < 365 and n % 5 = 0))`
	const total = "(20000 + n % 90000)"
	const ownAge = `(${DAYS} * (${statement} - n) / ${statement})::int`
	const discount = "(case when n % 10 = 0 then 400 else 0 end)"
	const isPaid = `n < ${statement - 40}`
	return [
		`create or replace function pg_temp.id(kind text, number bigint default 0) returns uuid language sql as $$
			select md5('${SLUG} ' || kind || ' ' || number)::uuid $$`,
		`insert into producers (id, slug, name, time_zone)
			values (${producer}, '${SLUG}', 'Million Invoices Yard', 'America/New_York')`,
		`insert into producer_settings (producer_id, email) values (${producer}, '${ownerEmail}')`,
		`insert into memberships (producer_id, user_id, role) select ${producer}, id, 'owner' from users
			where email = '${ownerEmail}'`,
		`insert into price_tiers (producer_id, id, name) values (${producer}, pg_temp.id('tier'), 'Shops')`,
		`insert into stores (producer_id, id, slug, name, tier_id)
			select ${producer}, pg_temp.id('store', n), 'store-' || n, 'Store ' || md5(n::text) || ' ' || n, pg_temp.id('tier')
			from generate_series(0, ${stores - 1}) n`,
		`insert into invoices (producer_id, id, year, sequence, store_id, issued_on, due_on, lines_cents, delivery_cents,
				tax_cents, total_cents, paid_cents)
			select ${producer}, pg_temp.id('invoice', n), 2026, n + 1, pg_temp.id('store', 1 + n % ${stores - 1}),
				current_date - ${age}, current_date - ${age} + 14, ${total}, 0, 0, ${total},
				case when ${isOpen} then 0 else ${total} end
			from generate_series(0, ${invoices - statement - 1}) n`,
		`insert into invoices (producer_id, id, year, sequence, store_id, issued_on, due_on, lines_cents, delivery_cents,
				tax_cents, total_cents, paid_cents, discount_cents)
			select ${producer}, pg_temp.id('own', n), 2025, n + 1, pg_temp.id('store', 0), current_date - ${ownAge},
				current_date - ${ownAge} + 14, ${total}, 0, 0, ${total},
				case when ${isPaid} then ${total} - ${discount} else 0 end, case when ${isPaid} then ${discount} else 0 end
			from generate_series(0, ${statement - 1}) n`,
		`insert into payments (producer_id, id, store_id, method, amount_cents, received_on, settled_cents, reference)
			select ${producer}, pg_temp.id('payment', n), pg_temp.id('store', 0), 'cheque', ${total} - ${discount},
				current_date - ${ownAge} + 9, ${total} - ${discount}, n::text
			from generate_series(0, ${statement - 1}) n where ${isPaid}`,
		`insert into settlements (producer_id, id, invoice_id, kind, payment_id, amount_cents, settled_on)
			select ${producer}, pg_temp.id('settled', n), pg_temp.id('own', n), 'payment', pg_temp.id('payment', n),
				${total} - ${discount}, current_date - ${ownAge} + 9
			from generate_series(0, ${statement - 1}) n where ${isPaid}`,
		`insert into settlements (producer_id, id, invoice_id, kind, payment_id, amount_cents, settled_on)
			select ${producer}, pg_temp.id('discount', n), pg_temp.id('own', n), 'discount', pg_temp.id('payment', n),
				${discount}, current_date - ${ownAge} + 9
			from generate_series(0, ${statement - 1}) n where ${isPaid} and ${discount} > 0`,
	]
}
