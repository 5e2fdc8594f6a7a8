import { beforeAll, describe, expect, test } from "vitest"
import { seedDemo } from "~/services/demo/seed-demo.server"
import { connect, INSUFFICIENT_PRIVILEGE, producerTables, refusalOf, undone } from "./connections"

const owner = await connect()
const app = await connect("waxbill_app")
const tables = await producerTables(owner)

let ours = ""
let theirs = ""

beforeAll(async () => {
	await seedDemo()
	const { rows } = await owner.query<{ id: string }>("select id from producers order by slug")
	;[ours = "", theirs = ""] = rows.map(({ id }) => id)
	expect(ours).not.toBe(theirs)
}, 120_000)

/** Counts as if there were no row security: its owner may lift it, here for the length of a transaction. */
function countBeyondSecurity(table: string, producerId: string): Promise<number> {
	return undone(owner, async () => {
		await owner.query(`alter table ${table} no force row level security`)
		const { rows } = await owner.query<{ n: number }>(
			`select count(*)::int as n from ${table} where producer_id = $1`,
			[producerId],
		)
		return rows[0]?.n ?? 0
	})
}

/** Runs `work` as the application, for our producer, and undoes it. */
function asOurs<T>(work: () => Promise<T>): Promise<T> {
	return undone(app, async () => {
		await app.query("select set_config('waxbill.producer_id', $1, true)", [ours])
		return work()
	})
}

/** How many rows a write changed; 0 when the application has no such right on the table at all. */
async function changedBy(query: string): Promise<number> {
	try {
		return (await app.query(query, [theirs])).rowCount ?? 0
	} catch (error) {
		expect(error).toMatchObject({ code: INSUFFICIENT_PRIVILEGE, message: expect.stringMatching(/permission denied/) })
		return 0
	}
}

const NOTHING_SETTLED = {
	paid_cents: 0,
	credited_cents: 0,
	discount_cents: 0,
	written_off_cents: 0,
	settled_cents: 0,
	returned_cents: 0,
}

async function writtenColumns(table: string): Promise<string> {
	const { rows } = await owner.query<{ columns: string }>(
		`select string_agg(quote_ident(attname), ', ' order by attnum) as columns from pg_attribute
		where attrelid = $1::regclass and attnum > 0 and not attisdropped and attgenerated = ''`,
		[table],
	)
	return rows[0]?.columns ?? ""
}

describe.each(tables)("%s", (table) => {
	test("has rows of both producers for this walk to mean something", async () => {
		expect(await countBeyondSecurity(table, ours)).toBeGreaterThan(0)
		expect(await countBeyondSecurity(table, theirs)).toBeGreaterThan(0)
	})

	test("shows our rows, all of them, and none of theirs", async () => {
		const { rows } = await asOurs(() =>
			app.query<{ producer: string; n: number }>(
				`select producer_id as producer, count(*)::int as n from ${table} group by 1`,
			),
		)
		expect(rows).toEqual([{ producer: ours, n: await countBeyondSecurity(table, ours) }])
	})

	test("lets none of their rows be altered or deleted", async () => {
		const { rows } = await owner.query<{ column: string }>(
			`select a.attname as column from pg_attribute a
			where a.attrelid = $1::regclass and a.attnum > 0 and not a.attisdropped and a.attname <> 'producer_id'
				and has_column_privilege('waxbill_app', a.attrelid, a.attnum, 'update')
			order by a.attnum`,
			[table],
		)
		for (const { column } of rows) {
			const update = `update ${table} set ${column} = ${column} where producer_id = $1`
			expect(await asOurs(() => changedBy(update))).toBe(0)
		}
		expect(await asOurs(() => changedBy(`delete from ${table} where producer_id = $1`))).toBe(0)
	})

	test("refuses a row in their name, new or moved over from ours", async () => {
		const row = await undone(owner, async () => {
			await owner.query(`alter table ${table} no force row level security`)
			const { rows } = await owner.query<{ row: object }>(
				`select to_jsonb(t) as row from ${table} t where producer_id = $1 limit 1`,
				[theirs],
			)
			return rows[0]?.row
		})
		expect(row).toMatchObject({ producer_id: theirs })
		// What the database works out itself cannot be written, and what is settled begins at nothing.
		const written = await writtenColumns(table)
		const copy = `insert into ${table} (${written}) select ${written} from jsonb_populate_record(null::${table}, $1)`
		const refused = await asOurs(() => refusalOf(app.query(copy, [JSON.stringify({ ...row, ...NOTHING_SETTLED })])))
		expect(refused).toMatchObject({
			code: INSUFFICIENT_PRIVILEGE,
			message: expect.stringMatching(/row-level security policy|permission denied/),
		})
		const move = `update ${table} set producer_id = $1 where producer_id = $2`
		const moved = await asOurs(() => refusalOf(app.query(move, [theirs, ours])))
		expect(moved).toMatchObject({
			code: INSUFFICIENT_PRIVILEGE,
			message: expect.stringMatching(/row-level security policy|permission denied/),
		})
	})

	test("shows nothing to a transaction that acts for nobody", async () => {
		const { rows } = await app.query(`select count(*)::int as n from ${table}`)
		expect(rows).toEqual([{ n: 0 }])
	})
})

describe("producers", () => {
	test("can be found by anyone, and altered, added or removed for nobody else", async () => {
		const { rows } = await app.query<{ n: number }>("select count(*)::int as n from producers")
		expect(rows).toEqual([{ n: 2 }])
		expect(await asOurs(() => changedBy("update producers set name = name where id = $1"))).toBe(0)
		expect(await asOurs(() => changedBy("delete from producers where id = $1"))).toBe(0)
		const added = await asOurs(() =>
			refusalOf(app.query("insert into producers (slug, name, time_zone) values ('third', 'Third', 'UTC')")),
		)
		expect(added).toMatchObject({ code: INSUFFICIENT_PRIVILEGE, message: expect.stringMatching(/row-level security/) })
	})
})

describe("memberships of a person", () => {
	test("are their own at every producer, to be read and not to be written", async () => {
		const { rows: people } = await owner.query<{ id: string }>(
			"select id from users where email = 'kit@nettleandquince.example.test'",
		)
		const person = people[0]?.id
		const asPerson = <T>(work: () => Promise<T>) =>
			undone(app, async () => {
				await app.query("select set_config('waxbill.user_id', $1, true)", [person])
				return work()
			})
		const { rows } = await asPerson(() =>
			app.query<{ producer_id: string; user_id: string }>("select producer_id, user_id from memberships"),
		)
		expect(new Set(rows.map((row) => row.producer_id))).toEqual(new Set([ours, theirs]))
		expect(new Set(rows.map((row) => row.user_id))).toEqual(new Set([person]))
		const promoted = await asPerson(() => app.query("update memberships set role = 'owner' where store_id is null"))
		expect(promoted.rowCount).toBe(0)
	})
})
