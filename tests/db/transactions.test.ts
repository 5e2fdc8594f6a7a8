import { eq, sql } from "drizzle-orm"
import type pg from "pg"
import { beforeAll, beforeEach, expect, test } from "vitest"
import { closePool, createPool } from "~/db/client.server"
import { counters, producers } from "~/db/schema"
import { readPerson, readProducer, withPlatform, withProducer } from "~/db/transaction.server"
import { findDeliveryDays } from "~/services/delivery/find-delivery-days.server"
import { seedDemo } from "~/services/demo/seed-demo.server"
import { takeNumber } from "~/services/numbers/take-number.server"
import { placeOrder } from "~/services/orders/place-order.server"
import { testDatabaseUrl } from "../setup/test-database"
import { connect } from "./connections"

const owner = await connect()
const kept = globalThis as { waxbillPool?: pg.Pool }
let producer = { id: "", timeZone: "" }

beforeAll(async () => {
	await seedDemo()
	const [row] = await withPlatform((tx) => tx.select().from(producers).where(eq(producers.slug, "larkmoor")))
	producer = row ?? producer
}, 120_000)

/** From here on the product has a single connection: whoever asks for a second inside a transaction waits for ever. */
beforeEach(async () => {
	await closePool()
	kept.waxbillPool = createPool(testDatabaseUrl(), "waxbill_app", 1)
})

const counter = { series: "order", year: 1999 } as const
const take = (tx: Parameters<typeof takeNumber>[0]) => takeNumber(tx, { producerId: producer.id, ...counter })

async function lastTaken(): Promise<number> {
	const rows = await readProducer(producer.id, (tx) =>
		tx.select().from(counters).where(eq(counters.year, counter.year)),
	)
	return rows[0]?.last ?? 0
}

test("a use case needs one connection and no more", async () => {
	const now = new Date()
	const { rows } = await owner.query<{ id: string; email: string }>(
		"select id, email from users where email = 'rosa@pantryandplume.example.test'",
	)
	const [person] = rows
	const { storeId, productId, days } = await readProducer(producer.id, async (tx) => {
		const store = await tx.execute<{ id: string }>(sql`select id from stores where slug = 'pantry-and-plume'`)
		const product = await tx.execute<{ id: string }>(sql`select id from products where code = '11'`)
		const storeId = store.rows[0]?.id ?? ""
		const query = { producerId: producer.id, storeId, now, zone: producer.timeZone, count: 4 }
		return { storeId, productId: product.rows[0]?.id ?? "", days: await findDeliveryDays(tx, query) }
	})
	const placed = await placeOrder({
		producerId: producer.id,
		storeId,
		person: person ?? { id: "", email: "" },
		zone: producer.timeZone,
		now,
		deliveryOn: days.find((day) => day.isOpen)?.on ?? "",
		lines: [{ productId, cases: 1, keep: false }],
		poNumber: "",
		note: "",
		idempotencyKey: crypto.randomUUID(),
	})
	expect(placed).toMatchObject({ ok: true })
})

test("transactions take turns on one connection", async () => {
	const before = await lastTaken()
	const taken = await Promise.all(Array.from({ length: 8 }, () => withProducer(producer.id, take)))
	expect(taken.toSorted((a, b) => a - b)).toEqual(Array.from({ length: 8 }, (_, index) => before + index + 1))
})

test("what fails is rolled back and gives its connection back", async () => {
	const before = await lastTaken()
	const failing = withProducer(producer.id, async (tx) => {
		await take(tx)
		throw new Error("changed my mind")
	})
	await expect(failing).rejects.toThrow("changed my mind")
	expect(await lastTaken()).toBe(before)
	expect([kept.waxbillPool?.totalCount, kept.waxbillPool?.idleCount]).toEqual([1, 1])
})

test("a refused statement is rolled back too", async () => {
	const before = await lastTaken()
	const failing = withProducer(producer.id, async (tx) => {
		await take(tx)
		await tx.execute(sql`select 1 / 0`)
	})
	await expect(failing).rejects.toMatchObject({ cause: expect.objectContaining({ code: "22012" }) })
	expect(await lastTaken()).toBe(before)
})

test("a connection that breaks in a transaction is thrown away, and the next transaction has a new one", async () => {
	const failing = withProducer(producer.id, async (tx) => {
		const { rows } = await tx.execute<{ pid: number }>(sql`select pg_backend_pid() as pid`)
		await owner.query("select pg_terminate_backend($1)", [rows[0]?.pid])
		await tx.execute(sql`select 1`)
	})
	await expect(failing).rejects.toThrow()
	expect(await withProducer(producer.id, take)).toBeGreaterThan(0)
})

test("a connection goes back without whom it acted for", async () => {
	const settings = sql`select coalesce(current_setting('waxbill.producer_id', true), '') as producer,
		coalesce(current_setting('waxbill.user_id', true), '') as person`
	const inside = await withProducer(producer.id, (tx) => tx.execute(settings))
	expect(inside.rows).toEqual([{ producer: producer.id, person: "" }])
	await readPerson(producer.id, (tx) => tx.execute(settings))
	expect((await withPlatform((tx) => tx.execute(settings))).rows).toEqual([{ producer: "", person: "" }])
})

test("an id that is none never reaches the database", async () => {
	await expect(withProducer("' or true --", async () => null)).rejects.toThrow(TypeError)
})

test("reading writes nothing", async () => {
	const before = await lastTaken()
	await expect(readProducer(producer.id, take)).rejects.toMatchObject({
		cause: expect.objectContaining({ code: "25006" }),
	})
	expect(await lastTaken()).toBe(before)
})
