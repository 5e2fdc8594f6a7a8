import { beforeAll, expect, test } from "vitest"
import { demoPeople } from "~/services/demo/people"
import { seedDemo } from "~/services/demo/seed-demo.server"
import { renderMail } from "~emails/render"
import { connect, producerTables, undone } from "./connections"

const owner = await connect()
const tables = await producerTables(owner)

beforeAll(async () => {
	await seedDemo()
}, 120_000)

/** Runs a query over the rows of all producers: the owner lifts row security for the length of a transaction. */
function acrossProducers<Row extends object>(query: string): Promise<Row[]> {
	return undone(owner, async () => {
		for (const table of tables) await owner.query(`alter table ${table} no force row level security`)
		return (await owner.query<Row>(query)).rows
	})
}

const faults = (query: string) => acrossProducers(query)

test("every piece that was harvested is somewhere", async () => {
	const lots = await acrossProducers<{ n: number }>("select count(*)::int as n from lots")
	expect(lots[0]?.n).toBeGreaterThan(50)
	expect(
		await faults(`
			select l.code, l.pieces_harvested, sum(b.pieces) from lots l
			left join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
			group by l.producer_id, l.id having l.pieces_harvested is distinct from sum(b.pieces)`),
	).toEqual([])
})

test("the balances are what the moves add up to", async () => {
	expect(
		await faults(`
			with flows as (
				select producer_id, lot_id, to_place as place, to_ref as ref, pieces from stock_moves
				union all
				select producer_id, lot_id, from_place, from_ref, -pieces from stock_moves where from_place is not null
			), sums as (select producer_id, lot_id, place, ref, sum(pieces) as pieces from flows group by 1, 2, 3, 4)
			select * from sums full join stock_balances b
				on b.producer_id = sums.producer_id and b.lot_id = sums.lot_id and b.place = sums.place and b.place_ref = sums.ref
			where b.pieces is distinct from sums.pieces`),
	).toEqual([])
})

test("what was sent is sold, to the piece, out of the lots that its lines name", async () => {
	expect(
		await faults(`
			select o.number, o.state, ol.given_cases * ol.pieces_per_case as given, sum(x.pieces) as from_lots
			from orders o
			join order_lines ol on ol.producer_id = o.producer_id and ol.order_id = o.id
			left join order_line_lots x on x.producer_id = ol.producer_id and x.order_line_id = ol.id
			group by o.producer_id, o.id, ol.producer_id, ol.id
			having coalesce(sum(x.pieces), 0) <>
				case when o.state in ('packed', 'sent', 'received') then ol.given_cases * ol.pieces_per_case else 0 end`),
	).toEqual([])
	expect(
		await faults(`
			select o.number, o.state from orders o
			join order_lines ol on ol.producer_id = o.producer_id and ol.order_id = o.id
			join order_line_lots x on x.producer_id = ol.producer_id and x.order_line_id = ol.id
			left join stock_balances b on b.producer_id = x.producer_id and b.lot_id = x.lot_id and b.place_ref = o.id
				and b.place = case o.state when 'packed' then 'packed' else 'sold' end
			left join stock_moves w on w.producer_id = x.producer_id and w.lot_id = x.lot_id and w.from_place = 'sold'
				and w.from_ref = o.id and w.to_place = 'waste'
			where b.pieces + coalesce(w.pieces, 0) is distinct from x.pieces`),
	).toEqual([])
})

test("what was sold at the stall left the table, and the rest came back", async () => {
	expect(
		await faults(`
			select d.market_on, l.product_id from market_days d
			join stock_balances b on b.producer_id = d.producer_id and b.place = 'market' and b.place_ref = d.id
			join lots l on l.producer_id = b.producer_id and l.id = b.lot_id
			where d.state = 'closed' and b.pieces <> 0`),
	).toEqual([])
	expect(
		await faults(`
			with sold as (
				select s.producer_id, s.market_day_id, sl.product_id, sum(sl.pieces) as pieces from sales s
				join sale_lines sl on sl.producer_id = s.producer_id and sl.sale_id = s.id group by 1, 2, 3
			), gone as (
				select b.producer_id, b.place_ref, l.product_id, sum(b.pieces) as pieces from stock_balances b
				join lots l on l.producer_id = b.producer_id and l.id = b.lot_id
				join market_days d on d.producer_id = b.producer_id and d.id = b.place_ref
				where b.place = 'sold' group by 1, 2, 3
			)
			select * from sold full join gone on gone.producer_id = sold.producer_id
				and gone.place_ref = sold.market_day_id and gone.product_id = sold.product_id
			where sold.pieces is distinct from gone.pieces`),
	).toEqual([])
	expect(
		await faults(`
			select s.id from sales s join sale_lines sl on sl.producer_id = s.producer_id and sl.sale_id = s.id
			group by s.producer_id, s.id having s.total_cents <> sum(sl.pieces * sl.piece_cents)`),
	).toEqual([])
	expect(
		await faults(`
			select sl.sale_id from sale_lines sl
			left join sale_line_lots x on x.producer_id = sl.producer_id and x.sale_id = sl.sale_id
				and x.product_id = sl.product_id
			group by sl.producer_id, sl.sale_id, sl.product_id having sum(x.pieces) is distinct from sl.pieces`),
	).toEqual([])
})

