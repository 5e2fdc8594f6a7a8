import type { MoneyWeek } from "~/domain/books/dated-event"
import { monthDay } from "~/domain/calendar"
import { plainMoney } from "~/domain/money"

/** Money in and out, a week a row. */
export function MoneyTable({ weeks }: { weeks: readonly MoneyWeek[] }) {
	return (
		<details className="season-table">
			<summary>Week by week</summary>
			<table className="sheet-table figure-table">
				<thead>
					<tr>
						<th scope="col">Week of</th>
						<th scope="col" className="num">
							Came in
						</th>
						<th scope="col" className="num">
							Went out
						</th>
					</tr>
				</thead>
				<tbody>
					{weeks.map(({ weekOn, inCents, outCents }) => (
						<tr key={weekOn}>
							<th scope="row">{monthDay(weekOn)}</th>
							<td className="num money">{plainMoney(inCents)}</td>
							<td className="num money">{plainMoney(outCents)}</td>
						</tr>
					))}
				</tbody>
			</table>
		</details>
	)
}
