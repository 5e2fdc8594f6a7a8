import { monthDay } from "~/domain/calendar"
import type { ShownWeek } from "./season-picture"

/** The same figures in cases, one week a row; weeks without anything wanted are left to the file. */
export function SeasonTable({ name, weeks }: { name: string; weeks: readonly ShownWeek[] }) {
	const shown = weeks.filter(({ commitment, standing, single }) => commitment + standing + single > 0)
	if (shown.length === 0) return <p className="note px-4 py-2 desk:px-8">Nothing is committed to or ordered yet.</p>
	return (
		<details className="season-table">
			<summary>{name}, week by week</summary>
			{/* biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls sideways is reached by keyboard */}
			<section className="overflow-x-auto" aria-label={`${name}, week by week`} tabIndex={0}>
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col" className="pl-4! desk:pl-8!">
								Week of
							</th>
							{["Commitments", "Standing", "Single", "There, low", "likely", "high", "Short, low", "likely"].map(
								(head, index) => (
									<th scope="col" className="num" key={`${head} ${index > 5 ? "short" : "there"}`}>
										{head}
									</th>
								),
							)}
						</tr>
					</thead>
					<tbody>
						{shown.map((week) => (
							<tr key={week.weekOn}>
								<th scope="row" className="pl-4! text-left desk:pl-8!">
									{monthDay(week.weekOn)}
								</th>
								<td className="num fig">{week.commitment}</td>
								<td className="num fig">{week.standing}</td>
								<td className="num fig">{week.single}</td>
								<td className="num fig">{week.low}</td>
								<td className="num fig">{week.likely}</td>
								<td className="num fig">{week.high}</td>
								<Short cases={week.short} />
								<Short cases={week.shortLikely} />
							</tr>
						))}
					</tbody>
				</table>
			</section>
		</details>
	)
}

function Short({ cases }: { cases: number }) {
	return (
		<td className="num fig">
			{cases > 0 ? <span className="short">{cases} short</span> : <span className="note">none</span>}
		</td>
	)
}
