import { and, eq } from "drizzle-orm"
import { auditEntries, breakageLines, breakagePhotos, breakageReports } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { lockStoreAccount } from "~/services/credits/lock-store-account.server"
import { type InvoiceLeft, readInvoiceLeft } from "~/services/credits/read-invoice-left.server"
import type { KeptPhoto } from "~/services/uploads/reencode-photo.server"
import { breakableLines, readBreakageDays } from "./find-breakage-form.server"
import { tellDesk } from "./tell-desk.server"

export type ReportedLine = { invoiceLineId: string; pieces: number; note: string; photos: readonly KeptPhoto[] }

export type ReportBreakage = {
	producer: { id: string; slug: string; timeZone: string }
	store: { id: string; name: string }
	person: { id: string; name: string }
	invoiceNumber: string
	/** Made with the form: a second send of the same form is the same report. */
	reportId: string
	note: string
	/** Lines with broken pieces; at least one. */
	lines: readonly ReportedLine[]
	now: Date
}

export type RefusedLine = { lineId: string } & (
	| { reason: "more-than-left"; leftPieces: number; sentPieces: number }
	| { reason: "too-late"; until: Day }
	| { reason: "no-such-line" }
)

export type ReportRefusal =
	| { ok: false; reason: "no-such-invoice" }
	| { ok: false; reason: "nothing-reported" }
	| { ok: false; reason: "lines"; refused: RefusedLine[] }

/**
 * Takes a store's report of comb that arrived broken, with its photos, once, and tells the desk. Refuses a line that is
 * not of the invoice, one reported later than the producer allows after its delivery, and more pieces than were sent less
 * what is credited or waits in earlier reports. Credits nothing: that is the producer's answer.
 */
export function reportBreakage(
	given: ReportBreakage,
): Promise<Result<{ reportId: string; isNew: boolean }, ReportRefusal>> {
	return withProducer(given.producer.id, (tx) => reportInTransaction(tx, given))
}

async function reportInTransaction(
	tx: Tx,
	given: ReportBreakage,
): Promise<Result<{ reportId: string; isNew: boolean }, ReportRefusal>> {
	const { producer, store, reportId, invoiceNumber } = given
	const producerId = producer.id
	await lockStoreAccount(tx, { producerId, storeId: store.id })
	const invoice = await readInvoiceLeft(tx, { producerId, storeId: store.id, number: invoiceNumber })
	if (!invoice) return { ok: false, reason: "no-such-invoice" }
	const [earlier] = await tx
		.select({ id: breakageReports.id })
		.from(breakageReports)
		.where(
			and(
				eq(breakageReports.producerId, producerId),
				eq(breakageReports.id, reportId),
				eq(breakageReports.invoiceId, invoice.id),
			),
		)
	if (earlier) return { ok: true, reportId, isNew: false }
	if (given.lines.length === 0) return { ok: false, reason: "nothing-reported" }
	const days = await readBreakageDays(tx, producerId)
	const refused = judgeLines(invoice, { lines: given.lines, days, today: dayInZone(given.now, producer.timeZone) })
	if (refused.length > 0) return { ok: false, reason: "lines", refused }
	await writeReport(tx, given, invoice)
	await tellDesk(tx, given, invoice)
	return { ok: true, reportId, isNew: true }
}

function judgeLines(
	invoice: InvoiceLeft,
	report: { lines: readonly ReportedLine[]; days: number; today: Day },
): RefusedLine[] {
	const breakable = new Map(breakableLines(invoice, report.days).map((line) => [line.id, line]))
	return report.lines.flatMap(({ invoiceLineId: lineId, pieces }): RefusedLine[] => {
		const line = breakable.get(lineId)
		if (!line) return [{ lineId, reason: "no-such-line" }]
		const { until, leftPieces, sentPieces } = line
		if (report.today > until) return [{ lineId, reason: "too-late", until }]
		return pieces > leftPieces ? [{ lineId, reason: "more-than-left", leftPieces, sentPieces }] : []
	})
}

async function writeReport(tx: Tx, given: ReportBreakage, invoice: InvoiceLeft): Promise<void> {
	const { reportId, store, person, note, now } = given
	const producerId = given.producer.id
	await tx.insert(breakageReports).values({
		producerId,
		id: reportId,
		storeId: store.id,
		invoiceId: invoice.id,
		note,
		reportedBy: person.id,
		reportedAt: now,
	})
	const written = await tx
		.insert(breakageLines)
		.values(given.lines.map(({ photos: _, ...line }) => ({ producerId, reportId, ...line })))
		.returning({ id: breakageLines.id, invoiceLineId: breakageLines.invoiceLineId })
	const lineIds = new Map(written.map(({ id, invoiceLineId }) => [invoiceLineId, id]))
	const photos = given.lines.flatMap(({ invoiceLineId, photos }) =>
		photos.map((photo, index) => ({
			producerId,
			lineId: lineIds.get(invoiceLineId) ?? "",
			position: index + 1,
			...photo,
		})),
	)
	if (photos.length > 0) await tx.insert(breakagePhotos).values(photos)
	await tx.insert(auditEntries).values({
		producerId,
		userId: person.id,
		action: "report breakage",
		subjectType: "breakage report",
		subjectId: reportId,
		detail: {
			invoiceNumber: invoice.number,
			lines: given.lines.map(({ invoiceLineId, pieces }) => ({ invoiceLineId, pieces })),
		},
	})
}
