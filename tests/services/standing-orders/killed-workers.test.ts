import { type ChildProcess, spawn } from "node:child_process"
import { randomUUID } from "node:crypto"
import { once } from "node:events"
import { fileURLToPath } from "node:url"
import { eq } from "drizzle-orm"
import { expect, test, vi } from "vitest"
import { orders } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"
import { makeDueOrders } from "~/services/standing-orders/make-due-orders.server"
import { setStandingOrder } from "~/services/standing-orders/set-standing-order.server"
import { addProduct, openStore, openYard, THURSDAY, ZONE } from "../orders/place-yard"

const STORES = 200
const FRIDAY_NOON = "2026-08-14T16:00:00Z"
const SCRIPT = fileURLToPath(new URL("make-due.process.ts", import.meta.url))

function startWorker(producerId: string): ChildProcess {
	return spawn(process.execPath, ["--import", "tsx", SCRIPT, producerId, FRIDAY_NOON], { stdio: "inherit" })
}

test("two workers killed in the middle of the cut-off lose no order and double none", {
	timeout: 120_000,
}, async () => {
	const yard = await openYard()
	const { producerId } = yard
	const productId = await addProduct(yard, { code: "11", readyCases: 100 })
	for (let count = 0; count < STORES; count += 1) {
		const shop = await openStore(yard)
		const set = await setStandingOrder({
			producerId,
			storeId: shop.storeId,
			person: shop.person,
			zone: ZONE,
			now: THURSDAY,
			cadence: { every: "week", interval: 2, weekday: 2, months: [] },
			startsOn: "2026-08-18",
			endsOn: null,
			lines: [{ productId, cases: 2, leastCases: 1, substituteIds: [] }],
			isCommitment: false,
			idempotencyKey: randomUUID(),
		})
		expect(set).toEqual({ ok: true })
	}
	const made = () =>
		readProducer(producerId, (tx) =>
			tx
				.select({ storeId: orders.storeId, number: orders.number })
				.from(orders)
				.where(eq(orders.producerId, producerId)),
		)

	const workers = [startWorker(producerId), startWorker(producerId)]
	const ended = workers.map((worker) => once(worker, "exit"))
	await vi.waitFor(async () => expect((await made()).length).toBeGreaterThan(4), { timeout: 60_000, interval: 5 })
	for (const worker of workers) worker.kill("SIGKILL")
	expect((await Promise.all(ended)).map(([, signal]) => signal)).toEqual(["SIGKILL", "SIGKILL"])
	expect((await made()).length).toBeLessThan(STORES)

	await makeDueOrders({ producerId, now: new Date("2026-08-15T03:00:00Z") })
	const all = await made()
	expect(all).toHaveLength(STORES)
	expect(new Set(all.map((order) => order.storeId)).size).toBe(STORES)
	expect(all.map((order) => order.number).toSorted((a, b) => a - b)).toEqual(
		Array.from({ length: STORES }, (_, index) => index + 1),
	)
})
