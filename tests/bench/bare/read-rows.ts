import { readFileSync } from "node:fs"
import type pg from "pg"
import { addDays, type Day, dayInZone } from "~/domain/calendar"
import { CULLS } from "~/domain/lots/count-harvest"
import { ribbonStart } from "~/services/orders/find-fortnight.server"

/** Whose sheet is asked for, and of which day. */
export type Asked = { tokenHash: string; producerSlug: string; storeSlug: string; day: Day; now: Date }

// biome-ignore lint/suspicious/noExplicitAny: rows as the statements give them, put together in sheet-of.ts
type Row = any

/** The rows of one sheet by what they are of. */
export type SheetRows = Record<"rounds" | "terms" | "prices" | "entries" | "usual" | "ownLines" | "toShare", Row[]> & {
	who: Row
	today: Day
	from: Day
}

/** order-sheet.sql, after it was held against what the product runs: each text with $1, $2 …, and what they stand for. */
const statements: { text: string; names: string[] }[] = JSON.parse(readFileSync(process.env.STATEMENTS ?? "", "utf8"))

/**
 * Asks the product's statements one after the other on one connection, with nothing but pg. Null where nobody is signed
 * in with that token, or they do not buy for that store.
 */
export async function readRows(pool: pg.Pool, asked: Asked): Promise<SheetRows | null> {
	const client = await pool.connect()
	const facts: Record<string, unknown> = {
		last_orders: 5,
		culls: CULLS,
		token_hash: asked.tokenHash,
		producer_slug: asked.producerSlug,
		store_slug: asked.storeSlug,
		delivery_on: asked.day,
	}
	let next = 0
	const rowsOfNext = async (): Promise<Row[]> => {
		const { text, names } = statements[next] as (typeof statements)[number]
		next += 1
		const isSetting = text.includes("set local")
		if (isSetting) await client.query(text.replace("$1", `'${facts.producer_id}'`))
		return isSetting
			? []
			: (
					await client.query(
						text,
						names.map((name) => facts[name]),
					)
				).rows
	}
	try {
		const [who] = await rowsOfNext()
		if (!who.session_id || !who.store_id) return null
		const today = dayInZone(asked.now, who.time_zone)
		const from = ribbonStart(today, asked.day)
		Object.assign(facts, {
			producer_id: who.producer_id,
			store_id: who.store_id,
			today,
			shut_since: addDays(today, -60),
			ribbon_from: from,
			ribbon_to: addDays(from, 13),
		})
		await rowsOfNext()
		const rounds = await rowsOfNext()
		const terms = await rowsOfNext()
		const prices = await rowsOfNext()
		facts.product_ids = prices.map((row) => row.id)
		const entries = await rowsOfNext()
		const usual = await rowsOfNext()
		const ownLines = await rowsOfNext()
		const toShare = await rowsOfNext()
		// The half-filled sheet: the bench's store has none.
		await rowsOfNext()
		await rowsOfNext()
		return { who, today, from, rounds, terms, prices, entries, usual, ownLines, toShare }
	} finally {
		client.release()
	}
}
