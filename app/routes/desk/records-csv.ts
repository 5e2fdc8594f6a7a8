import { data } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { listReceived, listReleased } from "~/services/trace/list-records.server"
import { csvStream } from "../csv-file"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/records-csv"
import { recordsRange } from "./records-range"

/** The records of food as a CSV file, sent while it is read: what left for stores, or with `of=received` what came in. */
export const loader = guard(admits.desk("owner", "desk"), ({ url }: Route.LoaderArgs, { producer }) => {
	const { from, to, error } = recordsRange(url, dayInZone(now(), producer.timeZone))
	if (error) throw data(null, { status: 400 })
	const isReceived = url.searchParams.get("of") === "received"
	const lines = (isReceived ? listReceived : listReleased)({ producer, from, to })
	return csvStream(lines, `${isReceived ? "received" : "released"}-${from}-to-${to}.csv`)
})
