import { Form, Link } from "react-router"
import type { Period } from "~/domain/books/period"
import { Button } from "~/ui/forms/button"
import { TextField } from "~/ui/forms/fields"

/** Which days a page is about: a step to the months around, the year, or any two days. Kept in the address of the page. */
export function PeriodBar({
	typed,
	error,
	links,
}: {
	typed: { from: string; to: string }
	error: string | null
	links: readonly { words: string; period: Period }[]
}) {
	return (
		<div className="period-bar">
			<nav aria-label="Other periods">
				{links.map(({ words, period }) => (
					<Link key={words} className="py-1" to={`?${new URLSearchParams(period)}`}>
						{words}
					</Link>
				))}
			</nav>
			<Form method="get" className="period-form">
				<TextField
					key={`from ${typed.from}`}
					name="from"
					label="From day"
					type="date"
					defaultValue={typed.from}
					error={error ?? undefined}
				/>
				<TextField key={`to ${typed.to}`} name="to" label="To day" type="date" defaultValue={typed.to} />
				<Button>Show these days</Button>
			</Form>
		</div>
	)
}
