import Papa from "papaparse"
import { data } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { findWhereBroken } from "~/services/breakage/find-where-broken.server"
import { csvFile } from "../csv-file"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/breakage-where-csv"
import { BROKEN_BY, breakageRange } from "./breakage-range"

/** Broken pieces beside those sent as a CSV file. A name that a spreadsheet would run is quoted as text. */
export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, { producer }) => {
	const range = breakageRange(url, dayInZone(now(), producer.timeZone))
	if (range.error) throw data(null, { status: 400 })
	const rows = await findWhereBroken({ producerId: producer.id, ...range })
	const head = BROKEN_BY.find(({ value }) => value === range.by)?.head ?? "Lot"
	const body = Papa.unparse(
		[
			[head, "Of", "Pieces sent", "Pieces broken", "Share, percent"],
			...rows.map(({ key, of, sentPieces, brokenPieces }) => [
				key,
				of,
				sentPieces,
				brokenPieces,
				sentPieces === 0 ? "" : ((brokenPieces / sentPieces) * 100).toFixed(2),
			]),
		],
		{ escapeFormulae: true },
	)
	return csvFile(body, `broken-by-${range.by}-${range.from}-to-${range.to}.csv`)
})
