import { data } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { drawStatement } from "~/services/receivables/draw-statement.server"
import { admits, guard } from "../guard.server"
import { pdfFile } from "../pdf-file"
import { statementRange } from "../statement-range"
import type { Route } from "./+types/statement-pdf"

/** The printed pages of the store's own statement. */
export const loader = guard(admits.store("buyer", "payer"), async ({ url }: Route.LoaderArgs, { producer, store }) => {
	const today = dayInZone(now(), producer.timeZone)
	const { range, error } = statementRange(url.searchParams, today)
	if (error) throw data(null, { status: 400 })
	const pdf = await drawStatement({ producerId: producer.id, storeId: store.id, range, today })
	return pdfFile(pdf, `statement-${producer.slug}-${range.until}.pdf`)
})
