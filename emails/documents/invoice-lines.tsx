import { Text, View } from "@react-pdf/renderer"
import { linesByOrder } from "~/domain/invoicing/invoice-facts"
import { plainMoney } from "~/domain/money"
import { stripCells } from "../parts/strip-cells"
import { StripDrawing } from "./drawings"
import type { InvoiceProps } from "./invoice-props"
import { column, paper } from "./paper"

type InvoiceLine = InvoiceProps["lines"][number]

/** The lines of an invoice with the heads of the columns, which stand again on every further page. */
export function InvoiceLines({ lines, orders }: Pick<InvoiceProps, "lines" | "orders">) {
	return (
		<View>
			<View style={paper.heads} fixed>
				<Text style={{ width: column.number }}>No.</Text>
				<Text style={{ flex: 1 }}>Product</Text>
				<Text style={{ width: column.lots }}>Lot</Text>
				<Text style={{ width: column.weight }}>Net weight</Text>
				<Text style={{ width: column.cases }}>Cases</Text>
				<Text style={{ width: column.price, textAlign: "right" }}>A case</Text>
				<Text style={{ width: column.amount, textAlign: "right" }}>Amount</Text>
			</View>
			{linesByOrder(lines, orders).map((group, groupIndex) => (
				// biome-ignore lint/suspicious/noArrayIndexKey: the groups of a document are never reordered
				<View key={groupIndex}>
					{group.head && (
						<Text style={paper.orderHead} minPresenceAhead={40}>
							{group.head}
						</Text>
					)}
					{group.lines.map((line, index) => (
						// biome-ignore lint/suspicious/noArrayIndexKey: the same product may stand on two lines
						<LineRow key={index} line={line} />
					))}
				</View>
			))}
		</View>
	)
}

function LineRow({ line }: { line: InvoiceLine }) {
	const isCharge = line.casesAsked === 0
	return (
		<View style={paper.line} wrap={false}>
			<Text style={[paper.figure, paper.soft, { width: column.number }]}>{line.sheetNumber ?? ""}</Text>
			<View style={{ flex: 1, paddingRight: 8 }}>
				<Text style={paper.name}>{line.productName}</Text>
				{line.productNote && <Text style={paper.small}>{line.productNote}</Text>}
			</View>
			<Text style={[paper.figure, { width: column.lots, paddingRight: 4 }]}>{line.lots.join(", ")}</Text>
			<Text style={[paper.figure, { width: column.weight, paddingRight: 4 }]}>{line.netWeight ?? ""}</Text>
			<View style={{ width: column.cases }}>
				{!isCharge && <StripDrawing given={line.casesSent} asked={line.casesAsked} />}
				{!isCharge && <Text style={paper.small}>{sentWords(line)}</Text>}
			</View>
			<View style={{ width: column.price }}>
				{!isCharge && <Text style={paper.amount}>{plainMoney(line.poundCents ?? line.priceCents)}</Text>}
				{line.poundCents && <Text style={[paper.small, { textAlign: "right" }]}>a lb</Text>}
			</View>
			<Text style={[paper.amount, { width: column.amount }]}>{plainMoney(line.amountCents)}</Text>
		</View>
	)
}

/** "3 sent", "2 sent of 4 asked"; where one cell is five cases it says so. */
function sentWords({ casesSent, casesAsked }: InvoiceLine): string {
	const { casesPerCell } = stripCells(casesSent, casesAsked)
	const words = casesSent < casesAsked ? `${casesSent} sent of ${casesAsked} asked` : `${casesSent} sent`
	return casesPerCell === 1 ? words : `${words}; one cell is ${casesPerCell} cases`
}
