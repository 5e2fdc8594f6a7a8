import { Link } from "react-router"

/** One entry as it is read: a step, or a message with its `body`. */
export type ShownEntry = {
	id: string
	what: string
	who: string | null
	/** For machines, and for people. */
	at: string
	when: string
	/** A sentence that belongs to a step. */
	note: string | null
	body: string | null
	isOwn: boolean
}

/** What has happened and what was written, the earliest first. */
export function OrderTimeline({
	entries,
	earlierHref,
	latestHref,
}: {
	entries: readonly ShownEntry[]
	earlierHref: string | null
	latestHref: string | null
}) {
	return (
		<section aria-labelledby="timeline">
			<h2 className="head-italic" id="timeline">
				What has happened
			</h2>
			{earlierHref && (
				<Link className="inline-block py-1" to={earlierHref}>
					Earlier
				</Link>
			)}
			<ol className="timeline">
				{entries.map((entry) => (
					<Entry key={entry.id} entry={entry} />
				))}
			</ol>
			{latestHref && (
				<Link className="inline-block py-1" to={latestHref}>
					Back to the latest
				</Link>
			)}
		</section>
	)
}

function Entry({ entry: { what, who, at, when, note, body, isOwn } }: { entry: ShownEntry }) {
	const time = (
		<time className="note" dateTime={at}>
			{when}
		</time>
	)
	if (body !== null) {
		return (
			<li className={isOwn ? "timeline-message own" : "timeline-message"}>
				<b>{who}</b>
				{what && ` ${what}`} {time}
				<p>{body}</p>
			</li>
		)
	}
	return (
		<li>
			<b>{what}</b>
			{who && ` by ${who}`} {time}
			{note && <p className="note whitespace-pre-line">{note}</p>}
		</li>
	)
}
