import { data, Link } from "react-router"
import { dayInZone, dayWords, fullDay, shortMonthDay, timeWords } from "~/domain/calendar"
import { mayRunDesk } from "~/domain/people/roles"
import type { Place } from "~/domain/stock/places"
import { findLot } from "~/services/desk/find-lot.server"
import { caseAndPieceWords } from "~/ui/desk/number-words"
import { SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/lot"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Lot ${params.code} · Waxbill` }]

const PLACE_WORDS: Record<Place, string> = {
	"cold-room": "Cold room",
	ready: "Ready shelf",
	packed: "Packed",
	van: "On the van",
	market: "At market",
	sold: "Sold",
	waste: "Waste",
	"cut-up": "Cut up",
	"other-lot": "In another lot",
	missing: "Missing at a count",
}

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ params }: Route.LoaderArgs, scope) => {
	const { producer, roles } = scope
	const lot = await findLot({ producerId: producer.id, code: params.code })
	if (!lot) throw data(null, { status: 404 })
	const { moves, ...facts } = lot
	const zone = producer.timeZone
	return {
		frame: await findDeskFrame(scope, { part: "lots" }),
		lot: facts,
		seesOrders: roles.some(mayRunDesk),
		moves: moves.map(({ at, from, to, ...move }) => ({
			...move,
			at: at.toISOString(),
			when: `${shortMonthDay(dayInZone(at, zone))}, ${timeWords(at, zone)}`,
			from: from ? PLACE_WORDS[from] : "Off the hives",
			to: PLACE_WORDS[to],
		})),
	}
})

export default function Lot({ loaderData, params }: Route.ComponentProps) {
	const { lot, moves, seesOrders } = loaderData
	const base = `/desk/${params.producer}`
	const state =
		lot.state === "held"
			? `Held; its release is due ${dayWords(lot.expectedReleaseOn)}.`
			: lot.state === "released"
				? "Released."
				: "Withdrawn: it must not be sold."
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={`Lot ${lot.code}`}
				lead={
					<>
						{lot.productName}, {lot.detail}. Off the hives {fullDay(lot.harvestedOn)}
						{lot.yard && ` at ${lot.yard}`}, best before {fullDay(lot.bestBeforeOn)}. {state}
					</>
				}
			/>
			<table className="sheet-table">
				<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">Where its pieces are</caption>
				<thead>
					<tr>
						<th scope="col">Place</th>
						<th scope="col">For</th>
						<th scope="col" className="num max-desk:hidden">
							In cases
						</th>
						<th scope="col" className="num pr-4! desk:pr-8!">
							Pieces
						</th>
					</tr>
				</thead>
				<tbody>
					{lot.places.map((place) => (
						<tr key={`${place.place} ${place.of} ${place.orderNumber}`}>
							<td>{PLACE_WORDS[place.place]}</td>
							<td>
								{place.of}
								{place.orderNumber !== null && (
									<>
										,{" "}
										{seesOrders ? (
											<Link className="inline-block py-1" to={`${base}/orders/${place.orderNumber}`}>
												order {place.orderNumber}
											</Link>
										) : (
											`order ${place.orderNumber}`
										)}
									</>
								)}
							</td>
							<td className="num max-desk:hidden text-ink-soft">
								{caseAndPieceWords(place.pieces, lot.piecesPerCase)}
							</td>
							<td className="num fig pr-4! desk:pr-8!">{place.pieces}</td>
						</tr>
					))}
				</tbody>
				<tfoot>
					<tr>
						<td colSpan={2}>
							<b>Harvested</b>
							{lot.isComplete ? ", and all of it is somewhere above" : ""}
							{!lot.isComplete && <span className="short">: the places above do not add up to it</span>}
						</td>
						<td className="max-desk:hidden" />
						<td className="num fig pr-4! desk:pr-8!">
							<b>{lot.piecesHarvested}</b>
						</td>
					</tr>
				</tfoot>
			</table>
			<table className="sheet-table mt-6">
				<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">
					How they came there, the latest first
				</caption>
				<thead>
					<tr>
						<th scope="col">When</th>
						<th scope="col">Move</th>
						<th scope="col" className="max-desk:hidden">
							Why
						</th>
						<th scope="col" className="max-desk:hidden">
							Who
						</th>
						<th scope="col" className="num pr-4! desk:pr-8!">
							Pieces
						</th>
					</tr>
				</thead>
				<tbody>
					{moves.map((move, index) => (
						// biome-ignore lint/suspicious/noArrayIndexKey: moves are never reordered, and two may look the same
						<tr key={index}>
							<td>
								<time dateTime={move.at}>{move.when}</time>
							</td>
							<td>
								{move.from} to {move.to.toLowerCase()}
								<span className="note block desk:hidden">{move.reason}</span>
							</td>
							<td className="max-desk:hidden">{move.reason}</td>
							<td className="max-desk:hidden">{move.who ?? "by itself"}</td>
							<td className="num fig pr-4! desk:pr-8!">{move.pieces}</td>
						</tr>
					))}
				</tbody>
			</table>
		</DeskBook>
	)
}
