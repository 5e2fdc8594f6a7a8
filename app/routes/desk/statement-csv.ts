import { data } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { findStatement } from "~/services/receivables/find-statement.server"
import { writeStatementCsv } from "~/services/receivables/write-statement-csv.server"
import { findStoreBySlug } from "~/services/standing-orders/find-store-by-slug.server"
import { csvFile } from "../csv-file"
import { admits, guard } from "../guard.server"
import { statementRange } from "../statement-range"
import type { Route } from "./+types/statement-csv"

/** The whole statement of a store as a CSV file. */
export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, { producer }) => {
	const store = await findStoreBySlug({ producerId: producer.id, slug: params.store })
	if (!store) throw data(null, { status: 404 })
	const today = dayInZone(now(), producer.timeZone)
	const { range, error } = statementRange(url.searchParams, today)
	if (error) throw data(null, { status: 400 })
	const statement = await findStatement({ producerId: producer.id, storeId: store.id, range, today, isWhole: true })
	return csvFile(writeStatementCsv(statement), `statement-${params.store}-${range.until}.csv`)
})
