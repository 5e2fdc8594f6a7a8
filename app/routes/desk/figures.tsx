import { data, Link } from "react-router"
import { type Period, periodWords, yearOf } from "~/domain/books/period"
import { compareDays, type Day, dayInZone } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { now as askClock } from "~/platform/clock.server"
import { findFigures } from "~/services/figures/find-figures.server"
import { findMoneyShare } from "~/services/trace/find-money-share.server"
import { PeriodBar } from "~/ui/books/period-bar"
import { CropPart } from "~/ui/figures/crop-part"
import { ChannelsPart, ProductsPart, SpansPart, StoresPart } from "~/ui/figures/sales-parts"
import { SharePart } from "~/ui/figures/share-part"
import { SleepingPart } from "~/ui/figures/sleeping-part"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/figures"
import { DeskBook } from "./desk-book"
import { askedFigures } from "./figures-asked"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "What was sold · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const asked = askedFigures(url, today)
	const { period, quietWeeks } = asked
	const lastDay = compareDays(period.to, today) < 0 ? period.to : today
	const answer = {
		frame: await findDeskFrame(scope, { part: "invoices", now }),
		...asked,
		today,
		figures: await findFigures({ producerId: producer.id, ...period, today, quietWeeks }),
		share: await findMoneyShare({ producer, year: Number(lastDay.slice(0, 4)) }),
	}
	return data(answer, { status: asked.error ? 400 : 200 })
})

/** This season, the four before it, and all of them. */
function seasonLinks(today: Day, firstSeason: number): { words: string; period: Period }[] {
	const year = Number(today.slice(0, 4))
	const years = [0, 1, 2, 3, 4].map((back) => year - back).filter((one) => one >= Math.min(year, firstSeason))
	const seasons = years.map((one) => ({ words: `Season ${one}`, period: yearOf(`${one}-01-01`) }))
	if (firstSeason >= year) return seasons
	return [...seasons, { words: "All seasons", period: { from: `${firstSeason}-01-01`, to: `${year}-12-31` } }]
}

export default function Figures({ loaderData, params }: Route.ComponentProps) {
	const { period, typed, error, today, quietWeeks, figures, share } = loaderData
	const base = `/desk/${params.producer}`
	const csv = (of: string) => `${base}/figures.csv?${new URLSearchParams({ of, ...period, quiet: String(quietWeeks) })}`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="What was sold"
				lead={
					<>
						In {periodWords(period)}, as invoiced and as sold at the stall, without delivery and sales tax on invoices.
						{figures.creditedCents > 0 && ` Credits of ${formatMoney(figures.creditedCents)} are not taken off.`}{" "}
						<Link to={`${base}/season`}>The season ahead</Link>
					</>
				}
			/>
			<ErrorSummary errors={error ? [{ field: "from", message: error }] : []} />
			<PeriodBar typed={typed} error={error} links={seasonLinks(today, figures.firstSeason)} />
			{figures.spans.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/figures`}>This season</Link>}>Nothing was sold in these days.</EmptyLine>
			) : (
				<>
					<SpansPart spans={figures.spans} span={figures.span} csvHref={csv("spans")} />
					<ProductsPart products={figures.products} csvHref={csv("products")} />
					<ChannelsPart channels={figures.channels} csvHref={csv("channels")} />
					<StoresPart
						stores={figures.stores}
						count={figures.storeCount}
						storesHref={`${base}/stores`}
						csvHref={csv("stores")}
					/>
				</>
			)}
			<SleepingPart
				stores={figures.sleeping}
				today={today}
				quietWeeks={quietWeeks}
				hrefOf={(weeks) => `?${new URLSearchParams({ ...period, quiet: String(weeks) })}#sleeping`}
				storesHref={`${base}/stores`}
				csvHref={csv("sleeping")}
			/>
			<CropPart crop={figures.crop} csvHref={csv("crop")} />
			<SharePart share={share} recordsHref={`${base}/records`} />
		</DeskBook>
	)
}
