import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { dayInZone, shortMonthDay, timeWords } from "~/domain/calendar"
import { localMinute } from "~/domain/cold-room/wall-clock"
import { now as askClock } from "~/platform/clock.server"
import { listLoads } from "~/services/cold-room/list-loads.server"
import { startLoad } from "~/services/cold-room/start-load.server"
import { ListPages } from "~/ui/desk/list-pages"
import { counted } from "~/ui/desk/number-words"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { QuantityField } from "~/ui/forms/quantity-field"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/cold-room"
import { piecesTyped, startLoadForm } from "./cold-room-form"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Cold room · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	const after = url.searchParams.get("after")
	const { loads, ...rest } = await listLoads({ producerId: producer.id, after })
	const when = (at: Date) => `${shortMonthDay(dayInZone(at, producer.timeZone))}, ${timeWords(at, producer.timeZone)}`
	return {
		frame: await findDeskFrame(scope, { part: "lots", now }),
		...rest,
		after,
		loads: loads.map(({ loadedAt, provenAt, ...load }) => ({
			...load,
			loaded: when(loadedAt),
			proven: provenAt && when(provenAt),
		})),
		loadId: randomUUID(),
		nowLocal: localMinute(now, producer.timeZone),
	}
})

type Wrong = { field?: string; message: string }

export const action = guard(admits.desk("owner", "desk", "packer"), async ({ request }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const typed = Object.fromEntries([...form].map(([name, value]) => [name, String(value)]))
	const refuse = (status: number, errors: Wrong[]) => data({ errors, typed }, { status })
	const parsed = startLoadForm(scope.producer.timeZone).safeParse(typed)
	const fields = Object.entries(typed).filter(([name]) => name.startsWith("pieces-"))
	const lots = fields.map(([field, text]) => ({
		field,
		lotId: field.slice("pieces-".length),
		pieces: piecesTyped(text),
	}))
	const errors: Wrong[] = [
		...(parsed.success ? [] : parsed.error.issues.map(({ path, message }) => ({ field: String(path[0]), message }))),
		...lots.flatMap(({ field, pieces }) =>
			pieces === null ? [{ field, message: "Write a whole number of pieces." }] : [],
		),
	]
	if (!parsed.success || errors.length > 0) return refuse(400, errors)
	const loaded = lots.flatMap(({ lotId, pieces }) => (pieces ? [{ lotId, pieces }] : []))
	return start(scope, { ...parsed.data, lots: loaded }, refuse)
})

async function start<Refusal>(
	{ producer, person }: DeskScope,
	load: { loadId: string; freezer: string; loadedAt: Date; lots: { lotId: string; pieces: number }[] },
	refuse: (status: number, errors: Wrong[]) => Refusal,
): Promise<Refusal> {
	const started = await startLoad({ producerId: producer.id, personId: person.id, now: askClock(), ...load })
	if (started.ok) throw redirect(`/desk/${producer.slug}/cold-room/${started.number}`)
	if (started.reason === "nothing-loaded")
		return refuse(422, [{ message: "Write how many pieces of at least one lot go in." }])
	if (started.reason === "in-the-future")
		return refuse(422, [{ field: "loadedAt", message: "This time is still to come. Write when it went in." }])
	const words = { gone: "This lot is not there any more.", "not-held": "This lot is not held any more; leave it out." }
	return refuse(
		422,
		started.refused.map(({ lotId, why, piecesThere }) => ({
			field: `pieces-${lotId}`,
			message: why === "too-many" ? `Only ${piecesThere} pieces of it are there.` : words[why],
		})),
	)
}

