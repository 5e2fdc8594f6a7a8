import { data, Link } from "react-router"
import { monthOf, monthsAround, periodWords, yearOf } from "~/domain/books/period"
import { dayInZone, fullDay } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { findBooks } from "~/services/books/find-books.server"
import { BalanceTable } from "~/ui/books/balance-table"
import { ChecksTable } from "~/ui/books/checks-table"
import { MoneyPicture } from "~/ui/books/money-picture"
import { MoneyTable } from "~/ui/books/money-table"
import { PeriodBar } from "~/ui/books/period-bar"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, MarginNote, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/books"
import { askedPeriod } from "./books-period"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Books · Waxbill" }]

/** Three years: more would be too wide a picture. The file takes any days. */
const MOST_DAYS = 1096

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, roles } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const asked = askedPeriod(url, today, { mostDays: MOST_DAYS })
	const answer = {
		frame: await findDeskFrame(scope, { part: "invoices", now }),
		...asked,
		today,
		isOwner: roles.includes("owner"),
		books: await findBooks({ producer, ...asked.period, today }),
	}
	return data(answer, { status: asked.error ? 400 : 200 })
})

export default function Books({ loaderData, params }: Route.ComponentProps) {
	const { period, typed, error, books, today } = loaderData
	const base = `/desk/${params.producer}/books`
	const { earlier, later } = monthsAround(period)
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Books"
				lead={
					<>
						Every event of money in {periodWords(period)} as entries that balance.{" "}
						{books.closedUntil
							? `Closed until ${fullDay(books.closedUntil)}: those days read the same ever after.`
							: "Nothing is closed yet."}
					</>
				}
				action={<BooksLinks base={base} period={period} isOwner={loaderData.isOwner} />}
			/>
			<ErrorSummary errors={error ? [{ field: "from", message: error }] : []} />
			<PeriodBar
				typed={typed}
				error={error}
				links={[
					{ words: periodWords(earlier), period: earlier },
					{ words: "This month", period: monthOf(today) },
					{ words: periodWords(later), period: later },
					{ words: "This year", period: yearOf(today) },
				]}
			/>
			{books.balance.rows.length === 0 ? (
				<EmptyLine action={<Link to={base}>This month</Link>}>No money has moved in these days or before.</EmptyLine>
			) : (
				<>
					<MoneyPicture weeks={books.weeks} />
					<MoneyTable weeks={books.weeks} />
					<BalanceTable balance={books.balance} chart={books.chart} />
					<ChecksTable checks={books.checks} />
				</>
			)}
			<BooksNotes openDifferences={books.openDifferences} />
		</DeskBook>
	)
}

function BooksLinks({
	base,
	period,
	isOwner,
}: {
	base: string
	period: { from: string; to: string }
	isOwner: boolean
}) {
	return (
		<span className="flex flex-wrap gap-x-5">
			{/* A file, not a page: the router leaves it to the browser. */}
			<Link className="py-1" to={`${base}.csv?${new URLSearchParams(period)}`} reloadDocument>
				All entries (CSV)
			</Link>
			{isOwner && (
				<>
					<Link className="py-1" to={`${base}/accounts`}>
						Names of accounts
					</Link>
					<Link className="py-1" to={`${base}/close`}>
						Close the books
					</Link>
				</>
			)}
		</span>
	)
}

function BooksNotes({ openDifferences }: { openDifferences: number }) {
	return (
		<div className="sheet-part">
			{openDifferences > 0 && (
				<MarginNote>
					<span className="short">
						{openDifferences} {openDifferences === 1 ? "thing differs" : "things differ"} between Stripe and these
						books.
					</span>
				</MarginNote>
			)}
			<p className="note">
				Fees are entered with the payout that they are taken from. A bank debit is entered when it clears. Money on
				account counts against what stores owe. Whether tax may be taken back with a discount or a bad debt is for local
				rules to decide: ask your bookkeeper.
			</p>
		</div>
	)
}
