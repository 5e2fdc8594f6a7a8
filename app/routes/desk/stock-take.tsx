import { randomUUID } from "node:crypto"
import { data, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone, shortMonthDay } from "~/domain/calendar"
import { piecesWords } from "~/domain/quantity"
import { now } from "~/platform/clock.server"
import {
	type CountSheet as FoundSheet,
	findCountSheet,
	listPlacesToCount,
	type SheetLot,
} from "~/services/stock/find-count-sheet.server"
import { postStockTake } from "~/services/stock/post-stock-take.server"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { CountReview } from "~/ui/stock/count-review"
import { CountSheet } from "~/ui/stock/count-sheet"
import { countedPlaceName } from "~/ui/stock/where-words"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/stock-take"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { countPlaceSearch, OTHER_ROWS, readCountPlace, readCounts, readOtherCodes, readRowIds } from "./stock-take-form"

export const meta: Route.MetaFunction = () => [{ title: "Stock-take · Waxbill" }]

const sheetLot = ({ lotId, code, productName, detail, bestBeforeOn }: SheetLot) => ({
	lotId,
	code,
	productName,
	detail,
	bestBefore: shortMonthDay(bestBeforeOn),
})

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const frame = await findDeskFrame(scope, { part: "lots" })
	const at = readCountPlace(url.searchParams)
	if (!at) {
		const places = await listPlacesToCount(producer.id)
		return {
			frame,
			sheet: null,
			places: places.map(({ place, ref, of, ...sums }) => ({
				name: countedPlaceName(place, of),
				search: countPlaceSearch({ place, ref }),
				...sums,
			})),
		}
	}
	const found = await findCountSheet({ producerId: producer.id, ...at })
	if (!found) throw data(null, { status: 404 })
	return {
		frame,
		places: [],
		sheet: {
			name: countedPlaceName(at.place, found.of),
			search: countPlaceSearch(at),
			lots: found.lots.map(sheetLot),
			more: found.more,
		},
	}
})

type Answer = {
	/** What is wrong, by field. */
	errors: Record<string, string>
	values: Record<string, string>
	/** Lots with a row on the sheet; empty when the differences are shown. */
	lots: ReturnType<typeof sheetLot>[]
	review: { key: string; lots: (ReturnType<typeof sheetLot> & ReviewFigures)[]; news: string } | null
}
type ReviewFigures = { counted: number; ledger: number; missing: number }

const NEWS = {
	first: "",
	changed: "Figures were changed since they were compared. Look at what would be posted now.",
	moved: "Pieces were moved here since the figures were compared, so nothing was posted. Look at them again.",
}

export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ request, url, params }: Route.ActionArgs, scope) => {
		const at = readCountPlace(url.searchParams)
		if (!at) throw data(null, { status: 400 })
		const form = await request.formData()
		const asked = { producerId: scope.producer.id, ...at, codes: readOtherCodes(form), lotIds: readRowIds(form) }
		const sheet = await findCountSheet(asked)
		if (!sheet) throw data(null, { status: 404 })
		const posted = readCounts(form, sheet.lots)
		const key = z.guid().safeParse(form.get("key"))
		if (Object.keys(posted.errors).length > 0) {
			const { errors, values } = posted
			return data<Answer>({ errors, values, lots: sheet.lots.map(sheetLot), review: null }, { status: 422 })
		}
		const again = (found: FoundSheet, news: keyof typeof NEWS, status: number) =>
			data<Answer>(
				{
					errors: {},
					values: posted.values,
					lots: [],
					review: {
						key: key.success ? key.data : randomUUID(),
						news: NEWS[news],
						lots: posted.counts.flatMap(({ lotId, counted }) => {
							const lot = found.lots.find((one) => one.lotId === lotId)
							return lot ? [{ ...sheetLot(lot), counted, ledger: lot.ledger, missing: lot.missing }] : []
						}),
					},
				},
				{ status },
			)
		if (form.get("intent") !== "post" || !key.success) return again(sheet, "first", 200)
		const lines = posted.counts.map(({ compared, ...line }) => ({ ...line, shown: compared?.ledger ?? -1 }))
		if (posted.counts.some(({ compared, counted }) => compared?.counted !== counted))
			return again(sheet, "changed", 409)
		const answer = await postStockTake({
			...at,
			producerId: scope.producer.id,
			personId: scope.person.id,
			takenOn: today(scope),
			placeWords: countedPlaceName(at.place, sheet.of),
			lines,
			idempotencyKey: key.data,
		})
		if (answer.ok) throw redirect(`/desk/${params.producer}/stock-take/${answer.takeId}?posted`)
		return again((await findCountSheet(asked)) ?? sheet, "moved", 409)
	},
)

