import { casesWords } from "~/domain/quantity"

type Season = {
	year: string
	madeDates: number
	comingDates: number
	totals: readonly { productId: string; code: string; name: string; madeCases: number; comingCases: number }[]
}

const datesWords = (count: number) => (count === 1 ? "1 date" : `${count} dates`)

/** What a standing order asks in this year, by product: in orders made so far, and on the dates to come. */
export function SeasonTotals({ season }: { season: Season }) {
	const { year, madeDates, comingDates, totals } = season
	if (totals.length === 0) return null
	const sum = totals.reduce((cases, total) => cases + total.madeCases + total.comingCases, 0)
	return (
		<table className="sheet-table">
			<caption className="px-4 py-3 text-left desk:px-8">
				<b>Asked in {year}</b>{" "}
				<span className="note">
					{casesWords(sum)} in all: {datesWords(madeDates)} made, {datesWords(comingDates)} to come. Both sides see
					this.
				</span>
			</caption>
			<thead>
				<tr>
					<th scope="col">No.</th>
					<th scope="col">Product</th>
					<th scope="col" className="num">
						Made, cases
					</th>
					<th scope="col" className="num">
						To come
					</th>
					<th scope="col" className="num">
						In all
					</th>
				</tr>
			</thead>
			<tbody>
				{totals.map((total) => (
					<tr key={total.productId}>
						<td>{total.code}</td>
						<td>{total.name}</td>
						<td className="num">{total.madeCases}</td>
						<td className="num">{total.comingCases}</td>
						<td className="num">{total.madeCases + total.comingCases}</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}
