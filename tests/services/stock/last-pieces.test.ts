import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { expect, test } from "vitest"
import { withProducer } from "~/db/transaction.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { packOrder } from "~/services/orders/pack-order.server"
import { placeOrder } from "~/services/orders/place-order.server"
import { movePieces } from "~/services/stock/move-pieces.server"
import { postStockTake } from "~/services/stock/post-stock-take.server"
import { addHand, addLot, place, producerOf, standOnThursday } from "../desk/desk-steps"
import { addProduct, openStore, openYard, THURSDAY, TUESDAY_18, ZONE } from "../orders/place-yard"

standOnThursday()

const NO_REF = "00000000-0000-0000-0000-000000000000"

test("fifty buyers, packers and hands at the last pieces: none below zero, none promised twice, all of it somewhere", async () => {
	const yard = await openYard()
	const { producerId } = yard
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	// Ten cases in two lots; five are promised before the rush.
	const lots = [
		await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2026-09-01", ready: 36, coldRoom: 24 }),
		await addLot(yard, { productId: round, code: "R2", bestBeforeOn: "2027-02-01", ready: 60 }),
	]
	const shops = await Promise.all(Array.from({ length: 5 }, () => openStore(yard)))
	const confirmed: number[] = []
	for (const shop of shops) {
		const number = await place(shop, [round, 1])
		await confirmOrder({ producer: producerOf(yard), number, personId, given: [] })
		confirmed.push(number)
	}
	const buy = (index: number) =>
		placeOrder({
			producerId,
			storeId: shops[index % 5]?.storeId ?? "",
			person: shops[index % 5]?.person ?? { id: "", email: "" },
			zone: ZONE,
			now: THURSDAY,
			deliveryOn: TUESDAY_18,
			lines: [{ productId: round, cases: 1, keep: false }],
			poNumber: "",
			note: "",
			idempotencyKey: randomUUID(),
		})
	const carry = (code: string, from: "ready" | "cold-room") =>
		movePieces({
			producerId,
			code,
			personId,
			from,
			fromRef: NO_REF,
			to: from === "ready" ? "cold-room" : "ready",
			pieces: 12,
			reason: "carried",
			key: randomUUID(),
		})
	const count = () =>
		postStockTake({
			producerId,
			personId,
			place: "ready",
			ref: NO_REF,
			takenOn: "2026-08-13",
			placeWords: "the ready shelf",
			lines: lots.map((lotId, index) => ({ lotId, counted: index ? 60 : 36, shown: index ? 60 : 36, reason: "" })),
			idempotencyKey: randomUUID(),
		})

	const buying = Array.from({ length: 25 }, (_, index) => buy(index))
	// Each order is packed by three hands at once.
	const packing = confirmed.flatMap((number) => [1, 2, 3].map(() => packOrder({ producerId, number, personId })))
	const carrying = [
		...["R1", "R2", "R1", "R2"].map((code) => carry(code, "ready")),
		...["R1", "R2", "R1", "R2"].map((code) => carry(code, "cold-room")),
	]
	const counting = [count(), count()]
	expect(buying.length + packing.length + carrying.length + counting.length).toBe(50)
	const [bought, packed] = await Promise.all([Promise.all(buying), Promise.all(packing), ...carrying, ...counting])

	expect(bought.filter((answer) => answer.ok)).toHaveLength(5)
	expect(packed.filter((answer) => answer.ok)).toHaveLength(5)
	await withProducer(producerId, async (tx) => {
		const { rows: balances } = await tx.execute<{ least: number; whole: boolean }>(sql`
			select min(b.pieces)::int as least, sum(b.pieces) = l.pieces_harvested as whole
			from lots l join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
			where l.producer_id = ${producerId} group by l.id, l.pieces_harvested`)
		for (const { least, whole } of balances)
			expect({ isNegative: least < 0, whole }).toEqual({ isNegative: false, whole: true })
		const {
			rows: [books],
		} = await tx.execute<{ ledger: number; moves: number; promised: number; packed: number }>(sql`
			select (select sum(pieces) from stock_balances where producer_id = ${producerId})::int as ledger,
				(select sum(pieces) from stock_moves where producer_id = ${producerId} and from_place is null)::int as moves,
				(select sum(coalesce(l.given_cases, l.asked_cases) * l.pieces_per_case) from order_lines l
					where l.producer_id = ${producerId})::int as promised,
				(select sum(pieces) from stock_balances where producer_id = ${producerId} and place = 'packed')::int as packed`)
		// Ten cases came off the hives, and ten are promised: five of them packed.
		expect(books).toEqual({ ledger: 120, moves: 120, promised: 120, packed: 60 })
		const { rows: doubled } = await tx.execute(sql`
			select order_line_id from order_line_lots where producer_id = ${producerId}
			group by order_line_id having sum(pieces) <> 12`)
		expect(doubled).toEqual([])
	})

	// What was promised can be packed, whatever was carried where.
	for (const answer of bought) {
		if (!answer.ok) continue
		await confirmOrder({ producer: producerOf(yard), number: answer.number, personId, given: [] })
		expect(await packOrder({ producerId, number: answer.number, personId })).toEqual({ ok: true })
	}
})
