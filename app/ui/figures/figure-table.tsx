import type { ReactNode } from "react"

type Column = { head: string; isFigure?: boolean }

/** The figures of a picture as rows: the first cell names the row. Scrolls sideways where it is too wide. */
export function FigureTable({
	label,
	columns,
	rows,
}: {
	label: string
	columns: readonly Column[]
	rows: readonly { key: string; cells: readonly ReactNode[] }[]
}) {
	return (
		// biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls sideways is reached by keyboard
		<section className="overflow-x-auto" aria-label={label} tabIndex={0}>
			<table className="sheet-table figure-table">
				<thead>
					<tr>
						{columns.map(({ head, isFigure }) => (
							<th scope="col" key={head} className={isFigure ? "num" : undefined}>
								{head}
							</th>
						))}
					</tr>
				</thead>
				<tbody>
					{rows.map(({ key, cells: [name, ...figures] }) => (
						<tr key={key}>
							<th scope="row">{name}</th>
							{figures.map((figure, index) => {
								const column = columns[index + 1]
								return (
									<td key={column?.head} className={column?.isFigure ? "num fig" : undefined}>
										{figure}
									</td>
								)
							})}
						</tr>
					))}
				</tbody>
			</table>
		</section>
	)
}