test("invoices are what was sent, and paid with what came in", async () => {
	expect(
		await faults(`
			select i.sequence from invoices i
			left join invoice_lines il on il.producer_id = i.producer_id and il.invoice_id = i.id
			group by i.producer_id, i.id
			having sum(il.line_cents) is distinct from i.lines_cents or bool_or(il.line_cents <> il.sent_cases * il.case_cents)`),
	).toEqual([])
	expect(
		await faults(`
			select i.sequence from invoices i
			left join settlements p on p.producer_id = i.producer_id and p.invoice_id = i.id and p.kind = 'payment'
			group by i.producer_id, i.id having coalesce(sum(p.amount_cents), 0) <> i.paid_cents`),
	).toEqual([])
	expect(
		await faults(`
			select y.id from payments y
			left join settlements p on p.producer_id = y.producer_id and p.payment_id = y.id
			group by y.producer_id, y.id
			having coalesce(sum(p.amount_cents), 0) + y.returned_cents
				is distinct from case y.state when 'settled' then y.amount_cents else 0 end`),
	).toEqual([])
	expect(
		await faults(`
			select o.number, o.state, i.invoice_id from orders o
			left join invoice_orders i on i.producer_id = o.producer_id and i.order_id = o.id
			where (o.state in ('sent', 'received')) <> (i.invoice_id is not null)`),
	).toEqual([])
})

test("numbers have no gaps, and the counters go on from the last", async () => {
	expect(
		await faults(`
			with numbers as (
				select producer_id, 'order' as series, 0 as year, number from orders
				union all select producer_id, 'invoice', year, sequence from invoices
				union all select producer_id, 'credit', year, sequence from credits
				union all select producer_id, 'load', 0, number from freezer_loads
				union all select producer_id, 'withdrawal', 0, number from withdrawals
			)
			select n.producer_id, n.series, n.year, max(n.number), count(*), c.last from numbers n
			left join counters c on c.producer_id = n.producer_id and c.series = n.series and c.year = n.year
			group by 1, 2, 3, c.last having max(n.number) <> count(*) or c.last is distinct from count(*)`),
	).toEqual([])
})

test("every lot that was released has its reason, and the proofs of it came before", async () => {
	expect(
		await faults(`
			select l.code, l.state, r.kind from lots l
			left join lot_releases r on r.producer_id = l.producer_id and r.lot_id = l.id
			where (l.state = 'held') <> (r.lot_id is null)`),
	).toEqual([])
	expect(
		await faults(`
			select l.code, p.created_at, c.created_at, r.released_at from lot_releases r
			join lots l on l.producer_id = r.producer_id and l.id = r.lot_id
			left join freeze_proofs p on p.producer_id = r.producer_id and p.id = r.freeze_proof_id and p.is_accepted
			left join net_checks c on c.producer_id = r.producer_id and c.id = r.net_check_id and c.lot_id = r.lot_id
				and c.has_passed
			where r.kind = 'proven' and not coalesce(greatest(p.created_at, c.created_at) <= r.released_at, false)`),
	).toEqual([])
})

test("what was made from other lots is what went into it, to the piece", async () => {
	const kinds = await acrossProducers<{ kind: string }>("select distinct kind from lot_links order by 1")
	expect(kinds.map(({ kind }) => kind)).toEqual(["cut-up", "split"])
	expect(
		await faults(`
			select k.kind, k.pieces, b.pieces, k.pieces_made, t.pieces_harvested from lot_links k
			join lots t on t.producer_id = k.producer_id and t.id = k.to_lot_id
			left join stock_balances b on b.producer_id = k.producer_id and b.lot_id = k.from_lot_id
				and b.place = case k.kind when 'cut-up' then 'cut-up' else 'other-lot' end
			where b.pieces is distinct from k.pieces or t.pieces_harvested <> k.pieces_made`),
	).toEqual([])
})

