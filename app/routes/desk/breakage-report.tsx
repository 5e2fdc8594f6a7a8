import { data, Link, redirect, useNavigation } from "react-router"
import { z } from "zod"
import { dayInZone, dayWords } from "~/domain/calendar"
import { creditForPieces } from "~/domain/credits/credit-money"
import { piecesWords } from "~/domain/quantity"
import { now as askClock } from "~/platform/clock.server"
import { answerReport } from "~/services/breakage/answer-report.server"
import { type BreakageReport, findReport } from "~/services/breakage/find-report.server"
import { findInvoiceLeft } from "~/services/credits/find-invoice-left.server"
import { AnswerForm } from "~/ui/breakage/answer-form"
import { ReportLines } from "~/ui/breakage/report-lines"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { MarginNote, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/breakage-report"
import { answerRefusal, readAnswer } from "./breakage-answer"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `Broken comb at ${loaderData?.report.storeName ?? "a store"} · Waxbill` },
]

async function reportOf({ producer }: DeskScope, id: string): Promise<BreakageReport> {
	const reportId = z.guid().safeParse(id)
	const report = reportId.success ? await findReport({ producerId: producer.id, reportId: reportId.data }) : null
	if (!report) throw data(null, { status: 404 })
	return report
}

export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const { reportedAt, answeredAt, lines, ...report } = await reportOf(scope, params.report)
	const invoice = await findInvoiceLeft({ producerId: producer.id, number: report.invoiceNumber })
	const left = new Map(invoice?.lines.map((line) => [line.id, line]))
	return {
		frame: await findDeskFrame(scope, { part: "invoices", now: askClock() }),
		report,
		reportedOn: dayInZone(reportedAt, producer.timeZone),
		answeredOn: answeredAt && dayInZone(answeredAt, producer.timeZone),
		lines: lines.map((line) => {
			const ofLine = left.get(line.invoiceLineId)
			const pieces = Math.min(line.pieces, ofLine?.pieces ?? 0)
			const money = ofLine ? creditForPieces(ofLine, pieces) : { lineCents: 0, taxCents: 0 }
			return { ...line, acceptable: { pieces, cents: money.lineCents + money.taxCents } }
		}),
		missing: Number(url.searchParams.get("missing") ?? 0) || 0,
		isJustAnswered: url.searchParams.has("answered"),
	}
})

export const action = guard(admits.desk("owner", "desk"), async ({ request, params, url }: Route.ActionArgs, scope) => {
	const report = await reportOf(scope, params.report)
	const read = readAnswer(await request.formData(), report.lines)
	const { typed, accepted, answer } = read
	if (read.errors.length > 0) return data({ errors: read.errors, typed }, { status: 422 })
	const { producer, person } = scope
	const answered = await answerReport({
		producer,
		reportId: report.id,
		accepted,
		answer,
		personId: person.id,
		now: askClock(),
	})
	if (answered.ok) {
		const missing = answered.missingPieces > 0 ? `&missing=${answered.missingPieces}` : ""
		throw redirect(`${url.pathname}?answered=1${missing}`)
	}
	const status = answered.reason === "answered-already" ? 409 : 422
	return data({ errors: answerRefusal(answered, report), typed }, { status })
})

export default function Report({ loaderData, actionData, params }: Route.ComponentProps) {
	const { report, reportedOn, lines, missing, isJustAnswered } = loaderData
	const base = `/desk/${params.producer}`
	const photosHref = `${base}/breakage-photos`
	const isBusy = useNavigation().formMethod === "POST"
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={`Broken comb at ${report.storeName}`}
				lead={
					<>
						Of <Link to={`${base}/invoices/${report.invoiceNumber}`}>invoice {report.invoiceNumber}</Link>, written by{" "}
						{report.reportedBy} on {dayWords(reportedOn)}.
					</>
				}
				action={<Link to={`${base}/breakage`}>All reports</Link>}
			/>
			{isJustAnswered && !actionData && (
				<MessageLine tone="saved" title={`${report.storeName} is told.`}>
					{report.creditNumber ? "The pieces are written off to waste by lot." : "Nothing is credited."}
					{missing > 0 &&
						` ${piecesWords(missing)} could not be written off: the books had them no longer as sold. Look at the lots.`}
				</MessageLine>
			)}
			<ErrorSummary title="It was not answered" errors={actionData?.errors ?? []} />
			{report.note && (
				<div className="sheet-part">
					<MarginNote>
						{report.reportedBy} wrote: {report.note}
					</MarginNote>
				</div>
			)}
			{report.state === "open" ? (
				<AnswerForm
					storeName={report.storeName}
					lines={lines}
					photosHref={photosHref}
					typed={actionData?.typed ?? null}
					errors={actionData?.errors ?? []}
					isBusy={isBusy}
				/>
			) : (
				<>
					<Answered loaderData={loaderData} base={base} />
					<ReportLines lines={lines} photosHref={photosHref} />
				</>
			)}
		</DeskBook>
	)
}

function Answered({ loaderData, base }: Pick<Route.ComponentProps, "loaderData"> & { base: string }) {
	const { report, answeredOn } = loaderData
	return (
		<div className="sheet-part">
			<p>
				{report.answeredBy ?? "Someone"} answered{answeredOn && ` on ${dayWords(answeredOn)}`}
				{report.creditNumber ? (
					<>
						{": "}
						<Link to={`${base}/credits/${report.creditNumber}`}>credit {report.creditNumber}</Link>
						{report.state === "part-accepted" && " for a part of it"}.
					</>
				) : (
					": nothing is credited."
				)}
			</p>
			{report.answer && <MarginNote>{report.answer}</MarginNote>}
		</div>
	)
}
