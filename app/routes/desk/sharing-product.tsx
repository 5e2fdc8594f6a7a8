import { data, Link, redirect, type ShouldRevalidateFunctionArgs } from "react-router"
import { dayWords, weekday, weekdayName } from "~/domain/calendar"
import { env } from "~/platform/env.server"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { ShareSheet } from "~/ui/sharing/share-sheet"
import { SharedRun } from "~/ui/sharing/shared-run"
import { WeightsForm } from "~/ui/sharing/weights-form"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/sharing-product"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { readSharingPage, sharingOf, takeSharingStep } from "./sharing-steps.server"

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `Share out ${loaderData?.page.productName.toLowerCase() ?? ""} · Waxbill` },
]

const DONE: Record<string, string> = {
	shared: "It is shared out, and the stores are told.",
	undone: "It waits again; no letter went out.",
	weighed: "Saved how much each store counts.",
}

export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const found = await sharingOf(scope, params)
	return {
		frame: await findDeskFrame(scope, { part: "sharing", day: params.day }),
		page: readSharingPage(found, { url, scope }),
		done: DONE[url.searchParams.get("done") ?? ""] ?? null,
		undoMinutes: Math.max(1, Math.round(env.UNDO_SECONDS / 60)),
	}
})

export const action = guard(admits.desk("owner", "desk"), async ({ request, params, url }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const taken = await takeSharingStep({ form, params, scope })
	if (!taken.ok) return data({ errors: taken.errors, values: taken.values }, { status: taken.status })
	throw redirect(`${url.pathname}?done=${taken.done}`)
})

/** A refusal reads the page again: what can be given may have changed, which is often why it was refused. */
export function shouldRevalidate({ actionStatus, defaultShouldRevalidate }: ShouldRevalidateFunctionArgs): boolean {
	return (actionStatus !== undefined && actionStatus >= 400) || defaultShouldRevalidate
}

/** One product of one day: the three rules beside one another, and one decision. */
export default function SharingProduct({ loaderData, actionData, params }: Route.ComponentProps) {
	const { page, done, undoMinutes } = loaderData
	const base = `/desk/${params.producer}`
	const values = actionData?.values ?? {}
	const errors = actionData?.errors ?? {}
	const summary = Object.entries(errors).map(([field, message]) =>
		field === ""
			? { message }
			: { field, message: `${page.names[field] ?? ""}${page.names[field] ? ": " : ""}${message}` },
	)
	const dayName = weekdayName(weekday(params.day))
	return (
		<DeskBook frame={loaderData.frame} ruled>
			{done && !actionData && (
				<MessageLine tone="saved" title={done}>
					{page.run?.canUndo &&
						`The letters go within ${undoMinutes === 1 ? "a minute" : `${undoMinutes} minutes`}; until then you can take it back.`}
				</MessageLine>
			)}
			<SheetHead
				title={`Share out ${page.productName.toLowerCase()}`}
				lead={
					<>
						For {dayWords(params.day)}. <Link to={`${base}/sharing`}>All that is short</Link>
						{" · "}
						<Link to={`${base}/promise/${encodeURIComponent(params.product)}?day=${params.day}`}>Why so many</Link>
					</>
				}
				note={page.note}
			/>
			<ErrorSummary title="Nothing was shared out" errors={summary} />
			{page.rows.length > 0 ? (
				<ShareSheet
					key={`${page.seen} ${page.suppose} ${page.rule}`}
					{...page}
					dayName={dayName}
					rule={page.ruleOf[values.rule ?? ""] ?? page.rule}
					values={values}
					errors={errors}
				/>
			) : (
				!page.run && (
					<EmptyLine action={<Link to={`${base}/orders?day=${params.day}`}>See the orders</Link>}>
						Nothing of it waits to be shared out for this day.
					</EmptyLine>
				)
			)}
			{page.run && <SharedRun run={page.run} ordersHref={`${base}/orders`} />}
			{page.maySetWeights && page.rows.length > 0 && (
				<WeightsForm stores={page.weighed} values={values} errors={errors} />
			)}
		</DeskBook>
	)
}
