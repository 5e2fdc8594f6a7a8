import { plainMoney } from "~/domain/money"
import { color, type } from "../theme"
import { Row } from "./text"
import { TotalFigure } from "./total-figure"

interface SumTableProps {
	head: string
	parts: readonly { label: string; cents: number }[]
	total: { label: string; cents: number }
}

/** Named sums under one another and their total over a double rule. */
export function SumTable({ head, parts, total }: SumTableProps) {
	const inkRule = { borderBottom: `1px solid ${color.ink}` }
	return (
		<Row>
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
							{head}
						</th>
						<th align="right" style={{ ...type.head, ...inkRule, padding: "8px 0" }}>
							Amount
						</th>
					</tr>
				</thead>
				<tbody>
					{parts.map((part, index) => (
						<tr key={part.label}>
							<td style={{ ...type.name, ...partRule(index, parts.length), padding: "11px 0" }}>{part.label}</td>
							<td
								align="right"
								style={{ ...type.figure, ...partRule(index, parts.length), padding: "11px 0 11px 14px" }}
							>
								{plainMoney(part.cents)}
							</td>
						</tr>
					))}
					<tr>
						<td style={{ ...type.total, padding: "9px 0" }}>{total.label}</td>
						<td align="right">
							<TotalFigure cents={total.cents} />
						</td>
					</tr>
				</tbody>
			</table>
		</Row>
	)
}

/** A fine rule between parts and an ink rule over the total. */
function partRule(index: number, count: number) {
	return { borderBottom: `1px solid ${index === count - 1 ? color.ink : color.rule}` }
}
