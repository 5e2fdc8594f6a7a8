import { Link } from "react-router"
import { addDays, type Day, fullDay } from "~/domain/calendar"

/** The closings, the latest first, each with the file of its days. */
export function ClosingsTable({
	closings,
	base,
}: {
	closings: readonly { until: Day; closedBy: string; closedOn: Day }[]
	base: string
}) {
	if (closings.length === 0) return null
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col">Closed until</th>
					<th scope="col">By</th>
					<th scope="col">Entries</th>
				</tr>
			</thead>
			<tbody>
				{closings.map(({ until, closedBy, closedOn }, index) => {
					const before = closings[index + 1]?.until
					const days = { ...(before ? { from: addDays(before, 1) } : { from: "1900-01-01" }), to: until }
					return (
						<tr key={until}>
							<td className="name">{fullDay(until)}</td>
							<td>
								{closedBy}, {fullDay(closedOn)}
							</td>
							<td>
								<Link className="py-1" to={`${base}.csv?${new URLSearchParams(days)}`} reloadDocument>
									CSV
								</Link>
							</td>
						</tr>
					)
				})}
			</tbody>
		</table>
	)
}
