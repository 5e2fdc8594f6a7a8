import { Link } from "react-router"
import { type Day, daysBetween, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { FigurePart } from "./figure-part"
import { FigureTable } from "./figure-table"

type SleepingStore = { slug: string; name: string; lastOn: Day; cents: number }

export const QUIET_WEEKS = [3, 6, 9, 12] as const

/** Stores that bought and have stopped: since when, and what they bought before. */
export function SleepingPart({
	stores,
	today,
	quietWeeks,
	hrefOf,
	storesHref,
	csvHref,
}: {
	stores: readonly SleepingStore[]
	today: Day
	quietWeeks: number
	/** The page with another number of weeks. */
	hrefOf: (weeks: number) => string
	storesHref: string
	csvHref: string
}) {
	return (
		<FigurePart
			id="sleeping"
			title="Stores that sleep"
			lead={
				<>
					Ordered since the beginning of last season, and nothing for{" "}
					{QUIET_WEEKS.map((weeks, index) => (
						<span key={weeks}>
							{index > 0 && ", "}
							{weeks === quietWeeks ? (
								<b>{weeks}</b>
							) : (
								<Link className="inline-block px-1 py-1" to={hrefOf(weeks)} aria-label={`${weeks} weeks`}>
									{weeks}
								</Link>
							)}
						</span>
					))}{" "}
					weeks.
				</>
			}
			csvHref={csvHref}
		>
			{stores.length === 0 ? (
				<p className="figure-lead">No store sleeps.</p>
			) : (
				<FigureTable
					label="Stores that sleep"
					columns={[
						{ head: "Store" },
						{ head: "Last delivery" },
						{ head: "Weeks", isFigure: true },
						{ head: "Bought since last season", isFigure: true },
					]}
					rows={stores.map(({ slug, name, lastOn, cents }) => ({
						key: slug,
						cells: [
							<Link key={slug} to={`${storesHref}/${slug}`}>
								{name}
							</Link>,
							fullDay(lastOn),
							Math.floor(daysBetween(lastOn, today) / 7),
							formatMoney(cents),
						],
					}))}
				/>
			)}
		</FigurePart>
	)
}
