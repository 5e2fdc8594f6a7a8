import type { onlinePaymentParts, onlinePayments, payments, settlements } from "~/db/schema"
import { addDays, type Day, dayInZone, instantAt, weekday } from "~/domain/calendar"
import type { Invoices } from "./plan-invoices"
import type { OrderOfSeason } from "./plan-orders"
import { grouped, minutesAfter, type Season } from "./season"

export type Payments = {
	rows: {
		payments: (typeof payments.$inferInsert)[]
		settlements: (typeof settlements.$inferInsert)[]
		onlinePayments: (typeof onlinePayments.$inferInsert)[]
		onlinePaymentParts: (typeof onlinePaymentParts.$inferInsert)[]
	}
	/** For the timelines. */
	paid: { order: OrderOfSeason; at: Date; by: string; amountCents: number; invoiceId: string }[]
}

type Invoice = Invoices["invoices"][number]

/**
 * What the stores have paid so far, each in its way and at its pace. A check pays all that is due that week. The oldest overdue invoice of a store that pays by check is paid in part, and one of a
 * store that pays by card has been tried with a card that was declined.
 */
export function planPayments(season: Season, invoices: Invoices): Payments {
	const { scenario, now } = season
	const plan: Payments = {
		rows: { payments: [], settlements: [], onlinePayments: [], onlinePaymentParts: [] },
		paid: [],
	}
	const isPaidBy = (invoice: Invoice) => paidAt(invoice, scenario.timeZone) <= now
	for (const group of grouped(invoices.invoices.filter(isPaidBy), groupKey).values()) {
		pay(season, plan, group)
	}
	const overdue = invoices.invoices.filter((invoice) => !isPaidBy(invoice) && invoice.row.dueOn < season.today)
	const byCheck = overdue.find(({ order }) => order.store.paysBy === "cheque")
	if (byCheck) payPart(season, plan, byCheck)
	const byCard = overdue.find(({ order }) => order.store.paysBy === "card")
	if (byCard) decline(season, plan, byCard)
	return plan
}

function paidOn({ row, order }: Invoice): Day {
	const on = addDays(row.dueOn, order.store.paysLateDays)
	const notBefore = on > row.issuedOn ? on : addDays(row.issuedOn, 1)
	// Checks are written on Fridays.
	return order.store.paysBy === "cheque" ? addDays(notBefore, (12 - weekday(notBefore)) % 7) : notBefore
}

function paidAt(invoice: Invoice, zone: string): Date {
	return instantAt(paidOn(invoice), "10:20", zone)
}

/** What is paid together: by card each invoice for itself, else all of a store on one day. */
function groupKey(invoice: Invoice): string {
	const { store } = invoice.order
	return store.paysBy === "card" ? invoice.row.id : `${store.id} ${paidOn(invoice)}`
}

function pay(season: Season, plan: Payments, group: Invoice[]): void {
	const { producerId, chance, scenario, userId } = season
	const [first] = group
	if (!first) return
	const { store } = first.order
	const at = paidAt(first, scenario.timeZone)
	const by = store.paysBy === "card" ? (store.buyerId ?? userId(scenario.ownerEmail)) : userId(scenario.deskEmail)
	const intentId = store.paysBy === "card" ? `pi_demo_${chance.hash().slice(0, 24)}` : null
	const paymentId = chance.id()
	const receivedOn = paidOn(first)
	plan.rows.payments.push({
		producerId,
		id: paymentId,
		storeId: store.id,
		method: store.paysBy,
		amountCents: group.reduce((sum, { row }) => sum + row.totalCents, 0),
		receivedAt: at,
		receivedOn,
		stripePaymentIntentId: intentId,
		enteredBy: by,
	})
	for (const { row, order } of group) {
		plan.rows.settlements.push({
			producerId,
			invoiceId: row.id,
			kind: "payment",
			paymentId,
			amountCents: row.totalCents,
			settledOn: receivedOn,
			settledAt: at,
			enteredBy: by,
		})
		plan.paid.push({ order, at, by, amountCents: row.totalCents, invoiceId: row.id })
		if (intentId === null) continue
		const onlinePaymentId = chance.id()
		plan.rows.onlinePaymentParts.push({ producerId, onlinePaymentId, invoiceId: row.id, amountCents: row.totalCents })
		plan.rows.onlinePayments.push({
			producerId,
			id: onlinePaymentId,
			storeId: store.id,
			amountCents: row.totalCents,
			state: "paid",
			stripeSessionId: `cs_demo_${chance.hash().slice(0, 24)}`,
			stripePaymentIntentId: intentId,
			startedBy: by,
			createdAt: minutesAfter(at, -3),
		})
	}
}

function payPart({ producerId, chance, now, scenario, userId }: Season, plan: Payments, { row, order }: Invoice): void {
	const paymentId = chance.id()
	const amountCents = Math.floor(row.totalCents / 2)
	const receivedAt = minutesAfter(now, -2 * 1440)
	const receivedOn = dayInZone(receivedAt, scenario.timeZone)
	const enteredBy = userId(scenario.deskEmail)
	plan.rows.payments.push({
		producerId,
		id: paymentId,
		storeId: order.store.id,
		method: "cheque",
		amountCents,
		receivedAt,
		receivedOn,
		enteredBy,
	})
	plan.rows.settlements.push({
		producerId,
		invoiceId: row.id,
		kind: "payment",
		paymentId,
		amountCents,
		settledOn: receivedOn,
		settledAt: receivedAt,
		enteredBy,
	})
}

function decline({ producerId, chance, now, scenario, userId }: Season, plan: Payments, { row, order }: Invoice): void {
	const onlinePaymentId = chance.id()
	plan.rows.onlinePaymentParts.push({ producerId, onlinePaymentId, invoiceId: row.id, amountCents: row.totalCents })
	plan.rows.onlinePayments.push({
		producerId,
		id: onlinePaymentId,
		storeId: order.store.id,
		amountCents: row.totalCents,
		state: "declined",
		declineMessage: "The card has too little on it for this amount.",
		stripeSessionId: `cs_demo_${chance.hash().slice(0, 24)}`,
		startedBy: order.store.buyerId ?? userId(scenario.ownerEmail),
		createdAt: minutesAfter(now, -1440),
	})
}
