import { auditEntries, creditLines, credits, settlements } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { creditNumber } from "~/domain/credits/credit-number"
import type { CreditKind } from "~/domain/credits/credit-words"
import type { PlannedCredit } from "~/domain/credits/plan-credit"
import { takeNumber } from "~/services/numbers/take-number.server"
import type { InvoiceLeft } from "./read-invoice-left.server"

export type NewCredit = {
	producerId: string
	/** Made with the form, where a person asks for the credit by itself. */
	creditId: string
	invoice: InvoiceLeft
	kind: CreditKind
	/** In words, as it is printed. */
	reason: string
	plan: PlannedCredit
	issuedOn: Day
	personId: string
}

/**
 * Issues a credit in a transaction that holds the store's account: its number, which has no gaps, its lines, and what of
 * it settles the invoice it mends, as far as that is open; the rest stays on the store's account. Answers the number as
 * printed. Take it last: others that issue credits wait from here on.
 */
export async function issueCredit(tx: Tx, credit: NewCredit): Promise<string> {
	const { producerId, creditId, invoice, kind, reason, plan, issuedOn, personId } = credit
	const year = Number(issuedOn.slice(0, 4))
	const sequence = await takeNumber(tx, { producerId, series: "credit", year })
	const { linesCents, taxCents, totalCents } = plan
	await tx.insert(credits).values({
		producerId,
		id: creditId,
		year,
		sequence,
		storeId: invoice.storeId,
		invoiceId: invoice.id,
		issuedOn,
		kind,
		reason,
		linesCents,
		taxCents,
		totalCents,
		issuedBy: personId,
	})
	await tx.insert(creditLines).values(linesOf(credit))
	const settledCents = Math.min(totalCents, invoice.openCents)
	if (settledCents > 0) {
		await tx.insert(settlements).values({
			producerId,
			invoiceId: invoice.id,
			kind: "credit",
			creditId,
			amountCents: settledCents,
			settledOn: issuedOn,
			enteredBy: personId,
		})
	}
	const number = creditNumber(year, sequence)
	await tx.insert(auditEntries).values({
		producerId,
		userId: personId,
		action: "issue credit",
		subjectType: "credit",
		subjectId: creditId,
		detail: { number, kind, invoiceNumber: invoice.number, totalCents, settledCents },
	})
	return number
}

function linesOf({ producerId, creditId, invoice, plan, reason }: NewCredit): (typeof creditLines.$inferInsert)[] {
	const about = new Map(invoice.lines.map((line) => [line.id, line]))
	const lines = plan.lines
		.filter((line) => line.pieces > 0 || line.lineCents > 0)
		.map(({ lineId, pieces, lineCents, taxCents }) => {
			const { code = "", name = "", detail = "" } = about.get(lineId) ?? {}
			return { invoiceLineId: lineId, code, name, detail, pieces, lineCents, taxCents }
		})
	const whole = plan.wholeCents > 0 ? [{ name: reason.slice(0, 200), lineCents: plan.wholeCents }] : []
	return [...lines, ...whole].map((line, index) => ({ producerId, creditId, position: index + 1, ...line }))
}
