import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { findStatement } from "~/services/receivables/find-statement.server"
import { mailStatement } from "~/services/receivables/mail-statement.server"
import { findStoreBySlug } from "~/services/standing-orders/find-store-by-slug.server"
import { ListPages } from "~/ui/desk/list-pages"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { StatementRangeForm, StatementTable } from "~/ui/receivables/statement-sheet"
import { admits, guard } from "../guard.server"
import { statementRange } from "../statement-range"
import type { Route } from "./+types/statement"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `Statement of ${loaderData?.storeName ?? "a store"} · Waxbill` },
]

export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const store = await findStoreBySlug({ producerId: producer.id, slug: params.store })
	if (!store) throw data(null, { status: 404 })
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const asked = statementRange(url.searchParams, today)
	const after = url.searchParams.get("after")
	const query = { producerId: producer.id, storeId: store.id, range: asked.range, today, after }
	const { yard: _, next, ...statement } = await findStatement(query)
	const answer = {
		frame: await findDeskFrame(scope, { part: "stores", now }),
		storeName: store.name,
		statement,
		asked,
		after,
		next,
		mailKey: randomUUID(),
		isMailed: url.searchParams.has("mailed"),
	}
	return data(answer, { status: asked.error ? 400 : 200 })
})

const UNMAILED = {
	nobody: "Nobody of this store has an address yet. Invite a buyer first.",
} as const

export const action = guard(admits.desk("owner", "desk"), async ({ request, params, url }: Route.ActionArgs, scope) => {
	const { producer, person } = scope
	const store = await findStoreBySlug({ producerId: producer.id, slug: params.store })
	if (!store) throw data(null, { status: 404 })
	const key = z.guid().safeParse((await request.formData()).get("mailKey"))
	if (!key.success) throw data(null, { status: 400 })
	const today = dayInZone(askClock(), producer.timeZone)
	const { range } = statementRange(url.searchParams, today)
	const query = { producerId: producer.id, storeId: store.id, range, today }
	const mailed = await mailStatement({ ...query, personId: person.id, mailKey: key.data })
	if (!mailed.ok) return data({ errors: [{ message: UNMAILED[mailed.reason] }] }, { status: 422 })
	throw redirect(`${url.pathname}?${new URLSearchParams({ ...range, mailed: "" })}`)
})

export default function DeskStatement({ loaderData, actionData, params }: Route.ComponentProps) {
	const { storeName, statement, asked, after, next, mailKey, isMailed } = loaderData
	const base = `/desk/${params.producer}`
	const here = `${base}/stores/${params.store}`
	return (
		<DeskBook frame={loaderData.frame}>
			{isMailed && !actionData && (
				<MessageLine tone="saved" title="The statement is on its way.">
					It goes to everyone of {storeName} who takes invoices by letter.
				</MessageLine>
			)}
			<SheetHead
				title={`Statement of ${storeName}`}
				lead="All that was invoiced, credited and paid in these days, in order, and what is owed at the end."
				action={<Link to={here}>{storeName}</Link>}
			/>
			<ErrorSummary
				errors={[...(asked.error ? [{ field: "from", message: asked.error }] : []), ...(actionData?.errors ?? [])]}
			/>
			<StatementRangeForm typed={asked.typed} error={asked.error} range={asked.range} filesHref={`${here}/statement`} />
			<Form
				method="post"
				action={`?${new URLSearchParams(asked.range)}`}
				className="no-print px-4 pb-4 desk:px-8"
				aria-label="Send the statement"
			>
				<input type="hidden" name="mailKey" value={mailKey} />
				<Button variant="primary">Mail this statement to the store</Button>
			</Form>
			<StatementTable
				statement={statement}
				isFirst={!after}
				isLast={next === null}
				invoiceHref={(number) => `${base}/invoices/${number}`}
			/>
			<ListPages params={{ ...asked.range, ...(after ? { after } : {}) }} next={next} laterWords="Further lines" />
		</DeskBook>
	)
}
