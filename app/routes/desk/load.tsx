import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { dayInZone, shortMonthDay, timeWords } from "~/domain/calendar"
import { degrees, FREEZE_TABLE, hoursWords, rowNamed, rowWords } from "~/domain/cold-room/freezing"
import { now as askClock } from "~/platform/clock.server"
import { enterTreatment } from "~/services/cold-room/enter-treatment.server"
import { findLoad } from "~/services/cold-room/find-load.server"
import { FreezeCurve } from "~/ui/cold-room/freeze-curve"
import { PROBE_OPTIONS } from "~/ui/cold-room/probe-words"
import { reportWords, stillMissing, tableWords, verdictWords } from "~/ui/cold-room/report-words"
import { Button, ButtonLink } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { SelectField, TextField } from "~/ui/forms/fields"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/load"
import { loadNumber, treatmentForm } from "./cold-room-form"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Load ${params.load} · Waxbill` }]

export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params, url }: Route.LoaderArgs, scope) => {
		const { producer } = scope
		const number = loadNumber(params.load)
		const load = number === null ? null : await findLoad({ producerId: producer.id, number })
		if (!load) throw data(null, { status: 404 })
		const zone = producer.timeZone
		const when = (at: Date | number) =>
			`${shortMonthDay(dayInZone(new Date(at), zone))}, ${timeWords(new Date(at), zone)}`
		const { proofs, curve, loadedAt, provenAt, ...facts } = load
		const drawn = curve && proofs.find(({ id }) => id === curve.proofId)
		const ends = curve && ([when(curve.buckets[0]?.[0] ?? 0), when(curve.buckets.at(-1)?.[0] ?? 0)] as [string, string])
		return {
			frame: await findDeskFrame(scope, { part: "lots" }),
			load: { ...facts, loaded: when(loadedAt), proven: provenAt && when(provenAt) },
			proofs: proofs.map(({ runFrom, runTo, createdAt, report, ...proof }) => {
				const run = report?.runMinutes[FREEZE_TABLE.findIndex((row) => row.tenthsC === proof.rowTenthsC)]
				return {
					...proof,
					when: when(createdAt),
					run: runFrom && runTo && `from ${when(runFrom)} to ${when(runTo)}`,
					missing: stillMissing(proof, run ?? proof.heldMinutes),
					report: report ? reportWords(report, when) : [],
				}
			}),
			curve: curve && {
				buckets: curve.buckets,
				ends: ends ?? (["", ""] as [string, string]),
				run: drawn?.runFrom && drawn.runTo ? { from: drawn.runFrom.getTime(), to: drawn.runTo.getTime() } : null,
				runWords: drawn?.runFrom && drawn.runTo ? `${when(drawn.runFrom)} to ${when(drawn.runTo)}` : null,
				rowTenthsC: drawn?.rowTenthsC ?? null,
			},
			proofId: randomUUID(),
			hasRead: proofs.some(({ id }) => id === url.searchParams.get("read")),
		}
	},
)

export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ request, params, url }: Route.ActionArgs, scope) => {
		const number = loadNumber(params.load)
		if (number === null) throw data(null, { status: 404 })
		const form = await request.formData()
		const typed = Object.fromEntries([...form].map(([name, value]) => [name, String(value)]))
		const refuse = (status: number, ...errors: { field: string; message: string }[]) =>
			data({ errors, typed }, { status })
		const parsed = treatmentForm.safeParse(typed)
		if (!parsed.success)
			return refuse(400, ...parsed.error.issues.map(({ path, message }) => ({ field: String(path[0]), message })))
		const { degrees: unit, hours: minutes, place: probe, ...rest } = parsed.data
		const entered = await enterTreatment({
			producerId: scope.producer.id,
			personId: scope.person.id,
			number,
			...rest,
			unit,
			minutes,
			probe,
			now: askClock(),
		})
		if (entered.ok) throw redirect(`${url.pathname}?read=${rest.proofId}`)
		if (entered.reason === "no-such-load") throw data(null, { status: 404 })
		return refuse(422, {
			field: "hours",
			message: `It has been in for ${hoursWords(entered.mostMinutes)}; it cannot have been cold for longer.`,
		})
	},
)

export default function Load({ loaderData, actionData, params }: Route.ComponentProps) {
	const { load, proofs, hasRead } = loaderData
	const desk = `/desk/${params.producer}`
	const [latest] = proofs
	return (
		<DeskBook frame={loaderData.frame} ruled>
			{hasRead && latest && !actionData && (
				<MessageLine
					tone={latest.isAccepted ? "saved" : "problem"}
					title={latest.isAccepted ? "The freezing is proven." : "The reading is kept, and does not prove it yet."}
				>
					{latest.missing && `Still missing: ${latest.missing}`}
				</MessageLine>
			)}
			<SheetHead
				title={`Load ${load.number}`}
				lead={
					<>
						{load.freezer}, in since {load.loaded}
						{load.loadedBy && `, by ${load.loadedBy}`}.{" "}
						{load.proven ? `Proven ${load.proven}.` : "Its freezing is to be proven."}{" "}
						<Link to={`${desk}/cold-room`}>All loads</Link>
					</>
				}
				note="A freezer log proves temperature at the probe, not in the middle of the case."
			/>
			<ErrorSummary title="Nothing was written down" errors={actionData?.errors ?? []} />
			<LoadLots lots={load.lots} desk={desk} isProven={load.proven !== null} />
			<Readings loaderData={loaderData} />
			{!load.proven && (
				<Prove loaderData={loaderData} actionData={actionData} page={`${desk}/cold-room/${load.number}`} />
			)}
		</DeskBook>
	)
}

type LoaderData = Route.ComponentProps["loaderData"]

function LoadLots({ lots, desk, isProven }: { lots: LoaderData["load"]["lots"]; desk: string; isProven: boolean }) {
	return (
		<section className="cold-part">
			<h2 className="head-italic">What lies in it</h2>
			<table className="sheet-table">
				<thead>
					<tr>
						<th scope="col">Lot</th>
						<th scope="col">Product</th>
						<th scope="col">State</th>
						<th scope="col" className="num pr-4!">
							Pieces
						</th>
					</tr>
				</thead>
				<tbody>
					{lots.map((lot) => (
						<tr key={lot.code}>
							<td>
								<Link
									className="name inline-block py-1 text-body! wrap-anywhere"
									to={`${desk}/lots/${encodeURIComponent(lot.code)}`}
								>
									{lot.code}
								</Link>
							</td>
							<td className="wrap-anywhere">
								{lot.productName}
								<span className="note block">{lot.detail}</span>
							</td>
							<td>
								{lot.state}
								{isProven && lot.state === "held" && (
									<Link className="block py-1" to={`${desk}/lots/${encodeURIComponent(lot.code)}/release`}>
										Release it
									</Link>
								)}
							</td>
							<td className="num fig pr-4!">{lot.pieces}</td>
						</tr>
					))}
				</tbody>
			</table>
		</section>
	)
}

function Readings({ loaderData: { proofs, curve } }: { loaderData: LoaderData }) {
	const row = curve && rowNamed(curve.rowTenthsC)
	return (
		<>
			{curve && (
				<section className="cold-part">
					<h2 className="head-italic">What the logger showed</h2>
					<FreezeCurve
						{...curve}
						row={row}
						label={`Temperature from ${curve.ends[0]} to ${curve.ends[1]}, between ${degrees(Math.min(...curve.buckets.map(([, low]) => low)) / 10)} and ${degrees(Math.max(...curve.buckets.map(([, , high]) => high)) / 10)} °C.`}
					/>
					<p>
						{curve.runWords && row
							? `The washed band is the longest stretch at ${rowWords(row)} or colder: ${curve.runWords}. The strong line is that row of the freezing table.`
							: "It never reached a row of the freezing table."}
					</p>
				</section>
			)}
			{proofs.map((proof) => (
				<section className="cold-part" key={proof.id}>
					<h2 className="head-italic">
						{proof.kind === "entry" ? "Read off a thermometer" : "From a logger"}, {proof.when}
						{proof.who && `, by ${proof.who}`}
					</h2>
					<p>
						<b className={proof.isAccepted ? undefined : "short"}>{verdictWords(proof)}</b>
						{proof.run && ` The stretch runs ${proof.run}.`}
						{proof.missing && ` Still missing: ${proof.missing}`}
					</p>
					{(proof.fileName || proof.note) && (
						<p className="note">
							{proof.fileName && `File ${proof.fileName}. `}
							{proof.note}
						</p>
					)}
					<ul className="note">
						{proof.report.map((words) => (
							<li key={words}>{words}</li>
						))}
					</ul>
				</section>
			))}
		</>
	)
}

type ProveProps = { loaderData: LoaderData; actionData: Route.ComponentProps["actionData"]; page: string }

function Prove({ loaderData, actionData, page }: ProveProps) {
	const typed = actionData?.typed ?? {}
	const errorOf = (name: string) => actionData?.errors.find(({ field }) => field === name)?.message
	return (
		<section className="cold-part">
			<h2 className="head-italic">Prove the freezing</h2>
			<p>{tableWords(FREEZE_TABLE)} Between two rows the warmer one decides.</p>
			<div className="cold-form">
				<div className="wide">
					<ButtonLink variant="primary" to={`${page}/readings`}>
						Read a logger's file
					</ButtonLink>
				</div>
			</div>
			<Form method="post" className="cold-form" key={loaderData.proofId}>
				<p className="wide">
					<b>Or write down what a thermometer showed:</b>
				</p>
				<input type="hidden" name="proofId" value={typed.proofId ?? loaderData.proofId} />
				<TextField
					name="temperature"
					label="Never warmer than"
					inputMode="text"
					defaultValue={typed.temperature}
					error={errorOf("temperature")}
					hint="Degrees, such as -18 or 0."
				/>
				<SelectField
					name="degrees"
					label="Degrees"
					defaultValue={typed.degrees ?? "F"}
					error={errorOf("degrees")}
					options={[
						{ value: "F", label: "°F" },
						{ value: "C", label: "°C" },
					]}
				/>
				<TextField
					name="hours"
					label="For how many hours"
					inputMode="decimal"
					defaultValue={typed.hours}
					error={errorOf("hours")}
					hint="Without a break, such as 48 or 2.5."
				/>
				<SelectField
					name="place"
					label="Where the thermometer was"
					options={PROBE_OPTIONS}
					defaultValue={typed.place ?? "air-cases"}
					error={errorOf("place")}
				/>
				<TextField name="note" label="Note" defaultValue={typed.note} error={errorOf("note")} maxLength={400} />
				<div className="wide">
					<Button>Write it down and judge</Button>
				</div>
			</Form>
		</section>
	)
}
