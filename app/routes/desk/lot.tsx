import { data, Link } from "react-router"
import { dayInZone, dayWords, fullDay, shortMonthDay, timeWords } from "~/domain/calendar"
import { colourByPfund } from "~/domain/grading/colour"
import { mayRunDesk } from "~/domain/people/roles"
import { findLot, type LotNeighbour } from "~/services/desk/find-lot.server"
import { listLotMoves } from "~/services/trace/list-lot-moves.server"
import { ListPages } from "~/ui/desk/list-pages"
import { ButtonLink } from "~/ui/forms/button"
import { SheetHead } from "~/ui/layout/sheet"
import { type Fact, FactList } from "~/ui/trace/lot-facts"
import { LotMoves } from "~/ui/trace/lot-moves"
import { LotPlaces } from "~/ui/trace/lot-places"
import { MarginLinks } from "~/ui/trace/margin-links"
import { PLACE_WORDS } from "~/ui/trace/place-words"
import { firstStep, missingWords } from "~/ui/trace/release-words"
import { superWords } from "~/ui/trace/super-words"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/lot"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { lotLinks } from "./lot-links"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Lot ${params.code} · Waxbill` }]

export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params, url }: Route.LoaderArgs, scope) => {
		const { producer, roles } = scope
		const query = { producerId: producer.id, code: params.code }
		const lot = await findLot(query)
		if (!lot) throw data(null, { status: 404 })
		const zone = producer.timeZone
		const { release: given, ...facts } = lot
		const { release, ...way } = given
		const after = url.searchParams.get("after")
		const { moves, next } = await listLotMoves({ ...query, after })
		return {
			frame: await findDeskFrame(scope, { part: "lots" }),
			lot: facts,
			way,
			release: release && { ...release, releasedAt: fullDay(dayInZone(release.releasedAt, zone)) },
			seesOrders: roles.some(mayRunDesk),
			after,
			next,
			moves: moves.map(({ at, from, to, ...move }) => ({
				...move,
				at: at.toISOString(),
				when: `${shortMonthDay(dayInZone(at, zone))}, ${timeWords(at, zone)}`,
				from: from ? PLACE_WORDS[from] : "Off the hives",
				to: PLACE_WORDS[to],
			})),
		}
	},
)

export default function Lot({ loaderData, params }: Route.ComponentProps) {
	const { lot, moves, seesOrders, after, next } = loaderData
	const desk = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame} ruled>
			<SheetHead
				title={`Lot ${lot.code}`}
				lead={
					<>
						{lot.productName}, {lot.detail}. Off the hives {fullDay(lot.harvestedOn)}
						{lot.yard && ` at ${lot.yard}`}, best before {fullDay(lot.bestBeforeOn)}. {stateWords(lot)}
					</>
				}
				note={lot.state === "held" ? "A held lot counts as supply from its expected release." : undefined}
			/>
			<div className="with-margin">
				<div>
					<FirstThing loaderData={loaderData} params={params} />
					<FactList facts={factsOf(lot, desk)} />
					<LotPlaces {...lot} ordersHref={seesOrders ? `${desk}/orders` : null} />
				</div>
				<MarginLinks
					label="With this lot"
					links={lotLinks({ producer: params.producer, code: lot.code, state: lot.state, seesOrders })}
				/>
			</div>
			<LotMoves moves={moves} />
			<ListPages params={after ? { after } : {}} next={next} laterWords="Earlier moves" />
		</DeskBook>
	)
}

type LoaderData = Route.ComponentProps["loaderData"]

function stateWords(lot: LoaderData["lot"]): string {
	if (lot.state === "held") return `Held; its release is due ${dayWords(lot.expectedReleaseOn)}.`
	return lot.state === "released" ? "Released." : "Withdrawn: it must not be sold."
}

/** The one thing to do first with the lot, or why there is none. */
function FirstThing({ loaderData, params }: Pick<Route.ComponentProps, "loaderData" | "params">) {
	const { lot, way, release, seesOrders } = loaderData
	const desk = `/desk/${params.producer}`
	if (lot.state === "withdrawn") {
		return (
			<div className="step-line">
				<p>
					<b className="short">Withdrawn.</b> What is left stays where it is, and nothing of it can leave.
				</p>
				{seesOrders && lot.withdrawalNumber !== null && (
					<Link className="py-1" to={`${desk}/withdrawals/${lot.withdrawalNumber}`}>
						Withdrawal {lot.withdrawalNumber}
					</Link>
				)}
			</div>
		)
	}
	if (lot.state === "held") {
		const step = firstStep(way)
		const missing = missingWords(way)
		return (
			<div className="step-line">
				<p>
					<b>Before it can be released:</b>{" "}
					{missing.length > 0 ? missing.join(" ") : "nothing is missing. It is frozen and weighed."}
				</p>
				<ButtonLink
					variant="primary"
					to={
						step.page === "cold-room"
							? `${desk}/cold-room`
							: `${desk}/lots/${encodeURIComponent(lot.code)}/${step.page}`
					}
				>
					{step.words}
				</ButtonLink>
			</div>
		)
	}
	return (
		<div className="step-line">
			<p>{release ? <ReleasedWords release={release} /> : "Released before releases were written down."}</p>
		</div>
	)
}

function ReleasedWords({ release }: { release: NonNullable<LoaderData["release"]> }) {
	const by = release.who ? ` by ${release.who}` : ""
	if (release.kind === "proven")
		return (
			<>
				Released on {release.releasedAt}
				{by}: frozen and weighed.
			</>
		)
	return (
		<>
			<b>
				Released by hand on {release.releasedAt}
				{by}.
			</b>{" "}
			The reason, which stays with the lot: {release.reason}
		</>
	)
}

function factsOf(lot: LoaderData["lot"], desk: string): Fact[] {
	const { moistureTenths, pfundTenths } = lot
	const sources = lot.neighbours.filter(({ isSource }) => isSource)
	const made = lot.neighbours.filter(({ isSource }) => !isSource)
	return [
		{ name: "Grade", fact: lot.grade || "not graded yet" },
		{ name: "Flora", fact: lot.flora },
		{ name: "Yard", fact: lot.yard },
		{ name: "Colour", fact: pfundTenths === null ? "" : `${colourByPfund(pfundTenths)}, ${pfundTenths / 10} mm Pfund` },
		{ name: "Moisture", fact: moistureTenths === null ? "" : `${moistureTenths / 10} %` },
		{ name: "Supers", fact: superWords(lot.supers) },
		{ name: "Came from", fact: sources.length > 0 ? <Neighbours lots={sources} desk={desk} /> : null },
		{ name: "Went into", fact: made.length > 0 ? <Neighbours lots={made} desk={desk} /> : null },
	]
}

function Neighbours({ lots, desk }: { lots: readonly LotNeighbour[]; desk: string }) {
	return lots.map(({ code, kind, isSource, pieces, piecesMade }) => (
		<span className="block" key={`${code} ${kind} ${pieces}`}>
			<Link className="inline-block py-1" to={`${desk}/lots/${encodeURIComponent(code)}`}>
				lot {code}
			</Link>
			, {neighbourWords({ kind, isSource, pieces, piecesMade })}
		</span>
	))
}

function neighbourWords({ kind, isSource, pieces, piecesMade }: Omit<LotNeighbour, "code">): string {
	if (kind === "cut-up") return `${pieces} pieces cut up into ${piecesMade}`
	if (kind === "split") return isSource ? `${pieces} pieces split off it` : `${pieces} pieces split off`
	return isSource ? `${pieces} pieces of it put in` : `${pieces} pieces put together with others`
}
