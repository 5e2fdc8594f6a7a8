import { randomUUID } from "node:crypto"
import { data, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone, dayWords } from "~/domain/calendar"
import { MOST_PHOTOS } from "~/domain/credits/breakage-window"
import { piecesWords } from "~/domain/quantity"
import { now as askClock } from "~/platform/clock.server"
import { findBreakageForm } from "~/services/breakage/find-breakage-form.server"
import { reportBreakage } from "~/services/breakage/report-breakage.server"
import { reportWords } from "~/ui/breakage/breakage-words"
import { ReportForm } from "~/ui/breakage/report-form"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, MarginNote, SheetHead } from "~/ui/layout/sheet"
import { listDay } from "~/ui/orders/state-words"
import { admits, guard, type StoreScope } from "../guard.server"
import type { Route } from "./+types/breakage"
import { readReport, refusedWords } from "./breakage-form.server"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [
	{ title: `Broken comb of invoice ${params.invoice} · Waxbill` },
]

async function formOf({ producer, store }: StoreScope, invoiceNumber: string) {
	const form = await findBreakageForm({ producerId: producer.id, storeId: store.id, invoiceNumber })
	if (!form) throw data(null, { status: 404 })
	return form
}

export const loader = guard(admits.store("buyer", "payer"), async ({ params }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const { lines, earlier, ...form } = await formOf(scope, params.invoice)
	return {
		frame: await findBuyFrame(scope, { part: "invoices", now }),
		...form,
		producerName: producer.name,
		today,
		lines: lines.filter((line) => line.until >= today && line.leftPieces > 0),
		sentLines: lines.length,
		lastUntil:
			lines
				.map(({ until }) => until)
				.toSorted()
				.at(-1) ?? null,
		earlier: earlier.map(({ reportedAt, ...report }) => ({
			...report,
			reportedOn: dayInZone(reportedAt, producer.timeZone),
		})),
		reportId: randomUUID(),
	}
})

export const action = guard(admits.store("buyer", "payer"), async ({ request, params }: Route.ActionArgs, scope) => {
	const { producer, store, person } = scope
	const { lines } = await formOf(scope, params.invoice)
	const read = await readReport(await request.formData().catch(() => new FormData()), lines)
	const { typed, errors } = read
	const reportId = z.guid().safeParse(typed.reportId)
	if (!reportId.success) errors.push({ message: "The form cannot be read. Open the page again." })
	if (errors.length > 0 || !reportId.success) return data({ errors, typed }, { status: 422 })
	const reported = await reportBreakage({
		producer,
		store,
		person,
		invoiceNumber: params.invoice,
		reportId: reportId.data,
		note: (typed.fields.note ?? "").trim(),
		lines: read.lines,
		now: askClock(),
	})
	if (reported.ok) throw redirect(`/buy/${params.producer}/${params.store}/breakage/${reported.reportId}?sent=1`)
	if (reported.reason === "no-such-invoice") throw data(null, { status: 404 })
	if (reported.reason === "nothing-reported") {
		const message = "Write at one line or more how many pieces are broken."
		return data({ errors: [{ message }], typed }, { status: 422 })
	}
	const refused = reported.refused.map((line) => ({ field: `pieces-${line.lineId}`, message: refusedWords(line) }))
	return data({ errors: refused, typed }, { status: 422 })
})

export default function Breakage({ loaderData, actionData, params }: Route.ComponentProps) {
	const { lines, producerName, days, yard, earlier, today, reportId, lastUntil } = loaderData
	const base = `/buy/${params.producer}/${params.store}`
	return (
		<BuyBook frame={loaderData.frame}>
			<SheetHead
				title="Something arrived broken"
				lead={
					<>
						Of <Link to={`${base}/invoices/${params.invoice}`}>invoice {params.invoice}</Link>. Write what is broken
						within {days === 1 ? "a day" : `${days} days`} of its delivery; {producerName} answers with a credit or a
						sentence.
					</>
				}
			/>
			<ErrorSummary title="It was not reported" errors={actionData?.errors ?? []} />
			{earlier.length > 0 && (
				<section className="sheet-part" aria-labelledby="earlier-head">
					<h2 className="head-italic" id="earlier-head">
						Reported before
					</h2>
					<ul>
						{earlier.map((report) => (
							<li key={report.id}>
								<Link className="inline-block py-1" to={`${base}/breakage/${report.id}`}>
									{listDay(report.reportedOn, today)}
								</Link>
								: {piecesWords(report.pieces)}, {reportWords(report)}
							</li>
						))}
					</ul>
				</section>
			)}
			{lines.length > 0 ? (
				<ReportForm
					producerName={producerName}
					lines={lines}
					reportId={reportId}
					typed={actionData?.typed ?? null}
					errors={actionData?.errors ?? []}
					mostPhotos={MOST_PHOTOS}
				/>
			) : (
				<TooLate yard={yard} lastUntil={lastUntil} isLate={lastUntil !== null && lastUntil < today} />
			)}
		</BuyBook>
	)
}

function TooLate({
	yard,
	lastUntil,
	isLate,
}: Pick<Route.ComponentProps["loaderData"], "yard" | "lastUntil"> & { isLate: boolean }) {
	const who = [yard.contactName, yard.name].filter(Boolean).join(" at ")
	return (
		<>
			<EmptyLine>
				{lastUntil === null
					? "Nothing on this invoice can break."
					: isLate
						? `Broken comb of this delivery could be reported until ${dayWords(lastUntil)}.`
						: "Every piece of it is reported or credited already."}
			</EmptyLine>
			<div className="sheet-part">
				<MarginNote>
					Write to {who}: <a href={`mailto:${yard.email}`}>{yard.email}</a>
					{yard.phone && `, or call ${yard.phone}`}.
				</MarginNote>
			</div>
		</>
	)
}
