import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { expect, test } from "vitest"
import { readProducer } from "~/db/transaction.server"
import type { Keep } from "~/services/orders/check-asked.server"
import { type PlaceOrderAnswer, placeOrder } from "~/services/orders/place-order.server"
import { addProduct, openStore, openYard, type Shop, THURSDAY, TUESDAY_18, ZONE } from "./place-yard"

/** As many buyers at the counter at once as keep every connection of the pool busy; the others stand in line. */
const AT_ONCE = 40

async function race(keepOf: (index: number) => Keep) {
	const yard = await openYard()
	const productId = await addProduct(yard, { code: "11", readyCases: 40 })
	const shops: Shop[] = []
	for (let made = 0; made < 20; made += 1) shops.push(await openStore(yard))
	const place = (index: number) => {
		const shop = shops[index % shops.length]
		if (!shop) throw new Error("there are twenty shops")
		return placeOrder({
			producerId: yard.producerId,
			storeId: shop.storeId,
			person: shop.person,
			zone: ZONE,
			now: THURSDAY,
			deliveryOn: TUESDAY_18,
			lines: [{ productId, cases: 1 + (index % 3), keep: keepOf(index) }],
			poNumber: "",
			note: "",
			idempotencyKey: randomUUID(),
		})
	}
	const answers: PlaceOrderAnswer[] = []
	const inLine = Array.from({ length: 200 }, (_, index) => index)
	const buyOneAfterAnother = async () => {
		for (let index = inLine.shift(); index !== undefined; index = inLine.shift()) answers[index] = await place(index)
	}
	await Promise.all(Array.from({ length: AT_ONCE }, buyOneAfterAnother))
	const { rows } = await readProducer(yard.producerId, (tx) =>
		tx.execute<{ promised: number }>(sql`
			select sum(case when is_to_share then promised_cases else asked_cases end)::int as promised from order_lines`),
	)
	return { answers, promised: rows[0]?.promised }
}

test("two hundred buyers who race for the last forty cases are promised forty, and the rest are told that none is free", async () => {
	const { answers, promised } = await race(() => false)
	// Asked are one, two and three cases: the last case goes to whoever asks for one.
	expect(promised).toBe(40)
	expect(answers.filter((answer) => answer.ok).length).toBeLessThanOrEqual(40)
	expect(answers.filter((answer) => !answer.ok && answer.reason !== "lines")).toEqual([])
})

test("forty are promised, too, when each takes what is free or waits for the rest", async () => {
	const { answers, promised } = await race((index) => (index % 2 ? "free" : "rest"))
	expect(promised).toBe(40)
	const waiting = answers.filter((_, index) => index % 2 === 0)
	expect(waiting.every((answer) => answer.ok)).toBe(true)
})