test("the lots of a harvest are what its supers gave, but for the culls", async () => {
	expect(
		await faults(`
			with gave as (
				select producer_id, harvest_id, product_id, sum(finished_pieces) as pieces from supers
				where harvest_id is not null group by 1, 2, 3
			), made as (
				select producer_id, harvest_id, product_id, sum(pieces_harvested) as pieces from lots
				where harvest_id is not null and grade <> 'Culls' group by 1, 2, 3
			)
			select * from gave full join made on made.producer_id = gave.producer_id
				and made.harvest_id = gave.harvest_id and made.product_id = gave.product_id
			where gave.pieces is distinct from made.pieces`),
	).toEqual([])
})

test("what a count did not find is missing, and no more", async () => {
	expect(
		await faults(`
			with short as (
				select producer_id, lot_id, sum(ledger_pieces - counted_pieces) as pieces from stock_take_lines
				group by 1, 2 having sum(ledger_pieces - counted_pieces) <> 0
			)
			select * from short full join (select * from stock_balances where place = 'missing' and pieces > 0) b
				on b.producer_id = short.producer_id and b.lot_id = short.lot_id
			where short.pieces is distinct from b.pieces`),
	).toEqual([])
})

test("a withdrawn lot had left for the stores that were written to", async () => {
	expect(
		await faults(`
			select w.number, n.pieces, l.state from withdrawal_notices n
			join withdrawals w on w.producer_id = n.producer_id and w.id = n.withdrawal_id
			join withdrawal_lots x on x.producer_id = w.producer_id and x.withdrawal_id = w.id
			join lots l on l.producer_id = x.producer_id and l.id = x.lot_id
			where l.state <> 'withdrawn' or n.pieces is distinct from (
				select sum(y.pieces) from order_line_lots y
				join order_lines e on e.producer_id = y.producer_id and e.id = y.order_line_id
				join orders o on o.producer_id = e.producer_id and o.id = e.order_id
				where y.producer_id = l.producer_id and y.lot_id = l.id and o.store_id = n.store_id)`),
	).toEqual([])
})

test("there are orders in every state, some ask beyond what is free, and something is overdue", async () => {
	const states = await acrossProducers<{ state: string }>("select distinct state from orders order by 1")
	expect(states.map(({ state }) => state)).toEqual(["cancelled", "confirmed", "packed", "placed", "received", "sent"])
	const [found] = await acrossProducers<Record<string, number>>(`
		select (select count(*)::int from orders) as orders,
			(select count(*)::int from order_lines where is_to_share and given_cases is null) as shared,
			(select count(*)::int from invoices where open_cents > 0 and due_on < current_date - 1) as overdue,
			(select count(*)::int from stores where length(name) = 80) as "longNames",
			(select count(*)::int from market_days d join market_day_people p
				on p.producer_id = d.producer_id and p.market_day_id = d.id where d.state = 'open') as "openDays"`)
	expect(found?.orders).toBeGreaterThan(200)
	expect(found?.shared).toBe(5)
	expect(found?.overdue).toBeGreaterThan(0)
	expect(found?.longNames).toBe(1)
	expect(found?.openDays).toBe(1)
})

test("nothing has happened in the future, and no letter still waits", async () => {
	expect(await faults("select id from order_events where at > now()")).toEqual([])
	expect(await faults("select id from stock_moves where moved_at > now()")).toEqual([])
	expect(await faults("select id from payments where received_at > now()")).toEqual([])
	expect(await faults("select id from super_checks where received_at > now()")).toEqual([])
	expect(await faults("select id from freeze_proofs where created_at > now()")).toEqual([])
	expect(await faults("select id from net_checks where created_at > now()")).toEqual([])
	expect(await faults("select lot_id from lot_releases where released_at > now()")).toEqual([])
	expect(await faults("select id from outbox_mails where sent_at is null")).toEqual([])
})

test("the letters in the outbox are ones the product can still write", async () => {
	const mails = await acrossProducers<{ template: string; props: unknown }>(
		"select template, props from outbox_mails order by created_at desc limit 3",
	)
	expect(mails).toHaveLength(3)
	for (const mail of mails) expect((await renderMail(mail.template, mail.props)).text).toContain("order")
})

test("a second run changes nothing", async () => {
	const fingerprints = () =>
		acrossProducers(
			[...tables, "producers", "users"]
				.map(
					(table) =>
						`select '${table}' as name, count(*), md5(string_agg(t::text, '' order by t::text)) from ${table} t`,
				)
				.join(" union all ")
				.concat(" order by 1"),
		)
	const before = await fingerprints()
	expect(await seedDemo()).toEqual(demoPeople)
	expect(await fingerprints()).toEqual(before)
})
