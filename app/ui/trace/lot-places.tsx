import { Link } from "react-router"
import type { Place } from "~/domain/stock/places"
import { caseAndPieceWords } from "~/ui/desk/number-words"
import { PLACE_WORDS } from "./place-words"

type LotPlacesProps = {
	places: readonly { place: Place; of: string | null; orderNumber: number | null; pieces: number }[]
	piecesPerCase: number
	piecesHarvested: number
	/** Whether the places add up to what was harvested. */
	isComplete: boolean
	/** Where orders are opened; null for those who may not. */
	ordersHref: string | null
}

/** Where the pieces of a lot are, down to the sum that was harvested. */
export function LotPlaces({ places, piecesPerCase, piecesHarvested, isComplete, ordersHref }: LotPlacesProps) {
	return (
		<table className="sheet-table beside-margin">
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
				{places.map((place) => (
					<tr key={`${place.place} ${place.of} ${place.orderNumber}`}>
						<td>{PLACE_WORDS[place.place]}</td>
						<td>
							{place.of}
							<OrderOf place={place} ordersHref={ordersHref} />
						</td>
						<td className="num max-desk:hidden text-ink-soft">{caseAndPieceWords(place.pieces, piecesPerCase)}</td>
						<td className="num fig pr-4! desk:pr-8!">{place.pieces}</td>
					</tr>
				))}
			</tbody>
			<tfoot>
				<tr>
					<td colSpan={2}>
						<b>Harvested</b>
						{isComplete ? ", and all of it is somewhere above" : ""}
						{!isComplete && <span className="short">: the places above do not add up to it</span>}
					</td>
					<td className="max-desk:hidden" />
					<td className="num fig pr-4! desk:pr-8!">
						<b>{piecesHarvested}</b>
					</td>
				</tr>
			</tfoot>
		</table>
	)
}

function OrderOf({
	place: { orderNumber },
	ordersHref,
}: {
	place: LotPlacesProps["places"][number]
	ordersHref: string | null
}) {
	if (orderNumber === null) return null
	if (ordersHref === null) return <>, order {orderNumber}</>
	return (
		<>
			,{" "}
			<Link className="inline-block py-1" to={`${ordersHref}/${orderNumber}`}>
				order {orderNumber}
			</Link>
		</>
	)
}
