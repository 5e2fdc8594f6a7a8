import { data, Form, Link, redirect, useNavigation } from "react-router"
import { addDays, type Day, dayInZone, fullDay, isDay } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { type ClosedBooks, closeBooks } from "~/services/books/close-books.server"
import { findClosing } from "~/services/books/find-closing.server"
import { ClosingsTable } from "~/ui/books/closings-table"
import { OpenList } from "~/ui/books/open-list"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { Notice } from "~/ui/forms/notice"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/books-close"
import { closingForm } from "./books-form"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Close the books · Waxbill" }]

export const loader = guard(admits.desk("owner"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const asked = url.searchParams.get("until")
	const page = await findClosing({ producer, until: asked !== null && isDay(asked) ? asked : null, today })
	const error = asked === null ? null : problemOf(asked, page)
	const answer = {
		frame: await findDeskFrame(scope, { part: "invoices", now }),
		...page,
		error,
		closed: url.searchParams.get("closed"),
	}
	return data(answer, { status: error ? 400 : 200 })
})

export const action = guard(admits.desk("owner"), async ({ request, url }: Route.ActionArgs, { producer, person }) => {
	const parsed = closingForm.safeParse(Object.fromEntries(await request.formData()))
	if (!parsed.success) return data({ error: "Choose a day." }, { status: 422 })
	const { until } = parsed.data
	const today = dayInZone(askClock(), producer.timeZone)
	const closed = await closeBooks({ producer, until, today, personId: person.id })
	if (!closed.ok) return data({ error: refusalWords(closed) }, { status: 422 })
	throw redirect(`${url.pathname}?closed=${until}`)
})

/** Why the books cannot be closed until that day; null when they can. */
function problemOf(until: string, { latest, firstOpen }: { latest: Day; firstOpen: Day | null }): string | null {
	if (!isDay(until)) return "Choose a day."
	if (until > latest) return refusalWords({ ok: false, reason: "not-over-yet" })
	if (firstOpen === null || until >= firstOpen) return null
	return refusalWords({ ok: false, reason: "closed-already", until: addDays(firstOpen, -1) })
}

function refusalWords(refusal: ClosedBooks & { ok: false }): string {
	return refusal.reason === "not-over-yet"
		? "Choose a day before today: more may still be entered today."
		: `The books are closed until ${fullDay(refusal.until)} already. Choose a later day.`
}

export default function BooksClose({ loaderData, actionData, params }: Route.ComponentProps) {
	const { until, latest, firstOpen, stillOpen, earlier, closed } = loaderData
	const canClose = !loaderData.error && until <= latest && (!firstOpen || until >= firstOpen)
	const isBusy = useNavigation().formMethod === "POST"
	const error = actionData?.error ?? loaderData.error
	const base = `/desk/${params.producer}/books`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Close the books"
				lead={
					<>
						{firstOpen ? `Open from ${fullDay(firstOpen)} on.` : "Nothing is closed yet."}{" "}
						<Link to={base}>Back to the books</Link>
					</>
				}
				note="For good: nothing dated in a closed day is entered any more. What comes late is entered on the first open day."
			/>
			<ErrorSummary errors={error ? [{ field: "until", message: error }] : []} title="The books were not closed" />
			{closed && !error && isDay(closed) && (
				<MessageLine tone="saved" title={`Closed until ${fullDay(closed)}.`}>
					The file of those days is the same ever after.
				</MessageLine>
			)}
			<Form method="get" className="sheet-form in-line">
				<TextField
					key={until}
					name="until"
					label="Close until"
					type="date"
					max={latest}
					defaultValue={until}
					error={error ?? undefined}
				/>
				<div>
					<Button>See what is open until then</Button>
				</div>
			</Form>
			<section className="sheet-part" aria-labelledby="still-open">
				<h2 className="head-italic" id="still-open">
					Still open until {fullDay(until)}
				</h2>
				{stillOpen.length === 0 ? (
					<p>Nothing: every order that was sent is invoiced, and no payment is on its way.</p>
				) : (
					<>
						<p>You can close all the same. What comes of these is entered on the first open day.</p>
						<OpenList stillOpen={stillOpen} />
					</>
				)}
			</section>
			{canClose && (
				<Form method="post" className="sheet-form">
					<input type="hidden" name="until" value={until} />
					<Notice title="It cannot be undone">
						<p>Give your bookkeeper the file first, or after: it does not change any more.</p>
					</Notice>
					<div>
						<Button variant="primary" busy={isBusy}>
							Close the books until {fullDay(until)}
						</Button>
					</div>
				</Form>
			)}
			<ClosingsTable closings={earlier} base={base} />
		</DeskBook>
	)
}
