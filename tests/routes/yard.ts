import { randomUUID } from "node:crypto"
import type pg from "pg"

/** What the walk asks for: a store of its own at the demo's main producer, with papers on which nothing can be done. */
export type Yard = {
	ours: { producerId: string; storeId: string; otherStoreId: string; marketDayId: string }
	theirs: { producerId: string; storeId: string }
	/** What stands in an address for each of its parts. */
	params: Record<string, string>
	/** One piece sold, or a sale given up, as the stall's forms post it. */
	saleFields: Record<string, string>
	clear: () => Promise<void>
}

/** Runs `work` in a transaction that sees this producer's rows. */
export async function asProducer<T>(client: pg.Client, producerId: string, work: () => Promise<T>): Promise<T> {
	await client.query("begin")
	try {
		await client.query("select set_config('waxbill.producer_id', $1, true)", [producerId])
		const result = await work()
		await client.query("commit")
		return result
	} catch (error) {
		await client.query("rollback")
		throw error
	}
}

const STORE_SLUG = "walked-store"
/** The number of that order. */
export const WALKED_ORDER = "900900"
const LONG_AGO = "2001-02-06"
/** A day for which the books are open. */
const TODAY = new Date().toISOString().slice(0, 10)

/**
 * Opens the yard: a store whose one order has been received and paid, and a market day that is closed with one card sale.
 * Whoever is admitted finds pages there, and can change nothing that another test relies on.
 */
