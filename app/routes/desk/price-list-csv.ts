import { data } from "react-router"
import { z } from "zod"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { findTierList } from "~/services/pricing/find-priced-list.server"
import { writePriceCsv } from "~/services/pricing/write-price-csv.server"
import { csvFile } from "../csv-file"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/price-list-csv"

/** The prices of one tier as they hold today, as a CSV file. */
export const loader = guard(admits.desk("owner", "desk"), async ({ params }: Route.LoaderArgs, { producer }) => {
	const tier = z.guid().safeParse(params.tier)
	const day = dayInZone(now(), producer.timeZone)
	const list = tier.success ? await findTierList({ producerId: producer.id, tierId: tier.data, day }) : null
	if (!list) throw data(null, { status: 404 })
	return csvFile(writePriceCsv(list), `prices-${day}.csv`)
})
