import Papa from "papaparse"
import { now } from "~/platform/clock.server"
import { findSeason } from "~/services/desk/find-season.server"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/season-csv"
import { seasonRows, seasonView } from "./season-view"

/** The season ahead as a CSV file, a row for each product and week. A name that a spreadsheet would run is quoted as text. */
export const loader = guard(admits.desk("owner", "desk"), async (_args: Route.LoaderArgs, { producer }) => {
	const season = await findSeason({ producerId: producer.id, now: now(), zone: producer.timeZone })
	const body = Papa.unparse(seasonRows(seasonView(season)), { escapeFormulae: true })
	return new Response(body, {
		headers: {
			"Content-Type": "text/csv; charset=utf-8",
			"Content-Disposition": `attachment; filename="season-from-${season.weeks[0]}.csv"`,
			"Cache-Control": "private, no-store",
		},
	})
})
