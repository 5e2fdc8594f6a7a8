import { data } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { figureFiles, writeFiguresCsv } from "~/services/figures/write-figures-csv.server"
import { csvFile } from "../csv-file"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/figures-csv"
import { askedFigures } from "./figures-asked"

/** One of the figures as a CSV file: `of` names it, sales by week unless said. */
export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, { producer }) => {
	const today = dayInZone(now(), producer.timeZone)
	const { period, quietWeeks, error } = askedFigures(url, today)
	const of = figureFiles.find((file) => file === (url.searchParams.get("of") ?? "spans"))
	if (error || !of) throw data(null, { status: 400 })
	const text = await writeFiguresCsv({ producerId: producer.id, ...period, today, quietWeeks, of })
	return csvFile(text, `${of}-${period.from}-to-${period.to}.csv`)
})
