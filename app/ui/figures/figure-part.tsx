import type { ReactNode } from "react"
import { Link } from "react-router"

/** One figure of the page: its name, its picture, the same figures as a table, and as a file. */
export function FigurePart({
	id,
	title,
	lead,
	csvHref,
	tableName,
	table,
	children,
}: {
	id: string
	title: string
	lead?: ReactNode
	csvHref?: string
	tableName?: string
	table?: ReactNode
	children: ReactNode
}) {
	return (
		<section className="figure-part" aria-labelledby={id}>
			<div className="figure-head">
				<h2 className="name" id={id}>
					{title}
				</h2>
				{csvHref && (
					// A file, not a page: the router leaves it to the browser.
					<Link className="py-1" to={csvHref} reloadDocument aria-label={`${title} as a CSV file`}>
						CSV
					</Link>
				)}
			</div>
			{lead && <p className="figure-lead">{lead}</p>}
			{children}
			{table && (
				<details className="season-table">
					<summary>{tableName}</summary>
					{table}
				</details>
			)}
		</section>
	)
}
