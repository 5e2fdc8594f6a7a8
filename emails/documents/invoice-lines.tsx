import { Text, View } from "@react-pdf/renderer"
import { formatMoney, plainMoney } from "~/domain/money"
import { stripCells } from "../parts/strip-cells"
import { DoubleRule, StripDrawing } from "./drawings"
import type { InvoiceProps } from "./invoice-props"
import { column, paper } from "./paper"

type InvoiceLine = InvoiceProps["lines"][number]

/** The lines of an invoice with the heads of the columns, which stand again on every further page. */
export function InvoiceLines({ lines }: Pick<InvoiceProps, "lines">) {
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
			{lines.map((line, index) => (
				// biome-ignore lint/suspicious/noArrayIndexKey: the same product may stand on two lines
				<LineRow key={index} line={line} />
			))}
		</View>
	)
}

function LineRow({ line }: { line: InvoiceLine }) {
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
				<StripDrawing given={line.casesSent} asked={line.casesAsked} />
				<Text style={paper.small}>{sentWords(line)}</Text>
			</View>
			<Text style={[paper.amount, { width: column.price }]}>{plainMoney(line.priceCents)}</Text>
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

/** Delivery, tax and what has been paid, then what is left over a double rule; never parted by the end of a page. */
export function InvoiceSums({
	charges,
	totalCents,
	paidCents,
}: Pick<InvoiceProps, "charges" | "totalCents" | "paidCents">) {
	const paid = paidCents > 0 ? [{ label: "Paid, thank you", cents: -paidCents }] : []
	return (
		<View wrap={false}>
			{[...charges, ...paid].map((charge) => (
				<View key={charge.label} style={paper.charge}>
					<Text style={[paper.text, { flex: 1 }]}>{charge.label}</Text>
					<Text style={paper.amount}>{plainMoney(charge.cents)}</Text>
				</View>
			))}
			<View style={paper.total}>
				<Text style={paper.totalWords}>To pay</Text>
				<View>
					<Text style={[paper.totalWords, { marginBottom: 6 }]}>{formatMoney(totalCents - paidCents)}</Text>
					<DoubleRule />
				</View>
			</View>
		</View>
	)
}
