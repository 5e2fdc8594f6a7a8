import * as schema from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { insertAll } from "./insert-all.server"
import type { Breakage } from "./plan-breakage.server"
import type { Invoices } from "./plan-invoices"
import type { Payments } from "./plan-payments"
import type { Receivables } from "./plan-receivables.server"
import type { StripeMoney } from "./plan-stripe"

/** Writes all that is about money, in the order that the foreign keys ask for. */
export async function writeMoney(
	tx: Tx,
	plans: { invoices: Invoices; money: Payments; stripe: StripeMoney; breakage: Breakage; receivables: Receivables },
): Promise<void> {
	const { invoices, money, stripe, breakage, receivables } = plans
	await insertAll(tx, schema.taxRates, receivables.taxRates)
	await insertAll(tx, schema.exemptionCertificates, receivables.certificates)
	await insertAll(
		tx,
		schema.invoices,
		invoices.invoices.map(({ row }) => row),
	)
	await insertAll(tx, schema.invoiceOrders, invoices.orders)
	await insertAll(tx, schema.invoiceLines, invoices.lines)
	await insertAll(tx, schema.invoiceRuns, receivables.runs)
	await insertAll(tx, schema.invoiceRunOrders, receivables.runOrders)
	await insertAll(tx, schema.payments, money.rows.payments)
	await insertAll(tx, schema.credits, breakage.credits)
	await insertAll(tx, schema.creditLines, breakage.creditLines)
	await insertAll(tx, schema.settlements, [...money.rows.settlements, ...breakage.settlements])
	await insertAll(tx, schema.paymentReturns, stripe.returns)
	await insertAll(tx, schema.onlinePayments, money.rows.onlinePayments)
	await insertAll(tx, schema.onlinePaymentParts, money.rows.onlinePaymentParts)
	await insertAll(tx, schema.payouts, stripe.payouts)
	await insertAll(tx, schema.stripeDifferences, stripe.differences)
	await insertAll(tx, schema.breakageReports, breakage.reports)
	await insertAll(tx, schema.breakageLines, breakage.lines)
	await insertAll(tx, schema.breakagePhotos, breakage.photos)
	await insertAll(tx, schema.reminderSteps, receivables.steps)
	await insertAll(tx, schema.remindersSent, receivables.sent)
	await insertAll(tx, schema.paymentPromises, receivables.promises)
	await insertAll(tx, schema.bookAccounts, receivables.accounts)
	await insertAll(tx, schema.bookClosings, receivables.closings)
}
