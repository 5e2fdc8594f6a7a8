import { randomUUID } from "node:crypto"
import { and, eq, sql } from "drizzle-orm"
import { auditEntries, breakageReports } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { answerState } from "~/domain/credits/breakage-window"
import { type PlannedCredit, type PlanRefusal, planCredit } from "~/domain/credits/plan-credit"
import type { Result } from "~/domain/result"
import { issueCredit } from "~/services/credits/issue-credit.server"
import { lockStoreAccount, withAccount } from "~/services/credits/lock-store-account.server"
import { readInvoiceLeft } from "~/services/credits/read-invoice-left.server"
import { tellCredit } from "~/services/credits/tell-credit.server"
import { type BreakageReport, readReport } from "./find-report.server"
import { tellDeclined } from "./tell-declined.server"
import { wastePieces } from "./waste-pieces.server"

export type AnswerReport = {
	producer: { id: string; slug: string; timeZone: string }
	reportId: string
	/** Pieces accepted of each line, by the line of the report; all 0 declines it. */
	accepted: ReadonlyMap<string, number>
	/** The sentence that goes to the store; may be empty only where all is accepted. */
	answer: string
	personId: string
	now: Date
}

/** `missingPieces` is what of the accepted pieces the ledger had no longer as sold, and so could not write off. */
export type Answered = { creditNumber: string | null; missingPieces: number }

export type AnswerRefusal =
	| { ok: false; reason: "no-such-report" }
	| { ok: false; reason: "answered-already"; by: string | null; state: BreakageReport["state"] }
	| { ok: false; reason: "too-many-pieces"; lineIds: string[] }
	| { ok: false; reason: "no-sentence" }
	| { ok: false; reason: "books-closed" }
	| PlanRefusal

/**
 * Answers a report, once: in one transaction the credit is issued for the accepted pieces at the price of their invoice
 * line, it settles that invoice as far as it is open, the pieces go from sold to waste by lot, and the store is told; or
 * it is declined with a sentence. Of two people who answer at once one is told that it is answered already. Refuses more
 * pieces than were reported, and more money than is left of the invoice.
 */
export async function answerReport(query: AnswerReport): Promise<Result<Answered, AnswerRefusal>> {
	const answered = await withAccount(query.producer.id, (tx) => answerInTransaction(tx, query))
	return answered === "books-closed" ? { ok: false, reason: "books-closed" } : answered
}

type AnsweredLine = BreakageReport["lines"][number] & { acceptedPieces: number }

async function answerInTransaction(tx: Tx, query: AnswerReport): Promise<Result<Answered, AnswerRefusal>> {
	const { reportId, accepted, answer } = query
	const named = { producerId: query.producer.id, reportId }
	const found = await readReport(tx, named)
	if (!found) return { ok: false, reason: "no-such-report" }
	await lockStoreAccount(tx, { producerId: named.producerId, storeId: found.storeId })
	const report = await readReport(tx, named)
	if (!report) throw new Error("a report is never taken away")
	if (report.state !== "open")
		return { ok: false, reason: "answered-already", by: report.answeredBy, state: report.state }
	const lines = report.lines.map((line) => ({ ...line, acceptedPieces: accepted.get(line.id) ?? 0 }))
	const tooMany = lines.filter(({ acceptedPieces, pieces }) => acceptedPieces > pieces)
	if (tooMany.length > 0) return { ok: false, reason: "too-many-pieces", lineIds: tooMany.map(({ id }) => id) }
	const state = answerState(lines)
	if (state !== "accepted" && answer === "") return { ok: false, reason: "no-sentence" }
	if (state === "declined") return decline(tx, { query, report, lines })
	return accept(tx, { query, report, lines, state })
}

type Answering = { query: AnswerReport; report: BreakageReport; lines: AnsweredLine[] }

async function decline(tx: Tx, { query, report, lines }: Answering): Promise<Result<Answered, AnswerRefusal>> {
	await writeAnswer(tx, { query, report, lines, state: "declined", creditId: null })
	await tellDeclined(tx, { producer: query.producer, report, answer: query.answer })
	return { ok: true, creditNumber: null, missingPieces: 0 }
}

async function accept(
	tx: Tx,
	{ query, report, lines, state }: Answering & { state: "accepted" | "part-accepted" },
): Promise<Result<Answered, AnswerRefusal>> {
	const { producer, personId } = query
	const producerId = producer.id
	const invoice = await readInvoiceLeft(tx, { producerId, number: report.invoiceNumber })
	if (!invoice) throw new Error("a report is of an invoice")
	const wanted = lines.map(({ invoiceLineId, acceptedPieces }) => ({ lineId: invoiceLineId, pieces: acceptedPieces }))
	const plan = planCredit({ lines: invoice.lines, leftCents: invoice.leftCents, wanted, wholeCents: 0 })
	if (!plan.ok) return plan
	const missingPieces = await wastePieces(tx, { producerId, invoice, plan, personId })
	const creditId = randomUUID()
	const number = await issueCredit(tx, {
		producerId,
		creditId,
		invoice,
		kind: "breakage",
		reason: reasonWords(plan, report),
		plan,
		issuedOn: dayInZone(query.now, producer.timeZone),
		personId,
	})
	await writeAnswer(tx, { query, report, lines, state, creditId })
	const told = lines.map(({ name, detail, pieces, acceptedPieces }) => ({
		productName: name,
		productNote: detail || null,
		reported: pieces,
		accepted: acceptedPieces,
	}))
	const breakage = { answer: query.answer, lines: told }
	await tellCredit(tx, { producer, store: { id: report.storeId, slug: report.storeSlug }, number, breakage })
	return { ok: true, creditNumber: number, missingPieces }
}

/** "5 pieces of invoice 2026-0412 that arrived broken." */
function reasonWords(plan: PlannedCredit, report: BreakageReport): string {
	const pieces = plan.lines.reduce((sum, line) => sum + line.pieces, 0)
	return `${pieces === 1 ? "1 piece" : `${pieces} pieces`} of invoice ${report.invoiceNumber} that arrived broken.`
}

async function writeAnswer(
	tx: Tx,
	answered: Answering & { state: "accepted" | "part-accepted" | "declined"; creditId: string | null },
): Promise<void> {
	const { query, report, lines, state, creditId } = answered
	const producerId = query.producer.id
	await tx
		.update(breakageReports)
		.set({ state, answer: query.answer, creditId, answeredBy: query.personId, answeredAt: query.now })
		.where(and(eq(breakageReports.producerId, producerId), eq(breakageReports.id, report.id)))
	const ids = sql.param(lines.map(({ id }) => id))
	const pieces = sql.param(lines.map(({ acceptedPieces }) => acceptedPieces))
	await tx.execute(sql`
		update breakage_lines b set accepted_pieces = x.pieces
		from unnest(${ids}::uuid[], ${pieces}::int[]) as x(id, pieces)
		where b.producer_id = ${producerId} and b.id = x.id`)
	await tx.insert(auditEntries).values({
		producerId,
		userId: query.personId,
		action: "answer breakage",
		subjectType: "breakage report",
		subjectId: report.id,
		detail: {
			state,
			answer: query.answer,
			lines: lines.map(({ id, pieces, acceptedPieces }) => ({ id, pieces, acceptedPieces })),
		},
	})
}
