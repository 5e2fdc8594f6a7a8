import { Link } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { listReports, type ReportFilter } from "~/services/breakage/list-reports.server"
import { ReportTable } from "~/ui/breakage/report-table"
import { FilterLinks } from "~/ui/desk/filter-links"
import { ListPages } from "~/ui/desk/list-pages"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/breakage"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Broken comb · Waxbill" }]

const FILTERS: readonly { value: ReportFilter; label: string }[] = [
	{ value: "open", label: "To answer" },
	{ value: "answered", label: "Answered" },
]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	const filter = FILTERS.find(({ value }) => value === url.searchParams.get("standing"))?.value ?? "all"
	const after = url.searchParams.get("after")
	const { reports, next } = await listReports({ producerId: producer.id, storeId: null, filter, after })
	return {
		frame: await findDeskFrame(scope, { part: "invoices", now }),
		today: dayInZone(now, producer.timeZone),
		filter,
		after,
		reports: reports.map(({ reportedAt, ...report }) => ({
			...report,
			reportedOn: dayInZone(reportedAt, producer.timeZone),
		})),
		next,
	}
})

export default function Breakage({ loaderData, params }: Route.ComponentProps) {
	const { reports, next, today, filter, after } = loaderData
	const base = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Broken comb"
				lead="What stores report as broken. Those without an answer come first."
				action={
					<span className="flex flex-wrap gap-x-5">
						<Link to={`${base}/breakage/where`}>Where it breaks</Link>
						<Link to={`${base}/credits`}>Credits</Link>
					</span>
				}
			/>
			<FilterLinks
				label="Reports by how they stand"
				name="standing"
				chosen={filter === "all" ? "" : filter}
				options={[{ value: "", label: "All" }, ...FILTERS]}
			/>
			{reports.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/breakage/where`}>See where comb breaks</Link>}>
					{after
						? "Nothing earlier."
						: filter === "open"
							? "No report waits for an answer."
							: "Nothing is reported broken."}
				</EmptyLine>
			) : (
				<ReportTable reports={reports} today={today} base={base} showStore />
			)}
			<ListPages
				params={{ ...(filter === "all" ? {} : { standing: filter }), ...(after ? { after } : {}) }}
				next={next}
				laterWords="Earlier reports"
			/>
		</DeskBook>
	)
}
