import { parentPort } from "node:worker_threads"
import { renderStatementPdf } from "~emails/documents/statement"
import type { StatementProps } from "~emails/documents/statement-props"

/** Draws statements one after the other for as long as it is asked to, and hands back the pages of each. */
parentPort?.on("message", async ({ id, data }: { id: number; data: StatementProps }) => {
	try {
		parentPort?.postMessage({ id, bytes: new Uint8Array(await renderStatementPdf(data)) })
	} catch (error) {
		parentPort?.postMessage({ id, error: error instanceof Error ? error.message : "the statement was not drawn" })
	}
})
