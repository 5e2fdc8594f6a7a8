import { data, Form, Link, redirect } from "react-router"
import { dayInZone, dayWords, fullDay } from "~/domain/calendar"
import { hoursWords, rowNamed, rowWords } from "~/domain/cold-room/freezing"
import { THAW_ADVICE } from "~/domain/cold-room/wax"
import { findReleasePage } from "~/services/cold-room/find-release-page.server"
import { type ReleaseAnswer, releaseByHand, releaseLot } from "~/services/cold-room/release-lot.server"
import { Button, ButtonLink } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { missingWords } from "~/ui/trace/release-words"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/release"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Release lot ${params.code} · Waxbill` }]

export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params, url }: Route.LoaderArgs, scope) => {
		const { producer, roles } = scope
		const lot = await findReleasePage({ producerId: producer.id, code: params.code })
		if (!lot) throw data(null, { status: 404 })
		const { way, ...facts } = lot
		const day = (at: Date) => fullDay(dayInZone(at, producer.timeZone))
		return {
			frame: await findDeskFrame(scope, { part: "lots" }),
			lot: facts,
			way: {
				...way,
				proof: way.proof && { ...way.proof, enteredAt: day(way.proof.enteredAt) },
				release: way.release && { ...way.release, releasedAt: day(way.release.releasedAt) },
			},
			isOwner: roles.includes("owner"),
			isDone: url.searchParams.has("done"),
		}
	},
)

export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ request, params, url }: Route.ActionArgs, scope) => {
		const form = await request.formData()
		const lot = { producerId: scope.producer.id, personId: scope.person.id, code: params.code }
		const reason = String(form.get("reason") ?? "")
		const isByHand = form.get("intent") === "by-hand"
		if (isByHand && !scope.roles.includes("owner")) throw data(null, { status: 403 })
		const answer = isByHand ? await releaseByHand({ ...lot, reason }) : await releaseLot(lot)
		if (answer.ok) throw redirect(`${url.pathname}?done`)
		if (answer.reason === "no-such-lot") throw data(null, { status: 404 })
		return data({ errors: [refusalWords(answer)], reason }, { status: 422 })
	},
)

function refusalWords(answer: Exclude<ReleaseAnswer, { ok: true }>): { field?: string; message: string } {
	if (answer.reason === "reason-too-short")
		return { field: "reason", message: "Write the reason in ten letters or more; it stands on the lot for ever." }
	if (answer.reason === "withdrawn") return { message: "The lot was withdrawn meanwhile, and stays withdrawn." }
	return { message: "Something is still missing; it stands below." }
}

export default function Release({ loaderData, actionData, params }: Route.ComponentProps) {
	const { lot, way, isOwner, isDone } = loaderData
	const desk = `/desk/${params.producer}`
	const page = `${desk}/lots/${encodeURIComponent(lot.code)}`
	const isHeld = lot.state === "held"
	return (
		<DeskBook frame={loaderData.frame} ruled>
			{isDone && way.release && !actionData && (
				<MessageLine tone="saved" title={`Lot ${lot.code} is released.`}>
					It can be promised and packed from where it lies.
				</MessageLine>
			)}
			<SheetHead
				title={isHeld ? `Release lot ${lot.code}` : `Release of lot ${lot.code}`}
				lead={
					<>
						{lot.productName}, {lot.detail}.{" "}
						{isHeld
							? `Its release is due ${dayWords(lot.expectedReleaseOn)}.`
							: lot.state === "withdrawn"
								? "It was withdrawn and must not be sold."
								: "It is released."}{" "}
						<Link to={page}>The lot</Link>
					</>
				}
				note="A freezer log proves temperature at the probe, not in the middle of the case."
			/>
			<ErrorSummary title="The lot was not released" errors={actionData?.errors ?? []} />
			<Grounds way={way} desk={desk} page={page} isHeld={isHeld} />
			{isHeld && way.missing.length === 0 && (
				<Form method="post" className="cold-form">
					<Button variant="primary" name="intent" value="proven">
						Release it
					</Button>
				</Form>
			)}
			{isHeld && way.missing.length > 0 && isOwner && (
				<Form method="post" className="cold-part">
					<h2 className="head-italic">Release it by hand</h2>
					<p>As the owner you may release it without all proofs. Your reason stands on the lot for ever.</p>
					<div className="cold-form">
						<div className="wide">
							<TextField
								name="reason"
								label="Why it is safe to sell"
								defaultValue={actionData?.reason}
								error={actionData?.errors.find(({ field }) => field === "reason")?.message}
								minLength={10}
								required
							/>
						</div>
						<div>
							<Button name="intent" value="by-hand">
								Release it by hand
							</Button>
						</div>
					</div>
				</Form>
			)}
			{lot.state !== "withdrawn" && (
				<section className="cold-part">
					<h2 className="head-italic">Thawing</h2>
					<ul>
						{THAW_ADVICE.map((words) => (
							<li key={words}>{words}</li>
						))}
					</ul>
				</section>
			)}
		</DeskBook>
	)
}

type GroundsProps = { way: Route.ComponentProps["loaderData"]["way"]; desk: string; page: string; isHeld: boolean }

/** What the release rests on, or what still stands before it with where it is done. */
function Grounds({ way, desk, page, isHeld }: GroundsProps) {
	const { proof, check, release, openLoads, missing } = way
	const row = proof && rowNamed(proof.rowTenthsC)
	const loadHref = openLoads[0] === undefined ? `${desk}/cold-room` : `${desk}/cold-room/${openLoads[0]}`
	const stepHref = missing[0] === "freezing" ? loadHref : `${page}/scale`
	return (
		<section className="cold-part">
			<h2 className="head-italic">What it rests on</h2>
			{isHeld && missing.length > 0 && (
				<p>
					<b className="short">Still missing:</b> {missingWords(way).join(" ")}
				</p>
			)}
			<ul>
				<li>
					<b>Freezing:</b>{" "}
					{proof && row ? (
						<>
							<Link to={`${desk}/cold-room/${proof.loadNumber}`}>load {proof.loadNumber}</Link>,{" "}
							{proof.kind === "entry" ? "read off a thermometer" : "from a logger"}: {hoursWords(proof.heldMinutes)} at{" "}
							{rowWords(row)} or colder. {way.piecesFrozen} pieces were frozen; {way.piecesOnShelves} lie on the
							shelves.
						</>
					) : (
						<>
							not proven.{" "}
							<Link to={loadHref}>
								{openLoads[0] === undefined ? "Put it in the freezer" : `Prove load ${openLoads[0]}`}
							</Link>
						</>
					)}
				</li>
				<li>
					<b>Net contents:</b>{" "}
					{check ? `${check.hasPassed ? "passed" : "failed"} on ${fullDay(check.checkedOn)}. ` : "not checked. "}
					<Link to={`${page}/scale`}>{check ? "The check" : "Check them"}</Link>
				</li>
				{release && (
					<li>
						<b>{release.kind === "proven" ? "Released on its proofs" : "Released by hand"}</b> on {release.releasedAt}
						{release.who && ` by ${release.who}`}
						{release.reason && `: “${release.reason}”`}
					</li>
				)}
			</ul>
			{isHeld && missing.length > 0 && (
				<div className="cold-form">
					<div>
						<ButtonLink variant="primary" to={stepHref}>
							{missing[0] === "freezing"
								? openLoads[0] === undefined
									? "Put it in the freezer"
									: "Prove its freezing"
								: "Check its net contents"}
						</ButtonLink>
					</div>
				</div>
			)}
		</section>
	)
}
