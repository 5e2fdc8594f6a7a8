import Papa from "papaparse"
import { plainMoney } from "~/domain/money"

/** What a spreadsheet would run, but for an amount below zero. */
const RUNNABLE = /^(?!-\d+\.\d\d$)[=+\-@\t\r].*$/

/** Rows as a CSV file; words that a spreadsheet would run are quoted as text. */
export function writeCsv(rows: readonly Readonly<Record<string, string>>[]): string {
	return Papa.unparse([...rows], { escapeFormulae: RUNNABLE })
}

/** Cents as a figure that every spreadsheet reads: "-1118.00". */
export const csvMoney = (cents: number): string => plainMoney(cents).replaceAll(",", "")