export async function openYard(owner: pg.Client): Promise<Yard> {
	const idOf = async (query: string, values: unknown[] = []) => {
		const { rows } = await owner.query<{ id: string }>(query, values)
		if (!rows[0]) throw new Error(`the demo has no row for: ${query}`)
		return rows[0].id
	}
	const ourId = await idOf("select id from producers where slug = 'larkmoor'")
	const theirId = await idOf("select id from producers where slug = 'tansy-knoll'")
	const theirStoreId = await asProducer(owner, theirId, () => idOf("select id from stores order by slug limit 1"))
	const storeId = randomUUID()
	const orderId = randomUUID()
	const invoiceId = randomUUID()
	const runId = randomUUID()
	const paymentId = randomUUID()
	const marketDayId = randomUUID()
	const saleId = randomUUID()
	const takeId = randomUUID()
	const certificateId = randomUUID()
	const [creditId, reportId, invoiceLineId] = [randomUUID(), randomUUID(), randomUUID()]
	const [brokenLineId, pictureId] = [randomUUID(), randomUUID()]
	const [beeYardId, hiveId, superId, photoId] = [randomUUID(), randomUUID(), randomUUID(), randomUUID()]
	const insert = async (table: string, row: Record<string, unknown>) => {
		const columns = Object.keys(row)
		const places = columns.map((_, index) => `$${index + 2}`)
		await owner.query(`insert into ${table} (producer_id, ${columns.join(", ")}) values ($1, ${places.join(", ")})`, [
			ourId,
			...Object.values(row),
		])
	}
	const otherStoreId = await asProducer(owner, ourId, async () => {
		const tierId = await idOf("select id from price_tiers order by name limit 1")
		const productId = await idOf("select id from products where code = '11'")
		const marketId = await idOf("select id from markets order by name limit 1")
		const sellerId = await idOf("select id from users order by email limit 1")
		await insert("stores", { id: storeId, slug: STORE_SLUG, name: "The Walked Store", tier_id: tierId })
		await owner.query(
			"insert into store_rounds (producer_id, store_id, round_id) select producer_id, $1, id from delivery_rounds",
			[storeId],
		)
		await insert("orders", {
			id: orderId,
			number: WALKED_ORDER,
			store_id: storeId,
			delivery_on: LONG_AGO,
			state: "received",
		})
		await insert("order_lines", {
			order_id: orderId,
			product_id: productId,
			asked_cases: 1,
			given_cases: 1,
			case_cents: 1000,
			pieces_per_case: 12,
		})
		await insert("invoices", {
			id: invoiceId,
			year: 2001,
			sequence: 1,
			store_id: storeId,
			issued_on: TODAY,
			due_on: TODAY,
			lines_cents: 1000,
			delivery_cents: 0,
			tax_cents: 0,
			total_cents: 1000,
		})
		await insert("invoice_orders", { order_id: orderId, invoice_id: invoiceId })
		await insert("payments", {
			id: paymentId,
			store_id: storeId,
			method: "cash",
			amount_cents: 500,
			received_on: TODAY,
		})
		await insert("invoice_runs", { id: runId, started_by: sellerId, finished_at: new Date() })
		await insert("settlements", {
			invoice_id: invoiceId,
			kind: "write-off",
			amount_cents: 1000,
			settled_on: TODAY,
		})
		await insert("invoice_lines", {
			id: invoiceLineId,
			invoice_id: invoiceId,
			position: 1,
			product_id: productId,
			code: "11",
			name: "Round section",
			detail: "Fancy, 8 oz, case of 12",
			net_grams: 2712,
			asked_cases: 1,
			sent_cases: 1,
			case_cents: 1000,
			line_cents: 1000,
		})
		// All of it is credited, and what was reported broken is answered: nothing more can be done with either.
		await insert("credits", {
			id: creditId,
			year: 2001,
			sequence: 1,
			store_id: storeId,
			invoice_id: invoiceId,
			issued_on: TODAY,
			kind: "goodwill",
			reason: "walked",
			lines_cents: 1000,
			tax_cents: 0,
			total_cents: 1000,
			issued_by: sellerId,
		})
		await insert("credit_lines", { credit_id: creditId, position: 1, name: "Round section", line_cents: 1000 })
		await insert("breakage_reports", {
			id: reportId,
			store_id: storeId,
			invoice_id: invoiceId,
			state: "declined",
			answer: "walked",
			reported_by: sellerId,
			answered_at: new Date(),
		})
		await insert("breakage_lines", {
			id: brokenLineId,
			report_id: reportId,
			invoice_line_id: invoiceLineId,
			pieces: 1,
			accepted_pieces: 0,
		})
		await insert("breakage_photos", {
			id: pictureId,
			line_id: brokenLineId,
			content: Buffer.from("a photo"),
			media_type: "image/jpeg",
			width: 1,
			height: 1,
		})
		await insert("withdrawals", { number: WALKED_ORDER, reason: "walked", instructions: "walked" })
		await insert("market_days", { id: marketDayId, market_id: marketId, market_on: LONG_AGO, state: "closed" })
		await insert("sales", {
			id: saleId,
			market_day_id: marketDayId,
			method: "card",
			state: "paid",
			total_cents: 1400,
			stripe_payment_intent_id: `pi_walk_${saleId}`,
			sold_by: sellerId,
			paid_at: new Date(),
		})
		await insert("sale_lines", { sale_id: saleId, product_id: productId, pieces: 1, piece_cents: 1400 })
		await insert("yards", { id: beeYardId, name: "The Walked Yard" })
		await insert("hives", { id: hiveId, yard_id: beeYardId, label: "Walked" })
		// It has come off, so that no check of it is taken.
		await insert("supers", {
			id: superId,
			hive_id: hiveId,
			product_id: productId,
			set_on: LONG_AGO,
			state: "off",
			off_on: LONG_AGO,
		})
		await insert("exemption_certificates", {
			id: certificateId,
			store_id: storeId,
			number: "walked",
			valid_until: LONG_AGO,
			file_name: "walked.pdf",
			media_type: "application/pdf",
			content: Buffer.from("%PDF-1.7"),
			handed_in_by: sellerId,
		})
		await insert("stock_takes", { id: takeId, place: "ready", taken_on: LONG_AGO })
		await insert("uploads", { id: photoId, media_type: "image/jpeg", content: Buffer.from("a photo") })
		return idOf("select id from stores where slug = 'mossgate-grocers'")
	})
	const [openDay, lotCode, placed, otherMarketDay, productId] = await asProducer(owner, ourId, async () => [
		await idOf("select max(delivery_on)::text as id from orders where state = 'placed'"),
		await idOf(
			`select l.code as id from lots l where exists (select from gradings g where g.lot_id = l.id)
				and exists (select from net_checks n where n.lot_id = l.id) order by l.code limit 1`,
		),
		await idOf("select number::text as id from orders where state = 'placed' order by number limit 1"),
		await idOf("select id from market_days where state = 'open' limit 1"),
		await idOf("select id from products where code = '11'"),
	])
	const paperOf = (table: string) =>
		asProducer(owner, ourId, () =>
			idOf(`select p.id from ${table} p join lots l on l.id = p.lot_id where l.code = $1 order by p.id limit 1`, [
				lotCode,
			]),
		)
	return {
		ours: { producerId: ourId, storeId, otherStoreId, marketDayId },
		theirs: { producerId: theirId, storeId: theirStoreId },
		params: {
			producer: "larkmoor",
			store: STORE_SLUG,
			number: WALKED_ORDER,
			invoice: "2001-0001",
			payment: paymentId,
			credit: "C2001-0001",
			report: reportId,
			picture: pictureId,
			day: openDay,
			code: lotCode,
			placed,
			otherMarketDay,
			marketDay: marketDayId,
			yard: beeYardId,
			super: superId,
			photo: photoId,
			// The demo's first load of the freezer.
			load: "1",
			sale: saleId,
			run: runId,
			take: takeId,
			certificate: certificateId,
			tier: await asProducer(owner, ourId, () => idOf("select id from price_tiers order by name limit 1")),
			product: "11",
			grading: await paperOf("gradings"),
			check: await paperOf("net_checks"),
			// The token of no link that was ever sent.
			token: "w".repeat(43),
		},
		saleFields: { [`n-${productId}`]: "1", given: "100.00", intent: "give-up" },
		clear: () =>
			asProducer(owner, ourId, async () => {
				const del = (table: string, where: string, id: string) =>
					owner.query(`delete from ${table} where producer_id = $1 and ${where} = $2`, [ourId, id])
				await del("sale_lines", "sale_id", saleId)
				await del("sales", "id", saleId)
				await del("market_day_people", "market_day_id", marketDayId)
				await del("market_days", "id", marketDayId)
				await del("withdrawals", "number", WALKED_ORDER)
				await del("breakage_photos", "id", pictureId)
				await del("breakage_lines", "id", brokenLineId)
				await del("breakage_reports", "id", reportId)
				await del("credit_lines", "credit_id", creditId)
				await del("credits", "id", creditId)
				await del("invoice_lines", "invoice_id", invoiceId)
				await del("settlements", "invoice_id", invoiceId)
				await del("payments", "id", paymentId)
				await del("invoice_orders", "invoice_id", invoiceId)
				await del("invoice_runs", "id", runId)
				await del("invoices", "id", invoiceId)
				await del("order_events", "order_id", orderId)
				await del("order_lines", "order_id", orderId)
				await del("orders", "id", orderId)
				await del("exemption_certificates", "id", certificateId)
				await del("stock_takes", "id", takeId)
				await del("uploads", "id", photoId)
				await del("supers", "id", superId)
				await del("hives", "id", hiveId)
				await del("yards", "id", beeYardId)
				await del("store_rounds", "store_id", storeId)
				await del("memberships", "store_id", storeId)
				await del("stores", "id", storeId)
			}),
	}
}

