import { randomUUID } from "node:crypto"
import { data, Form, redirect, useRevalidator } from "react-router"
import { z } from "zod"
import { dayInZone, fullDay } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { type FoundSuper, findSuper } from "~/services/crop/find-super.server"
import { listSuperChecks } from "~/services/crop/list-super-checks.server"
import { type MarkRefusal, markSupers, type SuperMark } from "~/services/crop/mark-supers.server"
import { CheckForm } from "~/ui/crop/check-form"
import { CheckHistory } from "~/ui/crop/check-history"
import { KeptChecks } from "~/ui/crop/kept-checks"
import { useKeptChecks } from "~/ui/crop/kept-checks-hook"
import { ListPages } from "~/ui/desk/list-pages"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/super"
import { postedForm, takeCheck } from "./check-post.server"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

const nameOf = ({ hiveLabel, level }: Pick<FoundSuper, "hiveLabel" | "level">) => `Hive ${hiveLabel}, super ${level}`

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `${loaderData ? nameOf(loaderData.found) : "Super"} · Waxbill` },
]

async function superOf({ producer }: DeskScope, id: string): Promise<FoundSuper> {
	const superId = z.guid().safeParse(id)
	const found = superId.success ? await findSuper({ producerId: producer.id, superId: superId.data }) : null
	if (!found) throw data(null, { status: 404 })
	return found
}

export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params, url }: Route.LoaderArgs, scope) => {
		const { producer, person } = scope
		const now = askClock()
		const found = await superOf(scope, params.super)
		const after = url.searchParams.get("after")
		const history = await listSuperChecks({ producerId: producer.id, superId: found.id, after })
		return {
			frame: await findDeskFrame(scope, { part: "crop", now }),
			found,
			...history,
			after,
			checkId: randomUUID(),
			place: {
				producer: producer.slug,
				zone: producer.timeZone,
				today: dayInZone(now, producer.timeZone),
				person: { id: person.id, name: person.name },
			},
			isChecked: url.searchParams.get("checked") === found.id,
		}
	},
)

export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ request, params, url }: Route.ActionArgs, scope) => {
		const found = await superOf(scope, params.super)
		const form = await postedForm(request)
		const intent = form.get("intent")
		if (intent === "escape-in" || intent === "escape-out") {
			const refused = await markEscape(scope, found, intent)
			if (refused === null) throw redirect(url.pathname)
			return data({ superId: null, fields: {}, errors: [{ message: refused }], newId: null }, { status: 422 })
		}
		const taken = await takeCheck(form, scope)
		if (!taken.ok) return data(taken, { status: 422 })
		throw redirect(`${url.pathname}?checked=${taken.superId}`)
	},
)

/** Marks the bee escape as of today; why it was not, in words, or null. */
async function markEscape(
	{ producer, person }: DeskScope,
	{ id }: FoundSuper,
	mark: SuperMark,
): Promise<string | null> {
	const today = dayInZone(askClock(), producer.timeZone)
	const marked = await markSupers({
		producerId: producer.id,
		personId: person.id,
		today,
		superIds: [id],
		mark,
		on: today,
	})
	return marked.ok ? null : ESCAPE_WORDS[marked.reason]
}

const ESCAPE_WORDS: Record<MarkRefusal["reason"], string> = {
	gone: "The super has come off meanwhile; nothing was marked.",
	"before-set-on": "The super is set on only after today; nothing was marked.",
	"none-chosen": "No super was named; nothing was marked.",
	"in-the-future": "That day is still to come; nothing was marked.",
}

function stateWords({ state, setOn, clearingOn, offOn, finishedPieces, capacityPieces }: FoundSuper): string {
	const since = `Set on ${fullDay(setOn)}`
	if (state === "off" && offOn) {
		const finished = finishedPieces === null ? "" : `, ${finishedPieces} of ${capacityPieces} sections fit to sell`
		return `${since}, came off ${fullDay(offOn)}${finished}.`
	}
	return clearingOn ? `${since}; the bee escape is in since ${fullDay(clearingOn)}.` : `${since}.`
}

export default function Super({ loaderData, actionData, params }: Route.ComponentProps) {
	const { found, checks, next, after, place, checkId } = loaderData
	const revalidator = useRevalidator()
	const book = useKeptChecks(place.producer, () => revalidator.revalidate())
	const base = `/desk/${params.producer}/crop`
	const name = nameOf(found)
	const about = { id: found.id, name, capacityPieces: found.capacityPieces, setOn: found.setOn }
	return (
		<DeskBook frame={loaderData.frame}>
			<div className="yard" data-mode="sun">
				<SheetHead
					title={name}
					lead={
						<>
							{found.productName}, {found.productDetail}, {found.capacityPieces} sections, at{" "}
							<a href={`${base}/yards/${found.yardId}`}>{found.yardName}</a>. {stateWords(found)}
						</>
					}
				/>
				<KeptChecks
					book={book}
					place={place}
					signInHref={`/sign-in?to=${encodeURIComponent(`${base}/supers/${found.id}`)}`}
				/>
				{loaderData.isChecked && !actionData && book.taken.length === 0 && (
					<MessageLine tone="saved" title="The check is recorded." />
				)}
				<ErrorSummary
					title="Nothing was recorded"
					errors={actionData?.errors ?? []}
					idOf={(field) => `check-${found.id}-${field}`}
				/>
				{found.state !== "off" && (
					<details className="check-opener yard-form" open={Boolean(actionData?.superId)}>
						<summary className="btn">Check it</summary>
						<CheckForm
							id={`check-${found.id}`}
							{...{ place, about }}
							checkId={actionData?.newId ?? checkId}
							last={checks[0] ?? null}
							fields={actionData?.fields}
							errors={actionData?.errors}
							onKeep={book.keep}
						/>
					</details>
				)}
				{found.state !== "off" && (
					<Form className="yard-form" method="post">
						<Button name="intent" value={found.state === "on" ? "escape-in" : "escape-out"}>
							{found.state === "on" ? "The bee escape went in today" : "The bee escape is out again"}
						</Button>
						<p className="field-hint">A bee escape clears a super in one to two days (common practice).</p>
					</Form>
				)}
				<section aria-labelledby="checks-head">
					<h2 className="head-italic border-b border-ink px-4 pt-2 pb-1 desk:px-8" id="checks-head">
						Its checks, the latest first
					</h2>
					{checks.length === 0 && (
						<EmptyLine>{after ? "No earlier checks." : "Nobody has looked into it yet."}</EmptyLine>
					)}
					<CheckHistory about={about} checks={checks} photosHref={`${base}/photos`} />
					<ListPages params={after ? { after } : {}} next={next} laterWords="Earlier checks" />
				</section>
			</div>
		</DeskBook>
	)
}
