import { randomUUID } from "node:crypto"
import { data, redirect, useRevalidator } from "react-router"
import { z } from "zod"
import { dayInZone, fullDay } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { type FoundSuper, findSuper } from "~/services/crop/find-super.server"
import { listSuperChecks } from "~/services/crop/list-super-checks.server"
import { CheckForm } from "~/ui/crop/check-form"
import { CheckHistory } from "~/ui/crop/check-history"
import { KeptChecks } from "~/ui/crop/kept-checks"
import { useKeptChecks } from "~/ui/crop/kept-checks-hook"
import { ListPages } from "~/ui/desk/list-pages"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/super"
import { takeCheck } from "./check-post.server"
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
		await superOf(scope, params.super)
		const taken = await takeCheck(request, scope)
		if (!taken.ok) return data(taken, { status: 422 })
		throw redirect(`${url.pathname}?checked=${taken.superId}`)
	},
)

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
					<details className="check-opener yard-form" open={actionData !== undefined}>
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
