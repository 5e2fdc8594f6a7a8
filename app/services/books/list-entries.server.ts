import Papa from "papaparse"
import { readProducer } from "~/db/transaction.server"
import type { DatedEvent } from "~/domain/books/dated-event"
import { entriesOf } from "~/domain/books/entries"
import { entryNumber } from "~/domain/books/entry-number"
import type { Day } from "~/domain/calendar"
import { plainMoney } from "~/domain/money"
import { type Place, readFrequentEvents } from "./read-frequent-events.server"
import { type BooksQuery, readRareEvents } from "./read-rare-events.server"
import { type BookViews, readViews } from "./read-views.server"

const COLUMNS = [
	"Entry",
	"Date",
	"Account number",
	"Account",
	"Debit",
	"Credit",
	"About",
	"Store or market",
	"Document",
]

/** Events that are read at once. */
const AT_ONCE = 1000

/** A cell that begins like a formula, also after blanks, is given a quote in front, so that a spreadsheet shows it. */
const FORMULA = /^\s*[=+\-@\t\r\n]/

type Cells = readonly string[]

function csvLines(rows: readonly Cells[]): string {
	return `${Papa.unparse(rows as string[][], { newline: "\r\n", escapeFormulae: FORMULA })}\r\n`
}

/**
 * Every entry of a period as pieces of a CSV file, a line for each account of an entry, by day. Read batch by batch, so
 * that a million lines take no more room than a thousand. A closed day reads the same ever after, to the byte.
 */
export async function* listEntries(query: BooksQuery): AsyncGenerator<string> {
	const { views, rare } = await readProducer(query.producer.id, async (tx) => {
		const views = await readViews(tx, query.producer.id)
		return { views, rare: await readRareEvents(tx, query, views) }
	})
	const write = writer(views)
	yield `\uFEFF${csvLines([COLUMNS])}`
	let waiting = 0
	let after: Place | null = null
	do {
		const batch: Awaited<ReturnType<typeof readFrequentEvents>> = await readProducer(query.producer.id, (tx) =>
			readFrequentEvents(tx, { ...query, after, limit: AT_ONCE }),
		)
		const lines: Cells[] = []
		for (const event of batch.events) {
			for (; (rare[waiting]?.on ?? event.on) < event.on; waiting++) lines.push(...write(rare[waiting] as DatedEvent))
			lines.push(...write(event))
		}
		if (!batch.next) lines.push(...rare.slice(waiting).flatMap(write))
		if (lines.length > 0) yield csvLines(lines)
		after = batch.next
	} while (after)
}

/** Numbers the entries of each day in their order; what enters nothing has no number. */
function writer(views: BookViews): (event: DatedEvent) => Cells[] {
	let day: Day | null = null
	let ordinal = 0
	return ({ on, event, about, withId, document }) => {
		const entry = entriesOf(event)
		if (entry.length === 0) return []
		ordinal = on === day ? ordinal + 1 : 1
		day = on
		const { chart, names } = views.on(on)
		const store = withId ? (names.get(withId) ?? "") : ""
		return entry.map(({ account, debitCents, creditCents }) => [
			entryNumber(on, ordinal),
			on,
			chart[account].number,
			chart[account].name,
			figure(debitCents),
			figure(creditCents),
			about,
			store,
			document,
		])
	}
}

/** "1118.00"; nothing for nothing, as in a ledger. */
function figure(cents: number): string {
	return cents === 0 ? "" : plainMoney(cents).replaceAll(",", "")
}
