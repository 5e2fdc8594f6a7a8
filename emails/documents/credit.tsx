import { Text, View } from "@react-pdf/renderer"
import { fullDay } from "~/domain/calendar"
import { formatMoney, plainMoney } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import { type CreditProps, creditSubject } from "./credit-props"
import { column, paper } from "./paper"
import { Paper, Parties, renderPaper, Sum, Sums } from "./paper-parts"

/**
 * Draws the printed page of a credit: Letter, column heads on every page, what it settles under the sum. The date of the
 * file is the day of issue. Throws when the fonts of the packages cannot be read.
 */
export function renderCreditPdf(credit: CreditProps): Promise<Buffer> {
	return renderPaper(credit, drawCredit)
}

function drawCredit(credit: CreditProps) {
	const { yard, number, issuedOn, store, invoice, taxCents, totalCents, settled, onAccountCents } = credit
	return (
		<Paper
			title={`Credit ${number}`}
			yard={yard}
			subject={`Credit ${number} to ${store.name}, ${fullDay(issuedOn)}`}
			day={issuedOn}
			fine="A credit takes off what was invoiced; nothing is to be paid on it."
		>
			<Parties
				parties={[
					{ group: "To", name: store.name, facts: [store.address] },
					{
						group: "Takes off",
						name: invoice ? `Invoice ${invoice.number}` : "No invoice in particular",
						facts: [invoice && `of ${fullDay(invoice.issuedOn)}`, creditSubject({ ...credit, invoice: null })],
					},
					{
						group: "Credited",
						name: formatMoney(totalCents),
						facts: [
							onAccountCents > 0 ? `${formatMoney(onAccountCents)} of it on your account` : "All of it taken off",
						],
					},
				]}
			/>
			<Lines credit={credit} />
			<View wrap={false}>
				<Sums
					charges={taxCents > 0 ? [{ label: "Sales tax", cents: taxCents }] : []}
					total={{ label: "Credited", cents: totalCents }}
				/>
				{settled.map(({ invoiceNumber, cents }) => (
					<Sum key={invoiceNumber} label={`Taken off invoice ${invoiceNumber}`} cents={cents} />
				))}
				{onAccountCents > 0 && <Sum label="On your account" cents={onAccountCents} />}
			</View>
			<Text style={[paper.note, { marginTop: 20 }]}>{credit.reason}</Text>
		</Paper>
	)
}

function Lines({ credit: { lines } }: { credit: CreditProps }) {
	return (
		<View>
			<View style={paper.heads} fixed>
				<Text style={{ width: column.number }}>No.</Text>
				<Text style={{ flex: 1 }}>Product</Text>
				<Text style={{ width: column.cases }}>Pieces</Text>
				<Text style={{ width: column.amount, textAlign: "right" }}>Amount</Text>
			</View>
			{lines.map((line, index) => (
				// biome-ignore lint/suspicious/noArrayIndexKey: the same product may stand on two lines
				<View key={index} style={paper.line} wrap={false}>
					<Text style={[paper.figure, paper.soft, { width: column.number }]}>{line.sheetNumber ?? ""}</Text>
					<View style={{ flex: 1, paddingRight: 8 }}>
						<Text style={paper.name}>{line.productName}</Text>
						{line.productNote && <Text style={paper.small}>{line.productNote}</Text>}
					</View>
					<Text style={[paper.figure, { width: column.cases }]}>
						{line.pieces > 0 ? piecesWords(line.pieces) : "amount"}
					</Text>
					<Text style={[paper.amount, { width: column.amount }]}>{plainMoney(line.amountCents)}</Text>
				</View>
			))}
		</View>
	)
}
