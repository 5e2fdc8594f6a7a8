import { data } from "react-router"
import { z } from "zod"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { drawPriceList } from "~/services/pricing/draw-price-list.server"
import { findTierList } from "~/services/pricing/find-priced-list.server"
import { admits, guard } from "../guard.server"
import { pdfFile } from "../pdf-file"
import type { Route } from "./+types/price-list-pdf"

/** The prices of one tier as they hold today, as a PDF file. */
export const loader = guard(admits.desk("owner", "desk"), async ({ params }: Route.LoaderArgs, { producer }) => {
	const tier = z.guid().safeParse(params.tier)
	const day = dayInZone(now(), producer.timeZone)
	const list = tier.success ? await findTierList({ producerId: producer.id, tierId: tier.data, day }) : null
	if (!list) throw data(null, { status: 404 })
	return pdfFile(await drawPriceList(list), `prices-${day}.pdf`)
})
