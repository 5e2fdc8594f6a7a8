import { data } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { drawStatement } from "~/services/receivables/draw-statement.server"
import { findStoreBySlug } from "~/services/standing-orders/find-store-by-slug.server"
import { admits, guard } from "../guard.server"
import { pdfFile } from "../pdf-file"
import { statementRange } from "../statement-range"
import type { Route } from "./+types/statement-pdf"

/** The printed pages of a store's statement. */
export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, { producer }) => {
	const store = await findStoreBySlug({ producerId: producer.id, slug: params.store })
	if (!store) throw data(null, { status: 404 })
	const today = dayInZone(now(), producer.timeZone)
	const { range, error } = statementRange(url.searchParams, today)
	if (error) throw data(null, { status: 400 })
	const pdf = await drawStatement({ producerId: producer.id, storeId: store.id, range, today })
	return pdfFile(pdf, `statement-${params.store}-${range.until}.pdf`)
})
