/** What has happened, the earliest first; `at` is for machines, `when` for people. */
export function Timeline({
	events,
}: {
	events: readonly { what: string; who: string | null; at: string; when: string }[]
}) {
	return (
		<section aria-labelledby="timeline">
			<h2 className="head-italic" id="timeline">
				What has happened
			</h2>
			<ol className="mt-2 grid gap-1">
				{events.map(({ what, who, at, when }) => (
					<li key={`${what} ${at}`}>
						<b>{what}</b>
						{who && ` by ${who}`}{" "}
						<time className="note" dateTime={at}>
							{when}
						</time>
					</li>
				))}
			</ol>
		</section>
	)
}
