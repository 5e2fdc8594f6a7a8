import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { listReceivables } from "~/services/receivables/list-receivables.server"
import { writeReceivablesCsv } from "~/services/receivables/write-receivables-csv.server"
import { csvFile } from "../csv-file"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/receivables-csv"

/** Who owes what today, every store, as a CSV file. */
export const loader = guard(admits.desk("owner", "desk"), async (_args: Route.LoaderArgs, { producer }) => {
	const today = dayInZone(now(), producer.timeZone)
	const list = await listReceivables({ producerId: producer.id, today, by: "owed", after: null, isWhole: true })
	return csvFile(writeReceivablesCsv(list), `owed-on-${today}.csv`)
})
