import { data } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { drawPriceList } from "~/services/pricing/draw-price-list.server"
import { findStoreList } from "~/services/pricing/find-priced-list.server"
import { admits, guard } from "../guard.server"
import { pdfFile } from "../pdf-file"
import type { Route } from "./+types/prices-pdf"

/** What the store pays today, as a PDF file. */
export const loader = guard(admits.store("buyer", "payer"), async (_args: Route.LoaderArgs, { producer, store }) => {
	const day = dayInZone(now(), producer.timeZone)
	const list = await findStoreList({ producerId: producer.id, store, day })
	if (!list) throw data(null, { status: 404 })
	return pdfFile(await drawPriceList(list), `prices-${day}.pdf`)
})
