import { data } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { findStatement } from "~/services/receivables/find-statement.server"
import { writeStatementCsv } from "~/services/receivables/write-statement-csv.server"
import { csvFile } from "../csv-file"
import { admits, guard } from "../guard.server"
import { statementRange } from "../statement-range"
import type { Route } from "./+types/statement-csv"

/** The store's own whole statement as a CSV file. */
export const loader = guard(admits.store("buyer", "payer"), async ({ url }: Route.LoaderArgs, { producer, store }) => {
	const today = dayInZone(now(), producer.timeZone)
	const { range, error } = statementRange(url.searchParams, today)
	if (error) throw data(null, { status: 400 })
	const statement = await findStatement({ producerId: producer.id, storeId: store.id, range, today, isWhole: true })
	return csvFile(writeStatementCsv(statement), `statement-${producer.slug}-${range.until}.csv`)
})
