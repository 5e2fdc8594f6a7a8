import { data } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { listEntries } from "~/services/books/list-entries.server"
import { csvStream } from "../csv-file"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/books-csv"
import { askedPeriod } from "./books-period"

/** All entries of a period as a CSV file, sent while it is read. */
export const loader = guard(admits.desk("owner", "desk"), ({ url }: Route.LoaderArgs, { producer }) => {
	const { period, error } = askedPeriod(url, dayInZone(now(), producer.timeZone))
	if (error) throw data(null, { status: 400 })
	return csvStream(listEntries({ producer, ...period }), `books-${period.from}-to-${period.to}.csv`)
})
