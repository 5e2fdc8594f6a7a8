import { data, Form, Link } from "react-router"
import { dayInZone, fullDay } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { findWhereBroken } from "~/services/breakage/find-where-broken.server"
import { shareWords } from "~/ui/breakage/breakage-words"
import { type BrokenRow, WherePicture } from "~/ui/breakage/where-picture"
import { WhereTable } from "~/ui/breakage/where-table"
import { FilterLinks } from "~/ui/desk/filter-links"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/breakage-where"
import { BROKEN_BY, breakageRange } from "./breakage-range"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Where comb breaks · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	const range = breakageRange(url, dayInZone(now, producer.timeZone))
	const rows = range.error ? [] : await findWhereBroken({ producerId: producer.id, ...range })
	const answer = { frame: await findDeskFrame(scope, { part: "invoices", now }), ...range, rows }
	return data(answer, { status: range.error ? 400 : 200 })
})

export default function WhereBroken({ loaderData, params }: Route.ComponentProps) {
	const { by, from, to, error, rows } = loaderData
	const base = `/desk/${params.producer}`
	const chosen = BROKEN_BY.find(({ value }) => value === by)
	const head = chosen?.head ?? "Lot"
	const broken = rows.reduce((sum, row) => sum + row.brokenPieces, 0)
	const keep = { from, to }
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Where comb breaks"
				lead={error ? undefined : leadWords(loaderData)}
				action={<Link to={`${base}/breakage`}>All reports</Link>}
			/>
			<ErrorSummary errors={error ? [{ field: "from", message: error }] : []} />
			<Form method="get" className="sheet-form in-line" aria-label="Days">
				<input type="hidden" name="by" value={by} />
				<TextField name="from" label="Delivered from" type="date" defaultValue={from} error={error ?? undefined} />
				<TextField name="to" label="to" type="date" defaultValue={to} />
				<div>
					<Button>Show these days</Button>
				</div>
			</Form>
			<FilterLinks label="Counted by" name="by" chosen={by} options={BROKEN_BY} keep={keep} />
			{broken === 0 && !error && (
				<EmptyLine>Nothing that was delivered in these days is written off as broken.</EmptyLine>
			)}
			<WherePicture rows={rows} by={head.toLowerCase()} />
			{rows.length > 0 && (
				<WhereTable
					rows={rows}
					head={head}
					name={(row) => nameOf(row, by, base)}
					sumLabel={by === "lot" ? "These lots together" : "Together"}
				/>
			)}
			{rows.length > 0 && (
				<p className="px-4 py-4 desk:px-8">
					<a href={`${base}/breakage/where.csv?${new URLSearchParams({ by, ...keep })}`} download>
						These figures as a CSV file
					</a>
				</p>
			)}
		</DeskBook>
	)
}

function nameOf({ key, of }: BrokenRow, by: string, base: string) {
	if (by === "round") return key
	return (
		<>
			{by === "lot" ? (
				<Link className="inline-block py-1 fig" to={`${base}/lots/${key}`}>
					{key}
				</Link>
			) : (
				<span className="fig text-ink-faint">{key}</span>
			)}{" "}
			{of}
		</>
	)
}

/** "Delivered from June 1, 2026 to August 28, 2026: 14 pieces broken, 0.6 % of those sent." */
function leadWords({ from, to, rows, by }: Route.ComponentProps["loaderData"]): string {
	const sum = (part: "sentPieces" | "brokenPieces") => rows.reduce((total, row) => total + row[part], 0)
	const broken = sum("brokenPieces")
	const days = `Delivered from ${fullDay(from)} to ${fullDay(to)}, accepted as broken`
	if (by === "lot" || broken === 0) return `${days}: ${broken} ${broken === 1 ? "piece" : "pieces"}.`
	return `${days}: ${broken} of ${sum("sentPieces")} pieces sent, ${shareWords(broken, sum("sentPieces"))}.`
}
