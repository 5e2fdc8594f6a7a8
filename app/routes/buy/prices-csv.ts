import { data } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { findStoreList } from "~/services/pricing/find-priced-list.server"
import { writePriceCsv } from "~/services/pricing/write-price-csv.server"
import { csvFile } from "../csv-file"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/prices-csv"

/** What the store pays today, as a CSV file. */
export const loader = guard(admits.store("buyer", "payer"), async (_args: Route.LoaderArgs, { producer, store }) => {
	const day = dayInZone(now(), producer.timeZone)
	const list = await findStoreList({ producerId: producer.id, store, day })
	if (!list) throw data(null, { status: 404 })
	return csvFile(writePriceCsv(list), `prices-${day}.csv`)
})
