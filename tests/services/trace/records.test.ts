import { eq } from "drizzle-orm"
import Papa from "papaparse"
import { expect, test } from "vitest"
import { lots, producerSettings, stockMoves, stores } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { RECEIVED_FIELDS, RELEASED_FIELDS } from "~/domain/trace/record-fields"
import { sendOrder } from "~/services/orders/send-order.server"
import { drawLotCode, lotAddress } from "~/services/trace/draw-lot-code.server"
import { findPublicLot } from "~/services/trace/find-public-lot.server"
import { listLotMoves } from "~/services/trace/list-lot-moves.server"
import { listReceived, listReleased } from "~/services/trace/list-records.server"
import { addHand, addLot, packed, producerOf, standOnThursday } from "../desk/desk-steps"
import { addProduct, openStore, openYard, TUESDAY_18, type Yard } from "../orders/place-yard"
import { makeLotFrom } from "./trace-steps"

standOnThursday()

/** A split lot of which two cases went to one store; the store's name begins like a formula. */
async function sellSplit() {
	const yard = await openYard()
	const personId = await addHand()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const mother = await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2027-03-01", ready: 60 })
	await makeLotFrom(yard, { fromLotId: mother, code: "R1b", productId: round, kind: "split", pieces: 36 })
	const store = await openStore(yard)
	await withProducer(yard.producerId, async (tx) => {
		await tx.update(stores).set({ name: "=Pantry\n& Plume", phone: "(555) 010-0177", email: "shop@plume.example.test" })
		await tx.update(lots).set({ yard: "Canal Bank", flora: "white clover" }).where(eq(lots.id, mother))
		await tx.update(producerSettings).set({ phone: "(555) 010-0142" })
	})
	const number = await packed(yard, store, personId, [round, 2])
	await sendOrder({ producer: producerOf(yard), number, personId })
	return { yard, number }
}

const days = { from: "2026-08-01", to: "2026-08-31" }

async function read(lines: AsyncGenerator<string>): Promise<Record<string, string>[]> {
	let text = ""
	for await (const piece of lines) text += piece
	expect(text.startsWith("\uFEFF")).toBe(true)
	return Papa.parse<Record<string, string>>(text.slice(1).trimEnd(), { header: true }).data
}

test("the record of what left names recipient, food, day, lot, quantity, carrier and what it was made from", async () => {
	const { yard, number } = await sellSplit()
	const [row, ...others] = await read(listReleased({ producer: producerOf(yard), ...days }))
	expect(others).toEqual([])
	expect(Object.keys(row ?? {})).toEqual(RELEASED_FIELDS.map(({ column }) => column))
	expect(row).toMatchObject({
		// Quoted, so that no spreadsheet takes it for a formula, also where the name has two lines.
		Recipient: "'=Pantry\n& Plume",
		"Recipient: address": "12 Carder Street",
		"Recipient: telephone": "(555) 010-0177",
		"Recipient: e-mail": "shop@plume.example.test",
		Food: "Comb honey",
		Brand: "Larkmoor Bee Yard",
		Lot: "R1b",
		Pieces: "24",
		"How packaged": "2 cases of 12",
		Carrier: "Larkmoor Bee Yard, own van",
		"Carrier: telephone": "(555) 010-0142",
		"Made from": "lot R1b, harvested 2026-07-01; lot R1, harvested 2026-07-01, Canal Bank",
		Order: String(number),
	})
	expect(row?.["Date released"]).toMatch(/^\d{4}-\d{2}-\d{2}$/)
	expect(await read(listReleased({ producer: producerOf(yard), from: "2026-09-01", to: "2026-09-30" }))).toEqual([])
	expect(await read(listReleased({ producer: producerOf(await openYard()), ...days }))).toEqual([])
	expect(TUESDAY_18 >= days.from && TUESDAY_18 <= days.to).toBe(true)
})

test("the record of what came in has a line for each lot off the hives, and none for those made from other lots", async () => {
	const { yard } = await sellSplit()
	const rows = await read(listReceived({ producer: producerOf(yard), from: "2026-07-01", to: "2026-07-01" }))
	expect(rows).toHaveLength(1)
	expect(Object.keys(rows[0] ?? {})).toEqual(RECEIVED_FIELDS.map(({ column }) => column))
	expect(rows[0]).toMatchObject({ Lot: "R1", Pieces: "60", "Date received": "2026-07-01", Hives: "Canal Bank" })
})

async function publicText(yard: Yard, code: string): Promise<string> {
	return JSON.stringify(await findPublicLot({ producerId: yard.producerId, code }))
}

test("the public page of a lot tells what, where and when, and never which store had it", async () => {
	const { yard } = await sellSplit()
	const lot = await findPublicLot({ producerId: yard.producerId, code: "R1" })
	expect(lot).toMatchObject({
		state: "released",
		productName: "Round section 11",
		yard: "Canal Bank",
		flora: "white clover",
		harvestedOn: "2026-07-01",
		withdrawal: null,
	})
	for (const code of ["R1", "R1b"]) expect(await publicText(yard, code)).not.toMatch(/Plume|Carder|0177/)
	expect(await findPublicLot({ producerId: yard.producerId, code: "R9" })).toBeNull()
})

test("the code on the label is a drawing, and its address escapes what a lot code may hold", async () => {
	expect(lotAddress({ producerSlug: "larkmoor", code: "R 1/b" })).toMatch(
		/^https?:\/\/.+\/shop\/larkmoor\/lots\/R%201%2Fb$/,
	)
	expect(await drawLotCode({ producerSlug: "larkmoor", code: "R1" })).toMatch(/^<svg[^>]*viewBox[\s\S]*<\/svg>\s*$/)
})

test("the moves of a lot page by key, the latest first, none twice and none lost", async () => {
	const yard = await openYard()
	const round = await addProduct(yard, { code: "11", readyCases: 0 })
	const lotId = await addLot(yard, { productId: round, code: "R1", bestBeforeOn: "2027-03-01", ready: 60 })
	const move = { producerId: yard.producerId, lotId, pieces: 1, reason: "to and fro" }
	await withProducer(yard.producerId, async (tx) => {
		for (let count = 0; count < 30; count += 1)
			await tx.insert(stockMoves).values([
				{ ...move, fromPlace: "ready", toPlace: "cold-room" },
				{ ...move, fromPlace: "cold-room", toPlace: "ready" },
			])
	})
	const query = { producerId: yard.producerId, code: "R1" }
	const first = await listLotMoves({ ...query, after: null })
	const second = await listLotMoves({ ...query, after: first.next })
	const ids = [...first.moves, ...second.moves].map(({ id }) => id)
	expect([first.moves.length, second.moves.length, new Set(ids).size]).toEqual([50, 12, 62])
	expect(second.next).toBeNull()
	expect((await listLotMoves({ ...query, after: "not a key" })).moves[0]?.id).toBe(first.moves[0]?.id)
})
