import { parentPort, workerData } from "node:worker_threads"
import { renderStatementPdf } from "~emails/documents/statement"

/** Draws one statement in a thread of its own and hands back its pages. */
parentPort?.postMessage(await renderStatementPdf(workerData))
