import type { ReactNode } from "react"
import { shareWords } from "./breakage-words"
import type { BrokenRow } from "./where-picture"

type WhereTableProps = {
	rows: readonly BrokenRow[]
	/** The head of the first column: "Lot", "Round", "Product". */
	head: string
	/** What stands for a row's key, such as a link. */
	name: (row: BrokenRow) => ReactNode
	sumLabel: string
}

/** Broken pieces beside those sent, with their sum. */
export function WhereTable({ rows, head, name, sumLabel }: WhereTableProps) {
	const sum = (part: "sentPieces" | "brokenPieces") => rows.reduce((total, row) => total + row[part], 0)
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col">{head}</th>
					<th scope="col" className="num">
						Pieces sent
					</th>
					<th scope="col" className="num">
						Broken
					</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						Share
					</th>
				</tr>
			</thead>
			<tbody>
				{rows.map((row) => (
					<tr key={`${row.key} ${row.of}`}>
						<td>{name(row)}</td>
						<td className="num fig">{row.sentPieces}</td>
						<td className="num fig">{row.brokenPieces}</td>
						<td className="num whitespace-nowrap pr-4! desk:pr-8!">{shareWords(row.brokenPieces, row.sentPieces)}</td>
					</tr>
				))}
			</tbody>
			<tfoot>
				<tr>
					<td>
						<b>{sumLabel}</b>
					</td>
					<td className="num fig">{sum("sentPieces")}</td>
					<td className="num fig">{sum("brokenPieces")}</td>
					<td className="num whitespace-nowrap pr-4! desk:pr-8!">
						{shareWords(sum("brokenPieces"), sum("sentPieces"))}
					</td>
				</tr>
			</tfoot>
		</table>
	)
}
