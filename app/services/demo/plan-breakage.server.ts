import type { breakageLines, breakagePhotos, breakageReports, creditLines, credits, settlements } from "~/db/schema"
import { dayInZone } from "~/domain/calendar"
import { drawPhoto } from "./draw-photo.server"
import type { Stock } from "./ledger"
import type { Invoices } from "./plan-invoices"
import type { Payments } from "./plan-payments"
import type { Records } from "./plan-records.server"
import { minutesAfter, notAfter, type Season } from "./season"

export type Breakage = {
	reports: (typeof breakageReports.$inferInsert)[]
	lines: (typeof breakageLines.$inferInsert)[]
	photos: (typeof breakagePhotos.$inferInsert)[]
	credits: (typeof credits.$inferInsert)[]
	creditLines: (typeof creditLines.$inferInsert)[]
	settlements: (typeof settlements.$inferInsert)[]
	counters: Records["counters"]
}

type Invoice = Invoices["invoices"][number]

const BROKEN = 2

/**
 * Comb that arrived broken, twice: two pieces of an open invoice were credited, and went from sold to waste; of the newest
 * invoice two are reported with a picture and wait for an answer.
 */
export async function planBreakage(
	season: Season,
	{ stock, invoices, money }: { stock: Stock; invoices: Invoices; money: Payments },
): Promise<Breakage> {
	const plan: Breakage = {
		reports: [],
		lines: [],
		photos: [],
		credits: [],
		creditLines: [],
		settlements: [],
		counters: [],
	}
	const touched = new Set(
		[...money.rows.settlements, ...money.rows.onlinePaymentParts].map(({ invoiceId }) => invoiceId),
	)
	const open = invoices.invoices.filter(
		({ row, order }) =>
			!touched.has(row.id) && order.lines.some((line) => line.lots.some(({ pieces }) => pieces > BROKEN)),
	)
	const answered = open.at(0)
	const asked = open.length > 1 ? open.at(-1) : undefined
	if (answered) credit(season, plan, stock, invoices, answered)
	if (asked) await ask(season, plan, invoices, asked)
	return plan
}

/** The first line of an invoice that has pieces to break, with the lot that they are of. */
function brokenLine(invoices: Invoices, { row, order }: Invoice) {
	for (const line of order.lines) {
		const lot = line.lots.find(({ pieces }) => pieces > BROKEN)
		const invoiceLine = invoices.lines.find((one) => one.invoiceId === row.id && one.orderLineId === line.id)
		if (lot && invoiceLine?.id) return { line, lot, invoiceLine: { ...invoiceLine, id: invoiceLine.id } }
	}
	throw new Error("an invoice with comb on it has a line to break")
}

function report({ producerId, chance, scenario, userId, now }: Season, { row, order }: Invoice, note: string) {
	return {
		producerId,
		id: chance.id(),
		storeId: order.store.id,
		invoiceId: row.id,
		note,
		reportedBy: order.store.buyerId ?? userId(scenario.deskEmail),
		reportedAt: notAfter(now, minutesAfter(order.sentAt ?? now, 240)),
	}
}

function credit(season: Season, plan: Breakage, stock: Stock, invoices: Invoices, invoice: Invoice): void {
	const { producerId, chance, scenario, userId, now } = season
	const { line, lot, invoiceLine } = brokenLine(invoices, invoice)
	const asked = report(season, invoice, "Two pieces at the bottom of the case had run out.")
	const by = userId(scenario.ownerEmail)
	const at = notAfter(now, minutesAfter(asked.reportedAt, 600))
	const on = dayInZone(at, scenario.timeZone)
	const creditId = chance.id()
	const cents = Math.round((invoiceLine.caseCents * BROKEN) / line.product.piecesPerCase)
	plan.credits.push({
		producerId,
		id: creditId,
		year: Number(on.slice(0, 4)),
		sequence: 1,
		storeId: asked.storeId,
		invoiceId: asked.invoiceId,
		issuedOn: on,
		kind: "breakage",
		reason: "Two pieces arrived broken.",
		linesCents: cents,
		taxCents: 0,
		totalCents: cents,
		issuedBy: by,
		createdAt: at,
	})
	plan.counters.push({ producerId, series: "credit", year: Number(on.slice(0, 4)), last: 1 })
	plan.creditLines.push({
		producerId,
		id: chance.id(),
		creditId,
		position: 1,
		invoiceLineId: invoiceLine.id,
		code: invoiceLine.code,
		name: invoiceLine.name,
		detail: invoiceLine.detail,
		pieces: BROKEN,
		lineCents: cents,
	})
	plan.settlements.push({
		producerId,
		invoiceId: asked.invoiceId,
		kind: "credit",
		creditId,
		amountCents: cents,
		settledOn: on,
		settledAt: at,
		enteredBy: by,
	})
	plan.reports.push({
		...asked,
		state: "accepted",
		answer: "Sorry for that. Both are credited; please throw them away.",
		creditId,
		answeredBy: by,
		answeredAt: at,
	})
	plan.lines.push({
		producerId,
		id: chance.id(),
		reportId: asked.id,
		invoiceLineId: invoiceLine.id,
		pieces: BROKEN,
		acceptedPieces: BROKEN,
	})
	stock.moves.push({
		producerId,
		id: chance.id(),
		lotId: lot.lotId,
		fromPlace: "sold",
		fromRef: invoice.order.id,
		toPlace: "waste",
		toRef: invoice.order.id,
		pieces: BROKEN,
		reason: "arrived broken",
		movedBy: by,
		movedAt: at,
	})
}

async function ask(season: Season, plan: Breakage, invoices: Invoices, invoice: Invoice): Promise<void> {
	const { producerId, chance } = season
	const { invoiceLine } = brokenLine(invoices, invoice)
	const asked = report(season, invoice, "The box was wet on one side when it came.")
	const lineId = chance.id()
	plan.reports.push(asked)
	plan.lines.push({
		producerId,
		id: lineId,
		reportId: asked.id,
		invoiceLineId: invoiceLine.id,
		pieces: BROKEN,
		note: "The comb has come loose.",
	})
	plan.photos.push({ producerId, id: chance.id(), lineId, ...(await drawPhoto()) })
}
