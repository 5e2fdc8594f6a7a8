import { color, type } from "../theme"
import { Row } from "./text"

interface PlainTableProps {
	heads: readonly [string, string]
	rows: readonly { key: string; name: string; note?: string | null; figure: string; figureNote?: string | null }[]
}

/** Two columns without sums: a name with its line, and what belongs to it at the right. */
export function PlainTable({ heads, rows }: PlainTableProps) {
	const inkRule = { borderBottom: `1px solid ${color.ink}` }
	const cell = { padding: "11px 0", borderBottom: `1px solid ${color.rule}` }
	return (
		<Row below={22}>
			<table
				data-text-format="dataTable"
				width="100%"
				cellPadding="0"
				cellSpacing="0"
				border={0}
				style={{ borderTop: `2px solid ${color.ink}` }}
			>
				<thead>
					<tr>
						<th align="left" style={{ ...type.head, ...inkRule, padding: "8px 0" }}>
							{heads[0]}
						</th>
						<th align="right" style={{ ...type.head, ...inkRule, padding: "8px 0" }}>
							{heads[1]}
						</th>
					</tr>
				</thead>
				<tbody>
					{rows.map((row) => (
						<tr key={row.key}>
							<td style={cell}>
								<TwoLines name={row.name} style={type.name} note={row.note} />
							</td>
							<td align="right" style={{ ...cell, paddingLeft: "14px" }}>
								<TwoLines name={row.figure} style={{ ...type.figure, whiteSpace: "normal" }} note={row.figureNote} />
							</td>
						</tr>
					))}
				</tbody>
			</table>
		</Row>
	)
}

function TwoLines({ name, style, note }: { name: string; style: React.CSSProperties; note?: string | null }) {
	return (
		<>
			<span style={style}>{name}</span>
			{note && (
				<>
					<br />
					<span style={type.caption}>{note}</span>
				</>
			)}
		</>
	)
}
