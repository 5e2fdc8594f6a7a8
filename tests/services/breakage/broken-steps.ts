import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import sharp from "sharp"
import { readProducer } from "~/db/transaction.server"
import { answerReport } from "~/services/breakage/answer-report.server"
import { findBreakageForm } from "~/services/breakage/find-breakage-form.server"
import { findReport } from "~/services/breakage/find-report.server"
import { type ReportedLine, reportBreakage } from "~/services/breakage/report-breakage.server"
import { sendOrder } from "~/services/orders/send-order.server"
import { type KeptPhoto, reencodePhoto } from "~/services/uploads/reencode-photo.server"
import { addHand, packed, producerOf } from "../desk/desk-steps"
import { addProduct, openStore, openYard, type Shop, type Yard } from "../orders/place-yard"

/** Thursday after the delivery of Tuesday, August 18: within the three days in which broken comb may be reported. */
const AFTER_DELIVERY = new Date("2026-08-20T14:00:00Z")

/** A delivery of two cases (24 pieces, $228.00, no delivery charge asked) that was sent and invoiced. */
export async function openDelivery(yardGiven?: Yard, cases = 2) {
	const yard = yardGiven ?? (await openYard())
	const shop = await openStore(yard)
	const handId = await addHand()
	const code = randomUUID().slice(0, 6)
	const productId = await addProduct(yard, { code, readyCases: cases + 2 })
	const orderNumber = await packed(yard, shop, handId, [productId, cases])
	const sent = await sendOrder({ producer: producerOf(yard), number: orderNumber, personId: handId })
	if (!sent.ok) throw new Error(sent.reason)
	const { invoiceNumber } = sent
	if (invoiceNumber === null) throw new Error("the order is not invoiced yet")
	const [lineId = ""] = await lineIdsOf(yard, shop, invoiceNumber)
	return { yard, shop, handId, productId, lotCode: `L-${code}`, invoiceNumber, lineId }
}

export type Delivery = Awaited<ReturnType<typeof openDelivery>>

async function lineIdsOf(yard: Yard, shop: Shop, invoiceNumber: string): Promise<string[]> {
	const query = { producerId: yard.producerId, storeId: shop.storeId, invoiceNumber }
	return (await findBreakageForm(query))?.lines.map(({ id }) => id) ?? []
}

type More = { reportId?: string; now?: Date; lines?: ReportedLine[] }

/** Reports so many pieces of the delivery's line as broken. */
export function report(delivery: Delivery, pieces: number, more: More = {}) {
	const { yard, shop, invoiceNumber, lineId } = delivery
	return reportBreakage({
		producer: producerOf(yard),
		store: { id: shop.storeId, name: "Pantry & Plume" },
		person: { id: shop.person.id, name: "Rosa Quill" },
		invoiceNumber,
		reportId: more.reportId ?? randomUUID(),
		note: "The lowest case was wet.",
		lines: more.lines ?? [{ invoiceLineId: lineId, pieces, note: "crushed", photos: [] }],
		now: more.now ?? AFTER_DELIVERY,
	})
}

/** The same, and its id; throws when it is refused. */
export async function reported(delivery: Delivery, pieces: number): Promise<string> {
	const made = await report(delivery, pieces)
	if (!made.ok) throw new Error(made.reason)
	return made.reportId
}

/** Answers a report with so many pieces accepted. */
export async function answer(delivery: Delivery, reportId: string, pieces: number, words = "Sorry for that.") {
	const { yard, handId } = delivery
	const found = await findReport({ producerId: yard.producerId, reportId })
	return answerReport({
		producer: producerOf(yard),
		reportId,
		accepted: new Map(found?.lines.map(({ id }) => [id, pieces])),
		answer: words,
		personId: handId,
		now: AFTER_DELIVERY,
	})
}

/** What the books say of a producer: its invoices, credits and settlements in cents, and where each lot's pieces are. */
export function readAccounts(yard: Yard) {
	return readProducer(yard.producerId, async (tx) => {
		const { rows: invoices } = await tx.execute<{ total: number; open: number; credited: number }>(sql`
			select total_cents as total, open_cents as open, credited_cents as credited from invoices
			where producer_id = ${yard.producerId} order by year, sequence`)
		const { rows: credits } = await tx.execute<{ number: number; total: number; settled: number; kind: string }>(sql`
			select sequence as number, total_cents as total, settled_cents as settled, kind from credits
			where producer_id = ${yard.producerId} order by sequence`)
		const { rows: lots } = await tx.execute<{ code: string; harvested: number; placed: number; least: number }>(sql`
			select l.code, l.pieces_harvested as harvested, sum(b.pieces)::int as placed, min(b.pieces) as least
			from lots l join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
			where l.producer_id = ${yard.producerId} group by l.code, l.pieces_harvested order by l.code`)
		return { invoices, credits, lots }
	})
}

/** Pieces of a producer at a place. */
export function piecesAt(yard: Yard, place: "sold" | "waste"): Promise<number> {
	return readProducer(yard.producerId, async (tx) => {
		const { rows } = await tx.execute<{ pieces: number }>(sql`
			select coalesce(sum(pieces), 0)::int as pieces from stock_balances
			where producer_id = ${yard.producerId} and place = ${place}`)
		return rows[0]?.pieces ?? 0
	})
}

/** A photo with a place written into it, as a phone makes one, drawn anew as every photo is. */
export async function takePhoto(): Promise<KeptPhoto> {
	const taken = await sharp({ create: { width: 400, height: 300, channels: 3, background: "#b0660f" } })
		.withExif({ IFD0: { ImageDescription: "behind the back door" } })
		.jpeg()
		.toBuffer()
	const drawn = await reencodePhoto(taken)
	if (!drawn.ok) throw new Error(drawn.reason)
	return drawn.photo
}
