import { Link } from "react-router"

/** Plain links in the margin of a ruled sheet: what else can be done with what the page is about. */
export function MarginLinks({
	label,
	links,
}: {
	label: string
	links: readonly { to: string; words: string; isFile?: boolean }[]
}) {
	return (
		<nav className="margin-links no-print" aria-label={label}>
			<h2 className="head-italic">{label}</h2>
			<ul>
				{links.map(({ to, words, isFile }) => (
					<li key={to}>
						<Link to={to} reloadDocument={isFile}>
							{words}
						</Link>
					</li>
				))}
			</ul>
		</nav>
	)
}