function today({ producer }: DeskScope) {
	return dayInZone(now(), producer.timeZone)
}

export default function StockTake({ loaderData, actionData, params }: Route.ComponentProps) {
	const { sheet, places } = loaderData
	const base = `/desk/${params.producer}`
	if (!sheet) return <ChoosePlace frame={loaderData.frame} places={places} base={base} />
	const review = actionData?.review
	const lots = actionData && !review ? actionData.lots : sheet.lots
	const errors = actionData?.errors ?? {}
	return (
		<DeskBook frame={loaderData.frame} ruled={Boolean(review)}>
			{review?.news && (
				<MessageLine tone="problem" title="Not posted yet.">
					{review.news}
				</MessageLine>
			)}
			<SheetHead
				title={review ? `What differs at ${sheet.name}` : `Count ${sheet.name}`}
				lead={
					review ? (
						"Nothing is posted yet. Mend a figure if you miscounted; then post what differs."
					) : (
						<>
							Write the pieces of each lot. A blank field is a lot that was not counted, and stays as it is.{" "}
							<Link className="no-print" to="?">
								Another place
							</Link>
						</>
					)
				}
			/>
			<div className={review ? "desk:mr-[calc(var(--spacing-margin)-1px)]" : undefined}>
				<ErrorSummary
					title="Nothing was compared"
					errors={Object.entries(errors).map(([field, message]) => (field ? { field, message } : { message }))}
				/>
			</div>
			{review ? (
				<CountReview
					lots={review.lots}
					idempotencyKey={review.key}
					values={actionData.values}
					errors={errors}
					sheetHref={sheet.search}
				/>
			) : (
				<>
					<CountSheet lots={lots} otherRows={OTHER_ROWS} values={actionData?.values ?? {}} errors={errors} />
					{sheet.more > 0 && (
						<p className="note px-4 pb-4 desk:px-8">
							{sheet.more} more lots are at this place. Post the count of these first, then count the rest by their
							codes.
						</p>
					)}
				</>
			)}
		</DeskBook>
	)
}

type Chosen = Route.ComponentProps["loaderData"]

function ChoosePlace({ frame, places, base }: { frame: Chosen["frame"]; places: Chosen["places"]; base: string }) {
	return (
		<DeskBook frame={frame}>
			<SheetHead
				title="Stock-take"
				lead={
					<>
						Choose the place that you count. The sheet can be printed and taken along.{" "}
						<Link to={`${base}/stock-takes`}>Earlier counts</Link>
					</>
				}
			/>
			{places.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/lots`}>Lots</Link>}>
					The ledger has nothing in the cold room, on the ready shelf or at a market.
				</EmptyLine>
			) : (
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col">Place</th>
							<th scope="col" className="num">
								Lots
							</th>
							<th scope="col" className="num pr-4! desk:pr-8!">
								By the ledger
							</th>
						</tr>
					</thead>
					<tbody>
						{places.map((place) => (
							<tr key={place.search}>
								<td>
									<Link className="name inline-block py-1 text-body! first-letter:uppercase" to={place.search}>
										{place.name}
									</Link>
								</td>
								<td className="num fig">{place.lots}</td>
								<td className="num pr-4! desk:pr-8!">{piecesWords(place.pieces)}</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
		</DeskBook>
	)
}
