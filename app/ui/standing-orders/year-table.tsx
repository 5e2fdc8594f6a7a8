import { type Day, dayInZone, fullDay, timeWords } from "~/domain/calendar"
import { casesWords } from "~/domain/quantity"

type YearRow = { ruleOn: Day; delivery: string; open: string; cases: string; note: string }

/** What the year's list says of one date: the day, its last orders, the cases, and what bends it. */
export function yearRow(
	date: {
		ruleOn: Day
		deliveryOn: Day
		isMoved: boolean
		isSkipped: boolean
		isOpen: boolean
		cutoffAt: Date
		lines: readonly { cases: number }[]
	},
	{ zone, standing }: { zone: string; standing: { changes: readonly { on: Day }[] } | null },
): YearRow {
	const { ruleOn, cutoffAt } = date
	const notes = [
		date.isMoved && `in place of ${fullDay(ruleOn)}, a shut day or a day without a van`,
		standing?.changes.some((change) => change.on === ruleOn) && "changed for this date",
	].filter((note) => note !== false && note !== undefined)
	return {
		ruleOn,
		delivery: fullDay(date.deliveryOn),
		open: date.isOpen ? `${fullDay(dayInZone(cutoffAt, zone))}, ${timeWords(cutoffAt, zone)}` : "closed",
		cases: date.isSkipped ? "skipped" : casesWords(date.lines.reduce((sum, line) => sum + line.cases, 0)),
		note: notes.join("; "),
	}
}

/** The dates of a standing order one below the other. */
export function YearTable({ rows }: { rows: readonly YearRow[] }) {
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col">Delivery</th>
					<th scope="col">Last orders</th>
					<th scope="col" className="num">
						Asked
					</th>
					<th scope="col">Note</th>
				</tr>
			</thead>
			<tbody>
				{rows.map((row) => (
					<tr key={row.ruleOn}>
						<td>{row.delivery}</td>
						<td>{row.open}</td>
						<td className="num">{row.cases}</td>
						<td>{row.note}</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}
