import { randomUUID } from "node:crypto"
import { askDatabase, IDA } from "./desk-visits"

/** Nine stores and eighteen cases: name, asked, least, and what it had of what it asked when last short. */
const STORES: [name: string, asked: number, least: number, last: [given: number, asked: number] | null][] = [
	["Mill Lane Co-op", 8, 2, [7, 8]],
	["Green Ladle Grocers", 6, 3, [3, 6]],
	["Pear & Plough", 4, 2, [2, 4]],
	["Corner Larder", 3, 2, [3, 3]],
	["Hobday’s Wholefoods", 3, 1, [1, 3]],
	["Thistle & Rye", 2, 1, [2, 2]],
	["The Copper Churn", 2, 1, [1, 2]],
	["Weir Street Pantry", 2, 2, null],
	["Saltmarsh Provisions", 1, 1, [1, 1]],
]

type Order = { id: string; lineId: string; storeId: string; number: number }

/**
 * A product of Larkmoor of which nine stores of their own ask for 31 cases and 18 can be ready, far enough ahead to be in
 * nobody's way; one may stand in for it. `clear` cancels the orders and takes both products off the price list.
 */
export async function openShortProduct() {
	const on = new Date(Date.now() + 40 * 86_400_000).toISOString().slice(0, 10)
	const tag = randomUUID().slice(0, 6)
	const code = `S${tag}`
	const producer = "(select id from producers where slug = 'larkmoor')"
	const productId = await addProduct(code, "Basswood sections", 18)
	const standInId = await addProduct(`T${tag}`, "Basswood No. 1", 3)
	const buyer = { id: randomUUID(), email: `quill-${tag}@pearandplough.example.test` }
	await askDatabase("insert into users (id, name, email) values ($1, 'Quill Amory', $2)", [buyer.id, buyer.email])
	const orders: Order[] = []
	const [{ first } = { first: 0 }] = await askDatabase<{ first: number }>(
		"select greatest(coalesce(max(number), 0), 950000)::int + 1 as first from orders where number < 990000 and number <> 900900",
	)
	for (const [index, [name, asked, least]] of STORES.entries()) {
		const order = { id: randomUUID(), lineId: randomUUID(), storeId: randomUUID(), number: first + index }
		await askDatabase(
			`with store as (
				insert into stores (producer_id, id, slug, name, tier_id)
				select ${producer}, $1, $2, $3, id from price_tiers order by name limit 1 returning id
			)
			insert into orders (producer_id, id, number, store_id, delivery_on) select ${producer}, $4, $5, id, $6 from store`,
			[order.storeId, `share-${tag}-${index}`, name, order.id, order.number, on],
		)
		await askDatabase(
			`insert into order_lines (producer_id, id, order_id, product_id, asked_cases, least_cases, is_to_share, substitute_ids,
				case_cents, pieces_per_case) values (${producer}, $1, $2, $3, $4, $5, true, $6::uuid[], 14250, 12)`,
			[order.lineId, order.id, productId, asked, least, index === 0 ? [standInId] : []],
		)
		orders.push(order)
	}
	await shareBefore(productId, orders)
	const ours = orders[2]
	if (!ours) throw new Error("nine stores")
	await askDatabase(
		`insert into memberships (producer_id, user_id, role, store_id) values (${producer}, $1, 'buyer', $2)`,
		[buyer.id, ours.storeId],
	)

	/** A product with so many cases released, at a price for every tier. */
	async function addProduct(ofCode: string, name: string, cases: number): Promise<string> {
		const [id, lotId] = [randomUUID(), randomUUID()]
		await askDatabase(
			`insert into products (producer_id, id, code, name, form, colour, detail, piece_net_grams, pieces_per_case, break_family)
			values (${producer}, $1, $2, $3, 'basswood', 'light', 'Fancy, 13 oz', 368, 12, 'sections')`,
			[id, ofCode, name],
		)
		await askDatabase(
			`insert into prices (producer_id, tier_id, product_id, min_cases, case_cents, valid_from)
			select ${producer}, id, $1, 1, 14250, '2020-01-01' from price_tiers`,
			[id],
		)
		await askDatabase(
			`insert into lots (producer_id, id, code, product_id, state, harvested_on, expected_release_on, best_before_on, pieces_harvested)
			values (${producer}, $1, $2, $3, 'released', current_date - 30, current_date - 20, current_date + 300, $4)`,
			[lotId, `L-${ofCode}`, id, cases * 12],
		)
		await askDatabase(
			`insert into stock_moves (producer_id, lot_id, to_place, pieces, reason) values (${producer}, $1, 'ready', $2, 'harvest')`,
			[lotId, cases * 12],
		)
		return id
	}

	/** What the stores had when the product was last short. */
	async function shareBefore(ofProduct: string, of: readonly Order[]): Promise<void> {
		const runId = randomUUID()
		await askDatabase(
			`insert into sharing_runs (producer_id, id, product_id, delivery_on, rule, supply_cases, claims, shared_by, shared_at)
			select ${producer}, $1, $2, current_date - 9, 'in-proportion', 20, '[]', id, now() - interval '9 days'
			from users where email = $3`,
			[runId, ofProduct, IDA],
		)
		for (const [index, [, , , last]] of STORES.entries()) {
			if (!last) continue
			await askDatabase(
				`insert into sharing_shares (producer_id, run_id, order_line_id, store_id, asked_cases, rule_cases, given_cases, sentence)
				values (${producer}, $1, $2, $3, $4, $5, $5, 'As it was then.')`,
				[runId, of[index]?.lineId, of[index]?.storeId, last[1], last[0]],
			)
		}
	}

	return {
		address: `/desk/larkmoor/sharing/${code}/${on}`,
		list: "/desk/larkmoor/sharing",
		buyer,
		storeOrder: `/buy/larkmoor/share-${tag}-2/orders/${ours.number}`,
		otherNames: STORES.map(([name]) => name).filter((name) => name !== "Pear & Plough"),
		given: () =>
			askDatabase<{ given: number | null }>(
				`select l.given_cases as given from order_lines l join orders o on o.producer_id = l.producer_id and o.id = l.order_id
				where l.product_id = $1 and o.delivery_on = $2 order by o.number`,
				[productId, on],
			).then((rows) => rows.map((row) => row.given)),
		letters: () =>
			askDatabase<{ recipient: string }>(
				"select recipient from outbox_mails where template = 'order-shared' and props->>'productName' = 'Basswood sections' and recipient = $1",
				[buyer.email],
			),
		clear: async () => {
			await askDatabase("update orders set state = 'cancelled' where id = any($1::uuid[])", [
				orders.map(({ id }) => id),
			])
			await askDatabase("update products set is_active = false where id = any($1::uuid[])", [[productId, standInId]])
			await askDatabase("update stores set is_active = false where id = any($1::uuid[])", [
				orders.map(({ storeId }) => storeId),
			])
		},
	}
}
