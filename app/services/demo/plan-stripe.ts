import type {
	onlinePaymentParts,
	onlinePayments,
	paymentReturns,
	payments,
	payouts,
	stripeDifferences,
} from "~/db/schema"
import { addDays, type Day, dayInZone, weekday } from "~/domain/calendar"
import type { Invoices } from "./plan-invoices"
import type { MarketDays } from "./plan-market-days"
import type { Payments } from "./plan-payments"
import { grouped, minutesAfter, notAfter, type Season } from "./season"

type PaymentRow = typeof payments.$inferInsert

export type StripeMoney = {
	returns: (typeof paymentReturns.$inferInsert)[]
	payouts: (typeof payouts.$inferInsert)[]
	differences: (typeof stripeDifferences.$inferInsert)[]
}

const MINUTES_A_DAY = 1440

/**
 * What Stripe has to do with the season's money: a bank debit that is on its way, a payment that came twice and was
 * refunded, what Stripe kept of each, and the payout of every week that is over. Completes the rows of payments and sales.
 * The fees are invented.
 */
export function planStripe(
	season: Season,
	{ invoices, money, markets }: { invoices: Invoices; money: Payments; markets: MarketDays },
): StripeMoney {
	const plan: StripeMoney = { returns: [], payouts: [], differences: [] }
	startBankDebit(season, invoices, money)
	payTwice(season, money, plan)
	payOut(season, money, markets, plan)
	return plan
}

const intentOf = ({ chance }: Season) => `pi_demo_${chance.hash().slice(0, 24)}`

/** The newest open invoice of a store that pays by transfer is being paid by bank debit. */
function startBankDebit(season: Season, invoices: Invoices, money: Payments): void {
	const { producerId, chance, now, scenario, userId } = season
	const settled = new Set(money.rows.settlements.map(({ invoiceId }) => invoiceId))
	const invoice = invoices.invoices.findLast(({ row }) => !settled.has(row.id) && row.totalCents > 0)
	if (!invoice) return
	const { row, order } = invoice
	const receivedAt = minutesAfter(now, -MINUTES_A_DAY)
	const intentId = intentOf(season)
	const by = order.store.buyerId ?? userId(scenario.ownerEmail)
	const onlinePaymentId = chance.id()
	const visit: typeof onlinePayments.$inferInsert = {
		producerId,
		id: onlinePaymentId,
		storeId: order.store.id,
		method: "bank-debit",
		amountCents: row.totalCents,
		state: "on-its-way",
		stripeSessionId: `cs_demo_${chance.hash().slice(0, 24)}`,
		stripePaymentIntentId: intentId,
		startedBy: by,
		createdAt: minutesAfter(receivedAt, -3),
	}
	const part: typeof onlinePaymentParts.$inferInsert = {
		producerId,
		onlinePaymentId,
		invoiceId: row.id,
		amountCents: row.totalCents,
	}
	money.rows.onlinePayments.push(visit)
	money.rows.onlinePaymentParts.push(part)
	money.rows.payments.push({
		producerId,
		id: chance.id(),
		storeId: order.store.id,
		method: "bank-debit",
		state: "on-its-way",
		amountCents: row.totalCents,
		receivedAt,
		receivedOn: dayInZone(receivedAt, scenario.timeZone),
		stripePaymentIntentId: intentId,
		enteredBy: by,
	})
}

/** The first card payment came once more from a second window, and was refunded the next day. */
function payTwice(season: Season, money: Payments, plan: StripeMoney): void {
	const { producerId, chance, scenario, userId, now } = season
	const first = money.rows.payments.find(({ method }) => method === "card")
	if (!first?.receivedAt) return
	const receivedAt = notAfter(now, minutesAfter(first.receivedAt, 4))
	const again = { ...first, id: chance.id(), receivedAt, stripePaymentIntentId: intentOf(season) }
	money.rows.payments.push(again)
	plan.returns.push({
		producerId,
		id: chance.id(),
		paymentId: again.id,
		kind: "refund",
		state: "done",
		amountCents: first.amountCents,
		returnedOn: dayInZone(notAfter(now, minutesAfter(receivedAt, MINUTES_A_DAY)), scenario.timeZone),
		stripeId: `re_demo_${chance.hash().slice(0, 24)}`,
		note: "Paid from two windows; the second payment went back.",
		enteredBy: userId(scenario.deskEmail),
	})
	plan.differences.push({
		producerId,
		id: chance.id(),
		kind: "missing-here",
		stripeId: again.stripePaymentIntentId,
		theirCents: first.amountCents,
		detail: "Paid there a day before the event came.",
		foundAt: receivedAt,
		settledAt: receivedAt,
	})
}

const onlineFee = (cents: number) => Math.round(cents * 0.029) + 30
const readerFee = (cents: number) => Math.round(cents * 0.027) + 5

/** The Monday on which what came in during a week is paid out. */
function payoutDay(on: Day): Day {
	return addDays(on, 8 - (weekday(on) || 7))
}

function payOut(
	{ producerId, chance, scenario, today }: Season,
	money: Payments,
	markets: MarketDays,
	plan: StripeMoney,
) {
	const returned = new Map(plan.returns.map((one) => [one.paymentId, one]))
	const paid = money.rows.payments.flatMap((row: PaymentRow) => {
		if (row.method !== "card") return []
		row.feeCents = onlineFee(row.amountCents)
		const gone = returned.get(row.id ?? "")
		return [{ row, on: row.receivedOn, cents: row.amountCents - (gone?.amountCents ?? 0), feeCents: row.feeCents }]
	})
	const sold = markets.rows.sales.flatMap((row) => {
		if (row.method !== "card" || !row.soldAt) return []
		row.feeCents = readerFee(row.totalCents)
		return [{ row, on: dayInZone(row.soldAt, scenario.timeZone), cents: row.totalCents, feeCents: row.feeCents }]
	})
	for (const [arrivedOn, group] of grouped([...paid, ...sold], ({ on }) => payoutDay(on))) {
		if (arrivedOn > today) continue
		const stripePayoutId = `po_demo_${chance.hash().slice(0, 24)}`
		for (const { row } of group) row.stripePayoutId = stripePayoutId
		const grossCents = group.reduce((sum, { cents }) => sum + cents, 0)
		const feeCents = group.reduce((sum, one) => sum + one.feeCents, 0)
		plan.payouts.push({
			producerId,
			id: chance.id(),
			stripePayoutId,
			arrivedOn,
			grossCents,
			feeCents,
			netCents: grossCents - feeCents,
		})
	}
}
