import { and, eq } from "drizzle-orm"
import { onlinePayments, payments, producers } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import type { PaymentFacts } from "~/platform/stripe-payment.server"
import { lockStoreAccount } from "~/services/credits/lock-store-account.server"
import { bringReturns } from "./bring-returns.server"
import { layMeant } from "./lay-meant.server"
import { openDay } from "./open-day.server"
import { queueFailure } from "./queue-failure.server"
import { queueReceipt } from "./queue-receipt.server"

type Visit = typeof onlinePayments.$inferSelect
type Payment = typeof payments.$inferSelect

/**
 * Brings one try to take money to what Stripe says of it: the try itself, the payment, what it settles, what of it went
 * back, Stripe's fee, and the letters. Moves forward only, so that running it again, two at once, or with news that is
 * older than what is known changes nothing more: the store is locked, and the payment carries Stripe's id, which is there
 * once. The day that decides on a discount is the one on which the payer made the payment, also of a debit that clears
 * later. What is above the open amount stays on the store's account.
 */
export async function bringPayment(
	tx: Tx,
	query: { producerId: string; onlinePaymentId: string; facts: PaymentFacts },
): Promise<void> {
	const { producerId, onlinePaymentId, facts } = query
	const isVisit = and(eq(onlinePayments.producerId, producerId), eq(onlinePayments.id, onlinePaymentId))
	const [found] = await tx
		.select({ storeId: onlinePayments.storeId, timeZone: producers.timeZone })
		.from(onlinePayments)
		.innerJoin(producers, eq(producers.id, onlinePayments.producerId))
		.where(isVisit)
	if (!found) return
	await lockStoreAccount(tx, { producerId, storeId: found.storeId })
	const [visit] = await tx.select().from(onlinePayments).where(isVisit)
	if (!visit) return
	const known = await readPayment(tx, { producerId, intentId: facts.intentId })
	const isOlder = known !== null && known.state !== "on-its-way" && facts.state !== "paid"
	if (isOlder) return
	await moveVisit(tx, visit, facts)
	const payment = await movePayment(tx, { visit, known, facts, zone: found.timeZone })
	if (payment?.state !== "settled") return
	if (facts.feeCents !== null && facts.feeCents !== payment.feeCents) {
		await tx.update(payments).set({ feeCents: facts.feeCents }).where(isPayment(payment))
	}
	await bringReturns(tx, { payment, facts, zone: found.timeZone })
}

/** A try that was paid stays so, whatever comes of another of its cards. */
async function moveVisit(tx: Tx, visit: Visit, facts: PaymentFacts): Promise<void> {
	if (visit.state === "paid") return
	await tx
		.update(onlinePayments)
		.set({ state: facts.state, declineMessage: facts.declineMessage, stripePaymentIntentId: facts.intentId })
		.where(and(eq(onlinePayments.producerId, visit.producerId), eq(onlinePayments.id, visit.id)))
	const isRefused = facts.state === "declined" && visit.state === "open"
	if (isRefused && visit.kind === "automatic") await queueFailure(tx, { visit, facts })
}

const isPayment = ({ producerId, id }: { producerId: string; id: string }) =>
	and(eq(payments.producerId, producerId), eq(payments.id, id))

async function readPayment(tx: Tx, query: { producerId: string; intentId: string }): Promise<Payment | null> {
	const [row] = await tx
		.select()
		.from(payments)
		.where(and(eq(payments.producerId, query.producerId), eq(payments.stripePaymentIntentId, query.intentId)))
	return row ?? null
}

/** The payment as it stands afterwards; null while nothing has been paid. */
async function movePayment(
	tx: Tx,
	{ visit, known, facts, zone }: { visit: Visit; known: Payment | null; facts: PaymentFacts; zone: string },
): Promise<Payment | null> {
	const { producerId } = visit
	const today = dayInZone(now(), zone)
	const madeOn = facts.madeAt ? dayInZone(facts.madeAt, zone) : today
	if (facts.state === "on-its-way") {
		return known ?? writePayment(tx, { visit, facts, state: "on-its-way", receivedOn: madeOn })
	}
	if (facts.state === "declined" && facts.method === "bank-debit" && facts.madeAt) {
		await queueFailure(tx, { visit, facts })
		if (!known) return writePayment(tx, { visit, facts, state: "returned", receivedOn: today })
		const receivedOn = await openDay(tx, { producerId, day: today })
		await tx.update(payments).set({ state: "returned", receivedOn }).where(isPayment(known))
		return { ...known, state: "returned" }
	}
	if (facts.state !== "paid" || known?.state === "settled") return known
	if (known?.state === "returned") return known
	const receivedOn = await openDay(tx, { producerId, day: known || facts.method === "bank-debit" ? today : madeOn })
	if (known) await tx.update(payments).set({ state: "settled", receivedOn }).where(isPayment(known))
	const payment = known
		? { ...known, state: "settled" as const, receivedOn }
		: await writePayment(tx, { visit, facts, state: "settled", receivedOn })
	await layMeant(tx, { payment, onlinePaymentId: visit.id, madeOn })
	await queueReceipt(tx, { producerId, paymentId: payment.id, visit })
	return payment
}

async function writePayment(
	tx: Tx,
	of: { visit: Visit; facts: PaymentFacts; state: Payment["state"]; receivedOn: Day },
): Promise<Payment> {
	const { visit, facts, state } = of
	const { producerId } = visit
	const [payment] = await tx
		.insert(payments)
		.values({
			producerId,
			storeId: visit.storeId,
			method: facts.method,
			state,
			amountCents: facts.amountCents,
			receivedOn: await openDay(tx, { producerId, day: of.receivedOn }),
			receivedAt: facts.madeAt ?? now(),
			stripePaymentIntentId: facts.intentId,
			enteredBy: visit.startedBy,
		})
		.returning()
	if (!payment) throw new Error("an insert returns its row")
	return payment
}