/** A mark of all that the product keeps, but for sessions, what was typed without one, and counted tries. */
export async function fingerprint(owner: pg.Client): Promise<Record<string, string>> {
	const { rows: tables } = await owner.query<{ name: string; hasProducer: boolean }>(`
		select relname as name, exists (
			select from pg_attribute a where a.attrelid = c.oid and a.attname = 'producer_id' and not a.attisdropped
		) as "hasProducer"
		from pg_class c where relnamespace = 'public'::regnamespace and relkind = 'r'
			and relname not in ('sessions', 'kept_posts', 'rate_limits')`)
	const { rows: producers } = await owner.query<{ id: string; slug: string }>("select id, slug from producers")
	const marks: Record<string, string> = {}
	const mark = async (name: string, table: string) => {
		const { rows } = await owner.query<{ mark: string | null }>(
			`select md5(string_agg(t::text, ',' order by t::text)) as mark from ${table} t`,
		)
		marks[name] = rows[0]?.mark ?? "empty"
	}
	for (const { name } of tables.filter(({ hasProducer }) => !hasProducer)) await mark(name, name)
	for (const { id, slug } of producers) {
		await asProducer(owner, id, async () => {
			for (const { name } of tables.filter(({ hasProducer }) => hasProducer)) await mark(`${slug} ${name}`, name)
		})
	}
	return marks
}
