type PiecesRow = {
	productId: string
	name: string
	brought: number
	sold: number
	/** In card sales that are still open. */
	atCard: number
	left: number
	/** Gone back to the yard. */
	returned: number
	agrees: boolean
}

type PiecesTableProps = {
	rows: readonly PiecesRow[]
	/** Said below when all rows agree. */
	verdict: string | null
}

/** Pieces brought, sold and left by product. The columns of open card sales and of what went back stand there when needed. */
export function PiecesTable({ rows, verdict }: PiecesTableProps) {
	const columns: [head: string, of: (row: PiecesRow) => number][] = [
		["Brought", (row) => row.brought],
		["Sold", (row) => row.sold],
	]
	if (rows.some(({ atCard }) => atCard > 0)) columns.push(["At card", (row) => row.atCard])
	if (rows.some(({ returned }) => returned > 0)) columns.push(["Back", (row) => row.returned])
	columns.push(["Left", (row) => row.left])
	return (
		<div>
			<table className="stall-table">
				<caption className="sr-only">Pieces brought, sold and left</caption>
				<thead>
					<tr>
						<th scope="col">Product</th>
						{columns.map(([head]) => (
							<th key={head} scope="col">
								{head}
							</th>
						))}
					</tr>
				</thead>
				<tbody>
					{rows.map((row) => (
						<tr key={row.productId} className={row.agrees ? undefined : "wrong"}>
							<th scope="row">{row.name}</th>
							{columns.map(([head, of]) => (
								<td key={head}>{of(row)}</td>
							))}
						</tr>
					))}
				</tbody>
			</table>
			{verdict && <p className="stall-verdict">{verdict}</p>}
		</div>
	)
}
