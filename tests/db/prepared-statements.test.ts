import { asc, eq, sql } from "drizzle-orm"
import type pg from "pg"
import { beforeAll, beforeEach, expect, test } from "vitest"
import { closePool, createPool } from "~/db/client.server"
import { producers, products } from "~/db/schema"
import { readProducer, withPlatform } from "~/db/transaction.server"
import { seedDemo } from "~/services/demo/seed-demo.server"
import { testDatabaseUrl } from "../setup/test-database"
import { connect } from "./connections"

const owner = await connect()
const kept = globalThis as { waxbillPool?: pg.Pool }

beforeAll(async () => {
	await seedDemo()
}, 120_000)

/** A single connection, so that whatever it has prepared can be seen. */
beforeEach(async () => {
	await closePool()
	kept.waxbillPool = createPool(testDatabaseUrl(), "waxbill_app", 1)
})

async function preparedTexts(): Promise<string[]> {
	const { rows } = await (kept.waxbillPool as pg.Pool).query<{ statement: string }>(
		"select statement from pg_prepared_statements",
	)
	return rows.map((row) => row.statement)
}

test("a statement that comes again is prepared once, and shows each producer its own rows however often it is run", async () => {
	const both = await withPlatform((tx) => tx.select().from(producers).orderBy(asc(producers.slug)))
	const counts = async () => {
		const found: number[] = []
		for (const { id } of both) {
			const rows = await readProducer(id, (tx) =>
				tx.select({ of: products.producerId, code: products.code }).from(products),
			)
			expect(rows.map((row) => row.of)).toEqual(rows.map(() => id))
			found.push(rows.length)
		}
		return found
	}
	const atFirst = await counts()
	// From the sixth time on the database may use one plan for all.
	for (let times = 0; times < 8; times += 1) expect(await counts()).toEqual(atFirst)
	expect(atFirst).toHaveLength(2)
	expect(Math.min(...atFirst)).toBeGreaterThan(0)
	expect(
		(await preparedTexts()).filter((text) => text === 'select "producer_id", "code" from "products"'),
	).toHaveLength(1)
})

test("a statement that is run once is not prepared", async () => {
	await withPlatform((tx) => tx.select({ name: producers.name }).from(producers).where(eq(producers.slug, "larkmoor")))
	expect(await preparedTexts()).toEqual([])
})

test("a prepared statement is planned anew when its table has changed", async () => {
	await owner.query("create table shelf_marks (mark text)")
	await owner.query("insert into shelf_marks values ('a')")
	const read = () => withPlatform((tx) => tx.execute<{ mark: string }>(sql`select mark from shelf_marks`))
	await read()
	expect((await read()).rows).toEqual([{ mark: "a" }])
	await owner.query("alter table shelf_marks add column place text")
	await owner.query("insert into shelf_marks values ('b', 'left')")
	expect((await read()).rows).toEqual([{ mark: "a" }, { mark: "b" }])
})

test("a prepared statement that the database refuses can be run again", async () => {
	const read = (divisor: number) =>
		withPlatform((tx) => tx.execute<{ of: number }>(sql`select 12 / ${divisor}::int as of`))
	await read(3)
	await read(4)
	await expect(read(0)).rejects.toThrow()
	expect((await read(6)).rows).toEqual([{ of: 2 }])
})