export default function ColdRoom({ loaderData, actionData, params }: Route.ComponentProps) {
	const { loads, next, after } = loaderData
	const base = `/desk/${params.producer}/cold-room`
	return (
		<DeskBook frame={loaderData.frame} ruled>
			<SheetHead
				title="Cold room"
				lead="What went into a freezer together is treated together. A lot is released once its freezing is proven and its net contents are checked."
				note="A freezer log proves temperature at the probe, not in the middle of the case."
			/>
			<ErrorSummary title="Nothing was written down" errors={actionData?.errors ?? []} />
			<StartLoad key={loaderData.loadId} loaderData={loaderData} actionData={actionData} />
			<section className="cold-part">
				<h2 className="head-italic">Loads, the latest first</h2>
				{loads.length === 0 ? (
					<EmptyLine>{after ? "Nothing earlier." : "Nothing has been frozen yet."}</EmptyLine>
				) : (
					<table className="sheet-table">
						<thead>
							<tr>
								<th scope="col">Load</th>
								<th scope="col">Lots</th>
								<th scope="col">Freezing</th>
								<th scope="col" className="num pr-4!">
									Pieces
								</th>
							</tr>
						</thead>
						<tbody>
							{loads.map((load) => (
								<tr key={load.number}>
									<td>
										<Link className="name inline-block py-1 text-body! whitespace-nowrap" to={`${base}/${load.number}`}>
											Load {load.number}
										</Link>
										<span className="note block wrap-anywhere">
											{load.freezer}, in {load.loaded}
										</span>
									</td>
									<td className="wrap-anywhere">
										{load.lotCodes.slice(0, 4).join(", ")}
										{load.lotCodes.length > 4 && ` and ${load.lotCodes.length - 4} more`}
									</td>
									<td>
										{load.proven ? (
											<>proven {load.proven}</>
										) : (
											<span className={load.proofs > 0 ? "short" : undefined}>
												{load.proofs > 0 ? "not long or cold enough yet" : "to be proven"}
											</span>
										)}
									</td>
									<td className="num fig pr-4!">{load.pieces}</td>
								</tr>
							))}
						</tbody>
					</table>
				)}
				<ListPages params={after ? { after } : {}} next={next} laterWords="Earlier loads" />
			</section>
		</DeskBook>
	)
}

function StartLoad({ loaderData, actionData }: Pick<Route.ComponentProps, "loaderData" | "actionData">) {
	const { held, moreHeld, loadId, nowLocal } = loaderData
	const typed = actionData?.typed ?? {}
	const errorOf = (name: string) => actionData?.errors.find(({ field }) => field === name)?.message
	if (held.length === 0)
		return <EmptyLine>No lot is held with pieces on the shelves, so there is nothing to freeze.</EmptyLine>
	return (
		<Form method="post" className="cold-part">
			<h2 className="head-italic">Start a load</h2>
			<input type="hidden" name="loadId" value={typed.loadId ?? loadId} />
			<div className="cold-form">
				<TextField
					name="freezer"
					label="Freezer"
					defaultValue={typed.freezer}
					error={errorOf("freezer")}
					required
					maxLength={80}
				/>
				<TextField
					name="loadedAt"
					type="datetime-local"
					label="It went in"
					defaultValue={typed.loadedAt ?? nowLocal}
					error={errorOf("loadedAt")}
					required
				/>
			</div>
			<table className="sheet-table">
				<thead>
					<tr>
						<th scope="col">Held lot</th>
						<th scope="col">Where it is at</th>
						<th scope="col" className="num pr-4!">
							Pieces that go in
						</th>
					</tr>
				</thead>
				<tbody>
					{held.map((lot) => {
						const name = `pieces-${lot.lotId}`
						const left = Math.max(0, lot.piecesOnShelves - lot.piecesLoaded)
						return (
							<tr key={lot.lotId}>
								<td>
									<b className="wrap-anywhere">{lot.code}</b>
									<span className="note block wrap-anywhere">
										{lot.productName}, {lot.detail}
									</span>
								</td>
								<td>
									{counted(lot.piecesOnShelves, "piece")}, due {shortMonthDay(lot.expectedReleaseOn)}
									{lot.loadNumber !== null && (
										<span className="note block">
											{lot.piecesLoaded} of them in load {lot.loadNumber} or earlier
										</span>
									)}
								</td>
								<td className="num pr-4!">
									<QuantityField
										name={name}
										label={`Pieces of lot ${lot.code}`}
										defaultValue={typed[name] ?? (left > 0 ? String(left) : "")}
										error={errorOf(name)}
									/>
								</td>
							</tr>
						)
					})}
				</tbody>
			</table>
			{moreHeld > 0 && <p className="note">{counted(moreHeld, "more held lot")} come once these are released.</p>}
			<div className="cold-form">
				<div>
					<Button variant="primary">Start the load</Button>
				</div>
			</div>
		</Form>
	)
}
