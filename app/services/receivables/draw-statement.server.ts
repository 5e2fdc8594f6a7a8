import type { Day } from "~/domain/calendar"
import type { StatementRange } from "~/domain/receivables/statement"
import { askThread } from "~/platform/lasting-thread.server"
import { findStatement } from "./find-statement.server"
import { statementDocument } from "./statement-document.server"

/** A statement with more lines than this takes a second and more to draw, which others should not wait for. */
const FEW_LINES = 150

/** The printed pages of a store's whole statement. A long one is drawn in a thread of its own. */
export async function drawStatement(query: {
	producerId: string
	storeId: string
	range: StatementRange
	today: Day
}): Promise<Uint8Array<ArrayBuffer>> {
	const document = statementDocument(await findStatement({ ...query, isWhole: true }))
	const apart = document.lines.length > FEW_LINES ? askThread("draw-statements", document) : null
	if (apart) return apart
	// The drawing of PDFs takes a second to load, so that no other page should wait for it.
	const { renderStatementPdf } = await import("~emails/documents/statement")
	return new Uint8Array(await renderStatementPdf(document))
}
