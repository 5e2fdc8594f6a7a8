import type { Day } from "~/domain/calendar"
import type { StatementRange } from "~/domain/receivables/statement"
import { findStatement } from "./find-statement.server"
import { statementDocument } from "./statement-document.server"

/** The printed pages of a store's whole statement. */
export async function drawStatement(query: {
	producerId: string
	storeId: string
	range: StatementRange
	today: Day
}): Promise<Uint8Array<ArrayBuffer>> {
	const statement = await findStatement({ ...query, isWhole: true })
	// The drawing of PDFs takes a second to load, so that no other page should wait for it.
	const { renderStatementPdf } = await import("~emails/documents/statement")
	return new Uint8Array(await renderStatementPdf(statementDocument(statement)))
}
