import { Link } from "react-router"
import { dayInZone, shortMonthDay } from "~/domain/calendar"
import { UNGRADED } from "~/domain/grading/grade-comb"
import { CULLS } from "~/domain/lots/count-harvest"
import { mayManagePeople } from "~/domain/people/roles"
import { piecesWords, wholeCases } from "~/domain/quantity"
import { now as askClock } from "~/platform/clock.server"
import { type ListedLot, type LotState, listLots } from "~/services/desk/list-lots.server"
import { FilterLinks } from "~/ui/desk/filter-links"
import { ListPages } from "~/ui/desk/list-pages"
import { ButtonLink } from "~/ui/forms/button"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { listDay } from "~/ui/orders/state-words"
import { FillStrip } from "~/ui/stock/fill-strip"
import { StockKey } from "~/ui/stock/stock-key"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/lots"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Lots · Waxbill" }]

const STATES: readonly LotState[] = ["held", "released", "withdrawn"]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, roles } = scope
	const now = askClock()
	const state = STATES.find((one) => one === url.searchParams.get("state")) ?? null
	const after = url.searchParams.get("after")
	const { lots, next } = await listLots({ producerId: producer.id, state, after })
	return {
		frame: await findDeskFrame(scope, { part: "lots", now }),
		today: dayInZone(now, producer.timeZone),
		state,
		after,
		lots,
		next,
		mayChangeGrades: roles.some(mayManagePeople),
	}
})

const MISSING_WORDS: Record<ListedLot["missing"][number], string> = {
	freezing: "freezing not proven",
	weighing: "not weighed",
}

/** How a lot was graded, after the product's own words. */
function gradeWords(grade: string): string {
	if (grade === "") return ""
	return grade === UNGRADED || grade === CULLS ? `, ${grade.toLowerCase()}` : `, graded ${grade}`
}

/** What a held lot waits for. */
function heldWords({ missing, expectedReleaseOn }: ListedLot): string {
	const until = `until ${shortMonthDay(expectedReleaseOn)}`
	return missing.length === 0
		? "ready to be released"
		: `${until}: ${missing.map((one) => MISSING_WORDS[one]).join(", ")}`
}

function LotStrip({ lot }: { lot: ListedLot }) {
	const left = wholeCases(lot.leftPieces, lot.piecesPerCase)
	const packed = wholeCases(lot.packedPieces, lot.piecesPerCase)
	const odd = lot.leftPieces - left * lot.piecesPerCase
	const words = [
		left > 0 && `${left} ${lot.state === "held" ? "held" : "left"}`,
		odd > 0 && `${odd} single ${odd === 1 ? "piece" : "pieces"}`,
		packed > 0 && `${packed} packed`,
	].filter(Boolean)
	return (
		<FillStrip
			size="sm"
			runs={[
				{ state: lot.state === "released" ? "free" : "held", count: left },
				{ state: "promised", count: packed },
			]}
			caption={words.length > 0 ? words.join(", ") : "all gone"}
		/>
	)
}

export default function Lots({ loaderData, params }: Route.ComponentProps) {
	const { lots, next, state, after, today, mayChangeGrades } = loaderData
	const base = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Lots"
				lead="Pieces of one product from one harvest, the latest first. Strips are in cases."
				action={
					<>
						<Link className="py-1" to={`${base}/cold-room`}>
							Cold room
						</Link>
						<Link className="py-1" to={`${base}/stock-take`}>
							Count a place
						</Link>
						<Link className="py-1" to={`${base}/trace`}>
							Trace
						</Link>
						{mayChangeGrades && (
							<Link className="py-1" to={`${base}/grades`}>
								Grades and lot codes
							</Link>
						)}
						<ButtonLink variant="primary" to={`${base}/crop/harvest`}>
							Bring a harvest in
						</ButtonLink>
					</>
				}
			/>
			<FilterLinks
				label="Lots by state"
				name="state"
				chosen={state ?? ""}
				options={[{ value: "", label: "All" }, ...STATES.map((one) => ({ value: one, label: one }))]}
			/>
			{lots.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/lots`}>All lots</Link>}>
					{after ? "Nothing earlier." : state ? `No lot is ${state}.` : "Nothing has come off the hives yet."}
				</EmptyLine>
			) : (
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col">Lot</th>
							<th scope="col">Product</th>
							<th scope="col">Now</th>
							<th scope="col" className="max-desk:hidden">
								State
							</th>
							<th scope="col" className="max-desk:hidden">
								Off the hives
							</th>
							<th scope="col" className="max-desk:hidden">
								Best before
							</th>
							<th scope="col" className="num pr-4! desk:pr-8!">
								Harvested
							</th>
						</tr>
					</thead>
					<tbody>
						{lots.map((lot) => (
							<tr key={lot.code}>
								<td>
									<Link
										className="name inline-block py-1 text-body! whitespace-nowrap"
										to={`${base}/lots/${encodeURIComponent(lot.code)}`}
									>
										{lot.code}
									</Link>
								</td>
								<td>
									{lot.productName}
									<span className="note block">
										{lot.detail}
										{gradeWords(lot.grade)}
									</span>
									{lot.state === "held" && <span className="note block desk:hidden">{heldWords(lot)}</span>}
								</td>
								<td>
									<LotStrip lot={lot} />
								</td>
								<td className="max-desk:hidden">
									{lot.state}
									{lot.state === "held" && <span className="note block">{heldWords(lot)}</span>}
								</td>
								<td className="max-desk:hidden">{listDay(lot.harvestedOn, today)}</td>
								<td className="max-desk:hidden">{listDay(lot.bestBeforeOn, today)}</td>
								<td className="num pr-4! desk:pr-8!">{piecesWords(lot.piecesHarvested)}</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
			<ListPages
				params={{ ...(state ? { state } : {}), ...(after ? { after } : {}) }}
				next={next}
				laterWords="Earlier lots"
			/>
			<div className="px-4 py-3 desk:px-8">
				<StockKey states={["free", "held", "promised"]} words={{ free: "left, released", promised: "packed" }} />
			</div>
		</DeskBook>
	)
}
