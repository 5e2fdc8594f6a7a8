import { ageingBuckets } from "~/domain/invoicing/ageing"
import { csvMoney, writeCsv } from "./csv.server"
import type { Receivables } from "./list-receivables.server"

/** Who owes what as a CSV file: a row for each store and one for all; days past due in the heads. */
export function writeReceivablesCsv({ stores, totals }: Receivables): string {
	const row = (name: string, sums: Omit<Receivables["totals"], "stores">, oldest: string) => ({
		Store: name,
		...Object.fromEntries(
			ageingBuckets.map((bucket) => [bucket.replace("–", " to "), csvMoney(sums.ageing[bucket])] as const),
		),
		"On account": csvMoney(-sums.onAccountCents),
		"Owes in all": csvMoney(sums.balanceCents),
		"Oldest due": oldest,
	})
	return writeCsv([
		...stores.map((store) => row(store.name, store, store.oldestDueOn ?? "")),
		row("All stores", totals, ""),
	])
}
