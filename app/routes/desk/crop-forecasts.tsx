import { Link } from "react-router"
import { dayInZone, shortMonthDay } from "~/domain/calendar"
import { type ForecastWeek, howForecastsFared, type WeekForecast } from "~/domain/crop/hindsight"
import { now as askClock } from "~/platform/clock.server"
import { compareForecasts } from "~/services/crop/compare-forecasts.server"
import { ForecastPicture } from "~/ui/crop/forecast-picture"
import { FilterLinks } from "~/ui/desk/filter-links"
import { counted } from "~/ui/desk/number-words"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/crop-forecasts"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Forecasts and what came off · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	return {
		frame: await findDeskFrame(scope, { part: "crop", now }),
		...(await compareForecasts({
			producerId: producer.id,
			today: dayInZone(now, producer.timeZone),
			productId: url.searchParams.get("product"),
			year: Number(url.searchParams.get("year")) || null,
		})),
	}
})

export default function CropForecasts({ loaderData, params }: Route.ComponentProps) {
	const { products, years, shown } = loaderData
	const base = `/desk/${params.producer}/crop`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Forecasts and what came off"
				lead={
					<>
						What was expected of a week two and four weeks before it began, and the finished pieces that came off in it.{" "}
						<Link to={base}>Back to the board</Link>
					</>
				}
			/>
			{!shown && (
				<EmptyLine action={<Link to={base}>The crop board</Link>}>
					Nothing has been expected or come off yet. A forecast is kept every day from the first super on.
				</EmptyLine>
			)}
			{shown && (
				<>
					<FilterLinks
						label="Product"
						name="product"
						chosen={shown.product.id}
						keep={{ year: String(shown.year) }}
						options={products.map(({ id, name, detail }) => ({
							value: id,
							label: detail ? `${name}, ${detail}` : name,
						}))}
					/>
					{years.length > 1 && (
						<FilterLinks
							label="Season"
							name="year"
							chosen={String(shown.year)}
							keep={{ product: shown.product.id }}
							options={years.map((year) => ({ value: String(year), label: String(year) }))}
						/>
					)}
					{shown.weeks.length === 0 ? (
						<EmptyLine>No week of {shown.year} is over in which it was expected or came off.</EmptyLine>
					) : (
						<Comparison weeks={shown.weeks} productName={shown.product.name} />
					)}
				</>
			)}
		</DeskBook>
	)
}

function Comparison({ weeks, productName }: { weeks: readonly ForecastWeek[]; productName: string }) {
	return (
		<>
			<ForecastPicture weeks={weeks} productName={productName} />
			<ul className="stock-key px-4 py-3 desk:px-8">
				<li>
					<svg width={15} height={12} viewBox="0 0 15 12" aria-hidden="true">
						<path className="c-expected" d="M1.5 .5h12v11h-12z" />
						<path className="c-least" d="M0 6h15" />
					</svg>
					expected two weeks ahead: low to high, the stroke is likely
				</li>
				<li>
					<svg width={15} height={12} viewBox="0 0 15 12" aria-hidden="true">
						<path className="c-free" d="M1 0h13v12h-13z" />
					</svg>
					came off, in pieces
				</li>
			</ul>
			<p className="aside px-4 pb-4 desk:px-8">
				{faredWords(weeks, "twoAhead", "Two")} {faredWords(weeks, "fourAhead", "Four")}
			</p>
			<table className="sheet-table">
				<caption className="sr-only">{productName}: expected and come off by week, in pieces</caption>
				<thead>
					<tr>
						<th scope="col">Week of</th>
						<th scope="col" className="num">
							Four weeks ahead
						</th>
						<th scope="col" className="num">
							Two weeks ahead
						</th>
						<th scope="col" className="num">
							Came off
						</th>
						<th scope="col" className="pr-4! pl-6! max-desk:hidden desk:pr-8!">
							Against two weeks ahead
						</th>
					</tr>
				</thead>
				<tbody>
					{weeks.map((week) => (
						<tr key={week.weekOn}>
							<td className="name text-body! whitespace-nowrap">{shortMonthDay(week.weekOn)}</td>
							<td className="num">
								<Span forecast={week.fourAhead} />
							</td>
							<td className="num">
								<Span forecast={week.twoAhead} />
							</td>
							<td className="num fig">
								<b>{week.cameOff}</b>
							</td>
							<td className="pr-4! pl-6! max-desk:hidden desk:pr-8!">{againstWords(week)}</td>
						</tr>
					))}
				</tbody>
			</table>
		</>
	)
}

function Span({ forecast }: { forecast: WeekForecast | null }) {
	if (!forecast) return <span className="note">none kept</span>
	return (
		<>
			<span className="fig">{forecast.likely}</span>
			<span className="note block">
				{forecast.low} to {forecast.high}
			</span>
		</>
	)
}

function againstWords({ twoAhead, cameOff }: ForecastWeek): string {
	if (!twoAhead) return ""
	if (cameOff < twoAhead.low) return `${twoAhead.low - cameOff} under the low figure`
	if (cameOff > twoAhead.high) return `${cameOff - twoAhead.high} over the high figure`
	return "within it"
}

function faredWords(weeks: readonly ForecastWeek[], ahead: "twoAhead" | "fourAhead", head: string): string {
	const { weeks: count, within, under, over } = howForecastsFared(weeks, ahead)
	if (count === 0) return `${head} weeks ahead, no forecast was kept.`
	return `${head} weeks ahead: of ${counted(count, "week")}, ${within} came within low and high, ${under} under, ${over} over.`
}
