import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { piecesWords } from "~/domain/quantity"
import { handTargets, mayMoveByHand } from "~/domain/stock/hand-moves"
import { findLotShelves, type LotShelf } from "~/services/stock/find-lot-shelves.server"
import { movePieces } from "~/services/stock/move-pieces.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { SelectField, TextField } from "~/ui/forms/fields"
import { EmptyLine, MarginNote, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { whereWords } from "~/ui/stock/where-words"
import { PLACE_WORDS } from "~/ui/trace/place-words"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/move-pieces"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { moveFields, moveForm, tooManyWords } from "./move-pieces-form"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Move pieces of lot ${params.code} · Waxbill` }]

async function lotOf({ producer }: DeskScope, code: string) {
	const lot = await findLotShelves({ producerId: producer.id, code })
	if (!lot) throw data(null, { status: 404 })
	return lot
}

const isByHand = (shelf: LotShelf) => handTargets.some((to) => mayMoveByHand(shelf.place, to))

export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params, url }: Route.LoaderArgs, scope) => {
		const { shelves, ...lot } = await lotOf(scope, params.code)
		return {
			frame: await findDeskFrame(scope, { part: "lots" }),
			lot,
			shelves: shelves.filter(isByHand),
			withOrders: shelves.filter((shelf) => !isByHand(shelf)),
			key: randomUUID(),
			wasMoved: url.searchParams.has("moved"),
		}
	},
)

export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ request, params, url }: Route.ActionArgs, scope) => {
		const lot = await lotOf(scope, params.code)
		const form = await request.formData()
		const typed = Object.fromEntries(moveFields.map((name) => [name, String(form.get(name) ?? "").slice(0, 400)]))
		const refuse = (...errors: { field?: string; message: string }[]) => data({ errors, typed }, { status: 422 })
		const parsed = moveForm.safeParse(typed)
		if (!parsed.success)
			return refuse(...parsed.error.issues.map(({ path, message }) => ({ field: String(path[0]), message })))
		const { from, to, pieces, reason, key } = parsed.data
		const answer = await movePieces({
			producerId: scope.producer.id,
			code: lot.code,
			personId: scope.person.id,
			from: from.place,
			fromRef: from.ref,
			to,
			pieces,
			reason,
			key,
		})
		if (answer.ok) throw redirect(`${url.pathname}?moved`)
		if (answer.reason === "no-such-lot") throw data(null, { status: 404 })
		if (answer.reason === "not-by-hand")
			return refuse({ field: "to", message: "Such a move is not made by hand. Choose another place." })
		const of = lot.shelves.find((shelf) => shelf.place === from.place && shelf.ref === from.ref)?.of ?? null
		return refuse({
			field: "pieces",
			message: tooManyWords({ code: lot.code, there: answer.there, where: whereWords(from.place, of) }),
		})
	},
)

export default function MovePieces({ loaderData, actionData, params }: Route.ComponentProps) {
	const { lot, shelves, withOrders, key, wasMoved } = loaderData
	const lotHref = `/desk/${params.producer}/lots/${encodeURIComponent(lot.code)}`
	const typed = actionData?.typed
	const errors = actionData?.errors ?? []
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	return (
		<DeskBook frame={loaderData.frame} ruled>
			{wasMoved && !actionData && (
				<MessageLine tone="saved" title="The pieces are moved.">
					The move stands on <Link to={lotHref}>the page of the lot</Link>, with its reason.
				</MessageLine>
			)}
			<SheetHead
				title={`Move pieces of lot ${lot.code}`}
				lead={
					<>
						{lot.productName}, {lot.detail}. A correction or a breakage; a move is never taken back, only followed by
						another. <Link to={lotHref}>The lot</Link>
					</>
				}
				note="Packing, selling and releasing write their own moves. This is for what happens besides."
			/>
			<ErrorSummary title="Nothing was moved" errors={errors} />
			{shelves.length === 0 ? (
				<EmptyLine action={<Link to={lotHref}>Lot {lot.code}</Link>}>
					Nothing of it lies on a shelf, at a market or is missing.
				</EmptyLine>
			) : (
				<Form method="post" className="grid gap-4 px-4 py-5 desk:px-8" noValidate key={key}>
					<input type="hidden" name="key" value={typed?.key || key} />
					<SelectField
						name="from"
						label="Pieces that are"
						options={shelves.map(({ place, ref, of, pieces }) => ({
							value: `${place}|${ref}`,
							label: `${whereWords(place, of)}: ${piecesWords(pieces)}`,
						}))}
						defaultValue={typed?.from}
						error={errorOf("from")}
					/>
					<SelectField
						name="to"
						label="Now go to"
						hint="Broken comb is waste. Missing is what nobody finds; a count brings it back when it turns up."
						options={[
							{ value: "", label: "Choose" },
							...handTargets.map((place) => ({ value: place, label: PLACE_WORDS[place] })),
						]}
						defaultValue={typed?.to}
						error={errorOf("to")}
					/>
					<TextField
						name="pieces"
						label="How many pieces"
						inputMode="numeric"
						autoComplete="off"
						defaultValue={typed?.pieces}
						error={errorOf("pieces")}
					/>
					<TextField
						name="reason"
						label="Why"
						autoComplete="off"
						defaultValue={typed?.reason}
						error={errorOf("reason")}
					/>
					<div>
						<Button variant="primary" size="big">
							Move the pieces
						</Button>
					</div>
				</Form>
			)}
			{withOrders.length > 0 && (
				<MarginNote>
					{withOrders
						.map(({ place, pieces, orderNumber }) => {
							const order = orderNumber === null ? "" : ` for order ${orderNumber}`
							return `${piecesWords(pieces)} ${whereWords(place)}${order}`
						})
						.slice(0, 3)
						.join("; ")}
					{withOrders.length > 3 ? ` and ${withOrders.length - 3} more` : ""}: they move with their orders.
				</MarginNote>
			)}
		</DeskBook>
	)
}
