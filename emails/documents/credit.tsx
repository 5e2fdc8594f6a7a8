import { Document, Page, renderToBuffer, Text, View } from "@react-pdf/renderer"
import { fullDay } from "~/domain/calendar"
import { formatMoney, plainMoney } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import { joinKnown } from "../words"
import { type CreditProps, creditSubject } from "./credit-props"
import { DoubleRule, Mark } from "./drawings"
import { registerFonts } from "./fonts"
import { legible } from "./legible"
import { column, paper } from "./paper"

/**
 * Draws the printed page of a credit: Letter, column heads on every page, what it settles under the sum. The date of the
 * file is the day of issue. Throws when the fonts of the packages cannot be read.
 */
export async function renderCreditPdf(credit: CreditProps): Promise<Buffer> {
	const writable = registerFonts()
	return renderToBuffer(<CreditPaper credit={legible(credit, writable)} />)
}

function CreditPaper({ credit }: { credit: CreditProps }) {
	const { yard, number, issuedOn, store } = credit
	return (
		<Document
			title={`Credit ${number}`}
			author={yard.name}
			subject={`Credit ${number} to ${store.name}, ${fullDay(issuedOn)}`}
			creator="Waxbill"
			producer="Waxbill"
			language="en-US"
			creationDate={new Date(`${issuedOn}T12:00:00Z`)}
		>
			<Page size="LETTER" style={paper.page}>
				<View style={[paper.beside, { gap: 24 }]}>
					<Text style={[paper.yard, { flex: 1 }]}>{yard.name}</Text>
					<Text style={paper.number}>Credit {number}</Text>
				</View>
				<View style={[paper.beside, paper.soft, { gap: 24, marginTop: 3, marginBottom: 10 }]}>
					<Text style={{ flex: 1 }}>{joinKnown([yard.address, yard.email, yard.phone], ". ")}</Text>
					<Text>{fullDay(issuedOn)}</Text>
				</View>
				<DoubleRule />
				<Parties credit={credit} />
				<Lines credit={credit} />
				<Sums credit={credit} />
				<Text style={[paper.note, { marginTop: 20 }]}>{credit.reason}</Text>
				<View style={paper.foot} fixed>
					<Text>A credit takes off what was invoiced; nothing is to be paid on it.</Text>
					<Text
						render={({ pageNumber, totalPages }) => (totalPages > 1 ? `Page ${pageNumber} of ${totalPages}` : "")}
					/>
					<View style={{ flexDirection: "row", alignItems: "center", gap: 4 }}>
						<Mark />
						<Text>Waxbill</Text>
					</View>
				</View>
			</Page>
		</Document>
	)
}

function Parties({ credit }: { credit: CreditProps }) {
	const { store, invoice, totalCents, onAccountCents } = credit
	return (
		<View style={{ flexDirection: "row", gap: 14, paddingTop: 14, paddingBottom: 16 }}>
			<Party group="To" name={store.name} facts={[store.address]} />
			<Party
				group="Takes off"
				name={invoice ? `Invoice ${invoice.number}` : "No invoice in particular"}
				facts={[invoice && `of ${fullDay(invoice.issuedOn)}`, creditSubject({ ...credit, invoice: null })]}
			/>
			<Party
				group="Credited"
				name={formatMoney(totalCents)}
				facts={[onAccountCents > 0 ? `${formatMoney(onAccountCents)} of it on your account` : "All of it taken off"]}
			/>
		</View>
	)
}

interface PartyProps {
	group: string
	name: string
	facts: readonly (string | null | undefined)[]
}

function Party({ group, name, facts }: PartyProps) {
	return (
		<View style={{ flexGrow: 1, flexBasis: 0 }}>
			<Text style={paper.group}>{group}</Text>
			<Text style={paper.whom}>{name}</Text>
			{facts
				.filter((fact) => fact)
				.map((fact) => (
					<Text key={fact} style={paper.text}>
						{fact}
					</Text>
				))}
		</View>
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

function Sums({ credit: { taxCents, totalCents, settled, onAccountCents } }: { credit: CreditProps }) {
	return (
		<View wrap={false}>
			{taxCents > 0 && <Sum label="Sales tax" cents={taxCents} />}
			<View style={paper.total}>
				<Text style={paper.totalWords}>Credited</Text>
				<View>
					<Text style={[paper.totalWords, { marginBottom: 6 }]}>{formatMoney(totalCents)}</Text>
					<DoubleRule />
				</View>
			</View>
			{settled.map(({ invoiceNumber, cents }) => (
				<Sum key={invoiceNumber} label={`Taken off invoice ${invoiceNumber}`} cents={cents} />
			))}
			{onAccountCents > 0 && <Sum label="On your account" cents={onAccountCents} />}
		</View>
	)
}

function Sum({ label, cents }: { label: string; cents: number }) {
	return (
		<View style={paper.charge}>
			<Text style={[paper.text, { flex: 1 }]}>{label}</Text>
			<Text style={paper.amount}>{plainMoney(cents)}</Text>
		</View>
	)
}
