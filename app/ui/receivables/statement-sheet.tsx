import { Form, Link } from "react-router"
import { type Day, fullDay, shortMonthDay } from "~/domain/calendar"
import { type Ageing, ageingBuckets } from "~/domain/invoicing/ageing"
import { formatMoney, plainMoney } from "~/domain/money"
import { AGEING_HEADS } from "~/domain/receivables/ageing-words"
import { type EntryFacts, entryWords } from "~/domain/receivables/entry-words"
import { effectOf, type StatementRange } from "~/domain/receivables/statement"
import { Button } from "~/ui/forms/button"
import { TextField } from "~/ui/forms/fields"
import { AgeingBar, AgeingPatterns } from "./ageing-picture"

type Line = EntryFacts & { id: string; on: Day; balanceCents: number }

type Statement = {
	range: StatementRange
	broughtForwardCents: number
	closingCents: number
	lines: readonly Line[]
	ageing: Ageing
	owedCents: number
	onAccountCents: number
}

/** Which days a statement is of, and where it can be had as a file. `error` is about the days. */
export function StatementRangeForm({
	typed,
	error,
	filesHref,
	range,
}: {
	typed: StatementRange
	error: string | null
	/** The address of the statement without its ending. */
	filesHref: string
	range: StatementRange
}) {
	const search = new URLSearchParams(range)
	return (
		<div className="statement-bar no-print">
			<Form method="get" className="flex flex-wrap items-end gap-4">
				<TextField name="from" label="From day" type="date" defaultValue={typed.from} error={error ?? undefined} />
				<TextField name="until" label="Until day" type="date" defaultValue={typed.until} />
				<Button>Show these days</Button>
			</Form>
			<span className="links">
				{/* Files, not pages: the router leaves them to the browser. */}
				<Link className="py-1" to={`${filesHref}.pdf?${search}`} reloadDocument>
					Printed pages (PDF)
				</Link>
				<Link className="py-1" to={`${filesHref}.csv?${search}`} reloadDocument>
					For a spreadsheet (CSV)
				</Link>
			</span>
		</div>
	)
}

/**
 * The lines of a statement with the balance after each, what is owed at its foot, and how long it has been owed. A page that
 * is not the first begins with what was carried over; the end stands on the last.
 */
export function StatementTable({
	statement,
	isFirst,
	isLast,
	invoiceHref,
}: {
	statement: Statement
	isFirst: boolean
	isLast: boolean
	invoiceHref: (number: string) => string
}) {
	const { range, broughtForwardCents, closingCents, lines } = statement
	const first = lines[0]
	const carried = isFirst || !first ? broughtForwardCents : first.balanceCents - effectOf(first)
	return (
		<>
			<table className="sheet-table statement-table">
				<caption className="sr-only">
					{fullDay(range.from)} to {fullDay(range.until)}, in dollars
				</caption>
				<thead>
					<tr>
						<th scope="col">Day</th>
						<th scope="col">What</th>
						<th scope="col" className="num">
							Amount
						</th>
						<th scope="col" className="num balance pr-4! desk:pr-8!">
							Balance
						</th>
					</tr>
				</thead>
				<tbody>
					<tr className="carried">
						<td>{isFirst && <EntryDay on={range.from} />}</td>
						<th scope="row">{isFirst ? "Brought forward" : "Carried over"}</th>
						<td className="money sm:hidden">{plainMoney(carried)}</td>
						<td className="money max-sm:hidden" />
						<td className="money balance pr-4! desk:pr-8!">{plainMoney(carried)}</td>
					</tr>
					{lines.map((line) => (
						<LineRow key={line.id} line={line} invoiceHref={invoiceHref} />
					))}
				</tbody>
				{isLast && (
					<tfoot>
						<tr className="closing">
							<td>
								<EntryDay on={range.until} />
							</td>
							<th scope="row">{closingCents < 0 ? "In your favor" : "Owed"}</th>
							<td className="money sm:hidden">{formatMoney(Math.abs(closingCents))}</td>
							<td className="max-sm:hidden" />
							<td className="money balance pr-4! desk:pr-8!">{formatMoney(Math.abs(closingCents))}</td>
						</tr>
					</tfoot>
				)}
			</table>
			{isLast && <StatementAgeing {...statement} />}
		</>
	)
}

/** A day with its month written out, and cut short on a phone. */
function EntryDay({ on }: { on: Day }) {
	return (
		<>
			<span className="whitespace-nowrap max-sm:hidden">{fullDay(on)}</span>
			<span className="whitespace-nowrap sm:hidden">
				{shortMonthDay(on)}, {on.slice(0, 4)}
			</span>
		</>
	)
}

function LineRow({ line, invoiceHref }: { line: Line; invoiceHref: (number: string) => string }) {
	const { name, note } = entryWords(line)
	return (
		<tr>
			<td>
				<EntryDay on={line.on} />
			</td>
			<th scope="row">
				{line.kind === "invoice" && line.number ? (
					<Link className="inline-block py-1 whitespace-nowrap" to={invoiceHref(line.number)}>
						{name}
					</Link>
				) : (
					name
				)}
				{note && <span className="note block">{note}</span>}
			</th>
			<td className="money">{plainMoney(effectOf(line))}</td>
			<td className="money balance pr-4! desk:pr-8!">{plainMoney(line.balanceCents)}</td>
		</tr>
	)
}

function StatementAgeing({ ageing, owedCents, onAccountCents, range }: Statement) {
	if (owedCents === 0 && onAccountCents === 0) return null
	return (
		<section aria-label="How long it has been owed">
			<AgeingPatterns />
			<p className="px-4 pt-4 text-ink-soft desk:px-8">
				What was open on {fullDay(range.until)}, by days past the due date
				{onAccountCents > 0 ? `; ${formatMoney(onAccountCents)} on account is still to be set against it` : ""}.
			</p>
			<AgeingList ageing={ageing} />
			{owedCents > 0 && (
				<div className="px-4 pb-6 desk:px-8">
					<AgeingBar ageing={ageing} mostCents={owedCents} label={`${formatMoney(owedCents)} by days late, drawn`} />
				</div>
			)}
		</section>
	)
}

/** The five columns of an ageing with their heads above. */
export function AgeingList({ ageing }: { ageing: Ageing }) {
	return (
		<dl className="statement-ageing">
			{ageingBuckets.map((bucket) => (
				<div key={bucket}>
					<dt>{AGEING_HEADS[bucket]}</dt>
					<dd className={bucket !== "current" && ageing[bucket] > 0 ? "short" : undefined}>
						{plainMoney(ageing[bucket])}
					</dd>
				</div>
			))}
		</dl>
	)
}
