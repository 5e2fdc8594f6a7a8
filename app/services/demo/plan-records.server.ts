import type { auditEntries, counters, orderEvents, outboxMails } from "~/db/schema"
import { env } from "~/platform/env.server"
import type { Letter } from "~emails/templates"
import type { Invoices } from "./plan-invoices"
import type { OrderOfSeason } from "./plan-orders"
import type { Payments } from "./plan-payments"
import { grouped, minutesAfter, type Season } from "./season"

export type Records = {
	events: (typeof orderEvents.$inferInsert)[]
	audit: (typeof auditEntries.$inferInsert)[]
	mails: (typeof outboxMails.$inferInsert)[]
	counters: (typeof counters.$inferInsert)[]
}

/** Order numbers run on over the years; the counter's year says so. */
const NO_YEAR = 0

/** What remains of all that was done: timelines, the audit trail, the mails that were sent, the last numbers taken. */
export function planRecords(
	season: Season,
	plans: { orders: readonly OrderOfSeason[]; invoices: Invoices; payments: Payments },
): Records {
	const { producerId, chance } = season
	const records: Records = { events: [], audit: [], mails: [], counters: [] }
	const invoiceOf = new Map(plans.invoices.invoices.map(({ row, order }) => [order.id, row]))
	const paidOf = new Map(plans.payments.paid.map((paid) => [paid.order.id, paid]))
	for (const order of plans.orders) {
		const invoice = invoiceOf.get(order.id)
		const paid = paidOf.get(order.id)
		const steps = stepsOf(season, order)
		if (invoice && order.sentAt) {
			steps.push({ kind: "invoiced", at: order.sentAt, userId: null, detail: { invoiceId: invoice.id } })
		}
		if (paid) {
			const detail = { invoiceId: paid.invoiceId, amountCents: paid.amountCents }
			steps.push({ kind: "paid", at: paid.at, userId: paid.by, detail })
		}
		for (const step of steps) {
			records.events.push({ producerId, id: chance.id(), orderId: order.id, ...step })
			records.audit.push({
				producerId,
				id: chance.id(),
				at: step.at,
				userId: step.userId,
				action: `order ${step.kind}`,
				subjectType: "order",
				subjectId: order.id,
				detail: step.detail,
			})
		}
		if (order.store.buyerEmail) records.mails.push(acknowledgement(season, order, order.store.buyerEmail))
	}
	records.counters.push({ producerId, series: "order", year: NO_YEAR, last: plans.orders.length })
	for (const [year, invoices] of grouped(plans.invoices.invoices, ({ row }) => row.year)) {
		records.counters.push({ producerId, series: "invoice", year, last: invoices.length })
	}
	return records
}

type Step = Pick<typeof orderEvents.$inferInsert, "kind"> & {
	at: Date
	userId: string | null
	detail: Record<string, unknown>
}

function stepsOf({ scenario, userId }: Season, order: OrderOfSeason): Step[] {
	const desk = userId(scenario.deskEmail)
	const packer = userId(scenario.packerEmail)
	const by = order.standing ? null : (order.store.buyerId ?? desk)
	const steps: [Step["kind"], Date | null, string | null][] = [
		["placed", order.placedAt, by],
		["confirmed", order.confirmedAt, desk],
		["packed", order.packedAt, packer],
		["sent", order.sentAt, packer],
		["received", order.receivedAt, order.store.buyerId ?? packer],
		["cancelled", order.cancelledAt, by ?? desk],
	]
	return steps.flatMap(([kind, at, person]) => (at ? { kind, at, userId: person, detail: {} } : []))
}

function acknowledgement(season: Season, order: OrderOfSeason, recipient: string): Records["mails"][number] {
	const { scenario, producerId, chance } = season
	const lines = order.lines.map(({ product, asked, isToShare, caseCents }) => ({
		productName: product.name,
		productNote: `${product.detail}, case of ${product.piecesPerCase}`,
		cases: asked,
		priceCents: caseCents,
		amountCents: isToShare ? 0 : asked * caseCents,
		toBeShared: isToShare,
	}))
	const props: Extract<Letter, { template: "order-received" }>["props"] = {
		yard: {
			name: scenario.name,
			address: scenario.settings.address,
			email: scenario.settings.email,
			phone: scenario.settings.phone,
			contactName: scenario.settings.contactName,
		},
		sentTo: recipient,
		storeName: order.store.name,
		orderNumber: String(order.number),
		deliveryOn: order.on,
		orderUrl: `${env.BASE_URL}/buy/${scenario.slug}/${order.store.slug}/orders/${order.number}`,
		lines,
		charges: [{ label: "Delivery", cents: order.deliveryCents }],
		totalCents: lines.reduce((sum, line) => sum + line.amountCents, order.deliveryCents),
	}
	return {
		producerId,
		id: chance.id(),
		recipient,
		template: "order-received",
		props,
		onceKey: `order-received:${order.id}`,
		createdAt: order.placedAt,
		sentAt: minutesAfter(order.placedAt, 1),
		attempts: 1,
	}
}
