import { entryWords } from "~/domain/receivables/entry-words"
import { effectOf } from "~/domain/receivables/statement"
import { csvMoney, writeCsv } from "./csv.server"
import type { Statement } from "./find-statement.server"

/** A whole statement as a CSV file, a row for each line, amounts signed by what they do to the balance. */
export function writeStatementCsv({ range, broughtForwardCents, lines, closingCents }: Statement): string {
	const row = (day: string, what: string, note: string, amount: string, balance: number) => ({
		Day: day,
		What: what,
		Note: note,
		Amount: amount,
		Balance: csvMoney(balance),
	})
	return writeCsv([
		row(range.from, "Brought forward", "", "", broughtForwardCents),
		...lines.map((line) => {
			const { name, note } = entryWords(line)
			return row(line.on, name, note, csvMoney(effectOf(line)), line.balanceCents)
		}),
		row(range.until, "Balance", "", "", closingCents),
	])
}
