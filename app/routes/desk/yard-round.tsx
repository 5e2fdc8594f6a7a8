import { randomUUID } from "node:crypto"
import { data, redirect } from "react-router"
import { z } from "zod"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { findYardRound } from "~/services/crop/find-yard-round.server"
import { KeptChecks } from "~/ui/crop/kept-checks"
import { useKeptChecks } from "~/ui/crop/kept-checks-hook"
import { useKeptPage } from "~/ui/crop/yard-offline"
import { YardSuper } from "~/ui/crop/yard-super"
import { ListPages } from "~/ui/desk/list-pages"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { LedgerGroup } from "~/ui/layout/ledger"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/yard-round"
import { postedForm, takeCheck } from "./check-post.server"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ loaderData }) => [{ title: `${loaderData?.yard.name ?? "Yard"} · Waxbill` }]

const superName = (hive: string, level: number) => `Hive ${hive}, super ${level}`

export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params, url }: Route.LoaderArgs, scope) => {
		const { producer, person } = scope
		const now = askClock()
		const id = z.guid().safeParse(params.yard)
		const after = url.searchParams.get("after")
		const round = id.success ? await findYardRound({ producerId: producer.id, yardId: id.data, after }) : null
		if (!round) throw data(null, { status: 404 })
		const hives = round.hives.map(({ supers, ...hive }) => ({
			...hive,
			// Each form has the id of the check that it would make.
			supers: supers.map((one) => ({ ...one, name: superName(hive.label, one.level), checkId: randomUUID() })),
		}))
		const checked = url.searchParams.get("checked")
		return {
			frame: await findDeskFrame(scope, { part: "crop", now }),
			...round,
			hives,
			after,
			place: {
				producer: producer.slug,
				zone: producer.timeZone,
				today: dayInZone(now, producer.timeZone),
				person: { id: person.id, name: person.name },
			},
			checked: hives.flatMap(({ supers }) => supers).find((one) => one.id === checked)?.name ?? null,
		}
	},
)

export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ request, url }: Route.ActionArgs, scope) => {
		const taken = await takeCheck(await postedForm(request), scope)
		if (!taken.ok) return data(taken, { status: 422 })
		const search = new URLSearchParams(url.searchParams)
		search.set("checked", taken.superId)
		throw redirect(`${url.pathname}?${search}`)
	},
)

export default function YardRound({ loaderData, actionData, params }: Route.ComponentProps) {
	const { yard, hives, next, after, place, checked } = loaderData
	const book = useKeptChecks(place.producer)
	useKeptPage(place.producer, book.taken.length)
	const base = `/desk/${params.producer}/crop`
	const supers = hives.reduce((sum, hive) => sum + hive.supers.length, 0)
	return (
		<DeskBook frame={loaderData.frame}>
			<div className="yard" data-mode="sun">
				<SheetHead
					title={yard.name}
					lead={`${yard.flora ? `Near ${yard.flora}. ` : ""}${supers === 1 ? "1 super" : `${supers} supers`} to look into. This page opens without signal, and keeps what you note.`}
				/>
				<KeptChecks
					book={book}
					place={place}
					signInHref={`/sign-in?to=${encodeURIComponent(`${base}/yards/${yard.id}`)}`}
				/>
				{checked && !actionData && <MessageLine tone="saved" title={`The check of ${checked} is recorded.`} />}
				<ErrorSummary
					title="Nothing was recorded"
					errors={actionData?.errors ?? []}
					idOf={(field) => `check-${actionData?.superId}-${field}`}
				/>
				{hives.length === 0 && (
					<EmptyLine action={<a href={base}>The crop board</a>}>
						{after ? "No hive after that." : "No hives stand here yet."}
					</EmptyLine>
				)}
				{hives.map((hive) => (
					<LedgerGroup key={hive.id} when={`Hive ${hive.label}`}>
						{hive.supers.length === 0 && <EmptyLine>No super is on it.</EmptyLine>}
						{hive.supers.map((one) => {
							const isGiven = actionData?.superId === one.id
							return (
								<YardSuper
									key={one.id}
									place={place}
									book={book}
									about={{ id: one.id, name: one.name, capacityPieces: one.capacityPieces, setOn: one.setOn }}
									line={`${one.productName}, ${one.productDetail}`}
									clearingOn={one.clearingOn}
									last={one.lastCheck}
									href={`${base}/supers/${one.id}`}
									checkId={(isGiven && actionData.newId) || one.checkId}
									given={isGiven ? { fields: actionData.fields, errors: actionData.errors } : undefined}
								/>
							)
						})}
					</LedgerGroup>
				))}
				<ListPages params={after ? { after } : {}} next={next} laterWords="Further hives" />
			</div>
		</DeskBook>
	)
}
