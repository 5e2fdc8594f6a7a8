import type { CSSProperties } from "react"
import { plainMoney } from "~/domain/money"
import { color, type } from "../theme"
import { Strip } from "./strip"
import { Row } from "./text"
import { TotalFigure } from "./total-figure"

interface TableLine {
	name: string
	/** Grade, size, lot: one line under the name. */
	note?: string | null
	/** The cases in words, under the strip where there is one. */
	cases: string
	strip?: { given: number; asked: number }
	priceCents: number
	/** Stands in its place where the price is not that of a case. */
	priceWords?: string | undefined
	/** Cents, or words where there is no sum yet. */
	amount: number | string
}

interface LineTableProps {
	casesHead: string
	lines: readonly TableLine[]
	charges: readonly { label: string; cents: number }[]
	total: { label: string; cents: number }
}

const underRule = { borderBottom: `1px solid ${color.rule}` }
const inkRule = { borderBottom: `1px solid ${color.ink}` }

/** The lines of an order or an invoice with strips, the sums below and the total over a double rule. */
export function LineTable({ casesHead, lines, charges, total }: LineTableProps) {
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
						<Head side="left">Product</Head>
						<Head side="left" padding="8px 12px">
							{casesHead}
						</Head>
						<Head side="right">A case</Head>
						<Head side="right" padding="8px 0 8px 14px">
							Amount
						</Head>
					</tr>
				</thead>
				<tbody>
					{lines.map((line, index) => (
						// biome-ignore lint/suspicious/noArrayIndexKey: the same product may stand on two lines
						<LineRow key={index} line={line} />
					))}
					{charges.map((charge) => (
						<tr key={charge.label}>
							<td colSpan={3} style={{ ...type.body, fontSize: "15px", lineHeight: "20px", padding: "9px 0" }}>
								{charge.label}
							</td>
							<td align="right" style={{ ...type.figure, padding: "9px 0" }}>
								{plainMoney(charge.cents)}
							</td>
						</tr>
					))}
					<tr>
						<td colSpan={2} style={{ ...type.total, padding: "9px 0", borderTop: `1px solid ${color.ink}` }}>
							{total.label}
						</td>
						<td colSpan={2} align="right" style={{ borderTop: `1px solid ${color.ink}` }}>
							<TotalFigure cents={total.cents} />
						</td>
					</tr>
				</tbody>
			</table>
		</Row>
	)
}

function Head({ side, padding = "8px 0", children }: { side: "left" | "right"; padding?: string; children: string }) {
	return (
		<th align={side} style={{ ...type.head, ...inkRule, padding }}>
			{children}
		</th>
	)
}

function LineRow({ line }: { line: TableLine }) {
	const cell: CSSProperties = { ...underRule, padding: "11px 0" }
	return (
		<tr>
			<td style={cell}>
				<span style={type.name}>{line.name}</span>
				{line.note && (
					<>
						<br />
						<span style={type.caption}>{line.note}</span>
					</>
				)}
			</td>
			<td style={{ ...cell, padding: "11px 12px" }}>
				{line.strip && <Strip {...line.strip} />}
				<span style={{ ...(line.strip ? type.caption : type.figure), color: color.inkSoft }}>{line.cases}</span>
			</td>
			<td align="right" style={{ ...type.figure, ...cell }}>
				{line.priceWords === undefined ? (
					plainMoney(line.priceCents)
				) : (
					<span style={type.caption}>{line.priceWords}</span>
				)}
			</td>
			<td align="right" style={{ ...type.figure, ...cell, padding: "11px 0 11px 14px" }}>
				{typeof line.amount === "number" ? (
					plainMoney(line.amount)
				) : (
					<span style={{ ...type.caption, whiteSpace: "normal" }}>{line.amount}</span>
				)}
			</td>
		</tr>
	)
}
