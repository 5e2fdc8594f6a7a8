import { and, eq, gt, sql } from "drizzle-orm"
import { beforeAll, describe, expect, test } from "vitest"
import {
	auditEntries,
	invoiceLines,
	invoiceOrders,
	invoices,
	lots,
	orderEvents,
	orderLines,
	orders,
	payments,
	producers,
	settlements,
	stockBalances,
	stockMoves,
} from "~/db/schema"
import { readProducer, type Tx, withPlatform, withProducer } from "~/db/transaction.server"
import { seedDemo } from "~/services/demo/seed-demo.server"
import { INSUFFICIENT_PRIVILEGE, refusalOf } from "./connections"

let producerId = ""

beforeAll(async () => {
	await seedDemo()
	const [producer] = await withPlatform((tx) => tx.select().from(producers).where(eq(producers.slug, "larkmoor")))
	producerId = producer?.id ?? ""
}, 120_000)

const constraintOf = async (work: (tx: Tx) => Promise<unknown>) =>
	(await refusalOf(withProducer(producerId, work))).constraint
const codeOf = async (work: (tx: Tx) => Promise<unknown>) => (await refusalOf(withProducer(producerId, work))).code

/** The first row; fails when there is none. */
function first<T>(rows: readonly T[]): T {
	const [row] = rows
	if (row === undefined) throw new Error("the demo has no such row")
	return row
}

async function anyOrder() {
	return first(await readProducer(producerId, (tx) => tx.select().from(orders).limit(1)))
}

/** Some invoice, and its row as one that is to be written anew: with nothing settled. */
async function newInvoice() {
	const { id, openCents, paidCents, creditedCents, discountCents, writtenOffCents, ...invoice } = first(
		await readProducer(producerId, (tx) => tx.select().from(invoices).limit(1)),
	)
	return { id, invoice }
}

/** A new lot with so many pieces on the ready shelf. */
async function readyLot(pieces: number): Promise<string> {
	return withProducer(producerId, async (tx) => {
		const model = first(await tx.select().from(lots).limit(1))
		const { id, code, ...rest } = model
		const lot = first(
			await tx
				.insert(lots)
				.values({ ...rest, code: `T-${crypto.randomUUID()}`, piecesHarvested: pieces })
				.returning({ id: lots.id }),
		)
		await tx.insert(stockMoves).values([
			{ producerId, lotId: lot.id, fromPlace: null, toPlace: "cold-room", pieces, reason: "off the hives" },
			{ producerId, lotId: lot.id, fromPlace: "cold-room", toPlace: "ready", pieces, reason: "released" },
		])
		return lot.id
	})
}

const waste = (tx: Tx, lotId: string, pieces: number) =>
	tx.insert(stockMoves).values({ producerId, lotId, fromPlace: "ready", toPlace: "waste", pieces, reason: "broken" })

async function piecesIn(lotId: string, place: "ready" | "waste"): Promise<number> {
	const rows = await readProducer(producerId, (tx) =>
		tx
			.select({ pieces: stockBalances.pieces })
			.from(stockBalances)
			.where(and(eq(stockBalances.lotId, lotId), eq(stockBalances.place, place))),
	)
	return rows.reduce((sum, { pieces }) => sum + pieces, 0)
}

describe("stock", () => {
	test("never falls below zero, and a refused move leaves no trace", async () => {
		const lotId = await readyLot(7)
		expect(await constraintOf((tx) => waste(tx, lotId, 8))).toBe("stock_balances_not_negative")
		expect(await piecesIn(lotId, "ready")).toBe(7)
		expect(await piecesIn(lotId, "waste")).toBe(0)
	})

	test("is not taken from a place that never held any", async () => {
		const lotId = await readyLot(7)
		const fromVan = { producerId, lotId, fromPlace: "van", toPlace: "sold", pieces: 1, reason: "sold" } as const
		expect(await constraintOf((tx) => tx.insert(stockMoves).values(fromVan))).toBe("stock_balances_not_negative")
	})

	test("moves whole pieces, more than none, and somewhere else", async () => {
		const lotId = await readyLot(7)
		expect(await constraintOf((tx) => waste(tx, lotId, 0))).toBe("stock_moves_pieces_positive")
		const nowhere = { producerId, lotId, fromPlace: "ready", toPlace: "ready", pieces: 1, reason: "none" } as const
		expect(await constraintOf((tx) => tx.insert(stockMoves).values(nowhere))).toBe("stock_moves_go_somewhere")
	})

	test("of twenty who take the last seven pieces at once seven get one, and none is left", async () => {
		const lotId = await readyLot(7)
		const takes = await Promise.allSettled(
			Array.from({ length: 20 }, () => withProducer(producerId, (tx) => waste(tx, lotId, 1))),
		)
		const refused = takes.flatMap((take) =>
			take.status === "rejected" ? [refusalOf(Promise.reject(take.reason))] : [],
		)
		expect((await Promise.all(refused)).map(({ constraint }) => constraint)).toEqual(
			Array.from({ length: 13 }, () => "stock_balances_not_negative"),
		)
		expect(await piecesIn(lotId, "ready")).toBe(0)
		expect(await piecesIn(lotId, "waste")).toBe(7)
	})

	test("keeps its moves as they were written, and its balances for the database alone", async () => {
		expect(await codeOf((tx) => tx.update(stockMoves).set({ pieces: 1 }))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await codeOf((tx) => tx.delete(stockMoves))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await codeOf((tx) => tx.update(stockBalances).set({ pieces: 1 }))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await codeOf((tx) => tx.delete(stockBalances))).toBe(INSUFFICIENT_PRIVILEGE)
	})
})

