import { data, Link } from "react-router"
import { fullDay } from "~/domain/calendar"
import { labelThatHolds } from "~/domain/scale/label-that-holds"
import type { NetContentsWorksheet } from "~/domain/scale/net-contents"
import { decisionSentence, shownWeight } from "~/domain/scale/net-contents-words"
import { findNetCheck } from "~/services/scale/find-net-check.server"
import { MarginNote, SheetHead } from "~/ui/layout/sheet"
import { Cures } from "~/ui/scale/cures"
import { ErrorPlot } from "~/ui/scale/error-plot"
import { PackageTable, WorksheetSteps } from "~/ui/scale/worksheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/scale-check"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Net contents of lot ${params.code} · Waxbill` }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ params }: Route.LoaderArgs, scope) => {
	const { code, check: checkId } = params
	const found = await findNetCheck({ producerId: scope.producer.id, code, checkId })
	if (!found) throw data(null, { status: 404 })
	return { frame: await findDeskFrame(scope, { part: "lots" }), ...found, producerName: scope.producer.name }
})

function plotFacts(sheet: NetContentsWorksheet) {
	const { unit, limit, variation } = sheet
	return {
		errors: sheet.packages.map(({ error, isTooShort }) => ({ error: Number(error), isTooShort })),
		average: Number(sheet.average),
		limit: limit === null ? null : Number(limit),
		variation: Number(variation),
		words: {
			label: "the label",
			limit: `error limit ${shownWeight(`-${limit ?? "0"}`, unit)}`,
			variation: `variation ${shownWeight(`-${variation}`, unit)}`,
		},
	}
}

/** The plot in words, for its caption and for those who do not see it. */
function plotWords(sheet: NetContentsWorksheet): string {
	const { unit, packages, limit } = sheet
	const sorted = packages.map(({ error }) => error).toSorted((a, b) => Number(a) - Number(b))
	const range = `${packages.length === 1 ? "One package" : `${packages.length} packages`}, from ${shownWeight(sorted[0] ?? "0", unit)} to ${shownWeight(sorted.at(-1) ?? "0", unit)}`
	const against = limit === null ? "" : `, sample error limit ${shownWeight(`-${limit}`, unit)}`
	return `${range}; average ${shownWeight(sheet.average, unit)}${against}, maximum allowable variation ${shownWeight(`-${sheet.variation}`, unit)}.`
}

export default function ScaleCheck({ loaderData, params }: Route.ComponentProps) {
	const { lot, check, frame, producerName } = loaderData
	const { worksheet: sheet, input } = check
	const lotHref = `/desk/${params.producer}/lots/${encodeURIComponent(lot.code)}`
	const who = check.who ? ` by ${check.who}` : ""
	return (
		<DeskBook frame={frame} ruled>
			<SheetHead
				title={`Net contents of lot ${lot.code}`}
				lead={`${producerName}. ${lot.productName}, ${lot.detail}. Weighed ${fullDay(check.checkedOn)}${who}.`}
				note="Follows NIST Handbook 133, chapter 2. It is no official inspection and no legal advice."
			/>
			<div className="scale-verdict">
				<p className={sheet.hasPassed ? "verdict" : "verdict short"}>{decisionSentence(sheet)}</p>
				{sheet.verified?.isRaised && (
					<MarginNote>
						The grams on the label are rounded up, which raises what must be in the package. Round them down.
					</MarginNote>
				)}
			</div>
			<ErrorPlot facts={plotFacts(sheet)} label={plotWords(sheet)} />
			{!sheet.hasPassed && (
				<div className="no-print">
					<Cures isHeld={lot.state === "held"} suggestedLabel={labelThatHolds(sheet)} againHref={`${lotHref}/scale`} />
				</div>
			)}
			<div className="clear-of-margin">
				<WorksheetSteps sheet={sheet} lotPackages={input.lotPackages} />
				<PackageTable sheet={sheet} />
			</div>
			{check.note && (
				<p className="clear-of-margin px-4 pt-4 desk:px-8">
					<b>Note.</b> {check.note}
				</p>
			)}
			<p className="clear-of-margin no-print flex flex-wrap gap-x-6 px-4 py-5 desk:px-8">
				<Link className="py-1" to={`${lotHref}/scale`}>
					Weigh again, and earlier checks
				</Link>
				<Link className="py-1" to={lotHref}>
					Lot {lot.code}
				</Link>
			</p>
		</DeskBook>
	)
}
