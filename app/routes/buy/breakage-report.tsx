import { data, Link } from "react-router"
import { z } from "zod"
import { dayInZone, dayWords } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { findReport } from "~/services/breakage/find-report.server"
import { ReportLines } from "~/ui/breakage/report-lines"
import { MarginNote, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/breakage-report"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Broken comb you reported · Waxbill" }]

export const loader = guard(admits.store("buyer", "payer"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const { producer, store } = scope
	const id = z.guid().safeParse(params.report)
	const report = id.success ? await findReport({ producerId: producer.id, storeId: store.id, reportId: id.data }) : null
	if (!report) throw data(null, { status: 404 })
	const { reportedAt, answeredAt, ...facts } = report
	return {
		frame: await findBuyFrame(scope, { part: "invoices", now: askClock() }),
		report: facts,
		reportedOn: dayInZone(reportedAt, producer.timeZone),
		answeredOn: answeredAt && dayInZone(answeredAt, producer.timeZone),
		producerName: producer.name,
		isJustSent: url.searchParams.has("sent"),
	}
})

export default function BreakageReport({ loaderData, params }: Route.ComponentProps) {
	const { report, reportedOn, answeredOn, producerName, isJustSent } = loaderData
	const base = `/buy/${params.producer}/${params.store}`
	return (
		<BuyBook frame={loaderData.frame}>
			<SheetHead
				title="Broken comb you reported"
				lead={
					<>
						Of <Link to={`${base}/invoices/${report.invoiceNumber}`}>invoice {report.invoiceNumber}</Link>, by{" "}
						{report.reportedBy} on {dayWords(reportedOn)}.
					</>
				}
			/>
			{isJustSent && report.state === "open" && (
				<MessageLine tone="saved" title={`${producerName} has your report.`}>
					The answer comes by letter and stands here.
				</MessageLine>
			)}
			<div className="sheet-part">
				<p>
					{report.state === "open" && `${producerName} has not answered yet.`}
					{report.state !== "open" && answeredOn && `${producerName} answered on ${dayWords(answeredOn)}. `}
					{report.state === "declined" && "Nothing is credited."}
					{report.creditNumber && (
						<>
							You have <Link to={`${base}/credits/${report.creditNumber}`}>credit {report.creditNumber}</Link>
							{report.state === "part-accepted" && " for a part of it"}.
						</>
					)}
				</p>
				{report.answer && <MarginNote>{report.answer}</MarginNote>}
				{report.note && <p className="note">You wrote: {report.note}</p>}
			</div>
			<ReportLines lines={report.lines} photosHref={`${base}/breakage-photos`} />
		</BuyBook>
	)
}
