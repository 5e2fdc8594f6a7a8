import { data, Link } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { findStatement } from "~/services/receivables/find-statement.server"
import { ListPages } from "~/ui/desk/list-pages"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { SheetHead } from "~/ui/layout/sheet"
import { StatementRangeForm, StatementTable } from "~/ui/receivables/statement-sheet"
import { admits, guard } from "../guard.server"
import { statementRange } from "../statement-range"
import type { Route } from "./+types/statement"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Statement · Waxbill" }]

export const loader = guard(admits.store("buyer", "payer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, store } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const asked = statementRange(url.searchParams, today)
	const after = url.searchParams.get("after")
	const query = { producerId: producer.id, storeId: store.id, range: asked.range, today, after }
	const { yard, next, ...statement } = await findStatement(query)
	const frame = await findBuyFrame(scope, { part: "invoices", now })
	const answer = { frame, yardName: yard.name, statement, asked, after, next }
	return data(answer, { status: asked.error ? 400 : 200 })
})

export default function BuyStatement({ loaderData, params }: Route.ComponentProps) {
	const { yardName, statement, asked, after, next } = loaderData
	const base = `/buy/${params.producer}/${params.store}`
	return (
		<BuyBook frame={loaderData.frame}>
			<SheetHead
				title="Statement"
				lead={`All that ${yardName} invoiced, credited and had from you in these days, and what is owed at the end.`}
				action={<Link to={`${base}/invoices`}>Invoices</Link>}
			/>
			<ErrorSummary errors={asked.error ? [{ field: "from", message: asked.error }] : []} />
			<StatementRangeForm typed={asked.typed} error={asked.error} range={asked.range} filesHref={`${base}/statement`} />
			<StatementTable
				statement={statement}
				isFirst={!after}
				isLast={next === null}
				invoiceHref={(number) => `${base}/invoices/${number}`}
			/>
			<ListPages params={{ ...asked.range, ...(after ? { after } : {}) }} next={next} laterWords="Further lines" />
		</BuyBook>
	)
}
