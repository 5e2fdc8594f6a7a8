import { data, Link } from "react-router"
import { z } from "zod"
import { fullDay } from "~/domain/calendar"
import { colourByPfund } from "~/domain/grading/colour"
import { faults } from "~/domain/grading/faults"
import { schemeColour } from "~/domain/grading/grade-comb"
import { measureNames, measures, measureWords } from "~/domain/grading/measures"
import { piecesWords } from "~/domain/quantity"
import { type FoundGrading, findGrading } from "~/services/lots/find-gradings.server"
import { SheetHead } from "~/ui/layout/sheet"
import { GradeResult } from "~/ui/lots/grade-result"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/grade-sheet"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Grading of lot ${params.code} · Waxbill` }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ params }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const isId = z.guid().safeParse(params.grading).success
	const grading = isId
		? await findGrading({ producerId: producer.id, code: params.code, gradingId: params.grading })
		: null
	if (!grading) throw data(null, { status: 404 })
	return { frame: await findDeskFrame(scope, { part: "lots" }), producerName: producer.name, grading }
})

/** The colour as the scheme and as USDA name it. */
function colourOf({ scheme, facts }: FoundGrading): string | null {
	if (facts.pfundTenths === null) return null
	const own = schemeColour(scheme.colours, facts.pfundTenths)
	return `${facts.pfundTenths / 10} mm Pfund${own ? `, ${own} by this scheme` : ""}, ${colourByPfund(facts.pfundTenths)} by USDA`
}

function factsOf({ scheme, facts }: FoundGrading): [string, string][] {
	const measured = measureNames.flatMap((measure): [string, string][] => {
		const isAsked = scheme.grades.some(({ limits }) => limits[measure] !== undefined)
		const value = facts.measured[measure]
		if (!isAsked) return []
		return [[measures[measure].label, value === undefined ? "not measured" : measureWords(measure, value)]]
	})
	const seen = facts.faults.map((fault) => faults[fault]).join(", ")
	return [
		...measured,
		["Row next to the wood", facts.isOutsideRowOpen ? "partly unsealed" : "sealed"],
		...(facts.caseWeighed
			? [
					[`A case of ${scheme.caseRule?.pieces}, net`, `${facts.caseWeighed.hundredthsLb / 100} lb`] as [
						string,
						string,
					],
				]
			: []),
		["Pieces looked at", String(facts.piecesSeen)],
		["Of those below it", String(facts.piecesBelow)],
		["Faults seen", seen === "" ? "none" : seen],
	]
}

export default function GradeSheet({ loaderData, params }: Route.ComponentProps) {
	const { grading, producerName } = loaderData
	const page = `/desk/${params.producer}/lots/${grading.code}`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={`Lot ${grading.code}: ${grading.grade}`}
				lead={`${producerName}. ${grading.productName}, ${grading.detail}, ${piecesWords(grading.pieces)} off the hives ${fullDay(grading.harvestedOn)}. Graded ${fullDay(grading.gradedOn)}${grading.who ? ` by ${grading.who}` : ""} by the scheme ${grading.schemeName}.`}
				action={
					<span className="no-print flex gap-5">
						<Link to={page}>Back to the lot</Link>
						<Link to={`${page}/grade`}>Grade again</Link>
					</span>
				}
			/>
			<section className="lot-part" aria-labelledby="facts-head">
				<h2 className="name" id="facts-head">
					What was seen
				</h2>
				<dl className="grade-facts">
					{factsOf(grading).map(([label, value]) => (
						<div className="contents" key={label}>
							<dt>{label}</dt>
							<dd>{value}</dd>
						</div>
					))}
				</dl>
			</section>
			<GradeResult
				grade={grading.grade}
				reasons={grading.reasons}
				colour={colourOf(grading)}
				faults={grading.facts.faults}
			/>
			<p className="note px-4 py-4 desk:px-8">
				{grading.scheme.source} A grading is never altered: another one is made instead. The law of the place of sale
				decides.
			</p>
		</DeskBook>
	)
}
