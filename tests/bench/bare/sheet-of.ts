import { randomUUID } from "node:crypto"
import { type Day, timeLeftWords } from "~/domain/calendar"
import { cutoffSoonWords } from "~/domain/delivery/last-orders"
import { caseCentsAfter } from "~/domain/pricing/price-in-force"
import { canServe, type PromisedQuantity, type Supply } from "~/domain/promise/free-to-promise"
import { findBuyFrame } from "~/routes/buy/frame.server"
import type { loadSheet } from "~/routes/buy/sheet.server"
import { deliveryDayOn } from "~/services/delivery/find-delivery-days.server"
import { caseStrips } from "~/services/orders/cases-on-day.server"
import type { OwnLine } from "~/services/orders/find-asked-days.server"
import { fortnightOf } from "~/services/orders/find-fortnight.server"
import type { ProductOutlook } from "~/services/promise/find-outlooks.server"
import type { Asked, SheetRows } from "./read-rows"

/** What the page of the order sheet is given. */
export type SheetData = Awaited<ReturnType<typeof loadSheet>>

/** Puts the rows of an open day together by the product's own rules. */
export async function sheetOf(rows: SheetRows, { day, now, producerSlug, storeSlug }: Asked): Promise<SheetData> {
	const { who, today, from } = rows
	const zone: string = who.time_zone
	const schedule = { ...roundsOf(rows), zone, today, now }
	const delivery = deliveryDayOn(schedule, day)
	if (!delivery?.isOpen) throw new Error("the bench asks for a day whose orders are open")
	const outlooks = outlooksOf(rows)
	const ownLines = rows.ownLines.map(ownLineOf)
	const lastOn = ownLines.findLast((line) => line.deliveryOn < day)?.deliveryOn
	const casesOn = (on: Day | undefined, productId: string) =>
		ownLines
			.filter((line) => line.deliveryOn === on && line.productId === productId)
			.reduce((sum, line) => sum + line.cases, 0)
	const toShare = new Map(rows.toShare.map((row) => [row.product_id, row.cases]))
	const usual = new Map(rows.usual.map((row) => [row.productId, row.cases]))
	const [terms] = rows.terms
	const fortnight = fortnightOf({ schedule, from, outlooks: [...outlooks.values()], ownLines })
	return {
		frame: await findBuyFrame(scopeOf(who, producerSlug, storeSlug), { part: "sheet", day, now, fortnight }),
		day,
		today,
		isOpen: true,
		closes: { words: cutoffSoonWords(delivery.cutoffAt, zone, today), left: timeLeftWords(now, delivery.cutoffAt) },
		nextOpenDay: null,
		store: {
			address: terms.address,
			receivingNote: terms.receiving_note,
			terms: {
				minimumCents: terms.minimum_cents,
				deliveryChargeCents: terms.delivery_charge_cents,
				freeAboveCents: terms.free_above_cents,
			},
			isLookedAtFirst: terms.is_stopped,
		},
		producerName: who.producer_name,
		products: rows.prices.flatMap((row) => {
			const outlook = outlooks.get(row.id)
			const [strip] = outlook ? caseStrips(outlook, [day]) : []
			if (!outlook || !strip) return []
			return {
				...productOf(row),
				strip,
				toShareCases: toShare.get(row.id) ?? 0,
				lastCases: casesOn(lastOn, row.id),
				usualCases: usual.get(row.id) ?? 0,
				orderedCases: casesOn(day, row.id),
				mayAsk: outlook.supplies.some((supply) => supply.quantity > 0 && canServe(supply, day)),
			}
		}),
		orders: ordersOf(ownLines.filter((line) => line.deliveryOn === day)),
		start: { key: day, values: {}, changes: null, again: null, gone: 0, draft: null },
		idempotencyKey: randomUUID(),
	}
}

type Row = SheetRows["who"]

function roundsOf({ rounds }: SheetRows) {
	return {
		rounds: rounds.map((row) => ({
			weekday: row.weekday,
			cutoffDaysBefore: row.cutoff_days_before,
			cutoffTime: row.cutoff_time.slice(0, 5),
		})),
		shutDays: rounds[0]?.shut_days ?? [],
	}
}

function outlooksOf({ entries }: SheetRows): Map<string, ProductOutlook> {
	type Growing = ProductOutlook & { supplies: Supply[]; promises: PromisedQuantity[] }
	const outlooks = new Map<string, Growing>()
	for (const { productId, piecesPerCase, reserve, kind, on, until, pieces } of entries) {
		const outlook: Growing = outlooks.get(productId) ?? { supplies: [], promises: [], reserve, piecesPerCase }
		outlooks.set(productId, outlook)
		if (kind === "promised") outlook.promises.push({ on, quantity: pieces })
		else if (kind) outlook.supplies.push({ on, until: until ?? undefined, quantity: pieces, kind })
	}
	return outlooks
}

function ownLineOf(row: Row): OwnLine {
	const { number, delivery_on: deliveryOn, state, product_id: productId, cases } = row
	return { number, deliveryOn, state, productId, cases }
}

function ordersOf(lines: readonly OwnLine[]): SheetData["orders"] {
	const orders = new Map<number, SheetData["orders"][number]>()
	for (const { number, state, cases } of lines)
		orders.set(number, { number, state, cases: (orders.get(number)?.cases ?? 0) + cases })
	return [...orders.values()]
}

function productOf(row: Row) {
	return {
		productId: row.id,
		code: row.code,
		name: row.name,
		detail: row.detail,
		pieceNetGrams: row.piece_net_grams,
		piecesPerCase: row.pieces_per_case,
		breakFamily: row.break_family,
		breaks: row.min_cases.map((minCases: number, index: number) => ({
			minCases,
			caseCents: caseCentsAfter(
				{ caseCents: row.case_cents[index] ?? 0, poundCents: row.pound_cents[index] ?? null },
				{ pieceNetGrams: row.piece_net_grams, piecesPerCase: row.pieces_per_case },
				row.off,
			).caseCents,
		})),
	}
}

function scopeOf(who: Row, producerSlug: string, storeSlug: string) {
	return {
		person: {
			id: who.user_id,
			name: who.user_name,
			email: who.user_email,
			sessionId: who.session_id,
			lastSeenAt: who.last_seen_at,
		},
		producer: {
			id: who.producer_id,
			slug: producerSlug,
			name: who.producer_name,
			county: who.county,
			timeZone: who.time_zone,
		},
		store: { id: who.store_id, slug: storeSlug, name: who.store_name },
		storeRoles: who.store_roles,
	}
}