describe("orders", () => {
	test("have a number of their own", async () => {
		const { id, idempotencyKey, standingOrderId, standingOn, ...order } = await anyOrder()
		expect(await constraintOf((tx) => tx.insert(orders).values(order))).toBe("orders_number_once")
	})

	test("come once for each date of a standing order", async () => {
		const standing = first(
			await readProducer(producerId, (tx) =>
				tx.select().from(orders).where(sql`standing_order_id is not null`).limit(1),
			),
		)
		const { id, idempotencyKey, ...order } = standing
		expect(await constraintOf((tx) => tx.insert(orders).values({ ...order, number: 900_001 }))).toBe(
			"orders_one_per_standing_date",
		)
	})

	test("come once from each form that was sent", async () => {
		const { id, standingOrderId, standingOn, ...order } = await anyOrder()
		expect(await constraintOf((tx) => tx.insert(orders).values({ ...order, number: 900_002 }))).toBe("orders_sent_once")
	})

	test("give no more than was asked, and nothing below zero", async () => {
		const giveMore = (tx: Tx) => tx.update(orderLines).set({ givenCases: sql`${orderLines.askedCases} + 1` })
		expect(await constraintOf(giveMore)).toBe("order_lines_given_within_asked")
		const giveLess = (tx: Tx) => tx.update(orderLines).set({ givenCases: -1 })
		expect(await constraintOf(giveLess)).toBe("order_lines_given_within_asked")
	})

	test("are cancelled, not deleted, and their timeline stays", async () => {
		expect(await codeOf((tx) => tx.delete(orders))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await codeOf((tx) => tx.delete(orderEvents))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await codeOf((tx) => tx.update(orderEvents).set({ kind: "paid" }))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await codeOf((tx) => tx.update(auditEntries).set({ action: "" }))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await codeOf((tx) => tx.delete(auditEntries))).toBe(INSUFFICIENT_PRIVILEGE)
	})
})

describe("invoices", () => {
	test("have a number of their own in their year, and an order its one invoice", async () => {
		const { id, invoice } = await newInvoice()
		expect(await constraintOf((tx) => tx.insert(invoices).values(invoice))).toBe("invoices_number_once")
		const about = first(await readProducer(producerId, (tx) => tx.select().from(invoiceOrders).limit(1)))
		expect(await constraintOf((tx) => tx.insert(invoiceOrders).values({ ...about, invoiceId: id }))).toBe(
			"invoice_orders_pk",
		)
	})

	test("once issued are never altered nor deleted, and neither are their lines and payments", async () => {
		expect(await codeOf((tx) => tx.update(invoices).set({ totalCents: 1 }))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await codeOf((tx) => tx.update(invoices).set({ dueOn: "2030-01-01" }))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await constraintOf((tx) => tx.update(invoices).set({ paidCents: 1 }))).toBe("invoices_sums_by_ledger_alone")
		expect(await codeOf((tx) => tx.delete(invoices))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await codeOf((tx) => tx.update(invoiceLines).set({ lineCents: 1 }))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await codeOf((tx) => tx.delete(invoiceLines))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await codeOf((tx) => tx.update(payments).set({ amountCents: 1 }))).toBe(INSUFFICIENT_PRIVILEGE)
		expect(await codeOf((tx) => tx.delete(payments))).toBe(INSUFFICIENT_PRIVILEGE)
	})

	test("take a payment, up to what they come to", async () => {
		const { id, openCents } = first(
			await readProducer(producerId, (tx) => tx.select().from(invoices).where(gt(invoices.openCents, 0)).limit(1)),
		)
		const settle = (cents: number) => (tx: Tx) =>
			tx.insert(settlements).values({
				producerId,
				invoiceId: id,
				kind: "write-off",
				amountCents: cents,
				settledOn: "2030-01-01",
			})
		expect(await constraintOf(settle(openCents + 1))).toBe("invoices_settled_within_total")
		await withProducer(producerId, settle(openCents))
		expect(await readProducer(producerId, (tx) => tx.select().from(invoices).where(eq(invoices.id, id)))).toMatchObject(
			[{ openCents: 0, writtenOffCents: openCents }],
		)
	})

	test("are the sum of their parts", async () => {
		const { invoice } = await newInvoice()
		const wrong = { ...invoice, sequence: 900_002, totalCents: invoice.totalCents + 1 }
		expect(await constraintOf((tx) => tx.insert(invoices).values(wrong))).toBe("invoices_sum")
	})

	test("are not settled twice by the same card payment", async () => {
		const card = first(
			await readProducer(producerId, (tx) => tx.select().from(payments).where(eq(payments.method, "card")).limit(1)),
		)
		const { id, settledCents, returnedCents, ...again } = card
		expect(await constraintOf((tx) => tx.insert(payments).values(again))).toBe("payments_card_payment_once")
	})
})
